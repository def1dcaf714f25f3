package org.meltbook.fit;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.function.ToDoubleFunction;
import java.util.stream.Collectors;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;

/**
 * Several models on the same points, ranked by Akaike's criterion corrected for few points, with weights and evidence
 * ratios. It says which of these models the data support best, never that the best one is right.
 *
 * <p>Weights: wᵢ ∝ exp(−Δᵢ / 2), and models within Δ = 2 of the best count as undecided: K. P. Burnham, D. R. Anderson,
 * Model Selection and Multimodel Inference (2002) sections 2.6 and 2.9 (memory).
 */
public final class Comparison implements Exhibit {
    private static final double UNDECIDED = 2;

    private final List<Entry> ranked;

    /**
     * One model among the others.
     *
     * @param name       what it is called here
     * @param fit        its fit
     * @param criteria   its information criteria
     * @param difference AICc above that of the best, 0 or more; NaN if it has none
     * @param weight     its share of the support of all, 0 to 1; NaN if it has no AICc
     */
    public record Entry(String name, Fit fit, InformationCriteria criteria, double difference, double weight) {
        /** How many times better the best model is supported: its weight over this one's. */
        public double evidenceRatio() {
            return Math.exp(difference / 2);
        }

        private boolean judged() {
            return !Double.isNaN(difference);
        }
    }

    private Comparison(Map<String, Fit> fits) {
        Map<String, InformationCriteria> criteria = new LinkedHashMap<>();
        fits.forEach((name, fit) -> criteria.put(name, InformationCriteria.of(fit)));
        double best = Doubles.of(criteria.values().stream()
                        .mapToDouble(InformationCriteria::aicc)
                        .toArray())
                .smallest();
        double total = criteria.values().stream()
                .mapToDouble(c -> Math.exp((best - c.aicc()) / 2))
                .filter(w -> !Double.isNaN(w))
                .sum();
        // NaN sorts behind all numbers
        this.ranked = fits.keySet().stream()
                .map(name -> {
                    double difference = criteria.get(name).aicc() - best;
                    double weight = Math.exp(-difference / 2) / total;
                    return new Entry(name, fits.get(name), criteria.get(name), difference, weight);
                })
                .sorted(Comparator.comparingDouble(Entry::difference))
                .toList();
    }

    /**
     * The fits, called by the names of their models; a name used again gets a number.
     *
     * @throws RangeException as {@link #of(Map)}
     */
    public static Comparison of(Fit... fits) {
        return of(List.of(fits));
    }

    /**
     * The fits, called by the names of their models; a name used again gets a number.
     *
     * @throws RangeException as {@link #of(Map)}
     */
    public static Comparison of(List<Fit> fits) {
        Map<String, Fit> named = new LinkedHashMap<>();
        for (Fit fit : fits) {
            String name = fit.problem().name();
            for (int i = 2; named.containsKey(name); i++) {
                name = fit.problem().name() + " (" + i + ")";
            }
            named.put(name, fit);
        }
        return of(named);
    }

    /**
     * The fits by names of their own.
     *
     * @throws RangeException if there are fewer than two, one has a robust loss, or they were not made on the same rows
     *     with the same weighting; the message says which differ in what
     */
    public static Comparison of(Map<String, Fit> fits) {
        ComparisonCheck.check(fits);
        return new Comparison(fits);
    }

    /** The models, the best supported first, those without AICc last. */
    public List<Entry> ranked() {
        return ranked;
    }

    /** What the comparison comes to, in one plain sentence that starts with "The". */
    public String sentence() {
        List<Entry> judged = ranked.stream().filter(Entry::judged).toList();
        if (judged.isEmpty()) {
            return "The points are too few, or met too exactly, to compare these models by AICc.";
        }
        Entry best = judged.get(0);
        if (judged.size() == 1) {
            return "The points are too few to judge any of these models but " + best.name() + " by AICc.";
        }
        List<Entry> close =
                judged.stream().filter(e -> e.difference() < UNDECIDED).toList();
        if (close.size() > 1) {
            String names = close.stream().map(Entry::name).collect(Collectors.joining(" and "));
            Entry simplest = close.stream()
                    .min(Comparator.comparingInt(e -> e.criteria().parameters()))
                    .orElseThrow();
            return "The data do not decide between " + names + " (AICc within 2 of the best); " + simplest.name()
                    + " has the fewest parameters of these.";
        }
        Entry next = judged.get(1);
        return "The data support " + best.name() + " best, with weight " + NumberText.of(best.weight(), 2) + ": "
                + ratio(next) + " times as well as the next, " + next.name() + ".";
    }

    private static String ratio(Entry entry) {
        return entry.evidenceRatio() < 1e6 ? NumberText.of(entry.evidenceRatio(), 2) : "more than a million";
    }

    @Override
    public String headline() {
        return sentence();
    }

    @Override
    public List<Rows> rows() {
        Problem problem = ranked.get(0).fit().problem();
        return List.of(Rows.titled("Models ranked by AICc")
                .text("model", ranked.stream().map(Entry::name).toList())
                .text(
                        "k",
                        ranked.stream()
                                .map(e -> Integer.toString(e.criteria().parameters()))
                                .toList())
                .numbers("sum of squares", "1", numbers(e -> e.fit().sumOfSquares()))
                .numbers("AICc", "1", numbers(e -> e.criteria().aicc()))
                .numbers("Δ AICc", "1", numbers(Entry::difference))
                .numbers("weight", "1", numbers(Entry::weight))
                .numbers("evidence ratio of the best", "1", numbers(Entry::evidenceRatio))
                .note("Error model of all: " + problem.errorWords() + "; " + problem.points() + " points, "
                        + (problem.errors() == ErrorModel.ABSOLUTE
                                ? "k does not count a variance, since the deviations are given."
                                : "k counts the variance, which is estimated."))
                .note("Weights say which of these models is supported best, not that any of them is right.")
                .build());
    }

    private Doubles numbers(ToDoubleFunction<Entry> number) {
        return Doubles.of(ranked.stream().mapToDouble(number).toArray());
    }

    @Override
    public List<Figure> figures() {
        return List.of();
    }

    @Override
    public List<String> cautions() {
        List<String> all = new ArrayList<>();
        for (Entry entry : ranked) {
            if (!entry.judged()) {
                all.add(entry.name() + " has no AICc: too few points for its parameters, or no misfit at all");
            }
            if (entry.fit().status() != Fit.Status.CONVERGED) {
                all.add(entry.name() + " did not converge: its AICc may be too high");
            }
            entry.fit().identification().forEach(problem -> all.add(entry.name() + ": " + problem));
        }
        return List.copyOf(all);
    }

    @Override
    public String toString() {
        return headline();
    }
}
