package org.meltbook.measure;

import java.util.Collections;
import java.util.List;
import java.util.stream.IntStream;
import org.meltbook.base.RangeException;

/**
 * Points of one quantity against another, with a verdict a point.
 *
 * @param x        what was set or scanned
 * @param y        what was found, same length
 * @param verdicts one for each point
 */
public record Curve(Series x, Series y, List<Verdict> verdicts) {
    /** Copies the verdicts and checks that all have one length. */
    public Curve {
        verdicts = List.copyOf(verdicts);
        if (x.size() != y.size() || x.size() != verdicts.size()) {
            throw new RangeException("a curve needs as many " + x.quantity().label() + " as "
                    + y.quantity().label() + " values and verdicts, found " + x.size() + ", " + y.size() + " and "
                    + verdicts.size());
        }
    }

    /** Points that are all sound. */
    public static Curve of(Series x, Series y) {
        return new Curve(x, y, Collections.nCopies(x.size(), Verdict.SOUND));
    }

    /** How many points there are, usable or not. */
    public int size() {
        return x.size();
    }

    /** The points a fit may use, in order. */
    public Curve usable() {
        int[] rows = IntStream.range(0, size())
                .filter(row -> verdicts.get(row).usable())
                .toArray();
        return new Curve(
                x.pick(rows),
                y.pick(rows),
                IntStream.of(rows).mapToObj(verdicts::get).toList());
    }

    /** How many points no fit may use. */
    public int setAside() {
        return size() - usable().size();
    }
}
