package org.meltbook.fit;

/** How far a point may lie from the model: by what its misfit is divided. */
public enum Weighting {
    /** Every point has the same absolute error. */
    EQUAL("equal absolute errors"),
    /** Every point has the same relative error: the misfit is divided by the measured value. */
    RELATIVE("equal relative errors"),
    /** Every point has the same error of its logarithm: the misfit is ln(model / measured). */
    LOGARITHMIC("equal errors of the logarithm"),
    /** Each point has its own standard deviation. */
    DEVIATIONS("given standard deviations");

    private final String words;

    Weighting(String words) {
        this.words = words;
    }

    /** The weighting in words. */
    public String words() {
        return words;
    }
}
