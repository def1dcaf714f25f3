package org.meltbook.fit;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.SingularValueDecomposition;

/**
 * What the Jacobian at the end of a fit says about the parameters: which are fixed by the data, and how well. Worked
 * out on the inner scale (difference or logarithm) from the singular values of the Jacobian with columns of length one.
 */
final class Covariance {
    /** Below this share of the largest singular value a combination of parameters counts as not fixed by the data. */
    private static final double SINGULAR = 1e-8;
    /** A parameter belongs to such a combination from this weight on. */
    private static final double PART = 0.1;

    private final Problem problem;
    private final int[] free;
    private final double[][] tangent;
    private final boolean[] bound;
    private final boolean[] loose;
    private final double[][] matrix;
    private final List<String> problems = new ArrayList<>();

    private Covariance(Problem problem, double[][] tangent) {
        int count = problem.parameters().size();
        this.problem = problem;
        this.tangent = tangent;
        this.free = problem.free();
        this.bound = new boolean[count];
        this.loose = new boolean[count];
        this.matrix = new double[count][count];
        for (double[] row : matrix) {
            Arrays.fill(row, Double.NaN);
        }
    }

    /**
     * The covariance at the given values for unit residual variance.
     *
     * @param values   one a parameter
     * @param jacobian derivatives of the residuals to the coordinates, one row a point
     * @param tangent  derivatives of all values to the coordinates, one row a parameter
     */
    static Covariance of(Problem problem, double[] values, double[][] jacobian, double[][] tangent) {
        Covariance covariance = new Covariance(problem, tangent);
        covariance.fill(values, jacobian);
        return covariance;
    }

    /** Covariance of two parameters on their own scales for unit residual variance; NaN if there is none. */
    double at(int first, int second) {
        return matrix[first][second];
    }

    boolean atBound(int parameter) {
        return bound[parameter];
    }

    boolean notIdentified(int parameter) {
        return loose[parameter];
    }

    /** How many parameters the data had to give: free ones that do not rest on a bound. */
    int estimated() {
        int count = 0;
        for (int place : free) {
            count += bound[place] ? 0 : 1;
        }
        return count;
    }

    /** What is wrong, in words. */
    List<String> problems() {
        return List.copyOf(problems);
    }

    private void fill(double[] values, double[][] jacobian) {
        List<Parameter> parameters = problem.parameters();
        List<int[]> used = new ArrayList<>(); // place among all, column of the Jacobian
        for (int j = 0; j < free.length; j++) {
            Parameter parameter = parameters.get(free[j]);
            if (parameter.atBound(values[free[j]])) {
                bound[free[j]] = true;
                problems.add(parameter.label() + " rests on its bound, so it has no standard error, and those of the "
                        + "others hold only if it stays there");
            } else if (length(jacobian, j) == 0) {
                loose[free[j]] = true;
                problems.add("the data do not depend on " + parameter.label() + " at all");
            } else {
                used.add(new int[] {free[j], j});
            }
        }
        if (!used.isEmpty()) {
            decompose(jacobian, used);
        }
        for (int p = 0; p < matrix.length; p++) {
            if (problem.tie(p).isPresent()) {
                follow(p, values);
            }
        }
    }

    /** Fills in the row and column of a parameter that follows from others. */
    private void follow(int p, double[] values) {
        double[] share = new double[free.length];
        for (int j = 0; j < free.length; j++) {
            share[j] = bound[free[j]]
                    ? 0
                    : tangent[p][j] / problem.parameters().get(p).stretch(values[p]);
            loose[p] |= loose[free[j]] && share[j] != 0;
        }
        for (int other = 0; other < matrix.length; other++) {
            if (other != p && (problem.parameters().get(other).isFree())) {
                matrix[p][other] = combined(share, other);
                matrix[other][p] = matrix[p][other];
            }
        }
        matrix[p][p] = combined(share, p);
    }

    private double combined(double[] share, int other) {
        double sum = 0;
        for (int j = 0; j < free.length; j++) {
            sum += share[j] == 0 ? 0 : share[j] * matrix[free[j]][other];
        }
        return sum;
    }

    private void decompose(double[][] jacobian, List<int[]> used) {
        int n = used.size();
        double[] lengths = new double[n];
        double[][] scaled = new double[Math.max(jacobian.length, n)][n];
        for (int c = 0; c < n; c++) {
            lengths[c] = length(jacobian, used.get(c)[1]);
            for (int i = 0; i < jacobian.length; i++) {
                scaled[i][c] = jacobian[i][used.get(c)[1]] / lengths[c];
            }
        }
        SingularValueDecomposition svd = new SingularValueDecomposition(new Array2DRowRealMatrix(scaled, false));
        double[] singular = svd.getSingularValues();
        double[][] v = svd.getV().getData();
        for (int k = 0; k < n; k++) {
            if (singular[k] <= SINGULAR * singular[0]) {
                name(used, v, k);
            }
        }
        for (int a = 0; a < n; a++) {
            for (int b = 0; b < n; b++) {
                if (!loose[used.get(a)[0]] && !loose[used.get(b)[0]]) {
                    double sum = 0;
                    for (int k = 0; k < n; k++) {
                        sum += singular[k] <= SINGULAR * singular[0]
                                ? 0
                                : v[a][k] * v[b][k] / (singular[k] * singular[k]);
                    }
                    matrix[used.get(a)[0]][used.get(b)[0]] = sum / (lengths[a] * lengths[b]);
                }
            }
        }
    }

    private void name(List<int[]> used, double[][] v, int k) {
        List<String> names = new ArrayList<>();
        for (int c = 0; c < used.size(); c++) {
            if (Math.abs(v[c][k]) > PART) {
                loose[used.get(c)[0]] = true;
                names.add(problem.parameters().get(used.get(c)[0]).label());
            }
        }
        problems.add("the data do not tell " + String.join(" from ", names)
                + ": other values of these together fit as well");
    }

    private static double length(double[][] jacobian, int column) {
        double sum = 0;
        for (double[] row : jacobian) {
            sum += row[column] * row[column];
        }
        return Math.sqrt(sum);
    }
}
