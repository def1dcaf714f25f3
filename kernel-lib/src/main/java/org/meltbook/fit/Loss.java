package org.meltbook.fit;

import org.meltbook.base.NumberText;
import org.meltbook.units.Require;

/**
 * How much a misfit counts. A fit minimises {@code Σ c² ρ(r²/c²)} over its residuals r, with the scale c: residuals
 * well below c count by their square, those above it count less, so that outliers need not be deleted. Formulas: P. J.
 * Huber, Ann. Math. Stat. 35 (1964) 73; J. W. Tukey's biweight after A. E. Beaton, J. W. Tukey, Technometrics 16 (1974)
 * 147 (memory).
 *
 * @param kind  the shape of ρ
 * @param scale c, in residuals: misfit over deviation; not used for plain squares
 */
public record Loss(Kind kind, double scale) {
    /** Every misfit counts by its square. */
    public static final Loss SQUARES = new Loss(Kind.SQUARES, 1);

    /** The shape of a loss. */
    public enum Kind {
        /** ρ(z) = z. */
        SQUARES("least squares"),
        /** ρ(z) = 2 (√(1 + z) − 1): smooth, grows like |r|. */
        SOFT_L1("soft absolute value"),
        /** ρ(z) = z up to 1, 2 √z − 1 above: grows like |r|. */
        HUBER("Huber loss"),
        /** ρ(z) = (1 − (1 − z)³) / 3 up to 1, 1/3 above: what lies beyond the scale has no pull at all. */
        TUKEY("Tukey loss");

        private final String words;

        Kind(String words) {
            this.words = words;
        }
    }

    /** Checks the scale. */
    public Loss {
        Require.positive("scale of the " + kind.words, scale, "1");
    }

    /** The soft absolute value with the given scale. */
    public static Loss softL1(double scale) {
        return new Loss(Kind.SOFT_L1, scale);
    }

    /** Huber's loss; a scale of 1.345 standard deviations keeps 95 % efficiency for normal errors. */
    public static Loss huber(double scale) {
        return new Loss(Kind.HUBER, scale);
    }

    /** Tukey's loss; a scale of 4.685 standard deviations keeps 95 % efficiency for normal errors. */
    public static Loss tukey(double scale) {
        return new Loss(Kind.TUKEY, scale);
    }

    /**
     * The loss under which to look for the start of a fit: Tukey's has an optimum wherever a few points agree, so it is
     * started at that of Huber's loss with the same efficiency.
     */
    Loss leading() {
        return kind == Kind.TUKEY ? huber(scale * 1.345 / 4.685) : this;
    }

    /** Whether every misfit counts by its square. */
    public boolean plain() {
        return kind == Kind.SQUARES;
    }

    /** What a residual adds to the sum that is minimised: its square or less. */
    public double cost(double residual) {
        double z = reduced(residual);
        return switch (kind) {
            case SQUARES -> residual * residual;
            case SOFT_L1 -> 2 * residual * residual / (1 + Math.sqrt(1 + z));
            case HUBER -> z <= 1 ? residual * residual : scale * scale * (2 * Math.sqrt(z) - 1);
            case TUKEY -> scale * scale * (z <= 1 ? z * (1 - z + z * z / 3) : 1.0 / 3);
        };
    }

    /** Weight of a residual, ρ'(z), 0 to 1: half the slope of its cost over the residual. */
    public double weight(double residual) {
        double z = reduced(residual);
        return switch (kind) {
            case SQUARES -> 1;
            case SOFT_L1 -> 1 / Math.sqrt(1 + z);
            case HUBER -> z <= 1 ? 1 : 1 / Math.sqrt(z);
            case TUKEY -> z <= 1 ? (1 - z) * (1 - z) : 0;
        };
    }

    /** Half the second derivative of the cost, ρ' + 2 z ρ''; negative far out for Tukey's loss. */
    public double curvature(double residual) {
        double z = reduced(residual);
        return switch (kind) {
            case SQUARES -> 1;
            case SOFT_L1 -> 1 / ((1 + z) * Math.sqrt(1 + z));
            case HUBER -> z <= 1 ? 1 : 0;
            case TUKEY -> z <= 1 ? (1 - z) * (1 - 5 * z) : 0;
        };
    }

    private double reduced(double residual) {
        double share = residual / scale;
        return share * share;
    }

    /** The loss in words, with its scale. */
    public String words() {
        return plain() ? kind.words : kind.words + " with scale " + NumberText.of(scale);
    }
}
