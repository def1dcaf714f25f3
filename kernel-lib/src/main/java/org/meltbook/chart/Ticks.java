package org.meltbook.chart;

import java.math.BigDecimal;
import java.math.MathContext;
import java.math.RoundingMode;
import java.util.ArrayList;
import java.util.List;
import java.util.function.ToDoubleFunction;
import org.meltbook.base.NumberText;

/**
 * Chooses the ticks of an axis and writes their numbers. A logarithmic axis over some decades is labelled at decades,
 * as 10ⁿ or, within three decades of moderate numbers, as plain numbers; over less than that at 1, 2, 5 or finer, so
 * that it is never left without numbers.
 */
final class Ticks {
    /** Labels are nearer to each other than this many of their own extents only if that cannot be avoided. */
    private static final double ROOM = 1.35;

    private static final int MOST = 11;
    private static final int MOST_STEPS = 8;
    private static final double[] ONE = {1};
    private static final double[] ONE_TWO_FIVE = {1, 2, 5};
    private static final double[] ONE_TWO_THREE_FIVE = {1, 2, 3, 5};
    private static final double[] MANY = {1, 2, 3, 4, 5, 6, 8};
    private static final double[] ALL = {1, 2, 3, 4, 5, 6, 7, 8, 9};
    private static final double[] HALVES = {1, 1.5, 2, 2.5, 3, 3.5, 4, 4.5, 5, 5.5, 6, 6.5, 7, 7.5, 8, 8.5, 9, 9.5};

    private final Scale scale;
    private final double length;
    private final ToDoubleFunction<String> extent;

    /**
     * @param length pixels along the axis
     * @param extent pixels that a label takes along the axis
     */
    Ticks(Scale scale, double length, ToDoubleFunction<String> extent) {
        this.scale = scale;
        this.length = length;
        this.extent = extent;
    }

    /** The ticks within the scale, rising, labelled ones and minor ones. */
    List<Tick> choose() {
        return scale.logarithmic() ? logarithmic() : linear();
    }

    private List<Tick> logarithmic() {
        double decades = scale.decades();
        boolean moderate = scale.min() > 0.9e-3 && scale.max() < 1.2e5;
        boolean plain = moderate && decades <= 3.2;
        for (double[] multiples : candidates(decades, plain)) {
            List<Tick> labelled = multiples(multiples, 1, plain);
            if (labelled.size() >= (multiples.length > 3 ? 3 : 2) && fit(labelled)) {
                return withMinor(labelled, multiples.length > 4 ? HALVES : ALL, 1);
            }
        }
        if (decades < 2) {
            return linear();
        }
        int stride = 1;
        while (!fit(multiples(ONE, stride, plain))) {
            stride++;
        }
        return withMinor(multiples(ONE, stride, plain), ONE, stride <= 5 ? 1 : stride);
    }

    private static List<double[]> candidates(double decades, boolean plain) {
        if (decades < 0.75) {
            return List.of(ALL, MANY, ONE_TWO_THREE_FIVE, ONE_TWO_FIVE);
        }
        if (decades < 2.3) {
            return plain ? List.of(ONE_TWO_FIVE, ONE) : List.of(ONE, ONE_TWO_FIVE);
        }
        return List.of(ONE);
    }

    /** The multiples of each {@code stride}-th power of ten that lie within the scale, labelled. */
    private List<Tick> multiples(double[] multiples, int stride, boolean plain) {
        List<Tick> ticks = new ArrayList<>();
        int first = Math.floorDiv((int) Math.floor(Math.log10(scale.min())), stride) * stride;
        for (int power = first; power <= Math.log10(scale.max()); power += stride) {
            for (double multiple : multiples) {
                double value = Double.parseDouble(multiple + "e" + power);
                if (value >= scale.min() && value <= scale.max()) {
                    ticks.add(new Tick(value, plain ? plain(value) : power(multiple, power)));
                }
            }
        }
        return ticks;
    }

    private List<Tick> withMinor(List<Tick> labelled, double[] multiples, int stride) {
        List<Tick> ticks = new ArrayList<>(labelled);
        for (Tick tick : multiples(multiples, stride, true)) {
            if (labelled.stream().noneMatch(t -> t.value() == tick.value())) {
                ticks.add(new Tick(tick.value(), ""));
            }
        }
        ticks.sort((a, b) -> Double.compare(a.value(), b.value()));
        return ticks;
    }

    /** Ticks at equal steps; also for a logarithmic axis over so little that it is nearly linear. */
    private List<Tick> linear() {
        BigDecimal step = BigDecimal.ONE.movePointRight((int) Math.floor(Math.log10(scale.max() - scale.min())) - 1);
        int[] growth = {2, 5, 10};
        BigDecimal base = step;
        List<Tick> labelled = steps(base, true);
        for (int i = 0; labelled.size() > MOST_STEPS || !fit(labelled); i++) {
            base = step.multiply(BigDecimal.valueOf(growth[i % 3])).movePointRight(i / 3);
            labelled = steps(base, true);
        }
        int parts = base.unscaledValue().toString().startsWith("2") ? 4 : 5;
        List<Tick> ticks = new ArrayList<>();
        for (Tick minor : steps(base.divide(BigDecimal.valueOf(parts)), false)) {
            ticks.add(labelled.stream()
                    .filter(t -> t.value() == minor.value())
                    .findFirst()
                    .orElse(minor));
        }
        return ticks;
    }

    private List<Tick> steps(BigDecimal step, boolean labelled) {
        List<Tick> ticks = new ArrayList<>();
        BigDecimal largest = new BigDecimal(Math.max(Math.abs(scale.min()), Math.abs(scale.max())));
        BigDecimal value = new BigDecimal(scale.min())
                .divide(step, 0, RoundingMode.CEILING)
                .multiply(step);
        BigDecimal end = new BigDecimal(scale.max());
        for (; value.compareTo(end) <= 0; value = value.add(step)) {
            ticks.add(new Tick(value.doubleValue(), labelled ? stepLabel(value, step, largest) : ""));
        }
        return ticks;
    }

    private static String stepLabel(BigDecimal value, BigDecimal step, BigDecimal largest) {
        int order = order(largest);
        if (value.signum() == 0) {
            return "0";
        }
        if (order < -3 || order > 5) {
            int digits = Math.max(0, order - order(step));
            BigDecimal mantissa = value.movePointLeft(order).setScale(digits, RoundingMode.HALF_EVEN);
            return minus(mantissa.toPlainString()) + "×10" + NumberText.raised(order);
        }
        return minus(value.setScale(Math.max(0, -order(step)), RoundingMode.HALF_EVEN)
                .toPlainString());
    }

    private static int order(BigDecimal value) {
        return value.precision() - value.scale() - 1;
    }

    /** Whether the labels stand apart and are not too many. */
    private boolean fit(List<Tick> ticks) {
        if (ticks.size() > MOST) {
            return false;
        }
        for (int i = 1; i < ticks.size(); i++) {
            double gap = length
                    * (scale.fraction(ticks.get(i).value())
                            - scale.fraction(ticks.get(i - 1).value()));
            double extents = extent.applyAsDouble(ticks.get(i).label())
                    + extent.applyAsDouble(ticks.get(i - 1).label());
            if (gap < ROOM * extents / 2) {
                return false;
            }
        }
        return true;
    }

    private static String plain(double value) {
        return new BigDecimal(value).round(new MathContext(1)).toPlainString();
    }

    private static String power(double multiple, int power) {
        return (multiple == 1 ? "" : plain(multiple) + "×") + "10" + NumberText.raised(power);
    }

    private static String minus(String plain) {
        return plain.replace('-', '−');
    }
}
