package org.meltbook.fit;

import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;

/**
 * Solves one problem by damped Gauss–Newton steps, again and again if asked, with other data, from other starts, or with
 * coordinates held; without allocation once it is made. For a single fit {@link Problem#solve()} is enough.
 *
 * <p>Bounds hold at every trial: a step that would leave them ends on them and is solved anew in the other coordinates,
 * and a coordinate that rests on a bound stays there while the sum of squares would only fall outside. Where the model
 * has no value the step is shortened.
 *
 * <p>Each step is solved from the QR decomposition of the Jacobian with the damping appended (no normal equations);
 * columns are scaled by their largest length so far. Damping follows H. B. Nielsen, report IMM-REP-1999-05, Technical
 * University of Denmark (from memory). Commons Math's optimiser knows neither bounds nor interrupts, hence this one; a
 * test holds both together.
 *
 * <p>One thread at a time. Coordinates are those of {@link Workspace}.
 */
public final class Solver {
    private static final int MOST_EVALUATIONS = 20_000;
    private static final double FIRST_DAMPING = 1e-3;
    private static final double LEAST_DAMPING = 1e-16;
    /** Share of the sum of squares to gain by the last step: less is lost in rounding. */
    private static final double LEFT_TO_GAIN = 1e-16;
    /** Share of it left after the last step: the optimum is less than a hundred-millionth of a standard error away. */
    private static final double LEFT_AFTER = 1e-17;
    /** Share to gain below which the steps shrink at the rate at which they shrank last. */
    private static final double CLOSE = 1e-9;
    /** By how much gained and predicted may differ before the model counts as bent. */
    private static final double FAR_OFF = 0.1;

    /** Along what share of a step the curve of the model is looked at. */
    private static final double PROBE = 0.1;
    /** A step whose second-order part is longer than this share of it is too long. */
    private static final double MOST_BEND = 0.375;
    /** Share of the sum of squares to gain from which on a step is bent. */
    private static final double WORTH_BENDING = 1e-4;

    private static final double ROUNDING = 0x1p-52;
    /** A step that changes no coordinate by more than this share of it cannot be told from none. */
    private static final double SMALL = 1e-14;
    /** If the best step changes no coordinate by more, and yet lowers nothing, the optimum is reached within rounding. */
    private static final double SETTLED = 1e-10;

    private final Workspace workspace;
    private final DampedStep step;
    private final Projection projection;
    private final int coordinates;
    private final boolean[] held;
    private double[] here;
    private double[] there;
    private double[] residuals;
    private double[] trialResiduals;
    private double[] jacobian;
    private double[] trialJacobian;
    private final double[] second;
    private final boolean plain;
    private double cost;
    private double damping;
    private double growth;
    private double shareBefore; // of the sum of squares, to gain by the best step at the place before
    private boolean bending; // whether the next step is bent along the curve of the model
    private boolean sure; // whether the next trial will most likely be accepted
    private boolean linearised; // whether the last trial brought its derivatives
    private int evaluations;

    private Solver(Problem problem) {
        this.workspace = Workspace.of(problem);
        this.coordinates = workspace.coordinates();
        this.step = new DampedStep(workspace);
        this.projection = new Projection(workspace);
        this.held = new boolean[coordinates];
        this.here = new double[coordinates];
        this.there = new double[coordinates];
        this.residuals = new double[workspace.points()];
        this.trialResiduals = new double[workspace.points()];
        this.jacobian = new double[workspace.points() * coordinates];
        this.trialJacobian = new double[jacobian.length];
        this.plain = problem.loss().plain();
        this.second = new double[workspace.points()];
        workspace.inward(problem.start().toArray(), here);
    }

    /** A solver for the problem, at its start. */
    public static Solver of(Problem problem) {
        return new Solver(problem);
    }

    /** Where data are exchanged and coordinates turned into values. */
    public Workspace workspace() {
        return workspace;
    }

    /** Moves to the coordinates from which the next solution starts; held ones too. */
    public void start(double[] from) {
        System.arraycopy(from, 0, here, 0, coordinates);
    }

    /** Holds a coordinate at a value in the next solutions. */
    public void hold(int j, double value) {
        here[j] = value;
        held[j] = true;
    }

    /** Lets a held coordinate go. */
    public void release(int j) {
        held[j] = false;
    }

    /** Copies the coordinates reached. */
    public void coordinates(double[] into) {
        System.arraycopy(here, 0, into, 0, coordinates);
    }

    /** What is left of the sum that is minimised. */
    public double cost() {
        return cost;
    }

    /** Whether the model has a value and derivatives where the next solution starts. */
    public boolean usable() {
        return workspace.linearise(here, trialResiduals, trialJacobian);
    }

    /** How often the model was tried in the last solution. */
    public int evaluations() {
        return evaluations;
    }

    /** The fit at the coordinates reached, with the data of the problem, not those exchanged since. */
    public Fit fit(Fit.Status status) {
        return Fit.at(workspace.problem(), here, status, evaluations);
    }

