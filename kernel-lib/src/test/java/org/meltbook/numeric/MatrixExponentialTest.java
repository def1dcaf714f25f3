package org.meltbook.numeric;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;

import org.apache.commons.math3.linear.MatrixUtils;
import org.apache.commons.math3.linear.RealMatrix;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.base.RangeException;

class MatrixExponentialTest {
    @ParameterizedTest
    @ValueSource(doubles = {0, 1e-9, 0.3, 2, 7, 40, 500})
    void turns_a_rotation_rate_into_a_rotation(double angle) {
        RealMatrix turned = MatrixExponential.of(matrix(new double[][] {{0, -angle}, {angle, 0}}));
        // closed form; scaling by powers of two lets rounding grow with the angle
        double tolerance = 1e-15 * (2 + angle);
        assertEquals(Math.cos(angle), turned.getEntry(0, 0), tolerance);
        assertEquals(-Math.sin(angle), turned.getEntry(0, 1), tolerance);
    }

    @ParameterizedTest
    @ValueSource(doubles = {1e-6, 0.5, 3, 30, 1e4})
    void matches_the_closed_form_of_a_jordan_block(double time) {
        double[] y = MatrixExponential.propagate(
                        matrix(new double[][] {{-1, 1, 0}, {0, -1, 1}, {0, 0, -1}}),
                        new double[3],
                        new double[] {0, 0, 1},
                        time)
                .toArray();
        double decay = Math.exp(-time);
        // the rounding of the scaled matrix grows like the time
        double tolerance = 1e-15 * (4 + 4 * time) * Math.max(1, time);
        assertArrayEquals(
                new double[] {decay * time * time / 2, decay * time, decay}, y, Math.max(tolerance * decay, 1e-30));
    }

    @Test
    void drives_a_plain_integrator_though_its_matrix_is_singular() {
        assertEquals(
                5.0,
                MatrixExponential.propagate(matrix(new double[][] {{0}}), new double[] {2}, new double[] {1}, 2)
                        .at(0));
    }

    @Test
    void refuses_what_has_no_exponential() {
        assertThrows(RangeException.class, () -> MatrixExponential.of(MatrixUtils.createRealMatrix(2, 3)));
        assertThrows(RangeException.class, () -> MatrixExponential.of(matrix(new double[][] {{Double.NaN}})));
    }

    private static RealMatrix matrix(double[][] rows) {
        return MatrixUtils.createRealMatrix(rows);
    }
}
