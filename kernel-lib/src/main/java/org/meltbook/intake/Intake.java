package org.meltbook.intake;

import java.util.ArrayList;
import java.util.List;
import java.util.stream.Collectors;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;
import org.meltbook.measure.Curve;
import org.meltbook.measure.FlowCurve;
import org.meltbook.measure.FrequencySweep;
import org.meltbook.measure.Measurement;
import org.meltbook.measure.Verdict;

/**
 * The measurements of one file, and the log of how they were read: what was found out about the file, what each column
 * was taken for, which units became which, and where every row went.
 */
public final class Intake implements Exhibit {
    private final Reading reading;
    private final IntakeLog log;
    private final List<Measurement> measurements;
    private final List<String> warnings;

    Intake(Reading reading, IntakeLog log, List<Measurement> measurements, List<String> warnings) {
        this.reading = reading;
        this.log = log;
        this.measurements = List.copyOf(measurements);
        this.warnings = List.copyOf(warnings);
    }

    /** All measurements, in the order in which they begin in the file. */
    public List<Measurement> measurements() {
        return measurements;
    }

    /** The frequency sweeps of the file; empty if there are none. */
    public List<FrequencySweep> frequencySweeps() {
        return of(FrequencySweep.class);
    }

    /** The flow curves of the file; empty if there are none. */
    public List<FlowCurve> flowCurves() {
        return of(FlowCurve.class);
    }

    private <M extends Measurement> List<M> of(Class<M> kind) {
        return measurements.stream().filter(kind::isInstance).map(kind::cast).toList();
    }

    /**
     * The one frequency sweep of the file.
     *
     * @throws RangeException if there is none, or more than one
     */
    public FrequencySweep frequencySweep() {
        return only(frequencySweeps(), "frequency sweep");
    }

    /**
     * The one flow curve of the file.
     *
     * @throws RangeException if there is none, or more than one
     */
    public FlowCurve flowCurve() {
        return only(flowCurves(), "flow curve");
    }

    private <M extends Measurement> M only(List<M> found, String kind) {
        if (found.size() == 1) {
            return found.get(0);
        }
        if (found.isEmpty()) {
            throw new RangeException(log.file() + " holds no " + kind + "; it holds " + contents());
        }
        throw new RangeException(log.file() + " holds " + found.size() + " " + kind
                + "s: take one of the list, by sample: "
                + found.stream().map(m -> "'" + m.conditions().sample() + "'").collect(Collectors.joining(", ")));
    }

    /**
     * The same file, in which rows with equal cells in these columns make one measurement each.
     *
     * @throws IntakeException if there is no such column, or the file has changed since it was read
     */
    public Intake splitBy(String... headings) {
        Intake again = reading.splitBy(headings).read();
        if (!again.digest().equals(digest())) {
            throw new IntakeException(
                    log.file(),
                    0,
                    "",
                    "the file as it was first read (SHA-256 " + digest() + ")",
                    "a changed one (" + again.digest() + ")");
        }
        return again;
    }

    /** SHA-256 of the file in hexadecimal. */
    public String digest() {
        return log.digest();
    }

    /** How many rows stand below the header: rows out and rows set aside together. */
    public long rowsRead() {
        return log.rowsRead();
    }

    /** How many rows went into measurements, flagged ones included. */
    public long rowsOut() {
        return log.rowsOut();
    }

    /** How many rows hold nothing at all; the log names their lines. */
    public long rowsSetAside() {
        return log.emptyLines().size();
    }

    @Override
    public String headline() {
        String aside = rowsSetAside() == 0 ? "none set aside" : rowsSetAside() + " set aside";
        return log.file() + ": " + contents() + " from " + rowsRead() + " rows, " + aside + ".";
    }

    private String contents() {
        List<String> parts = new ArrayList<>();
        for (String kind :
                measurements.stream().map(Measurement::kind).distinct().toList()) {
            long count =
                    measurements.stream().filter(m -> m.kind().equals(kind)).count();
            parts.add(count + " " + kind + (count == 1 ? "" : "s"));
        }
        return String.join(" and ", parts);
    }

    @Override
    public List<Rows> rows() {
        return List.of(log.decisions(), log.columns(), made());
    }

    /** One line for each measurement. */
    private Rows made() {
        return Rows.titled("Measurements of " + log.file())
                .text("kind", measurements.stream().map(Measurement::kind).toList())
                .text(
                        "sample",
                        measurements.stream().map(m -> m.conditions().sample()).toList())
                .text("points", measurements.stream().map(Intake::points).toList())
                .text(
                        "doubtful",
                        measurements.stream()
                                .map(m -> count(m, Verdict.Standing.DOUBTFUL))
                                .toList())
                .text(
                        "unusable",
                        measurements.stream()
                                .map(m -> count(m, Verdict.Standing.UNUSABLE))
                                .toList())
                .build();
    }

    private static String points(Measurement measurement) {
        return measurement.curves().stream()
                .map(curve -> curve.size() + " " + curve.y().quantity().symbol())
                .collect(Collectors.joining(", "));
    }

    private static String count(Measurement measurement, Verdict.Standing standing) {
        long most = 0;
        for (Curve curve : measurement.curves()) {
            most = Math.max(
                    most,
                    curve.verdicts().stream()
                            .filter(v -> v.standing() == standing)
                            .count());
        }
        return Long.toString(most);
    }

    @Override
    public List<Figure> figures() {
        return List.of();
    }

    /** What to mind about the file, then about its rows, measurement by measurement. */
    @Override
    public List<String> cautions() {
        List<String> all = new ArrayList<>(warnings);
        for (Measurement measurement : measurements) {
            String sample = measurement.conditions().sample();
            measurement.cautions().forEach(caution -> all.add(sample.isEmpty() ? caution : sample + ": " + caution));
        }
        return List.copyOf(all);
    }

    @Override
    public String toString() {
        return headline();
    }
}
