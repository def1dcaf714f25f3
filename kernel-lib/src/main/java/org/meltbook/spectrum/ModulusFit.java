package org.meltbook.spectrum;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Random;
import java.util.function.DoubleUnaryOperator;
import org.meltbook.base.Doubles;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;
import org.meltbook.measure.Curve;
import org.meltbook.numeric.NonNegativeLeastSquares;

/**
 * Non-negative moduli on a fixed grid of relaxation times that come nearest to measured moduli in relative terms.
 * Storage and loss points keep their own frequencies; either curve may be left out.
 */
final class ModulusFit {
    private final Doubles times;
    private final double[][] matrix;
    private final double[] residuals;
    private final int storagePoints;
    private final RelaxationSpectrum spectrum;

    private ModulusFit(Doubles times, double[][] matrix, int storagePoints, Progress progress) {
        this.times = times;
        this.matrix = matrix;
        this.storagePoints = storagePoints;
        double[] ones = new double[matrix.length];
        Arrays.fill(ones, 1);
        double[] moduli = solve(ones, progress);
        this.spectrum = spectrum(moduli);
        this.residuals = new double[matrix.length];
        for (int i = 0; i < residuals.length; i++) {
            residuals[i] = ratio(i, moduli) - 1;
        }
    }

    /** Both curves together. */
    static ModulusFit joint(Curve storage, Curve loss, Doubles times, Progress progress) {
        List<double[]> rows = new ArrayList<>(storageRows(storage, times));
        rows.addAll(lossRows(loss, times));
        return new ModulusFit(times, rows.toArray(new double[0][]), storage.size(), progress);
    }

    /** The storage modulus alone. */
    static ModulusFit ofStorage(Curve storage, Doubles times, Progress progress) {
        return new ModulusFit(times, storageRows(storage, times).toArray(new double[0][]), storage.size(), progress);
    }

    /** The loss modulus alone. */
    static ModulusFit ofLoss(Curve loss, Doubles times, Progress progress) {
        return new ModulusFit(times, lossRows(loss, times).toArray(new double[0][]), 0, progress);
    }

    /** One row a point: what a mode of unit modulus at each time adds to model / measured. */
    private static List<double[]> rows(Curve curve, Doubles times, DoubleUnaryOperator share) {
        List<double[]> rows = new ArrayList<>();
        for (int i = 0; i < curve.size(); i++) {
            double frequency = curve.x().at(i);
            double measured = curve.y().at(i);
            rows.add(times.map(time -> share.applyAsDouble(frequency * time) / measured)
                    .toArray());
        }
        return rows;
    }

    private static List<double[]> storageRows(Curve curve, Doubles times) {
        return rows(curve, times, RelaxationSpectrum::storageShare);
    }

    private static List<double[]> lossRows(Curve curve, Doubles times) {
        return rows(curve, times, RelaxationSpectrum::lossShare);
    }

    private double[] solve(double[] target, Progress progress) {
        NonNegativeLeastSquares.Solution solution = NonNegativeLeastSquares.solve(matrix, target, progress);
        if (!solution.converged()) {
            throw new RangeException(
                    "the spectrum on a grid of " + times.size() + " relaxation times did not settle within "
                            + solution.steps() + " steps; ask for fewer modes a decade");
        }
        return solution.unknowns().toArray();
    }

    private RelaxationSpectrum spectrum(double[] moduli) {
        List<RelaxationSpectrum.Mode> modes = new ArrayList<>();
        for (int j = 0; j < moduli.length; j++) {
            if (moduli[j] > 0) {
                modes.add(new RelaxationSpectrum.Mode(moduli[j], times.at(j)));
            }
        }
        return RelaxationSpectrum.of(modes);
    }

    private double ratio(int row, double[] moduli) {
        double sum = 0;
        for (int j = 0; j < moduli.length; j++) {
            sum += matrix[row][j] * moduli[j];
        }
        return sum;
    }

    RelaxationSpectrum spectrum() {
        return spectrum;
    }

    /** model / measured − 1 of each point, storage first. */
    double[] residuals() {
        return residuals.clone();
    }

    /** Root mean square of the relative residuals. */
    double rootMeanSquare() {
        return Math.sqrt(sumOfSquares() / residuals.length);
    }

    /** Sum of the squared relative residuals. */
    double sumOfSquares() {
        return Arrays.stream(residuals).map(r -> r * r).sum();
    }

    /** Points less modes, one at least. */
    int spare() {
        return Math.max(1, residuals.length - spectrum.modes().size());
    }

    /**
     * Spectra refitted to the model plus residuals drawn again, each curve from its own, widened for the modes used up:
     * what the scatter of the points leaves open.
     */
    List<RelaxationSpectrum> replicates(int count, long seed, Progress progress) {
        Random random = new Random(seed);
        double widened = Math.sqrt((double) residuals.length / spare());
        List<RelaxationSpectrum> all = new ArrayList<>();
        for (int k = 0; k < count; k++) {
            progress.at(k, count, "spectra for the intervals");
            double[] target = new double[residuals.length];
            for (int i = 0; i < target.length; i++) {
                boolean storage = i < storagePoints;
                int drawn = storage
                        ? random.nextInt(storagePoints)
                        : storagePoints + random.nextInt(residuals.length - storagePoints);
                target[i] = 1 + residuals[i] - widened * residuals[drawn];
            }
            all.add(spectrum(solve(target, progress)));
        }
        return all;
    }
}
