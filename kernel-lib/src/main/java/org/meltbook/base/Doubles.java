package org.meltbook.base;

import java.util.Arrays;
import java.util.function.DoubleUnaryOperator;
import java.util.stream.DoubleStream;

/** A fixed list of numbers: what an array would be if nobody could change it behind your back. */
public final class Doubles {
    private static final Doubles EMPTY = new Doubles(new double[0]);
    private final double[] values;

    private Doubles(double[] values) {
        this.values = values;
    }

    /** The given numbers, copied. */
    public static Doubles of(double... values) {
        return values.length == 0 ? EMPTY : new Doubles(values.clone());
    }

    /**
     * {@code count} numbers evenly spaced on a log scale, both ends included.
     *
     * @throws RangeException unless {@code 0 < first}, {@code 0 < last} and {@code count >= 2}
     */
    public static Doubles logSpaced(double first, double last, int count) {
        if (!(first > 0 && last > 0 && count >= 2 && first < Double.MAX_VALUE && last < Double.MAX_VALUE)) {
            throw new RangeException("log spacing needs two positive ends and at least 2 points, found first = " + first
                    + ", last = " + last + ", count = " + count);
        }
        double[] spaced = new double[count];
        double step = Math.log(last / first) / (count - 1);
        for (int i = 0; i < count; i++) {
            spaced[i] = first * Math.exp(step * i);
        }
        spaced[count - 1] = last;
        return new Doubles(spaced);
    }

    /** How many numbers there are. */
    public int size() {
        return values.length;
    }

    /** Whether there is no number at all. */
    public boolean isEmpty() {
        return values.length == 0;
    }

    /** The number at {@code index}, counted from zero. */
    public double at(int index) {
        return values[index];
    }

    /** A new array with the numbers. */
    public double[] toArray() {
        return values.clone();
    }

    /** The numbers as a stream. */
    public DoubleStream stream() {
        return Arrays.stream(values);
    }

    /** Each number replaced by what {@code change} makes of it. */
    public Doubles map(DoubleUnaryOperator change) {
        double[] changed = new double[values.length];
        for (int i = 0; i < changed.length; i++) {
            changed[i] = change.applyAsDouble(values[i]);
        }
        return new Doubles(changed);
    }

    /** The numbers at the given places, in that order. */
    public Doubles pick(int... indices) {
        double[] picked = new double[indices.length];
        for (int i = 0; i < picked.length; i++) {
            picked[i] = values[indices[i]];
        }
        return new Doubles(picked);
    }

    /** The smallest number, NaN passed over; NaN if there is none. */
    public double smallest() {
        return stream().filter(v -> !Double.isNaN(v)).min().orElse(Double.NaN);
    }

    /** The largest number, NaN passed over; NaN if there is none. */
    public double largest() {
        return stream().filter(v -> !Double.isNaN(v)).max().orElse(Double.NaN);
    }

    @Override
    public boolean equals(Object other) {
        return other instanceof Doubles that && Arrays.equals(values, that.values);
    }

    @Override
    public int hashCode() {
        return Arrays.hashCode(values);
    }

    @Override
    public String toString() {
        StringBuilder text = new StringBuilder("[");
        int shown = Math.min(values.length, 8);
        for (int i = 0; i < shown; i++) {
            text.append(i == 0 ? "" : ", ").append(NumberText.of(values[i]));
        }
        return text.append(shown < values.length ? ", … " + values.length + " in all]" : "]")
                .toString();
    }
}
