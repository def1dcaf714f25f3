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
    private static final String NO_REASON = "this cannot be compiled";
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
        if (errors.isEmpty()) {
            return compileError(origin, origin.offset, NO_REASON);
        }
        List<String> report = new ArrayList<>();
        for (Diag error : errors.subList(0, Math.min(MOST_ERRORS, errors.size()))) {
            report.addAll(pointed(origin.cell, placeOf(error, origin), plain(error)));
        }
        Diag first = errors.get(0);
        int line = origin.cell.lineAt(placeOf(first, origin));
        return new Outcome.Failed(Outcome.Reason.COMPILE, "CompileError", plain(first), line, report);
    }

    private static int placeOf(Diag error, Origin origin) {
        int at = origin.offset + (int) Math.max(0, error.getPosition());
        return Math.min(at, origin.cell.text().length());
    }

    /** A part of a cell that never ends. */
    Outcome.Failed unfinished(Origin origin) {
        int open = CellText.openComment(origin.cell.text());
        return open < 0
                ? compileError(origin, origin.offset, "this is not a whole statement")
                : compileError(origin, open, "this comment has no end");
    }

    /** A cell on which the compiler itself broke down. */
    Outcome.Failed beyondCompiler(Throwable broken) {
        String message = broken.toString().contains("StackOverflowError")
                ? "an expression of this cell is nested too deeply to be compiled"
                : "the compiler cannot take this cell: " + broken;
        return new Outcome.Failed(Outcome.Reason.COMPILE, "CompileError", message, 0, List.of(message));
    }

    private static Outcome.Failed compileError(Origin origin, int at, String message) {
        return new Outcome.Failed(
                Outcome.Reason.COMPILE,
                "CompileError",
                message,
                origin.cell.lineAt(at),
                pointed(origin.cell, at, message));
    }

    /** A declaration that needs something which is not, or no longer, declared. */
    Outcome.Failed unresolved(DeclarationSnippet snippet, Origin current) {
        Origin origin = origins.getOrDefault(snippet.id(), current);
        List<String> missing = shell.unresolvedDependencies(snippet).toList();
        String message = missing.isEmpty()
                ? shell.diagnostics(snippet).map(Failures::plain).findFirst().orElse(NO_REASON)
                : "cannot find " + String.join(", ", missing);
        int at = origin.offset + (missing.isEmpty() ? 0 : placeOf(missing.get(0), snippet.source()));
        List<String> report = new ArrayList<>();
        boolean elsewhere = origin.number != current.number;
        if (elsewhere) {
            report.add(
                    "this needs a declaration of the cell run as number " + origin.number + ", which no longer holds:");
        }
        report.addAll(pointed(origin.cell, at, message));
        int line = elsewhere ? current.cell.lineAt(current.offset) : origin.cell.lineAt(at);
        return new Outcome.Failed(Outcome.Reason.COMPILE, "CompileError", message, line, report);
    }

    /** Where the name stands that JShell misses and tells as {@code class Egg} or {@code method odd(int)}. */
    private static int placeOf(String missing, String source) {
        String name = missing.replaceAll("\\(.*", "").replaceAll(".*\\s", "");
        Matcher place = Pattern.compile("\\b" + Pattern.quote(name) + "\\b").matcher(CellText.masked(source));
        return place.find() ? place.start() : 0;
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
        report.addAll(caret(current.cell, line, -1));
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

    /** The lines that led to the failure, innermost first; the first with a caret. */
    private static List<String> framesOf(List<Place> places, Origin current) {
        List<String> lines = new ArrayList<>();
        int number = current.number;
        for (Place place : places.stream().distinct().limit(MOST_FRAMES).toList()) {
            if (place.origin.number != number) {
                number = place.origin.number;
                lines.add(number == current.number ? "in this cell:" : "in the cell run as number " + number + ":");
            }
            List<String> pointed = caret(place.origin.cell, place.line, -1);
            lines.addAll(place.equals(places.get(0)) ? pointed : pointed.subList(0, 1));
        }
        return lines;
    }

    /** The causes of what was thrown, without those whose words its own message has already. */
    private List<String> causesOf(Throwable thrown) {
        List<String> lines = new ArrayList<>();
        String told = message(thrown);
        Throwable cause = thrown.getCause();
        for (int depth = 0; cause != null && depth < MOST_CAUSES; depth++) {
            String kind = speaksForItself.test(cause) ? "" : cause.getClass().getSimpleName() + ": ";
            if (!told.contains(message(cause))) {
                lines.add("caused by " + kind + message(cause));
            }
            cause = cause.getCause();
        }
        return lines;
    }

    private static String message(Throwable thrown) {
        String message = thrown.getMessage();
        return message == null || message.isBlank()
                ? "no message"
                : WRAPPER.matcher(message).replaceAll("");
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
        int under = column >= 0
                ? Math.min(column, code.length())
                : code.length() - code.stripLeading().length();
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
                .orElse(NO_REASON);
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
