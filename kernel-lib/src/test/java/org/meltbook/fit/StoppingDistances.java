package org.meltbook.fit;

import org.meltbook.base.Doubles;

/**
 * Speed and stopping distance of 50 cars: M. Ezekiel, Methods of Correlation Analysis (1930), as data set
 * {@code cars} of R (typed from memory; the fitted line below agrees with the published coefficients).
 */
final class StoppingDistances {
    static final Doubles SPEED = Doubles.of(
            4, 4, 7, 7, 8, 9, 10, 10, 10, 11, 11, 12, 12, 12, 12, 13, 13, 13, 13, 14, 14, 14, 14, 15, 15, 15, 16, 16,
            17, 17, 17, 18, 18, 18, 18, 19, 19, 19, 20, 20, 20, 20, 20, 22, 23, 24, 24, 24, 24, 25);
    static final Doubles DISTANCE = Doubles.of(
            2, 10, 4, 22, 16, 10, 18, 26, 34, 17, 28, 14, 20, 24, 28, 26, 34, 34, 46, 26, 36, 60, 80, 20, 26, 54, 32,
            40, 32, 40, 50, 42, 56, 76, 84, 36, 46, 68, 32, 48, 52, 56, 64, 66, 54, 70, 92, 93, 120, 85);

    private StoppingDistances() {}

    /** The straight line through them. */
    static Fit line() {
        return Problem.of(polynomial(2)).data(SPEED, DISTANCE).from(0, 0).solve();
    }

    /** b1 + b2 x + b3 x² + … */
    static Model polynomial(int terms) {
        return new TestModel(
                terms,
                (x, b) -> {
                    double sum = 0;
                    for (int k = terms - 1; k >= 0; k--) {
                        sum = sum * x + b[k];
                    }
                    return sum;
                },
                (x, b, into) -> {
                    into[0] = 1;
                    for (int k = 1; k < terms; k++) {
                        into[k] = into[k - 1] * x;
                    }
                });
    }
}
