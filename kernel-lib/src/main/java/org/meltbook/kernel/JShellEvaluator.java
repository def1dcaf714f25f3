package org.meltbook.kernel;

import java.io.File;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.Optional;
import java.util.stream.Stream;
import jdk.jshell.DeclarationSnippet;
import jdk.jshell.JShell;
import jdk.jshell.JShellException;
import jdk.jshell.Snippet;
import jdk.jshell.Snippet.Kind;
import jdk.jshell.Snippet.Status;
import jdk.jshell.Snippet.SubKind;
import jdk.jshell.SnippetEvent;
import jdk.jshell.SourceCodeAnalysis;
import jdk.jshell.SourceCodeAnalysis.CompletionInfo;
import jdk.jshell.UnresolvedReferenceException;
import org.meltbook.kernel.Failures.Origin;

/**
 * Cells of Java run by JShell inside this process, so that values keep their types. While a session is open, standard
 * output, error and input of the process belong to its cells: who prints for another purpose keeps the former streams.
 */
public final class JShellEvaluator implements Evaluator {
    private final Settings settings;
    private final CellRun run = new CellRun();
    private final InProcessControl control;
    private final JShell shell;
    private final SourceCodeAnalysis analysis;
    private final Failures failures;
    private final Inspection inspection;
    private final CellStreams streams;
    private Optional<Cell.Stage> stage = Optional.empty();
    private int cells;

    private JShellEvaluator(Settings settings) {
        this.settings = settings;
        CellLoader loader = new CellLoader();
        control = new InProcessControl(loader, run);
        shell = JShell.builder().executionEngine(control.provider(), null).build();
        analysis = shell.sourceCodeAnalysis();
        failures = new Failures(shell, settings.speaksForItself());
        inspection = new Inspection(shell, loader.classes());
        streams = new CellStreams();
    }

    /**
     * A new session; the working folder is that of this process.
     *
     * @throws IllegalArgumentException if an import of the settings cannot be compiled
     */
    public static JShellEvaluator open(Settings settings) {
        JShellEvaluator evaluator = new JShellEvaluator(settings);
        evaluator.shell.addToClasspath(String.join(File.pathSeparator, settings.classPath()));
        for (String declaration : settings.imports()) {
            boolean known = evaluator.shell.eval(declaration).stream().allMatch(e -> e.status() == Status.VALID);
            if (!known) {
                evaluator.close();
                throw new IllegalArgumentException("not an import that can be compiled: " + declaration);
            }
        }
        return evaluator;
    }

    @Override
    public Outcome run(String cell, Outlet outlet) {
        streams.to(outlet);
        stage = Optional.of(Cell.enter(settings.renderer(), outlet));
        run.begin();
        try {
            return runPieces(new CellText(cell), ++cells);
        } finally {
            streams.flush();
            run.end();
        }
    }

    private Outcome runPieces(CellText cell, int number) {
        List<Origin> pieces = new ArrayList<>();
        Optional<Origin> broken = split(cell, number, pieces);
        if (broken.isPresent()) {
            // Nothing of a cell runs if a part of it cannot be read.
            return refusal(broken.get());
        }
        List<Declared> declared = new ArrayList<>();
        Optional<MimeBundle> result = Optional.empty();
        for (int i = 0; i < pieces.size(); i++) {
            int end = i + 1 < pieces.size() ? pieces.get(i + 1).offset() : cell.text().length();
            Step step = runPiece(pieces.get(i), end, declared);
            if (step.failure.isPresent()) {
                return step.failure.get();
            }
            result = step.result;
        }
        return unresolved(declared).map(Outcome.class::cast).orElse(new Outcome.Done(result));
    }

    /** Fills {@code pieces} with the cell's snippets; gives the rest that cannot be read, if there is one. */
    private Optional<Origin> split(CellText cell, int number, List<Origin> pieces) {
        int offset = CellText.firstCode(cell.text());
        while (offset < cell.text().length()) {
            Origin piece = new Origin(number, cell, offset);
            String rest = cell.text().substring(offset);
            CompletionInfo info = analysis.analyzeCompletion(rest);
            if (isUnreadable(rest, info)) {
                return Optional.of(piece);
            }
            pieces.add(piece);
            boolean whole = info.completeness() == SourceCodeAnalysis.Completeness.CONSIDERED_INCOMPLETE;
            int next = cell.text().length() - (whole ? 0 : info.remaining().length());
            offset = next + CellText.firstCode(cell.text().substring(next));
        }
        return Optional.empty();
    }

    private boolean isUnreadable(String rest, CompletionInfo info) {
        return switch (info.completeness()) {
            case COMPLETE, COMPLETE_WITH_SEMI, EMPTY -> false;
            case DEFINITELY_INCOMPLETE -> true;
            case CONSIDERED_INCOMPLETE, UNKNOWN -> analysis.sourceToSnippets(rest).stream()
                    .anyMatch(s -> s.kind() == Kind.ERRONEOUS);
        };
    }

    private Outcome refusal(Origin broken) {
        List<SnippetEvent> events = shell.eval(broken.cell().text().substring(broken.offset()));
        return events.stream()
                .filter(e -> e.status() == Status.REJECTED)
                .findFirst()
                .map(e -> failures.refused(e.snippet(), broken))
                .orElseThrow(() -> new IllegalStateException("read as broken, and yet it ran: " + events));
    }

