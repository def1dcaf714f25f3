package org.meltbook.spectrum;

import org.meltbook.units.Require;

/**
 * An estimate of the first normal stress difference in steady shear from the moduli at the angular frequency equal to
 * the shear rate, {@code N₁(γ̇) = 2 G′ [1 + (G′/G″)²]^0.7 at ω = γ̇}. An empirical rule for melts, exact at low rates.
 * Source: H. M. Laun, J. Rheol. 30 (1986) 459 (exponent from memory).
 */
public final class LaunRule {
    private static final double EXPONENT = 0.7;

    private LaunRule() {}

    /** N₁ in Pa from storage and loss modulus in Pa at ω = γ̇, loss above zero. */
    public static double of(double storage, double loss) {
        Require.notNegative("storage modulus", storage, "Pa");
        Require.positive("loss modulus", loss, "Pa");
        double ratio = storage / loss;
        return 2 * storage * Math.pow(1 + ratio * ratio, EXPONENT);
    }

    /** N₁ in Pa at a shear rate in 1/s, above zero, from a spectrum. */
    public static double of(RelaxationSpectrum spectrum, double rate) {
        Require.positive("shear rate", rate, "1/s");
        return of(spectrum.storage(rate), spectrum.loss(rate));
    }
}
