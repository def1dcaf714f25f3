package org.meltbook.flow;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.base.RangeException;

class FlowTest {
    @Test
    void shear_moves_the_flow_direction_along_the_gradient_alone() {
        VelocityGradient gradient = new SteadyShear(3).gradient(7);
        assertEquals(3, gradient.at(0, 1));
        assertEquals(0, gradient.at(1, 0));
        assertEquals(1.5, gradient.deformation(0, 1));
        assertEquals(1.5, gradient.deformation(1, 0));
        assertFalse(new SteadyShear(3).components().contains(Component.XZ));
        assertTrue(new SteadyShear(3).components().contains(Component.ZZ));
    }

    @Test
    void a_start_up_rests_before_time_zero() {
        StartUpShear flow = new StartUpShear(3);
        assertEquals(VelocityGradient.REST, flow.gradient(-1e-300));
        assertEquals(VelocityGradient.simpleShear(3), flow.gradient(0));
        assertEquals(1, flow.changes().size());
        assertEquals(0, flow.changes().at(0));
        assertTrue(new SteadyShear(3).changes().isEmpty());
    }

    @ParameterizedTest
    @ValueSource(doubles = {-1, Double.NaN, Double.POSITIVE_INFINITY})
    void rejects_a_rate(double bad) {
        assertThrows(RangeException.class, () -> new SteadyShear(bad));
        assertThrows(RangeException.class, () -> new StartUpShear(bad));
    }

    @Test
    void a_gradient_keeps_the_volume() {
        assertEquals(-0.5, VelocityGradient.of(1, 0, 0, 0, -0.5, 0, 0, 0, -0.5).at(2, 2));
        assertThrows(RangeException.class, () -> VelocityGradient.of(1, 0, 0, 0, 0, 0, 0, 0, 0));
        assertThrows(RangeException.class, () -> VelocityGradient.of(0, Double.NaN, 0, 0, 0, 0, 0, 0, 0));
        assertThrows(RangeException.class, () -> VelocityGradient.of(0, 1));
    }
}
