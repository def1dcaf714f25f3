package org.meltbook.numeric;

import java.util.Arrays;
import java.util.stream.IntStream;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.ArrayRealVector;
import org.apache.commons.math3.linear.QRDecomposition;
import org.apache.commons.math3.linear.SingularMatrixException;
import org.meltbook.base.Doubles;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;

/**
 * Least squares with unknowns that may not be negative: minimises |A x − b| over x ≥ 0.
 *
 * <p>Active-set method of C. L. Lawson and R. J. Hanson, Solving Least Squares Problems, 1974, chapter 23 (from
 * memory). Each trial set of free unknowns is solved by Householder QR of its own columns, never by the normal
 * equations, so that the conditioning is that of A. At the optimum the gradient w = Aᵀ(b − A x) is zero for free
 * unknowns and not positive for those held at zero. With many more rows than columns A and b are first brought to the
 * triangle of one QR, which leaves all lengths and angles as they are and makes each trial cheaper.
 */
public final class NonNegativeLeastSquares {
    private static final double EPSILON = Math.ulp(1.0);

    private final double[][] columns;
    private final double[] norms;
    private final double[] target;
    private final double[] x;
    private final boolean[] free;
    private final boolean[] barred;
    private int steps;

    private NonNegativeLeastSquares(double[][] matrix, double[] target) {
        int n = matrix[0].length;
        this.columns = new double[n][matrix.length];
        this.norms = new double[n];
        for (int j = 0; j < n; j++) {
            for (int i = 0; i < matrix.length; i++) {
                columns[j][i] = matrix[i][j];
            }
            norms[j] = Math.sqrt(dot(columns[j], columns[j]));
        }
        this.target = target.clone();
        this.x = new double[n];
        this.free = new boolean[n];
        this.barred = new boolean[n];
    }

    /**
     * The solution.
     *
     * @param unknowns  the unknowns, each zero or above
     * @param residual  length of A x − b
     * @param steps     how many trial sets were solved
     * @param converged whether the optimum was reached; {@code false} if the limit of steps came first
     */
    public record Solution(Doubles unknowns, double residual, int steps, boolean converged) {}

    /**
     * Solves the problem.
     *
     * @param matrix   A, one row an equation, all rows of one length; at least one row and one column
     * @param target   b, as long as A has rows
     * @param progress looked at before each step for an interrupt
     * @throws RangeException if the sizes do not fit or a number is not finite
     */
    public static Solution solve(double[][] matrix, double[] target, Progress progress) {
        check(matrix, target);
        int columns = matrix[0].length;
        if (matrix.length <= columns + 1) {
            return new NonNegativeLeastSquares(matrix, target).run(progress);
        }
        double[][] triangle = triangle(matrix, target);
        double[] last = new double[columns + 1];
        for (int i = 0; i <= columns; i++) {
            last[i] = triangle[i][columns];
            triangle[i] = Arrays.copyOf(triangle[i], columns);
        }
        return new NonNegativeLeastSquares(triangle, last).run(progress);
    }

    /** The triangle R of the QR decomposition of [A b]: one row and column more than A has columns. */
    private static double[][] triangle(double[][] matrix, double[] target) {
        int columns = matrix[0].length;
        double[][] both = new double[matrix.length][];
        for (int i = 0; i < both.length; i++) {
            both[i] = Arrays.copyOf(matrix[i], columns + 1);
            both[i][columns] = target[i];
        }
        return new QRDecomposition(new Array2DRowRealMatrix(both, false))
                .getR()
                .getSubMatrix(0, columns, 0, columns)
                .getData();
    }

    private static void check(double[][] matrix, double[] target) {
        if (matrix.length == 0 || matrix[0].length == 0 || matrix.length != target.length) {
            throw new RangeException("least squares needs at least one row and one column and as many targets as rows, "
                    + "found " + matrix.length + " rows and " + target.length + " targets");
        }
        for (int i = 0; i < matrix.length; i++) {
            if (matrix[i].length != matrix[0].length) {
                throw new RangeException(
                        "row " + i + " has " + matrix[i].length + " columns, row 0 has " + matrix[0].length);
            }
            if (!Double.isFinite(target[i]) || !Arrays.stream(matrix[i]).allMatch(Double::isFinite)) {
                throw new RangeException(
                        "row " + i + " of the least squares problem holds a number that is not finite");
            }
        }
    }

