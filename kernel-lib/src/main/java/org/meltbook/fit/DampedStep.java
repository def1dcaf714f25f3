package org.meltbook.fit;

import java.util.Arrays;

/**
 * The step that lowers a linearised sum of squares most, damped, between bounds. The Jacobian is reduced once to its
 * triangle R and the turned residuals q; each damping then costs only a small problem. Without allocation.
 */
final class DampedStep {
    /** Share of its damping scale that a coordinate keeps from one linearisation to the next if its column shrinks. */
    private static final double KEPT = 0.5;

    private final Workspace workspace;
    private final int rows;
    private final int n;
    private final double[] lowest;
    private final double[] highest;
    private final double[] lengths; // of the columns
    private final double[] scales; // of the damping
    private final double[] matrix; // the Jacobian, column by column, overwritten by its decomposition
    private final double[] right;
    private final double[] heads;
    private final double[] triangle; // R, row k, column j at j * n + k
    private final double[] turned; // q
    private final double[] slope;
    private final double[] small; // R and the damping below it, column by column
    private final double[] smallRight;
    private final double[] smallHeads;
    private final double[] step;
    private final double[] straight; // the step before it was bent
    private final boolean[] fixed;
    private final boolean[] linear; // undamped
    private final int[] active;

    DampedStep(Workspace workspace) {
        this.workspace = workspace;
        this.rows = workspace.points();
        this.n = workspace.coordinates();
        this.lowest = new double[n];
        this.highest = new double[n];
        for (int j = 0; j < n; j++) {
            lowest[j] = workspace.lowest(j);
            highest[j] = workspace.highest(j);
        }
        this.lengths = new double[n];
        this.scales = new double[n];
        this.matrix = new double[rows * n];
        this.right = new double[rows];
        this.heads = new double[n];
        this.triangle = new double[n * n];
        this.turned = new double[n];
        this.slope = new double[n];
        this.small = new double[2 * n * n];
        this.smallRight = new double[2 * n];
        this.smallHeads = new double[n];
        this.straight = new double[n];
        this.step = new double[n];
        this.fixed = new boolean[n];
        this.linear = new boolean[n];
        for (int j : workspace.linear()) {
            linear[j] = true;
        }
        this.active = new int[n];
    }

    /** Forgets the column lengths seen so far. */
    void reset() {
        Arrays.fill(scales, 0);
    }

    /** Takes a linearisation, with the loss, and decomposes it. */
    void take(double[] residuals, double[] jacobian) {
        System.arraycopy(jacobian, 0, matrix, 0, rows * n);
        System.arraycopy(residuals, 0, right, 0, rows);
        Loss loss = workspace.loss();
        if (!loss.plain()) {
            weigh(loss);
        }
        for (int j = 0; j < n; j++) {
            double square = Sums.products(matrix, j * rows, matrix, j * rows, rows);
            lengths[j] = Math.sqrt(square);
            scales[j] = Math.max(KEPT * scales[j], lengths[j]);
            slope[j] = Sums.products(matrix, j * rows, right, 0, rows);
        }
        Reflections.reduce(matrix, rows, n, right, heads);
        for (int j = 0; j < n; j++) {
            turned[j] = right[j];
            for (int k = 0; k < n; k++) {
                triangle[j * n + k] = k <= j ? matrix[j * rows + k] : 0;
            }
        }
    }

    /** Rows so scaled that gradient and curvature are those of the loss; curvature is kept above a tenth of the weight. */
    private void weigh(Loss loss) {
        for (int i = 0; i < rows; i++) {
            double weight = loss.weight(right[i]);
            double root = Math.sqrt(Math.max(loss.curvature(right[i]), 0.1 * weight));
            right[i] = root > 0 ? right[i] * weight / root : 0;
            for (int j = 0; j < n; j++) {
                matrix[j * rows + i] *= root;
            }
        }
    }

    /** One coordinate of the step. */
    double at(int j) {
        return step[j];
    }

    /** Largest change of a coordinate as a share of it. */
    double longest(double[] here) {
        double most = 0;
        for (int j = 0; j < n; j++) {
            most = Math.max(most, Math.abs(step[j]) / (Math.abs(here[j]) + Double.MIN_NORMAL));
        }
        return most;
    }

