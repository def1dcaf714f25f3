package org.meltbook.kernel;

import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.function.Predicate;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import java.util.stream.Stream;
import jdk.jshell.DeclarationSnippet;
import jdk.jshell.Diag;
import jdk.jshell.JShell;
import jdk.jshell.JShellException;
import jdk.jshell.Snippet;

/** Tells what went wrong in a cell in the reader's own lines: no class, frame or line of the kernel shows. */
final class Failures {
    private static final int MOST_FRAMES = 8;
    private static final int MOST_ERRORS = 5;
    private static final int MOST_CAUSES = 5;
    private static final Pattern WRAPPER = Pattern.compile("(REPL\\.)?\\$JShell\\$\\w+\\.?");

    private final JShell shell;
    private final Predicate<Throwable> speaksForItself;
    private final Map<String, Origin> origins = new HashMap<>();

    Failures(JShell shell, Predicate<Throwable> speaksForItself) {
        this.shell = shell;
        this.speaksForItself = speaksForItself;
    }

    /** Remembers where a snippet stands, so that frames in it can be told as lines of its cell. */
    void remember(Snippet snippet, Origin origin) {
        origins.put(snippet.id(), origin);
    }

    /** A snippet that the compiler refused. */
    Outcome.Failed refused(Snippet snippet, Origin origin) {
        List<Diag> errors = shell.diagnostics(snippet).filter(Diag::isError).toList();
        List<String> report = new ArrayList<>();
        for (Diag error : errors.subList(0, Math.min(MOST_ERRORS, errors.size()))) {
            int at = origin.offset + (int) Math.max(0, error.getPosition());
            report.addAll(pointed(origin.cell, at, plain(error)));
        }
        if (errors.isEmpty()) {
            report.addAll(pointed(origin.cell, origin.offset, "this cannot be compiled"));
        }
        int first = errors.isEmpty() ? 0 : (int) Math.max(0, errors.get(0).getPosition());
        String message = errors.isEmpty() ? "this cannot be compiled" : plain(errors.get(0));
        int line = origin.cell.lineAt(Math.min(origin.offset + first, origin.cell.text().length()));
        return new Outcome.Failed(Outcome.Reason.COMPILE, "CompileError", message, line, report);
    }

    /** A part of a cell that never ends. */
    Outcome.Failed unfinished(Origin origin) {
        int open = CellText.openComment(origin.cell.text());
        int at = open < 0 ? origin.offset : open;
        String message = open < 0 ? "this is not a whole statement" : "this comment has no end";
        return new Outcome.Failed(
                Outcome.Reason.COMPILE,
                "CompileError",
                message,
                origin.cell.lineAt(at),
                pointed(origin.cell, at, message));
    }

    /** A declaration that needs something which the whole cell did not declare. */
    Outcome.Failed unresolved(DeclarationSnippet snippet, Origin origin) {
        List<String> missing = shell.unresolvedDependencies(snippet).toList();
        if (missing.isEmpty()) {
            return refused(snippet, origin);
        }
        String message = "cannot find " + String.join(", ", missing);
        String name = missing.get(0).replaceAll("\\(.*", "").replaceAll(".*\\s", "");
        Matcher place = Pattern.compile("\\b" + Pattern.quote(name) + "\\b").matcher(CellText.masked(snippet.source()));
        int at = origin.offset + (place.find() ? place.start() : 0);
        return new Outcome.Failed(
                Outcome.Reason.COMPILE,
                "CompileError",
                message,
                origin.cell.lineAt(at),
                pointed(origin.cell, at, message));
    }

    /**
     * A snippet that threw.
     *
     * @param thrown  what was thrown
     * @param seen    the same as JShell tells it, with frames in terms of snippets
     * @param current the snippet
     */
    Outcome.Failed threw(Throwable thrown, JShellException seen, Origin current) {
        List<Place> places = places(seen);
        String kind = thrown.getClass().getSimpleName();
        String message = message(thrown);
        List<String> report = new ArrayList<>();
        report.add(speaksForItself.test(thrown) ? message : kind + ": " + message);
        report.addAll(framesOf(places, current));
        report.addAll(causesOf(thrown));
        return new Outcome.Failed(Outcome.Reason.THROWN, kind, message, lineIn(places, current), report);
    }

