package org.meltbook.numeric;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Random;
import java.util.function.DoubleUnaryOperator;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.base.InterruptedComputation;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;

class NonNegativeLeastSquaresTest {
    /** Inputs as the formulas in the head of scipy_nnls.csv give them. */
    private static double[][] matrix(String problem) {
        return switch (problem) {
            case "smooth" -> filled(12, 6, (i, j) -> Math.exp(-(i - 2 * j) * (i - 2 * j) / 18.0));
            case "maxwell" -> filled(20, 9, (i, j) -> {
                double x = Math.pow(10, -2 + 4.0 * i / 19) * Math.pow(10, -2 + 4.0 * j / 8);
                return x * x / (1 + x * x);
            });
            case "mixed" -> filled(7, 5, (i, j) -> Math.cos(1 + i * (j + 1)));
            default -> filled(4, 7, (i, j) -> 1.0 / (1 + i + j));
        };
    }

    private static double[] target(String problem) {
        return switch (problem) {
            case "smooth" -> filled(12, i -> Math.sin(i / 2) + 0.3);
            case "maxwell" -> filled(20, i -> Math.pow(10, -2 + 4 * i / 19) / (1 + Math.pow(10, -2 + 4 * i / 19)));
            case "mixed" -> filled(7, i -> i - 2.5);
            default -> filled(4, i -> 1 - i / 3);
        };
    }

    @ParameterizedTest
    @ValueSource(strings = {"smooth", "maxwell", "mixed", "wide"})
    void agrees_with_a_general_purpose_library(String problem) {
        ReferenceTable reference = ReferenceTable.of("scipy_nnls.csv").where("problem", problem);
        NonNegativeLeastSquares.Solution solution =
                NonNegativeLeastSquares.solve(matrix(problem), target(problem), Progress.QUIET);
        assertTrue(solution.converged());
        // condition numbers up to 5e3 leave about twelve digits
        assertArrayEquals(reference.numbers("value"), solution.unknowns().toArray(), 1e-11);
        assertEquals(reference.numbers("residual")[0], solution.residual(), 1e-12);
    }

    @Test
    void meets_the_conditions_of_the_optimum_on_random_problems() {
        Random random = new Random(20260101);
        for (int trial = 0; trial < 200; trial++) {
            int rows = 1 + random.nextInt(30);
            int columns = 1 + random.nextInt(20);
            double[][] a = filled(rows, columns, (i, j) -> random.nextGaussian());
            double[] b = filled(rows, i -> random.nextGaussian());
            NonNegativeLeastSquares.Solution solution = NonNegativeLeastSquares.solve(a, b, Progress.QUIET);
            assertTrue(solution.converged());
            assertOptimal(a, b, solution.unknowns().toArray());
        }
    }

    /** Karush–Kuhn–Tucker: x ≥ 0, slope ≤ 0 where x is zero, slope = 0 where it is above. */
    private static void assertOptimal(double[][] a, double[] b, double[] x) {
        for (int j = 0; j < x.length; j++) {
            double slope = 0;
            for (int i = 0; i < b.length; i++) {
                double left = b[i];
                for (int k = 0; k < x.length; k++) {
                    left -= a[i][k] * x[k];
                }
                slope += a[i][j] * left;
            }
            assertTrue(x[j] >= 0);
            assertTrue(slope <= 1e-10, "slope " + slope + " at " + x[j]);
            assertTrue(x[j] == 0 || slope >= -1e-10, "slope " + slope + " at " + x[j]);
        }
    }

    @Test
    void gives_back_unknowns_that_made_the_target() {
        double[][] a = matrix("smooth");
        double[] truth = {0, 1.5, 0, 0, 2.25, 0.5};
        double[] b = filled(12, i -> {
            double sum = 0;
            for (int j = 0; j < truth.length; j++) {
                sum += a[(int) i][j] * truth[j];
            }
            return sum;
        });
        assertArrayEquals(
                truth,
                NonNegativeLeastSquares.solve(a, b, Progress.QUIET).unknowns().toArray(),
                1e-11);
    }

    @Test
    void copes_with_equal_and_empty_columns() {
        double[][] a = {{1, 1, 0}, {2, 2, 0}, {3, 3, 0}};
        double[] x = NonNegativeLeastSquares.solve(a, new double[] {2, 4, 6}, Progress.QUIET)
                .unknowns()
                .toArray();
        assertEquals(2, x[0] + x[1], 1e-14);
        assertEquals(0, x[2]);
    }

    @Test
    void refuses_sizes_that_do_not_fit_and_numbers_that_are_not_finite() {
        assertThrows(RangeException.class, () -> solve(new double[][] {{1}}, 1, 2));
        assertThrows(RangeException.class, () -> solve(new double[][] {{1, 2}, {1}}, 1, 2));
        assertThrows(RangeException.class, () -> solve(new double[0][0]));
        assertThrows(RangeException.class, () -> solve(new double[][] {{Double.NaN}}, 1));
        assertThrows(RangeException.class, () -> solve(new double[][] {{1}}, Double.POSITIVE_INFINITY));
    }

    private static void solve(double[][] a, double... b) {
        NonNegativeLeastSquares.solve(a, b, Progress.QUIET);
    }

    @Test
    void stops_on_interrupt() {
        Thread.currentThread().interrupt();
        try {
            assertThrows(InterruptedComputation.class, () -> solve(new double[][] {{1}}, 1));
        } finally {
            Thread.interrupted();
        }
    }

    private interface Entry {
        double at(double i, double j);
    }

    private static double[][] filled(int rows, int columns, Entry entry) {
        double[][] filled = new double[rows][columns];
        for (int i = 0; i < rows; i++) {
            for (int j = 0; j < columns; j++) {
                filled[i][j] = entry.at(i, j);
            }
        }
        return filled;
    }

    private static double[] filled(int rows, DoubleUnaryOperator entry) {
        double[] filled = new double[rows];
        for (int i = 0; i < rows; i++) {
            filled[i] = entry.applyAsDouble(i);
        }
        return filled;
    }
}
