package org.meltbook.viscosity;

import org.meltbook.base.Doubles;

/**
 * A scalar law of shear viscosity with its constants: what the viscosity is at a shear rate.
 *
 * <p>Contract, held by one test for every family of {@link ViscosityLaws}: (1) immutable; its constructor refuses
 * constants outside their bounds; (2) {@code at} takes any rate from zero to finite in 1/s and gives Pa·s, and refuses
 * a negative rate or NaN; (3) {@code gradient} gives the exact derivatives in the order of {@code
 * family().parameters()}; (4) {@code at} tends to {@code zeroRateLimit} and {@code infiniteRateLimit}, which may be
 * infinite or zero; (5) {@code family().of(values())} equals the law; (6) the family names a source, and gives from any
 * flow curve of two different rates or more a start that its own constructor accepts.
 */
public interface ViscosityLaw {
    /** The family to which the law belongs. */
    LawFamily family();

    /** Its constants, in the order of the parameters of its family. */
    Doubles values();

    /**
     * Viscosity in Pa·s.
     *
     * @param rate shear rate in 1/s
     * @throws org.meltbook.base.RangeException if {@code rate < 0}, infinite or NaN
     */
    double at(double rate);

    /**
     * The derivatives of the viscosity with respect to each constant.
     *
     * @param rate shear rate in 1/s, above zero
     * @param into filled with one derivative a constant, in Pa·s over the unit of the constant
     */
    void gradient(double rate, double[] into);

    /** Viscosity in Pa·s as the rate goes to zero; infinite if it grows without bound. */
    double zeroRateLimit();

    /** Viscosity in Pa·s as the rate goes to infinity. */
    double infiniteRateLimit();

    /** Shear stress in Pa at a shear rate in 1/s; for laws that grow without bound, zero at rate zero is its limit. */
    default double stress(double rate) {
        return rate == 0 ? 0 : at(rate) * rate;
    }
}
