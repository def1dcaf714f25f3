package org.meltbook.fit;

import java.util.ArrayList;
import java.util.List;
import org.meltbook.base.Doubles;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;

/**
 * Walks one coordinate away from the optimum, the others fitted again at each place, until the cost has risen to a
 * threshold, a bound is met, or the profile stays below for as far as it is looked at.
 */
final class ProfileTrace {
    /** Steps to the threshold if the profile is a parabola. */
    private static final int STEPS = 6;
    /** Half-widths that the standard error gives, after which a linear profile counts as open. */
    private static final double FAR = 200;
    /** A logarithmic profile counts as open after a factor of a hundred million. */
    private static final double FAR_LOGARITHM = 8 * Math.log(10);

    private static final int MOST_SOLUTIONS = 200;
    private static final int MOST_SECANTS = 60;
    private static final double CLOSE = 1e-9;

    private final Solver solver;
    private final Workspace workspace;
    private final Progress progress;
    private final Parameter parameter;
    private final int held;
    private final double[] optimum;
    private final double cost;
    private final double scale;
    private final double target; // square root of the threshold
    private final List<ProfilePoint> points = new ArrayList<>();
    private int solutions;
    private int unconverged;

    /**
     * @param held   the coordinate that is walked
     * @param scale  by what a rise of the cost is divided
     * @param target square root of the threshold for the divided rise
     */
    ProfileTrace(Fit fit, int held, double scale, double target, Progress progress) {
        this.solver = Solver.of(fit.problem());
        this.workspace = solver.workspace();
        this.progress = progress;
        this.parameter = fit.problem().parameters().get(fit.problem().free()[held]);
        this.held = held;
        this.optimum = fit.coordinates().toArray();
        this.cost = fit.cost();
        this.scale = scale;
        this.target = target;
    }

    /** A place that was solved. */
    private record Place(double[] coordinates, double root) {}

    /** The places solved, in the order in which they were met. */
    List<ProfilePoint> points() {
        return points;
    }

    /** How many of the solutions did not converge. */
    int unconverged() {
        return unconverged;
    }

    /**
     * Walks to one side.
     *
     * @param way   −1 or 1
     * @param error standard error of the coordinate, NaN if there is none
     */
    ProfileEnd walk(int way, double error) {
        boolean known = error > 0 && error < Double.POSITIVE_INFINITY;
        double start = optimum[held];
        double width = known ? target * error : 0.1 * target * unknownScale(start);
        double reach = parameter.scale() == Parameter.Scale.LOG
                ? Math.max(FAR_LOGARITHM, 3 * width)
                : FAR * Math.max(width, known ? 0 : 100 * Math.abs(start));
        double limit = way < 0 ? workspace.lowest(held) : workspace.highest(held);
        double step = width / STEPS;
        Place before = new Place(optimum.clone(), 0);
        Place last = before;
        for (int tried = 0; tried < MOST_SOLUTIONS; tried++) {
            double from = last.coordinates[held];
            if (from == limit) {
                return unfinished(ProfileEnd.Kind.BOUND, way, last);
            } else if (Math.abs(from - start) > reach) {
                return unfinished(ProfileEnd.Kind.OPEN, way, last);
            } else if (!(step > CLOSE * width)) {
                return unfinished(ProfileEnd.Kind.LOST, way, last);
            }
            Place place = solved(way < 0 ? Math.max(limit, from - step) : Math.min(limit, from + step), before, last);
            if (place == null) {
                step /= 4;
                continue;
            } else if (place.root >= target) {
                double end = value(crossing(last, place));
                return new ProfileEnd(ProfileEnd.Kind.DATA, end, end, target * target);
            }
            double gained = (place.root - last.root) * STEPS / target;
            step *= gained > 0.5 ? Math.max(0.4, Math.min(2, 1 / gained)) : 2;
            before = last;
            last = place;
        }
        return unfinished(ProfileEnd.Kind.OPEN, way, last);
    }

    private ProfileEnd unfinished(ProfileEnd.Kind kind, int way, Place last) {
        double edge = way < 0 ? parameter.low() : parameter.high();
        return new ProfileEnd(kind, edge, value(last.coordinates[held]), last.root * last.root);
    }

    private double unknownScale(double start) {
        return parameter.scale() == Parameter.Scale.LOG || start == 0 ? 1 : Math.abs(start);
    }

    private double value(double inner) {
        return Math.min(parameter.high(), Math.max(parameter.low(), parameter.outward(inner)));
    }

    /** Where the root of the rise meets the target: false position, an end kept twice halved (Illinois). */
    private double crossing(Place inside, Place outside) {
        Place near = inside;
        Place far = outside;
        double low = near.coordinates[held];
        double high = far.coordinates[held];
        double below = near.root - target;
        double above = far.root - target;
        int kept = 0; // −1 if the last place replaced the lower end, 1 if the upper one
        for (int k = 0; k < MOST_SECANTS && Math.abs(high - low) > 1e-13 * Math.abs(high); k++) {
            double middle = high - above * (high - low) / (above - below);
            Place place = solved(middle, near, far);
            // where there is no value the crossing must lie before
            double miss = place == null ? Math.max(above, CLOSE * target) : place.root - target;
            if (Math.abs(miss) <= CLOSE * target && place != null) {
                return middle;
            }
            if (miss < 0) {
                low = middle;
                below = miss;
                above = kept < 0 ? above / 2 : above;
                kept = -1;
                near = place;
            } else {
                high = middle;
                above = miss;
                below = kept > 0 ? below / 2 : below;
                kept = 1;
                far = place == null ? far : place;
            }
        }
        return high;
    }

    /** The place with the coordinate held there, started on the line through two others; null if there is no value. */
    private Place solved(double at, Place first, Place second) {
        progress.at(solutions, 0, "profile of " + parameter.label());
        double span = second.coordinates[held] - first.coordinates[held];
        double share = span == 0 ? 0 : (at - second.coordinates[held]) / span;
        Place place = solvedFrom(at, second.coordinates, first.coordinates, share);
        return place == null && share != 0 ? solvedFrom(at, second.coordinates, first.coordinates, 0) : place;
    }

    private Place solvedFrom(double at, double[] last, double[] before, double share) {
        double[] from = new double[last.length];
        for (int j = 0; j < from.length; j++) {
            double line = last[j] + share * (last[j] - before[j]);
            from[j] = Math.min(workspace.highest(j), Math.max(workspace.lowest(j), line));
        }
        solver.start(from);
        solver.hold(held, at);
        Fit.Status status;
        try {
            status = solver.solve(Progress.QUIET);
        } catch (RangeException noValue) {
            return null;
        }
        solutions++;
        unconverged += status == Fit.Status.CONVERGED ? 0 : 1;
        double[] reached = new double[last.length];
        solver.coordinates(reached);
        double[] all = new double[workspace.problem().parameters().size()];
        workspace.outward(reached, all);
        double rise = (solver.cost() - cost) / scale;
        points.add(new ProfilePoint(value(at), rise, Doubles.of(all)));
        return new Place(reached, Math.sqrt(Math.max(0, rise)));
    }
}
