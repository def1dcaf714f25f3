package org.meltbook.constitutive;

import java.util.List;
import java.util.stream.IntStream;
import org.apache.commons.math3.linear.EigenDecomposition;
import org.apache.commons.math3.linear.LUDecomposition;
import org.apache.commons.math3.linear.MatrixUtils;
import org.apache.commons.math3.linear.RealMatrix;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.RangeException;
import org.meltbook.flow.Component;
import org.meltbook.flow.Flow;
import org.meltbook.flow.VelocityGradient;
import org.meltbook.numeric.MatrixExponential;
import org.meltbook.spectrum.RelaxationSpectrum;
import org.meltbook.units.Require;

/**
 * The upper-convected Maxwell model with the modes of a relaxation spectrum. Each mode obeys
 * {@code τ + λ τ^∇ = 2 g λ D} with the upper-convected derivative {@code τ^∇ = dτ/dt − L τ − τ Lᵀ}.
 * Source: R. B. Bird, R. C. Armstrong, O. Hassager, Dynamics of Polymeric Liquids, vol. 1, 2nd ed. 1987 (memory).
 *
 * <p>Under a constant velocity gradient the equation is linear in τ. Its matrix is made from the equation itself by
 * letting it act on one stress component after the other, only those that the symmetry of the flow allows; the steady
 * state is the solution of that linear system, a start-up its exact solution by the matrix exponential. No textbook
 * result is typed in.
 *
 * @param spectrum moduli g in Pa and relaxation times λ in s
 */
public record UpperConvectedMaxwell(RelaxationSpectrum spectrum) implements ConstitutiveModel {
    private static final double NORMAL_STRESS_LIMIT = 0.05;
    private static final double VISCOSITY_LIMIT = 0.3;

    @Override
    public String name() {
        return "upper-convected Maxwell model";
    }

    @Override
    public String source() {
        return "R. B. Bird, R. C. Armstrong, O. Hassager, Dynamics of Polymeric Liquids, vol. 1, 2nd ed. 1987 (memory)";
    }

    @Override
    public List<String> limits() {
        return List.of(
                "in steady shear this model does not thin, and its N₁ grows with the square of the rate without end",
                "melts depart from it early: N₁ from Wi ≈ " + NORMAL_STRESS_LIMIT + " on, here "
                        + rate(NORMAL_STRESS_LIMIT) + " (12 % below the model), η from Wi ≈ " + VISCOSITY_LIMIT
                        + " on, here " + rate(VISCOSITY_LIMIT)
                        + " (7 % below); computed for LDPE Melt I with the damped integral model",
                "N₂ = 0 in this model; measured melts have a small negative one");
    }

    private String rate(double weissenberg) {
        return NumberText.of(weissenberg / spectrum.meanRelaxationTime(), 2) + " 1/s";
    }

    @Override
    public Stress stress(Flow flow, double time) {
        Require.finite("time", time, "s");
        Stress sum = Stress.NONE;
        for (RelaxationSpectrum.Mode mode : spectrum.modes()) {
            sum = sum.plus(stress(mode, flow, time));
        }
        return sum;
    }

    /** One mode: the steady state before the first change, then exactly from change to change. */
    private static Stress stress(RelaxationSpectrum.Mode mode, Flow flow, double time) {
        Doubles changes = flow.changes();
        double early = changes.isEmpty() ? time : Math.min(time, Math.nextDown(changes.at(0)));
        double[] state = new Equation(mode.time(), flow.gradient(early), flow.components()).steady();
        for (int i = 0; i < changes.size() && changes.at(i) < time; i++) {
            double until = i + 1 < changes.size() ? Math.min(time, changes.at(i + 1)) : time;
            Equation equation = new Equation(mode.time(), flow.gradient(changes.at(i)), flow.components());
            state = equation.after(state, until - changes.at(i));
        }
        double[] full = new double[Component.values().length];
        for (int k = 0; k < state.length; k++) {
            full[flow.components().get(k).ordinal()] = mode.modulus() * state[k];
        }
        return new Stress(Doubles.of(full));
    }

    /**
     * The equation of one mode of unit modulus under a constant gradient, in units of its relaxation time:
     * ds/dT = A s + b for the allowed components s of τ/g, with T = t/λ.
     */
    private static final class Equation {
        private final double time;
        private final VelocityGradient gradient;
        private final List<Component> components;
        private final RealMatrix matrix;
        private final double[] drive;