    /**
     * Works out the step.
     *
     * @return by how much it lowers the linearised sum of squares
     */
    double solve(double[] here, boolean[] held, double damping) {
        Arrays.fill(step, 0);
        for (int j = 0; j < n; j++) {
            fixed[j] = held[j]
                    || here[j] <= lowest[j] && slope[j] >= 0
                    || here[j] >= highest[j] && slope[j] <= 0
                    || lengths[j] == 0;
        }
        boolean inside = false;
        while (!inside) {
            solveActive(Math.sqrt(damping), turned);
            inside = true;
            for (int j = 0; j < n; j++) {
                if (!fixed[j] && !(here[j] + step[j] >= lowest[j] && here[j] + step[j] <= highest[j])) {
                    step[j] = (step[j] < 0 ? lowest[j] : highest[j]) - here[j];
                    fixed[j] = true;
                    inside = false;
                }
            }
        }
        return gain();
    }

    /** The damped step in the coordinates that are not fixed, with the others where they are. */
    private void solveActive(double root, double[] target) {
        int m = 0;
        for (int j = 0; j < n; j++) {
            if (!fixed[j]) {
                active[m++] = j;
            }
        }
        int height = root > 0 ? n + m : n;
        Arrays.fill(smallRight, 0);
        for (int k = 0; k < n; k++) {
            double sum = target[k];
            for (int j = k; j < n; j++) {
                sum += fixed[j] ? triangle[j * n + k] * step[j] : 0;
            }
            smallRight[k] = -sum;
        }
        for (int c = 0; c < m; c++) {
            int j = active[c];
            for (int k = 0; k < n; k++) {
                small[c * height + k] = triangle[j * n + k] / lengths[j];
            }
            if (root > 0) {
                Arrays.fill(small, c * height + n, (c + 1) * height, 0);
                small[c * height + n + c] = linear[j] ? 0 : root * scales[j] / lengths[j];
            }
        }
        if (root > 0 || m < n) {
            Reflections.reduce(small, height, m, smallRight, smallHeads);
        }
        for (int c = m - 1; c >= 0; c--) {
            double sum = smallRight[c];
            for (int d = c + 1; d < m; d++) {
                sum -= small[d * height + c] * step[active[d]] * lengths[active[d]];
            }
            double pivot = small[c * height + c];
            // a combination that the data do not fix at all stays where it is
            step[active[c]] = Math.abs(pivot) > 1e-15 ? sum / pivot / lengths[active[c]] : 0;
        }
    }

    /**
     * Bends the step along the curve of the model (M. K. Transtrum, J. P. Sethna, arXiv:1201.5885, from memory).
     *
     * @param second second derivatives of the residuals along the step; overwritten
     * @return length of the bend over that of the step; the step is bent only if that is a number within bounds
     */
    double bend(double[] here, double damping, double[] second) {
        Reflections.turn(matrix, rows, n, second, heads);
        System.arraycopy(step, 0, straight, 0, n);
        for (int j = 0; j < n; j++) {
            second[j] *= 0.5;
            step[j] = 0;
        }
        solveActive(Math.sqrt(damping), second);
        double bend = 0;
        double length = 0;
        boolean inside = true;
        for (int j = 0; j < n; j++) {
            double scale = linear[j] ? 0 : scales[j]; // linear ones are put in place afterwards
            bend += step[j] * step[j] * scale * scale;
            length += straight[j] * straight[j] * scale * scale;
            double end = here[j] + straight[j] + step[j];
            inside &= fixed[j] || end >= lowest[j] && end <= highest[j];
        }
        for (int j = 0; j < n; j++) {
            step[j] = straight[j] + (inside ? step[j] : 0);
        }
        return length > 0 ? Math.sqrt(bend / length) : 0;
    }

    /** Jacobian times step, added to nothing: how the residuals change along it to first order. */
    void change(double[] jacobian, double[] into) {
        Arrays.fill(into, 0);
        for (int j = 0; j < n; j++) {
            for (int i = 0; i < rows; i++) {
                into[i] += jacobian[j * rows + i] * step[j];
            }
        }
    }

    /** |q|² − |q + R step|². */
    private double gain() {
        double gain = 0;
        for (int k = 0; k < n; k++) {
            double change = 0;
            for (int j = k; j < n; j++) {
                change += triangle[j * n + k] * step[j];
            }
            gain -= change * (2 * turned[k] + change);
        }
        return gain;
    }
}
