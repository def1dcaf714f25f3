package org.meltbook.fit;

/**
 * Where the size of the errors is taken from. The values of a fit do not depend on it; their standard errors do. Every
 * report says which one was used.
 */
public enum ErrorModel {
    /**
     * The deviations given are taken as they are: standard errors do not depend on how well the model fits, and
     * chi-square tells whether it fits.
     */
    ABSOLUTE("deviations taken as absolute: standard errors do not depend on the scatter around the model"),
    /**
     * The deviations are known up to one common factor, which the scatter of the points around the model tells:
     * standard errors are scaled by the residual variance, so a model that does not fit widens its own errors.
     */
    SCALED("standard errors are scaled by the residual variance");

    private final String words;

    ErrorModel(String words) {
        this.words = words;
    }

    /** The error model in words. */
    public String words() {
        return words;
    }
}