    /** What happened while the value of a cell was turned into something to show. */
    Outcome.Failed notShown(Throwable thrown, Origin current) {
        String kind = thrown.getClass().getSimpleName();
        String message = message(thrown);
        int line = current.cell.lineAt(current.offset);
        List<String> report = new ArrayList<>();
        report.add("the result cannot be shown: " + (speaksForItself.test(thrown) ? message : kind + ": " + message));
        report.addAll(caret(current.cell, line, 0));
        report.addAll(causesOf(thrown));
        return new Outcome.Failed(Outcome.Reason.THROWN, kind, message, line, report);
    }

    /** A cell that was interrupted. */
    Outcome.Failed interrupted(Stream<JShellException> seen, Origin current) {
        List<Place> places = seen.flatMap(e -> places(e).stream()).toList();
        List<String> report = new ArrayList<>(List.of("interrupted"));
        report.addAll(framesOf(places, current));
        return new Outcome.Failed(
                Outcome.Reason.INTERRUPTED, "Interrupted", "the cell was interrupted", lineIn(places, current), report);
    }

    private List<Place> places(JShellException seen) {
        List<Place> places = new ArrayList<>();
        for (StackTraceElement frame : seen.getStackTrace()) {
            String file = frame.getFileName();
            Origin origin = file != null && file.startsWith("#") ? origins.get(file.substring(1)) : null;
            if (origin != null) {
                places.add(new Place(origin, origin.cell.lineAt(origin.offset) + frame.getLineNumber() - 1));
            }
        }
        return places;
    }

    private static int lineIn(List<Place> places, Origin current) {
        return places.stream()
                .filter(p -> p.origin.number == current.number)
                .mapToInt(Place::line)
                .findFirst()
                .orElse(0);
    }

    private static List<String> framesOf(List<Place> places, Origin current) {
        List<String> lines = new ArrayList<>();
        List<Place> shown = places.stream().distinct().toList();
        for (Place place : shown.subList(0, Math.min(MOST_FRAMES, shown.size()))) {
            String where = place.origin.number == current.number ? "" : "in the cell run as number " + place.origin.number + ":";
            if (!where.isEmpty()) {
                lines.add(where);
            }
            boolean first = lines.size() <= 1;
            List<String> pointed = caret(place.origin.cell, place.line, -1);
            lines.addAll(first ? pointed : pointed.subList(0, 1));
        }
        return lines;
    }

    private List<String> causesOf(Throwable thrown) {
        List<String> lines = new ArrayList<>();
        Throwable cause = thrown.getCause();
        while (cause != null && lines.size() < MOST_CAUSES) {
            String kind = speaksForItself.test(cause) ? "" : cause.getClass().getSimpleName() + ": ";
            lines.add("caused by " + kind + message(cause));
            cause = cause.getCause();
        }
        return lines;
    }

    private static String message(Throwable thrown) {
        String message = thrown.getMessage();
        return message == null || message.isBlank() ? "no message" : message;
    }

    private static List<String> pointed(CellText cell, int offset, String message) {
        int inside = Math.min(offset, cell.text().length());
        List<String> lines = new ArrayList<>(message.lines().toList());
        lines.addAll(caret(cell, cell.lineAt(inside), cell.columnAt(inside)));
        return lines;
    }

    /** The line with its number, and a caret below: under the given column, or under the first letter if negative. */
    private static List<String> caret(CellText cell, int line, int column) {
        String code = cell.line(line);
        int under = column >= 0 ? Math.min(column, code.length()) : code.length() - code.stripLeading().length();
        String number = "line " + line + ": ";
        String indent = code.substring(0, under).replaceAll("[^\\t]", " ");
        return List.of(number + code, " ".repeat(number.length()) + indent + "^");
    }

    /** The compiler's words without the wrapper class that the user never wrote. */
    private static String plain(Diag error) {
        return error.getMessage(Locale.ROOT)
                .lines()
                .filter(line -> !line.strip().matches("location:\\s+class\\s*(" + WRAPPER + ")?"))
                .map(line -> WRAPPER.matcher(line).replaceAll("").replace(" in class  ", " "))
                .reduce((a, b) -> a + "\n" + b)
                .orElse("this cannot be compiled");
    }

    /**
     * Where a snippet came from.
     *
     * @param number how many cells ran before it, plus one
     * @param cell   text of the cell
     * @param offset where the snippet starts in it
     */
    record Origin(int number, CellText cell, int offset) {}

    private record Place(Origin origin, int line) {}
}
