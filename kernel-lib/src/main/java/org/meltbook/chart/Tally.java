package org.meltbook.chart;

import java.util.ArrayList;
import java.util.List;

/** Counts what a figure cannot show where it belongs, and says so in sentences for the caption. */
final class Tally {
    /** Points at or below zero on a logarithmic axis, which are marked at its edge. */
    int pointsAtEdge;
    /** Points that are infinite or too large for any axis. */
    int pointsOutOfRange;
    /** Error bars with an end beyond the axis. */
    int barsCut;
    /** Values of lines that the axis cannot show. */
    int lineValuesLeftOut;
    /** Places of bands with a side that the axis cannot show. */
    int bandValuesCut;
    /** Names of layers of which nothing is drawn. */
    final List<String> emptyLayers = new ArrayList<>();

    /**
     * One sentence for each count above zero.
     *
     * @param nothing whether nothing at all is drawn
     */
    List<String> sentences(boolean nothing) {
        List<String> sentences = new ArrayList<>();
        add(
                sentences,
                pointsAtEdge,
                " point at or below zero is marked at the edge.",
                " points at or below zero are marked at the edge.");
        add(
                sentences,
                pointsOutOfRange,
                " point is infinite or too large to be drawn.",
                " points are infinite or too large to be drawn.");
        add(
                sentences,
                barsCut,
                " error bar reaches beyond the axis and is cut at the edge.",
                " error bars reach beyond the axis and are cut at the edge.");
        add(
                sentences,
                lineValuesLeftOut,
                " value of a line cannot be shown on the axes and leaves a gap.",
                " values of lines cannot be shown on the axes and leave gaps.");
        add(
                sentences,
                bandValuesCut,
                " place of a band reaches beyond the axes and is cut there.",
                " places of bands reach beyond the axes and are cut there.");
        if (nothing) {
            sentences.add("There is no point that can be drawn.");
        } else {
            emptyLayers.forEach(name -> sentences.add("Nothing of '" + name + "' can be drawn."));
        }
        return sentences;
    }

    private static void add(List<String> sentences, int count, String one, String more) {
        if (count > 0) {
            sentences.add(count + (count == 1 ? one : more));
        }
    }
}
