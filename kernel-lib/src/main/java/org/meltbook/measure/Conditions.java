package org.meltbook.measure;

import java.util.Collections;
import java.util.LinkedHashMap;
import java.util.Map;
import java.util.OptionalDouble;
import org.meltbook.units.Require;

/**
 * Under what a measurement was made, and where it comes from.
 *
 * @param sample      what was measured, as named in the source; may be empty
 * @param temperature temperature in K, empty if the source does not tell
 * @param source      file name, or a few words for data made in code
 * @param digest      SHA-256 of the source file in hexadecimal, empty for data made in code
 * @param remarks     further keys and values of the source, in its order
 */
public record Conditions(
        String sample, OptionalDouble temperature, String source, String digest, Map<String, String> remarks) {
    /** Copies the remarks and checks the temperature. */
    public Conditions {
        temperature.ifPresent(kelvin -> Require.positive("temperature", kelvin, "K"));
        remarks = Collections.unmodifiableMap(new LinkedHashMap<>(remarks));
    }

    /** Conditions of data made in code: {@code source} says by what. */
    public static Conditions of(String sample, String source) {
        return new Conditions(sample, OptionalDouble.empty(), source, "", Map.of());
    }

    /** The sample behind a noun, as in {@code Flow curve of A-00}: with the "of", or nothing if it has no name. */
    public String ofSample() {
        return sample.isEmpty() ? "" : " of " + sample;
    }

    /** The same at a temperature in K. */
    public Conditions at(double kelvin) {
        return new Conditions(sample, OptionalDouble.of(kelvin), source, digest, remarks);
    }

    /** The same for a sample of another name. */
    public Conditions of(String otherSample) {
        return new Conditions(otherSample, temperature, source, digest, remarks);
    }
}