    private Step runPiece(Origin piece, int end, List<Declared> declared) {
        String source = piece.cell().text().substring(piece.offset(), end);
        boolean last = end == piece.cell().text().length();
        control.clear();
        SnippetEvent event = shell.eval(source).stream()
                .filter(e -> e.causeSnippet() == null)
                .findFirst()
                .orElseThrow(() -> new IllegalStateException("nothing to run in: " + source));
        failures.remember(event.snippet(), piece);
        Optional<Outcome.Failed> failure = failureOf(event, piece);
        boolean temporary = event.snippet().subKind() == SubKind.TEMP_VAR_EXPRESSION_SUBKIND;
        try {
            if (failure.isPresent()) {
                return new Step(failure, Optional.empty());
            }
            if (event.snippet() instanceof DeclarationSnippet declaration) {
                declared.add(new Declared(declaration, piece));
            }
            boolean shown = last
                    && (temporary || event.snippet().kind() == Kind.EXPRESSION)
                    && !CellText.endsWithSemicolon(source);
            return shown ? shown(event, piece) : new Step(failure, Optional.empty());
        } finally {
            if (temporary) {
                drop(event);
            }
            control.clear();
        }
    }

    /** JShell gives each bare expression a variable, and each variable slows all later cells. */
    private void drop(SnippetEvent event) {
        if (event.status() == Status.VALID) {
            control.release(((jdk.jshell.VarSnippet) event.snippet()).name());
            shell.drop(event.snippet());
        }
    }

    private Optional<Outcome.Failed> failureOf(SnippetEvent event, Origin piece) {
        if (event.status() == Status.REJECTED) {
            return Optional.of(failures.refused(event.snippet(), piece));
        }
        JShellException seen = event.exception();
        if (run.stopAsked()) {
            return Optional.of(failures.interrupted(Stream.ofNullable(seen), piece));
        }
        if (seen instanceof UnresolvedReferenceException missing) {
            return Optional.of(failures.unresolved(missing.getSnippet(), piece));
        }
        if (seen != null) {
            return Optional.of(failures.threw(control.thrown().orElse(seen), seen, piece));
        }
        return Optional.empty();
    }

    private Step shown(SnippetEvent event, Origin piece) {
        Optional<InProcessControl.Value> value = control.take(event.value());
        if (value.isEmpty()) {
            return new Step(Optional.empty(), Optional.empty());
        }
        try {
            run.enterCellCode();
            return new Step(
                    Optional.empty(), Optional.of(Rendering.of(value.get().object(), settings.renderer())));
        } catch (VirtualMachineError | LinkageError | RuntimeException | CellStopped e) {
            return new Step(
                    Optional.of(
                            run.stopAsked()
                                    ? failures.interrupted(Stream.empty(), piece)
                                    : failures.notShown(e, piece)),
                    Optional.empty());
        } finally {
            run.leaveCellCode();
        }
    }

    /** Declarations may need each other in any order, so a cell is judged at its end; what stays open goes. */
    private Optional<Outcome.Failed> unresolved(List<Declared> declared) {
        List<Declared> open = declared.stream()
                .filter(d -> isOpen(shell.status(d.snippet)))
                .toList();
        Optional<Outcome.Failed> failure =
                open.stream().findFirst().map(d -> failures.unresolved(d.snippet, d.origin));
        open.forEach(d -> shell.drop(d.snippet));
        return failure;
    }

    private static boolean isOpen(Status status) {
        return status == Status.RECOVERABLE_DEFINED || status == Status.RECOVERABLE_NOT_DEFINED;
    }

    @Override
    public void interrupt() {
        run.stop();
    }

    @Override
    public Completion complete(String cell, int cursor) {
        int[] anchor = {cursor};
        List<String> options = analysis.completionSuggestions(cell, cursor, anchor).stream()
                .sorted(Comparator.comparing(s -> !s.matchesType()))
                .map(SourceCodeAnalysis.Suggestion::continuation)
                .distinct()
                .toList();
        return new Completion(options, options.isEmpty() ? cursor : anchor[0], cursor);
    }

    @Override
    public Optional<MimeBundle> inspect(String cell, int cursor) {
        return inspection.of(cell, cursor);
    }

    @Override
    public Completeness completeness(String cell) {
        List<Origin> pieces = new ArrayList<>();
        return split(new CellText(cell), 0, pieces)
                .map(rest -> switch (analysis.analyzeCompletion(cell.substring(rest.offset())).completeness()) {
                    case DEFINITELY_INCOMPLETE, CONSIDERED_INCOMPLETE -> Completeness.INCOMPLETE;
                    default -> Completeness.INVALID;
                })
                .orElse(Completeness.COMPLETE);
    }

    @Override
    public void close() {
        stage.ifPresent(Cell::leave);
        streams.close();
        shell.close();
    }

    /** Variables that bare expressions left behind; none in a healthy session. */
    long leftovers() {
        return shell.variables()
                .filter(v -> v.subKind() == SubKind.TEMP_VAR_EXPRESSION_SUBKIND)
                .filter(v -> shell.status(v) == Status.VALID)
                .count();
    }

    private record Declared(DeclarationSnippet snippet, Origin origin) {}

    private record Step(Optional<Outcome.Failed> failure, Optional<MimeBundle> result) {}
}
