package org.meltbook.fit;

/** How far a point may lie from the model: the error model of a fit. */
public enum Weighting {
    /** Every point has the same absolute error. */
    EQUAL("equal absolute errors"),
    /** Every point has the same relative error: the misfit is divided by the measured value. */
    RELATIVE("equal relative errors"),
    /** Each point has its own standard deviation, known up to a common factor. */
    DEVIATIONS("given standard deviations, known up to a common factor");

    private final String words;

    Weighting(String words) {
        this.words = words;
    }

    /** The error model in words, with how it enters the standard errors. */
    public String words() {
        return words + "; standard errors are scaled by the residual variance";
    }
}
