package org.meltbook.scenario;

import java.nio.charset.StandardCharsets;
import java.util.SplittableRandom;

/**
 * Normal random numbers that belong to a name: the same seed and name give the same numbers on every machine, and
 * another name gives others, so that one more export moves none of the rest.
 */
final class Scatter {
    private final SplittableRandom random;

    private Scatter(SplittableRandom random) {
        this.random = random;
    }

    /** The scatter of the export called {@code name}. */
    static Scatter of(long seed, String name) {
        long hash = 0xcbf29ce484222325L ^ seed; // FNV-1a, 64 bits, started from the seed
        for (byte letter : name.getBytes(StandardCharsets.UTF_8)) {
            hash = (hash ^ (letter & 0xff)) * 0x100000001b3L;
        }
        return new Scatter(new SplittableRandom(hash));
    }

    /** A reading of {@code truth} with standard deviation {@code deviation}, both in one unit (Box and Muller). */
    double about(double truth, double deviation) {
        double radius = StrictMath.sqrt(-2 * StrictMath.log(1 - random.nextDouble()));
        return truth + deviation * radius * StrictMath.cos(2 * StrictMath.PI * random.nextDouble());
    }
}
