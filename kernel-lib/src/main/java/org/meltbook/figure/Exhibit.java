package org.meltbook.figure;

import java.util.List;
import org.meltbook.base.Rows;

/**
 * Something that can be laid before a supervisor. A notebook shows it as headline, tables, figures and cautions, in
 * that order.
 *
 * <p>Contract: (1) immutable, so that it shows the same each time; (2) the headline is one sentence that names the thing
 * and its verdict; (3) every number in {@code rows} has its unit; (4) what is extrapolated, bounded or undetermined says
 * so in the row or in a caution; (5) {@code toString} is the headline.
 */
public interface Exhibit {
    /** One sentence: what this is and what to make of it. */
    String headline();

    /** Its numbers as tables. */
    List<Rows> rows();

    /** Its pictures as data. */
    List<Figure> figures();

    /** What to mind before using it; empty if nothing. */
    default List<String> cautions() {
        return List.of();
    }
}
