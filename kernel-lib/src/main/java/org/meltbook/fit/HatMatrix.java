package org.meltbook.fit;

import java.util.stream.IntStream;
import org.apache.commons.math3.distribution.BetaDistribution;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.RealMatrix;
import org.apache.commons.math3.linear.SingularValueDecomposition;
import org.meltbook.base.Doubles;

/**
 * How the fitted values follow the measured ones near the optimum: H = J (JᵀJ)⁻¹ Jᵀ, kept as an orthonormal basis of the
 * columns of the Jacobian. Parameters that rest on a bound do not follow the data and are left out.
 */
final class HatMatrix {
    private static final double SINGULAR = 1e-8;
    private static final int MANY = 2000;

    private final double[][] basis; // one row a point
    private final int rank;

    private HatMatrix(double[][] basis, int rank) {
        this.basis = basis;
        this.rank = rank;
    }

    static HatMatrix of(Fit fit) {
        RealMatrix jacobian = fit.scaledJacobian();
        int[] free = fit.problem().free();
        int[] used = IntStream.range(0, free.length)
                .filter(j -> fit.estimates().get(free[j]).status() != Estimate.Status.AT_BOUND
                        && jacobian.getColumnVector(j).getNorm() > 0)
                .toArray();
        int rows = jacobian.getRowDimension();
        if (used.length == 0) {
            return new HatMatrix(new double[rows][0], 0);
        }
        double[][] scaled = new double[Math.max(rows, used.length)][used.length];
        for (int c = 0; c < used.length; c++) {
            double length = jacobian.getColumnVector(used[c]).getNorm();
            for (int i = 0; i < rows; i++) {
                scaled[i][c] = jacobian.getEntry(i, used[c]) / length;
            }
        }
        SingularValueDecomposition svd = new SingularValueDecomposition(new Array2DRowRealMatrix(scaled, false));
        double[] singular = svd.getSingularValues();
        int rank = (int) java.util.Arrays.stream(singular)
                .filter(s -> s > SINGULAR * singular[0])
                .count();
        return new HatMatrix(svd.getU().getSubMatrix(0, rows - 1, 0, rank - 1).getData(), rank);
    }

    /** How many combinations of parameters follow the data. */
    int rank() {
        return rank;
    }

    /** Share of each point in its own fitted value, 0 to 1; they sum to the rank. */
    Doubles leverage() {
        return Doubles.of(IntStream.range(0, basis.length)
                .mapToDouble(i -> Math.min(1, entry(i, i)))
                .toArray());
    }

    double entry(int first, int second) {
        double sum = 0;
        for (int k = 0; k < rank; k++) {
            sum += basis[first][k] * basis[second][k];
        }
        return sum;
    }

    /**
     * Probability of a Durbin–Watson number as low as {@code statistic} if the errors are independent: the beta
     * distribution on 0 to 4 with the mean and variance that the fitted places give, J. Durbin, G. S. Watson,
     * Biometrika 38 (1951) 159, section 4 (memory). Beyond 2000 points the limit for many points takes their place:
     * mean 2, variance 4 / n. NaN if too few points are left for it.
     *
     * @param order places of the points along the residuals, in the order in which they are followed
     */
    double durbinWatsonBelow(double statistic, int[] order) {
        int n = order.length;
        int left = n - rank;
        double mean = 2;
        double variance = 4.0 / n;
        if (n <= MANY) {
            double[][] product = residualDifferences(order);
            double trace = IntStream.range(0, n).mapToDouble(i -> product[i][i]).sum();
            double squares = 0;
            for (int i = 0; i < n; i++) {
                for (int j = 0; j < n; j++) {
                    squares += product[i][j] * product[j][i];
                }
            }
            mean = trace / left;
            variance = 2 * (squares - trace * mean) / (left * (left + 2.0));
        }
        double both = mean * (4 - mean) / variance - 1;
        return left > 0 && both > 0
                ? new BetaDistribution(both * mean / 4, both * (1 - mean / 4)).cumulativeProbability(statistic / 4)
                : Double.NaN;
    }

    /** (I − H) A, where eᵀ A e is the sum of the squared steps from one residual to the next. */
    private double[][] residualDifferences(int[] order) {
        int n = order.length;
        double[][] product = new double[n][n];
        double[] row = new double[n];
        for (int i = 0; i < n; i++) {
            for (int j = 0; j < n; j++) {
                row[j] = (i == j ? 1 : 0) - entry(order[i], order[j]);
            }
            for (int j = 0; j < n; j++) {
                product[i][j] = (j > 0 ? row[j] - row[j - 1] : 0) + (j < n - 1 ? row[j] - row[j + 1] : 0);
            }
        }
        return product;
    }
}
