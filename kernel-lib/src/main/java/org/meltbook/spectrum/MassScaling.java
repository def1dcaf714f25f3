package org.meltbook.spectrum;

import java.util.ArrayList;
import java.util.List;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.figure.Axis;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;
import org.meltbook.units.Prediction;
import org.meltbook.units.Quantity;
import org.meltbook.units.Require;

/**
 * The exponent with which the zero-shear viscosity grows with molar mass between two samples of one kind. Well
 * entangled linear melts of narrow distribution have about 3.4 (common knowledge; from memory: J. D. Ferry,
 * Viscoelastic Properties of Polymers, 3rd ed. 1980).
 */
public final class MassScaling implements Exhibit {
    private static final double USUAL = 3.4;

    private final double lightMass;
    private final Prediction light;
    private final double heavyMass;
    private final Prediction heavy;

    private MassScaling(double lightMass, Prediction light, double heavyMass, Prediction heavy) {
        this.lightMass = lightMass;
        this.light = light;
        this.heavyMass = heavyMass;
        this.heavy = heavy;
    }

    /**
     * The scaling between two samples.
     *
     * @param lightMass molar mass of the lighter sample in kg/mol
     * @param light     its zero-shear viscosity
     * @param heavyMass molar mass of the heavier sample in kg/mol
     * @param heavy     its zero-shear viscosity
     * @throws RangeException if the masses do not rise, or a viscosity is only a bound: the message says why
     */
    public static MassScaling between(double lightMass, Prediction light, double heavyMass, Prediction heavy) {
        Require.positive("molar mass", lightMass, "kg/mol");
        Require.positive("molar mass", heavyMass, "kg/mol");
        if (!(heavyMass > lightMass)) {
            throw new RangeException("a scaling needs two different molar masses, the lighter one first, found "
                    + lightMass + " and " + heavyMass + " kg/mol");
        }
        Require.positive(light.name(), light.value(), light.quantity().siUnit());
        Require.positive(heavy.name(), heavy.value(), heavy.quantity().siUnit());
        return new MassScaling(lightMass, light, heavyMass, heavy);
    }

    /** The exponent ln(η₂/η₁)/ln(M₂/M₁), with the interval that those of the viscosities leave, if both are known. */
    public Prediction exponent() {
        double span = Math.log(heavyMass / lightMass);
        double value = Math.log(heavy.value() / light.value()) / span;
        double below = Math.hypot(Math.log(heavy.value() / heavy.low()), Math.log(light.high() / light.value())) / span;
        double above = Math.hypot(Math.log(heavy.high() / heavy.value()), Math.log(light.value() / light.low())) / span;
        return Prediction.of("exponent of the molar mass", Quantity.RATIO, value, value - below, value + above);
    }

    @Override
    public String headline() {
        Prediction exponent = exponent();
        String interval = Double.isNaN(exponent.low())
                ? ""
                : " (95 %: " + NumberText.of(exponent.low(), 3) + " to " + NumberText.of(exponent.high(), 3) + ")";
        return "Zero-shear viscosity grows with molar mass to the power " + NumberText.of(exponent.value(), 3)
                + interval
                + " between " + NumberText.of(lightMass, 3) + " and " + NumberText.of(heavyMass, 3)
                + " kg/mol; well entangled linear melts have about " + NumberText.of(USUAL, 2) + ".";
    }

    @Override
    public List<Rows> rows() {
        return List.of(Rows.titled("Zero-shear viscosity and molar mass")
                .numbers("M", "kg/mol", lightMass, heavyMass)
                .numbers("η₀", "Pa·s", light.value(), heavy.value())
                .numbers("95 % low", "Pa·s", light.low(), heavy.low())
                .numbers("95 % high", "Pa·s", light.high(), heavy.high())
                .build());
    }

    @Override
    public List<Figure> figures() {
        Doubles masses = RelaxationSpectrum.spread(lightMass, heavyMass);
        double middle = Math.sqrt(light.value() * heavy.value());
        double middleMass = Math.sqrt(lightMass * heavyMass);
        return List.of(Figure.titled("Zero-shear viscosity over molar mass")
                .x(Quantity.MOLAR_MASS)
                .y(new Axis("zero-shear viscosity η₀", "Pa·s", Axis.Scale.LOG))
                .line(
                        "slope " + NumberText.of(USUAL, 2),
                        masses,
                        masses.map(m -> middle * Math.pow(m / middleMass, USUAL)))
                .marks(
                        "η₀ of the samples",
                        Doubles.of(lightMass, heavyMass),
                        Doubles.of(light.value(), heavy.value()),
                        Doubles.of(light.low(), heavy.low()),
                        Doubles.of(light.high(), heavy.high()))
                .build());
    }

    @Override
    public List<String> cautions() {
        List<String> all = new ArrayList<>();
        light.cautions().forEach(caution -> all.add(NumberText.of(lightMass, 3) + " kg/mol: " + caution));
        heavy.cautions().forEach(caution -> all.add(NumberText.of(heavyMass, 3) + " kg/mol: " + caution));
        all.add("two samples give a slope, not a law");
        return List.copyOf(all);
    }

    @Override
    public String toString() {
        return headline();
    }
}