    private Solution run(Progress progress) {
        int limit = 10 * x.length + 10;
        while (steps < limit) {
            progress.at(steps, 0, "non-negative least squares");
            double[] residual = residual(x);
            int entering = steepest(residual);
            if (entering < 0) {
                return new Solution(Doubles.of(x), length(residual), steps, true);
            }
            free[entering] = true;
            if (settle(entering)) {
                Arrays.fill(barred, false);
            }
        }
        return new Solution(Doubles.of(x), length(residual(x)), steps, false);
    }

    /** The held unknown that would lower the sum of squares fastest a unit of its column, or −1 at the optimum. */
    private int steepest(double[] residual) {
        double scale = length(target);
        int best = -1;
        double most = 0;
        for (int j = 0; j < x.length; j++) {
            if (free[j] || barred[j] || norms[j] == 0) {
                continue;
            }
            double slope = dot(columns[j], residual) / norms[j];
            if (slope > 10 * EPSILON * scale * Math.sqrt(target.length) && slope > most) {
                most = slope;
                best = j;
            }
        }
        return best;
    }

    /**
     * Solves for the free unknowns, holding at zero those that would turn negative; false if the new one was refused.
     */
    private boolean settle(int entering) {
        boolean first = true;
        while (true) {
            steps++;
            double[] trial = solveFree();
            if (first && !(trial[entering] > 0)) {
                free[entering] = false;
                barred[entering] = true;
                return false;
            }
            first = false;
            double share = 1;
            for (int j = 0; j < x.length; j++) {
                share = Math.min(share, reach(j, trial));
            }
            for (int j = 0; j < x.length; j++) {
                boolean stops = reach(j, trial) <= share;
                x[j] = free[j] && !stops ? x[j] + share * (trial[j] - x[j]) : 0;
                free[j] = free[j] && !stops;
            }
            if (share == 1) {
                return true;
            }
        }
    }

    /** The share of the way from x to the trial at which this unknown reaches zero; infinite if it never does. */
    private double reach(int j, double[] trial) {
        return free[j] && trial[j] <= 0 ? x[j] / (x[j] - trial[j]) : Double.POSITIVE_INFINITY;
    }

    /** Least squares over the free columns, zero elsewhere; all zero if the columns depend on each other. */
    private double[] solveFree() {
        int[] chosen = IntStream.range(0, x.length).filter(j -> free[j]).toArray();
        double[] trial = new double[x.length];
        if (chosen.length > target.length) {
            return trial;
        }
        double[][] a = new double[target.length][chosen.length];
        for (int c = 0; c < chosen.length; c++) {
            for (int i = 0; i < target.length; i++) {
                a[i][c] = columns[chosen[c]][i] / norms[chosen[c]];
            }
        }
        try {
            double[] solved = new QRDecomposition(new Array2DRowRealMatrix(a, false), 100 * EPSILON)
                    .getSolver()
                    .solve(new ArrayRealVector(target, false))
                    .toArray();
            for (int c = 0; c < chosen.length; c++) {
                trial[chosen[c]] = solved[c] / norms[chosen[c]];
            }
        } catch (SingularMatrixException dependent) {
            return trial; // the entering column adds nothing to those already free: settle() refuses it
        }
        return trial;
    }

    private double[] residual(double[] at) {
        double[] left = target.clone();
        for (int j = 0; j < at.length; j++) {
            if (at[j] != 0) {
                for (int i = 0; i < left.length; i++) {
                    left[i] -= columns[j][i] * at[j];
                }
            }
        }
        return left;
    }

    private static double dot(double[] a, double[] b) {
        double sum = 0;
        for (int i = 0; i < a.length; i++) {
            sum += a[i] * b[i];
        }
        return sum;
    }

    private static double length(double[] a) {
        return Math.sqrt(dot(a, a));
    }
}
