package org.meltbook.fit;

import java.util.ArrayList;
import java.util.List;
import java.util.stream.IntStream;
import org.meltbook.base.NumberText;

/**
 * Parameters that can be changed together with little or no effect on the misfit, and what of them stays the same.
 *
 * @param grade      how badly they are told apart
 * @param parameters names of those that change together
 * @param fixed      what stays the same, products or sums of two of them: {@code a·b^0.5}, {@code a + 2·b}; empty if
 *     one parameter alone is loose
 * @param factor     by what factor, up or down, the loosest of them moves within its 95 % interval along this direction;
 *     infinite if the data do not limit it, NaN if a value is zero or no interval is known
 */
public record Combination(Grade grade, List<String> parameters, List<String> fixed, double factor) {
    private static final double HIGH_POWER = 4;

    /** How badly parameters are told apart. */
    public enum Grade {
        /** The data do not tell them apart at all. */
        NOT_FIXED,
        /** Within the 95 % interval one moves by more than a factor of ten either way. */
        WEAK,
        /** Told apart, but errors of one pull the others along: condition index above 30. */
        LINKED
    }

    /** Copies the lists. */
    public Combination {
        parameters = List.copyOf(parameters);
        fixed = List.copyOf(fixed);
    }

    /** What the data say and do not say, in words. */
    public String words() {
        String all = joined(parameters);
        String kept = (sums() ? "sum " : "product ") + (fixed.isEmpty() ? "" : joined(fixed));
        String keeps = fixed.size() > 1 ? kept.replaceFirst(" ", "s ") + " are" : kept + " is";
        return switch (grade) {
            case NOT_FIXED -> fixed.isEmpty()
                    ? "the data do not determine " + all + " at all"
                    : "only the " + keeps + " determined, not " + all + " apart";
            case WEAK -> fixed.isEmpty()
                    ? "the data hardly determine " + all
                    : "the " + keeps + " determined far better than " + all + " apart";
            case LINKED -> fixed.isEmpty()
                    ? all + " follows errors of the others"
                    : all + " are determined, but less well apart than the "
                            + kept.replaceFirst(" ", fixed.size() > 1 ? "s " : " ");
        };
    }

    private boolean sums() {
        return fixed.stream().anyMatch(text -> text.contains(" "));
    }

    private static String joined(List<String> names) {
        int last = names.size() - 1;
        return last == 0 ? names.get(0) : String.join(", ", names.subList(0, last)) + " and " + names.get(last);
    }

    /**
     * Products that stay the same when the logarithms of the parameters move along the direction: each parameter with
     * the last, or with the one that moves most if that spares the reader high powers.
     */
    static List<String> products(List<String> names, double[] direction) {
        int last = names.size() - 1;
        int most = IntStream.rangeClosed(0, last)
                .reduce((a, b) -> Math.abs(direction[b]) > Math.abs(direction[a]) ? b : a)
                .orElseThrow();
        boolean high = Math.abs(direction[most]) > HIGH_POWER * Math.abs(direction[last]);
        return kept(names, direction, high ? most : last, Combination::product);
    }

    /** Sums that stay the same when the parameters move along the direction. */
    static List<String> sums(List<String> names, double[] direction) {
        return kept(names, direction, names.size() - 1, Combination::sum);
    }

    private interface Pair {
        String text(String first, String second, double share);
    }

    private static List<String> kept(List<String> names, double[] direction, int with, Pair pair) {
        return IntStream.range(0, names.size())
                .filter(j -> j != with)
                .mapToObj(j -> pair.text(names.get(j), names.get(with), -direction[j] / direction[with]))
                .toList();
    }

    private static String product(String first, String second, double power) {
        String size = number(Math.abs(power));
        return first + (power < 0 ? "/" : "·") + second + (size.equals("1") ? "" : "^" + size);
    }

    private static String sum(String first, String second, double factor) {
        String size = number(Math.abs(factor));
        return first + (factor < 0 ? " − " : " + ") + (size.equals("1") ? "" : size + "·") + second;
    }

    /** Four digits at most, zeros behind the point left out. */
    private static String number(double value) {
        String text = NumberText.of(value);
        return text.contains(".") && !text.contains("×") ? text.replaceAll("\\.?0+$", "") : text;
    }

    /**
     * The same null space spanned by directions that each leave out as many parameters as they can, by elimination.
     *
     * @param directions one array a direction, one number a parameter; changed
     */
    static List<double[]> sparse(List<double[]> directions) {
        List<Integer> taken = new ArrayList<>();
        for (double[] direction : directions) {
            int pivot = IntStream.range(0, direction.length)
                    .filter(j -> !taken.contains(j))
                    .reduce((a, b) -> Math.abs(direction[b]) > Math.abs(direction[a]) ? b : a)
                    .orElseThrow();
            taken.add(pivot);
            for (double[] other : directions) {
                double share = other == direction ? 0 : other[pivot] / direction[pivot];
                for (int j = 0; j < other.length; j++) {
                    other[j] -= share * direction[j];
                }
            }
        }
        return directions;
    }
}
