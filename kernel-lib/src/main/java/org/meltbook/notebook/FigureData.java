package org.meltbook.notebook;

import java.math.BigDecimal;
import java.math.MathContext;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import java.util.TreeSet;
import java.util.stream.Collectors;
import java.util.stream.DoubleStream;
import java.util.stream.IntStream;
import org.meltbook.base.Doubles;
import org.meltbook.figure.Axis;
import org.meltbook.figure.Figure;
import org.meltbook.figure.Layer;
import org.meltbook.kernel.MimeBundle;

/**
 * The numbers behind pictures, laid beside them in a notebook: pictures of one figure may differ in a few pixels from
 * one Java to the next, its numbers do not. Five significant digits keep them small.
 */
final class FigureData {
    /** The MIME type under which a list of figures stands in a bundle. */
    static final String MIME = "application/vnd.meltbook.figures+json";

    private static final MathContext DIGITS = new MathContext(5);
    /** Two roundings to five digits differ by at most one unit in the fifth. */
    private static final double TOLERANCE = 1.01e-4;

    /** A series of more numbers than this is thinned out. */
    private static final int LONGEST = 2000;

    private FigureData() {}

    static List<Object> of(List<Figure> figures, List<String> captions) {
        List<Object> data = new ArrayList<>();
        for (int i = 0; i < figures.size(); i++) {
            Figure figure = figures.get(i);
            Map<String, Object> entry = new LinkedHashMap<>();
            entry.put("title", figure.title());
            entry.put("caption", captions.get(i));
            entry.put("x", axis(figure.x()));
            entry.put("y", axis(figure.y()));
            entry.put("layers", figure.layers().stream().map(FigureData::layer).toList());
            data.add(entry);
        }
        return data;
    }

    /** The captions of the figures in a bundle, one after another; blank if there are none. */
    static String captions(MimeBundle bundle) {
        return bundle.data().get(MIME) instanceof List<?> figures
                ? figures.stream()
                        .map(figure -> figure instanceof Map<?, ?> map ? String.valueOf(map.get("caption")) : "")
                        .collect(Collectors.joining(" "))
                : "";
    }

    /** The first place where two trees of figure data differ, with what was stored and what was found. */
    static Optional<Difference> difference(String path, Object expected, Object found) {
        if (expected instanceof Map<?, ?> a && found instanceof Map<?, ?> b) {
            TreeSet<String> keys = new TreeSet<>();
            a.keySet().forEach(key -> keys.add(key.toString()));
            b.keySet().forEach(key -> keys.add(key.toString()));
            return keys.stream()
                    .flatMap(key -> difference(path + "." + key, a.get(key), b.get(key)).stream())
                    .findFirst();
        } else if (expected instanceof List<?> a && found instanceof List<?> b) {
            for (int i = 0; i < Math.max(a.size(), b.size()); i++) {
                Object before = i < a.size() ? a.get(i) : "nothing";
                Object now = i < b.size() ? b.get(i) : "nothing";
                Optional<Difference> difference = difference(path + "[" + (i + 1) + "]", before, now);
                if (difference.isPresent()) {
                    return difference;
                }
            }
            return Optional.empty();
        }
        return inText(path, Objects.toString(expected), Objects.toString(found));
    }

    /** Texts are held against each other word by word, numbers among them within rounding. */
    private static Optional<Difference> inText(String path, String expected, String found) {
        String[] before = expected.split(" ");
        String[] now = found.split(" ");
        for (int i = 0; i < Math.max(before.length, now.length); i++) {
            String a = i < before.length ? before[i] : "nothing";
            String b = i < now.length ? now[i] : "nothing";
            if (!same(a, b)) {
                return Optional.of(new Difference(path + ", place " + (i + 1), a, b));
            }
        }
        return Optional.empty();
    }

    private static boolean same(String expected, String found) {
        if (expected.equals(found)) {
            return true;
        }
        try {
            double a = Double.parseDouble(expected);
            double b = Double.parseDouble(found);
            return Math.abs(a - b) <= TOLERANCE * Math.max(Math.abs(a), Math.abs(b));
        } catch (NumberFormatException e) {
            return false;
        }
    }

    private static Map<String, Object> axis(Axis axis) {
        Map<String, Object> data = new LinkedHashMap<>();
        data.put("label", axis.title());
        data.put("scale", axis.scale().name());
        return data;
    }

    private static Map<String, Object> layer(Layer layer) {
        Map<String, Object> data = new LinkedHashMap<>();
        data.put("name", layer.name());
        data.put("x", numbers(layer.x()));
        if (layer instanceof Layer.Marks marks) {
            data.put("kind", "marks");
            data.put("y", numbers(marks.y()));
            ends(data, marks.low(), marks.high());
        } else if (layer instanceof Layer.Band band) {
            data.put("kind", "band");
            ends(data, band.low(), band.high());
        } else if (layer instanceof Layer.Line line) {
            data.put("kind", line.style() == Layer.Style.DASHED ? "dashed" : "line");
            data.put("y", numbers(line.y()));
        }
        return data;
    }

    private static void ends(Map<String, Object> data, Doubles low, Doubles high) {
        boolean some =
                low.stream().anyMatch(v -> !Double.isNaN(v)) || high.stream().anyMatch(v -> !Double.isNaN(v));
        if (some) {
            data.put("low", numbers(low));
            data.put("high", numbers(high));
        }
    }

    /**
     * Numbers in one line of text, so that a figure takes a few lines of the notebook's file. Of a long series it is
     * every so many-th number, and how many there are: a notebook is no place for millions.
     */
    private static String numbers(Doubles values) {
        int step = (values.size() + LONGEST - 1) / LONGEST;
        if (step <= 1) {
            return text(values.stream());
        }
        return "one in " + step + " of " + values.size() + ": "
                + text(IntStream.iterate(0, i -> i < values.size(), i -> i + step)
                        .mapToDouble(values::at));
    }

    private static String text(DoubleStream values) {
        return values.mapToObj(v -> Double.isFinite(v)
                        ? String.valueOf(new BigDecimal(v).round(DIGITS).doubleValue())
                        : String.valueOf(v))
                .map(text -> text.endsWith(".0") ? text.substring(0, text.length() - 2) : text)
                .collect(Collectors.joining(" "));
    }

    /** One place where figures differ. */
    record Difference(String place, String expected, String found) {}
}
