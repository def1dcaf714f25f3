package org.meltbook.fit;

import java.util.Arrays;
import java.util.Comparator;
import java.util.List;
import java.util.Random;
import org.apache.commons.math3.random.SobolSequenceGenerator;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;

/**
 * One problem solved from many starts, for sums of squares with more than one valley. The first start is the problem's
 * own; the others fill the box of the bounds evenly (Sobol's sequence, shifted by a seeded random step). Where a
 * parameter has no bound the box ends at a factor of 100 from its start on a logarithmic scale, and at ten times its
 * size on a linear one, so that a valley farther off is not found.
 */
public final class MultiStart {
    private static final double RATIO = Math.log(100);
    private static final double SIZES = 10;
    /** Solutions whose sums of squares differ by no more than this share are one. */
    private static final double SAME = 1e-6;

    private final List<Fit> fits;
    private final int starts;

    private MultiStart(List<Fit> fits, int starts) {
        this.fits = List.copyOf(fits);
        this.starts = starts;
    }

    /**
     * Solves the problem from many starts, on as many threads as there are cores; the result depends on the seed alone.
     *
     * @param starts how many, the problem's own included; at least one
     * @throws RangeException if the model has no value at any of them, or fewer than one is asked for
     */
    public static MultiStart of(Problem problem, int starts, long seed, Progress progress) {
        if (starts < 1) {
            throw new RangeException("a fit from many starts needs one at least, asked for " + starts);
        }
        double[][] places = places(problem, starts, seed);
        Fit[] ends = new Fit[starts];
        Parallel.each(
                starts,
                Runtime.getRuntime().availableProcessors(),
                () -> {
                    Solver solver = Solver.of(problem);
                    return (number, pause) -> {
                        solver.start(places[number]);
                        if (solver.usable()) {
                            ends[number] = solver.fit(solver.solve(pause));
                        }
                    };
                },
                progress,
                "fits from many starts");
        List<Fit> fits = Arrays.stream(ends)
                .filter(fit -> fit != null && Double.isFinite(fit.cost()))
                .sorted(Comparator.comparingDouble(Fit::cost))
                .toList();
        if (fits.isEmpty()) {
            throw new RangeException(problem.name() + " has no finite value at any of the " + starts + " starts");
        }
        return new MultiStart(fits, starts);
    }

    private static double[][] places(Problem problem, int starts, long seed) {
        Workspace workspace = Workspace.of(problem);
        int count = workspace.coordinates();
        double[][] places = new double[starts][count];
        workspace.inward(problem.start().toArray(), places[0]);
        Random random = new Random(seed);
        double[] shift = random.doubles(count).toArray();
        SobolSequenceGenerator sequence = new SobolSequenceGenerator(count);
        int[] free = problem.free();
        for (int k = 1; k < starts; k++) {
            double[] even = sequence.nextVector();
            for (int j = 0; j < count; j++) {
                double own = places[0][j];
                boolean log = problem.parameters().get(free[j]).scale() == Parameter.Scale.LOG;
                double reach = log ? RATIO : SIZES * Math.max(Math.abs(own), 1);
                double low = Double.isInfinite(workspace.lowest(j)) ? own - reach : workspace.lowest(j);
                double high = Double.isInfinite(workspace.highest(j)) ? own + reach : workspace.highest(j);
                double share = (even[j] + shift[j]) % 1;
                places[k][j] = Math.min(high, Math.max(low, low + share * (high - low)));
            }
        }
        return places;
    }

    /** The fit with the least sum of squares. */
    public Fit best() {
        return fits.get(0);
    }

    /** All fits, the best first; starts at which the model has no value gave none. */
    public List<Fit> fits() {
        return fits;
    }

    /** How many starts there were. */
    public int starts() {
        return starts;
    }

    /** How many starts led to the best fit: few of many say that there may be a better one still. */
    public int reachedBest() {
        double least = best().cost();
        return (int)
                fits.stream().filter(fit -> fit.cost() - least <= SAME * least).count();
    }

    /** The best fit, and how many starts led to it. */
    @Override
    public String toString() {
        return best().headline() + " " + reachedBest() + " of " + starts + " starts led there.";
    }
}