    /**
     * Steps from where it is to the optimum.
     *
     * @throws RangeException if the model has no value at the start
     */
    public Fit.Status solve(Progress progress) {
        evaluations = 0;
        Loss loss = workspace.problem().loss();
        if (!loss.leading().equals(loss)) {
            workspace.loss(loss.leading());
            try {
                descend(progress);
            } finally {
                workspace.loss(loss);
            }
        }
        return descend(progress);
    }

    private Fit.Status descend(Progress progress) {
        begin();
        while (evaluations < MOST_EVALUATIONS) {
            progress.at(evaluations, 0, "fit");
            double leftToGain = step.solve(here, held, 0);
            if (last(leftToGain)) {
                move();
                swapPlaces();
                return Fit.Status.CONVERGED;
            }
            boolean settled = step.longest(here) <= SETTLED;
            double predicted = step.solve(here, held, damping);
            if (bending && predicted > WORTH_BENDING * cost && !bend()) {
                shorten();
                continue;
            }
            move();
            double gained = cost - trial();
            if (gained > 0) {
                accept(gained, predicted);
            } else if (settled || predicted <= noise()) {
                return Fit.Status.CONVERGED; // what is left to gain is below rounding
            } else if (step.longest(here) <= SMALL) {
                return Fit.Status.STALLED;
            } else {
                shorten();
                bending = plain;
            }
        }
        return Fit.Status.EVALUATIONS_SPENT;
    }

    private void begin() {
        damping = FIRST_DAMPING;
        growth = 2;
        shareBefore = 0;
        bending = plain;
        step.reset();
        project(here);
        if (!linearise()) {
            throw new RangeException(workspace.problem().name() + " has no finite value or derivative at the start "
                    + "of the fit, " + workspace.problem().start());
        }
    }

    /** Whether the best step, which would gain so much, needs no trial and no other after it. */
    private boolean last(double leftToGain) {
        double share = Math.abs(leftToGain) / cost;
        double rate = Math.min(1, share / shareBefore);
        shareBefore = share;
        return cost == 0 || share <= LEFT_TO_GAIN || share <= CLOSE && share * rate <= LEFT_AFTER;
    }

    private void move() {
        for (int j = 0; j < coordinates; j++) {
            there[j] = here[j] + step.at(j);
        }
        project(there);
    }

    private void shorten() {
        damping *= growth;
        growth *= 2;
    }

    private void accept(double gained, double predicted) {
        double quality = 2 * gained / predicted - 1;
        damping = Math.max(LEAST_DAMPING, damping * Math.max(1.0 / 3, 1 - quality * quality * quality));
        growth = 2;
        bending = plain && Math.abs(gained / predicted - 1) > FAR_OFF;
        sure = Math.abs(gained / predicted - 1) <= FAR_OFF;
        swapPlaces();
        if (linearised) {
            double[] left = residuals;
            residuals = trialResiduals;
            trialResiduals = left;
            left = jacobian;
            jacobian = trialJacobian;
            trialJacobian = left;
            cost -= gained;
            step.take(residuals, jacobian);
        } else if (!linearise()) {
            swapPlaces(); // a value but no derivative there: back, and shorter
            linearise();
            damping *= 10;
        }
    }

    private void swapPlaces() {
        double[] left = here;
        here = there;
        there = left;
    }

    /**
     * Bends the step along the curve of the model, found from one more trial part of the way.
     *
     * @return false if the model bends so much that the step should be shorter
     */
    private boolean bend() {
        evaluations++;
        for (int j = 0; j < coordinates; j++) {
            there[j] = here[j] + PROBE * step.at(j);
        }
        if (!workspace.residuals(there, trialResiduals)) {
            return false;
        }
        step.change(jacobian, second);
        for (int i = 0; i < second.length; i++) {
            second[i] = 2 / PROBE * ((trialResiduals[i] - residuals[i]) / PROBE - second[i]);
        }
        return step.bend(here, damping, second) <= MOST_BEND;
    }

    private boolean linearise() {
        evaluations++;
        boolean usable = workspace.linearise(here, residuals, jacobian);
        if (usable) {
            cost = workspace.cost(residuals);
            step.take(residuals, jacobian);
        }
        return usable;
    }

    private void project(double[] coordinates) {
        if (projection.places().length > 0) {
            evaluations++;
            projection.apply(coordinates, held);
        }
    }

    /** What is to be minimised at the trial; with the derivatives at once if they will most likely be needed. */
    private double trial() {
        evaluations++;
        linearised = sure;
        boolean usable = sure
                ? workspace.linearise(there, trialResiduals, trialJacobian)
                : workspace.residuals(there, trialResiduals);
        sure = false;
        return usable ? workspace.cost(trialResiduals) : Double.NaN;
    }

    /** By how much rounding may change the sum of squares. */
    private double noise() {
        double size = workspace.size();
        return 4 * ROUNDING * size * (Math.sqrt(cost) + ROUNDING * size);
    }
}
