package org.meltbook.figure;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;

import org.junit.jupiter.api.Test;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;
import org.meltbook.units.Quantity;

class FigureFamilyTest {
    private static final Doubles X = Doubles.of(1, 2);

    @Test
    void a_layer_that_is_like_the_one_before_joins_its_family() {
        Figure figure = start().marks("A-00", X, X)
                .likeBefore()
                .line("A-00, fit", X, X)
                .marks("R-01", X, X)
                .likeBefore()
                .line("R-01, fit", X, X)
                .band("interval", X, X, X)
                .build();
        assertEquals(0, figure.family(0));
        assertEquals(0, figure.family(1));
        assertEquals(1, figure.family(2));
        assertEquals(1, figure.family(3));
        assertEquals(2, figure.family(4));
    }

    @Test
    void nothing_can_be_like_a_layer_that_is_not_there() {
        assertThrows(RangeException.class, () -> start().likeBefore());
    }

    private static Figure.Builder start() {
        return Figure.titled("families").x(Quantity.SHEAR_RATE).y(Quantity.VISCOSITY);
    }
}
