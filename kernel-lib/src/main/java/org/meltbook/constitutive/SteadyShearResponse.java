package org.meltbook.constitutive;

import java.util.ArrayList;
import java.util.List;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.figure.Figure;
import org.meltbook.flow.SteadyShear;
import org.meltbook.units.Quantity;
import org.meltbook.units.Require;

/**
 * Steady shear of a model at many rates.
 *
 * @param model    the model
 * @param rates    shear rates in 1/s
 * @param stresses the extra stress at each rate
 */
public record SteadyShearResponse(ConstitutiveModel model, Doubles rates, List<Stress> stresses) implements Response {
    /** Copies the stresses. */
    public SteadyShearResponse {
        stresses = List.copyOf(stresses);
    }

    static SteadyShearResponse of(ConstitutiveModel model, Doubles rates, Progress progress) {
        if (rates.isEmpty()) {
            throw new RangeException("steady shear needs one rate at least, found none");
        }
        List<Stress> stresses = new ArrayList<>();
        for (int i = 0; i < rates.size(); i++) {
            progress.at(i, rates.size(), "steady shear");
            double rate = Require.positive("shear rate", rates.at(i), "1/s");
            stresses.add(model.stress(new SteadyShear(rate), 0));
        }
        return new SteadyShearResponse(model, rates, stresses);
    }

    private Doubles over(Doubles numbers, int power) {
        double[] divided = numbers.toArray();
        for (int i = 0; i < divided.length; i++) {
            divided[i] /= Math.pow(rates.at(i), power);
        }
        return Doubles.of(divided);
    }

    /** Viscosity η = σ/γ̇ in Pa·s. */
    public Doubles viscosity() {
        return over(shearStress(), 1);
    }

    /** First normal stress coefficient Ψ₁ = N₁/γ̇² in Pa·s². */
    public Doubles firstNormalStressCoefficient() {
        return over(firstNormalStressDifference(), 2);
    }

    /** Weissenberg number: shear rate times mean relaxation time of the spectrum. */
    public Doubles weissenberg() {
        return rates.map(rate -> rate * model.spectrum().meanRelaxationTime());
    }

    @Override
    public String headline() {
        Doubles viscosity = viscosity();
        double first = viscosity.at(0);
        double last = viscosity.at(viscosity.size() - 1);
        boolean level = viscosity.largest() - viscosity.smallest() <= 1e-9 * viscosity.largest();
        return "Steady shear of the " + model.name() + ", " + NumberText.of(rates.smallest()) + " to "
                + NumberText.of(rates.largest()) + " 1/s: viscosity "
                + (level
                        ? NumberText.of(first) + " Pa·s at every rate"
                        : "from " + NumberText.of(first) + " to " + NumberText.of(last) + " Pa·s")
                + ", N₁ up to "
                + NumberText.of(firstNormalStressDifference().largest()) + " Pa.";
    }

    @Override
    public List<Rows> rows() {
        return List.of(Rows.titled("Steady shear, " + model.name())
                .numbers("γ̇", "1/s", rates)
                .numbers("Wi", "1", weissenberg())
                .numbers("σ", "Pa", shearStress())
                .numbers("N₁", "Pa", firstNormalStressDifference())
                .numbers("N₂", "Pa", secondNormalStressDifference())
                .numbers("η", "Pa·s", viscosity())
                .numbers("Ψ₁", "Pa·s²", firstNormalStressCoefficient())
                .note("Wi = γ̇ times the mean relaxation time, "
                        + NumberText.of(model.spectrum().meanRelaxationTime()) + " s.")
                .build());
    }

    @Override
    public List<Figure> figures() {
        return List.of(
                Figure.titled("Viscosity of the " + model.name())
                        .x(Quantity.SHEAR_RATE)
                        .y(Quantity.VISCOSITY)
                        .line(model.name(), rates, viscosity())
                        .build(),
                Figure.titled("First normal stress difference of the " + model.name())
                        .x(Quantity.SHEAR_RATE)
                        .y(Quantity.FIRST_NORMAL_STRESS_DIFFERENCE)
                        .line(model.name(), rates, firstNormalStressDifference())
                        .build());
    }

    @Override
    public String toString() {
        return headline();
    }
}
