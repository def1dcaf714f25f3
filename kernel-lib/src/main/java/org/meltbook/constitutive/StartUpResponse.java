package org.meltbook.constitutive;

import java.util.ArrayList;
import java.util.List;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.figure.Figure;
import org.meltbook.flow.StartUpShear;
import org.meltbook.units.Quantity;
import org.meltbook.units.Require;

/**
 * Start-up of shear of a model at one rate.
 *
 * @param model    the model
 * @param rate     shear rate in 1/s
 * @param times    times after the start in s
 * @param stresses the extra stress at each time
 */
public record StartUpResponse(ConstitutiveModel model, double rate, Doubles times, List<Stress> stresses)
        implements Response {
    /** Copies the stresses. */
    public StartUpResponse {
        stresses = List.copyOf(stresses);
    }

    static StartUpResponse of(ConstitutiveModel model, double rate, Doubles times, Progress progress) {
        Require.positive("shear rate", rate, "1/s");
        if (times.isEmpty()) {
            throw new RangeException("a start-up needs one time at least, found none");
        }
        StartUpShear flow = new StartUpShear(rate);
        List<Stress> stresses = new ArrayList<>();
        for (int i = 0; i < times.size(); i++) {
            progress.at(i, times.size(), "start-up of shear");
            stresses.add(model.stress(flow, Require.notNegative("time", times.at(i), "s")));
        }
        return new StartUpResponse(model, rate, times, stresses);
    }

    /** Shear stress growth coefficient η⁺(t) = σ/γ̇ in Pa·s. */
    public Doubles shearStressGrowth() {
        return shearStress().map(stress -> stress / rate);
    }

    /** First normal stress growth coefficient Ψ₁⁺(t) = N₁/γ̇² in Pa·s². */
    public Doubles firstNormalStressGrowth() {
        return firstNormalStressDifference().map(stress -> stress / rate / rate);
    }

    /** Weissenberg number: shear rate times mean relaxation time of the spectrum. */
    public double weissenberg() {
        return rate * model.spectrum().meanRelaxationTime();
    }

    @Override
    public String headline() {
        Doubles growth = shearStressGrowth();
        return "Start-up of shear of the " + model.name() + " at " + NumberText.of(rate) + " 1/s (Wi = "
                + NumberText.of(weissenberg()) + "): η⁺ up to " + NumberText.of(growth.largest()) + " Pa·s, "
                + NumberText.of(growth.at(growth.size() - 1)) + " Pa·s at " + NumberText.of(times.at(times.size() - 1))
                + " s.";
    }

    @Override
    public List<Rows> rows() {
        return List.of(Rows.titled("Start-up of shear at " + NumberText.of(rate) + " 1/s, " + model.name())
                .numbers("t", "s", times)
                .numbers("γ", "1", times.map(time -> time * rate))
                .numbers("σ", "Pa", shearStress())
                .numbers("N₁", "Pa", firstNormalStressDifference())
                .numbers("N₂", "Pa", secondNormalStressDifference())
                .numbers("η⁺", "Pa·s", shearStressGrowth())
                .numbers("Ψ₁⁺", "Pa·s²", firstNormalStressGrowth())
                .build());
    }

    @Override
    public List<Figure> figures() {
        return List.of(
                Figure.titled("Stress growth of the " + model.name() + " at " + NumberText.of(rate) + " 1/s")
                        .x(Quantity.TIME)
                        .y(Quantity.SHEAR_STRESS_GROWTH)
                        .line(model.name(), times, shearStressGrowth())
                        .dashed("linear viscoelastic", times, times.map(model.spectrum()::stressGrowth))
                        .build(),
                Figure.titled("Growth of N₁ of the " + model.name() + " at " + NumberText.of(rate) + " 1/s")
                        .x(Quantity.TIME)
                        .y(Quantity.FIRST_NORMAL_STRESS_DIFFERENCE)
                        .line(model.name(), times, firstNormalStressDifference())
                        .build());
    }

    @Override
    public String toString() {
        return headline();
    }
}
