package org.meltbook.notebook;

import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.concurrent.CountDownLatch;
import org.meltbook.kernel.Evaluator;
import org.meltbook.kernel.MimeBundle;
import org.meltbook.kernel.Outcome;
import org.meltbook.kernel.Outlet;

/**
 * Understands one word a line: {@code print}, {@code err}, {@code value}, {@code html}, {@code fail}, {@code ask},
 * {@code endless}, {@code folder}; so that the runner is tested without a compiler.
 */
final class FakeEvaluator implements Evaluator {
    private final CountDownLatch stop = new CountDownLatch(1);
    private Optional<MimeBundle> result = Optional.empty();

    @Override
    public Outcome run(String cell, Outlet outlet) {
        result = Optional.empty();
        int line = 0;
        for (String text : cell.lines().toList()) {
            line++;
            String[] words = text.split(" ", 2);
            Optional<Outcome> failed = step(words[0], words.length > 1 ? words[1] : "", outlet, line);
            if (failed.isPresent()) {
                return failed.get();
            }
        }
        return new Outcome.Done(result);
    }

    private Optional<Outcome> step(String word, String text, Outlet outlet, int line) {
        switch (word) {
            case "print" -> outlet.out(text + "\n");
            case "err" -> outlet.err(text + "\n");
            case "value" -> result = Optional.of(MimeBundle.of(Map.of("text/plain", text)));
            case "folder" -> outlet.out(DataFolder.find(text).getFileName() + "\n");
            case "html" -> {
                Map<String, Object> forms = new LinkedHashMap<>();
                forms.put("text/plain", "a table");
                forms.put("text/html", text);
                outlet.display(MimeBundle.of(forms));
            }
            case "ask" -> outlet.ask(text, false);
            case "endless" -> {
                try {
                    stop.await();
                } catch (InterruptedException e) {
                    Thread.currentThread().interrupt();
                }
                return failed(Outcome.Reason.INTERRUPTED, "Interrupted", "stopped", line);
            }
            case "fail" -> {
                return failed(Outcome.Reason.THROWN, "RangeException", text, line);
            }
            default -> throw new IllegalArgumentException(word);
        }
        return Optional.empty();
    }

    private static Optional<Outcome> failed(Outcome.Reason reason, String kind, String message, int line) {
        return Optional.of(new Outcome.Failed(reason, kind, message, line, List.of(kind + ": " + message)));
    }

    @Override
    public void interrupt() {
        stop.countDown();
    }

    @Override
    public Completion complete(String cell, int cursor) {
        return new Completion(List.of(), cursor, cursor);
    }

    @Override
    public Optional<MimeBundle> inspect(String cell, int cursor) {
        return Optional.empty();
    }

    @Override
    public Completeness completeness(String cell) {
        return Completeness.COMPLETE;
    }

    @Override
    public void close() {}
}
