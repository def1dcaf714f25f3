package org.meltbook.units;

/**
 * What a number measures. A unit alone does not tell: Pa serves stress, modulus and pressure, and 1/s, rad/s and Hz have
 * one dimension, though 1 Hz is 2π rad/s. Names and symbols follow the nomenclature of the Society of Rheology.
 */
public enum Quantity {
    /** Angular frequency ω. */
    ANGULAR_FREQUENCY("angular frequency", "ω", "rad/s"),
    /** Shear rate γ̇. */
    SHEAR_RATE("shear rate", "γ̇", "1/s"),
    /** Hencky strain rate ε̇ of an extensional flow. */
    EXTENSION_RATE("Hencky strain rate", "ε̇", "1/s"),
    /** Shear stress σ. */
    SHEAR_STRESS("shear stress", "σ", "Pa"),
    /** First normal stress difference N1. */
    FIRST_NORMAL_STRESS_DIFFERENCE("first normal stress difference", "N₁", "Pa"),
    /** Second normal stress difference N2. */
    SECOND_NORMAL_STRESS_DIFFERENCE("second normal stress difference", "N₂", "Pa"),
    /** First normal stress coefficient Ψ1. */
    FIRST_NORMAL_STRESS_COEFFICIENT("first normal stress coefficient", "Ψ₁", "Pa·s²"),
    /** Viscosity η, in shear. */
    VISCOSITY("viscosity", "η", "Pa·s"),
    /** Magnitude of the complex viscosity |η*|. */
    COMPLEX_VISCOSITY("complex viscosity", "|η*|", "Pa·s"),
    /** Shear stress growth coefficient η⁺ of a start-up. */
    SHEAR_STRESS_GROWTH("shear stress growth coefficient", "η⁺", "Pa·s"),
    /** Storage modulus G′. */
    STORAGE_MODULUS("storage modulus", "G′", "Pa"),
    /** Loss modulus G″. */
    LOSS_MODULUS("loss modulus", "G″", "Pa"),
    /** Relaxation modulus G. */
    RELAXATION_MODULUS("relaxation modulus", "G", "Pa"),
    /** Compliance J. */
    COMPLIANCE("compliance", "J", "1/Pa"),
    /** Loss tangent tan δ. */
    LOSS_TANGENT("loss tangent", "tan δ", "1"),
    /** Time t. */
    TIME("time", "t", "s"),
    /** Relaxation time λ. */
    RELAXATION_TIME("relaxation time", "λ", "s"),
    /** Shear strain γ. */
    SHEAR_STRAIN("shear strain", "γ", "1"),
    /** Temperature T, in kelvin inside. */
    TEMPERATURE("temperature", "T", "K"),
    /** Density ρ. */
    DENSITY("density", "ρ", "kg/m³"),
    /** Molar mass M. */
    MOLAR_MASS("molar mass", "M", "kg/mol"),
    /** Volume fraction φ. */
    VOLUME_FRACTION("volume fraction", "φ", "1"),
    /** Mass fraction w. */
    MASS_FRACTION("mass fraction", "w", "1"),
    /** Length, for geometry. */
    LENGTH("length", "l", "m"),
    /** Plane angle. */
    ANGLE("angle", "β", "rad"),
    /** Torque M. */
    TORQUE("torque", "M", "N·m"),
    /** Normal force F. */
    NORMAL_FORCE("normal force", "F", "N"),
    /** Pressure p. */
    PRESSURE("pressure", "p", "Pa"),
    /** Melt mass-flow rate. */
    MELT_MASS_FLOW_RATE("melt mass-flow rate", "MFR", "kg/s"),
    /** A ratio of two numbers of one kind. */
    RATIO("ratio", "–", "1");

    private final String label;
    private final String symbol;
    private final String siUnit;

    Quantity(String label, String symbol, String siUnit) {
        this.label = label;
        this.symbol = symbol;
        this.siUnit = siUnit;
    }

    /** The name in words: {@code angular frequency}. */
    public String label() {
        return label;
    }

    /** The usual symbol: {@code ω}. */
    public String symbol() {
        return symbol;
    }

    /** The SI unit in which Meltbook keeps it, as shown: {@code rad/s}; {@code 1} for a pure number. */
    public String siUnit() {
        return siUnit;
    }

    /** Symbol and SI unit as on an axis or above a column: {@code ω [rad/s]}. */
    public String heading() {
        return siUnit.equals("1") ? symbol : symbol + " [" + siUnit + "]";
    }
}
