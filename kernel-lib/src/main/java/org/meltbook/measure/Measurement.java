package org.meltbook.measure;

import java.util.List;
import org.meltbook.figure.Exhibit;

/**
 * Something measured: series in SI under conditions, with a verdict a row and a trail of notes.
 *
 * <p>Contract: (1) immutable: each change gives a new object with one more note; (2) a row of the source is there or the
 * measurement was not made: rows are flagged, never dropped; (3) {@code curves} holds all of its numbers in SI.
 */
public interface Measurement extends Exhibit {
    /** What kind of test this is: {@code frequency sweep}. */
    String kind();

    /** Under what it was made. */
    Conditions conditions();

    /** Its numbers, curve by curve. */
    List<Curve> curves();

    /** What was done to it, oldest first. */
    List<Note> trail();
}