        Equation(double time, VelocityGradient gradient, List<Component> components) {
            this.time = time;
            this.gradient = gradient;
            this.components = components;
            int n = components.size();
            this.matrix = MatrixUtils.createRealMatrix(n, n);
            this.drive = new double[n];
            for (int k = 0; k < n; k++) {
                double[][] change = change(unit(components.get(k)));
                for (Component component : Component.values()) {
                    double entry = change[component.row()][component.column()];
                    int row = components.indexOf(component);
                    if (row >= 0) {
                        matrix.setEntry(row, k, entry);
                    } else if (entry != 0) {
                        throw new RangeException("the flow with " + gradient + " moves stress into component "
                                + component + ", which its list " + components + " leaves out");
                    }
                }
                Component component = components.get(k);
                drive[k] = 2 * time * gradient.deformation(component.row(), component.column());
            }
        }

        private static double[][] unit(Component component) {
            double[][] tensor = new double[3][3];
            tensor[component.row()][component.column()] = 1;
            tensor[component.column()][component.row()] = 1;
            return tensor;
        }

        /** λ (L τ + τ Lᵀ) − τ. */
        private double[][] change(double[][] stress) {
            double[][] change = new double[3][3];
            for (int i = 0; i < 3; i++) {
                for (int j = 0; j < 3; j++) {
                    double carried = 0;
                    for (int k = 0; k < 3; k++) {
                        carried += gradient.at(i, k) * stress[k][j] + stress[i][k] * gradient.at(j, k);
                    }
                    change[i][j] = time * carried - stress[i][j];
                }
            }
            return change;
        }

        double[] steady() {
            double[] rest = new double[components.size()];
            int[] reached = reached(rest);
            if (reached.length == 0) {
                return rest;
            }
            double growth = growth();
            if (!(2 * time * growth < 1)) {
                throw new RangeException("no steady state: the flow stretches at " + NumberText.of(growth)
                        + " 1/s, and the mode with λ = " + NumberText.of(time) + " s grows without bound from "
                        + NumberText.of(1 / (2 * time)) + " 1/s on");
            }
            double[] solved = new LUDecomposition(matrix.getSubMatrix(reached, reached))
                    .getSolver()
                    .solve(MatrixUtils.createRealVector(picked(drive, reached)).mapMultiply(-1))
                    .toArray();
            return spread(solved, reached);
        }

        /** The components that are driven, or not zero at the start, or fed by these: the others stay zero exactly. */
        private int[] reached(double[] start) {
            boolean[] reached = new boolean[start.length];
            for (int pass = 0; pass <= start.length; pass++) {
                for (int row = 0; row < start.length; row++) {
                    reached[row] |= drive[row] != 0 || start[row] != 0;
                    for (int column = 0; column < start.length; column++) {
                        reached[row] |= reached[column] && matrix.getEntry(row, column) != 0;
                    }
                }
            }
            return IntStream.range(0, start.length).filter(k -> reached[k]).toArray();
        }

        private static double[] picked(double[] all, int[] places) {
            return IntStream.of(places).mapToDouble(k -> all[k]).toArray();
        }

        private double[] spread(double[] some, int[] places) {
            double[] all = new double[components.size()];
            for (int k = 0; k < places.length; k++) {
                all[places[k]] = some[k];
            }
            return all;
        }

        /** The largest rate at which the flow stretches a line for ever: the largest real part of L's eigenvalues. */
        private double growth() {
            RealMatrix l = MatrixUtils.createRealMatrix(3, 3);
            boolean triangular = true;
            for (int i = 0; i < 3; i++) {
                for (int j = 0; j < 3; j++) {
                    l.setEntry(i, j, gradient.at(i, j));
                    triangular &= i <= j || gradient.at(i, j) == 0;
                }
            }
            double[] real = triangular
                    ? new double[] {l.getEntry(0, 0), l.getEntry(1, 1), l.getEntry(2, 2)}
                    : new EigenDecomposition(l).getRealEigenvalues();
            return Doubles.of(real).largest();
        }

        double[] after(double[] start, double duration) {
            int[] reached = reached(start);
            if (reached.length == 0) {
                return start;
            }
            double[] after = MatrixExponential.propagate(
                            matrix.getSubMatrix(reached, reached),
                            picked(drive, reached),
                            picked(start, reached),
                            duration / time)
                    .toArray();
            return spread(after, reached);
        }
    }
}
