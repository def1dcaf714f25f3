package org.meltbook.notebook;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.meltbook.kernel.MimeBundle;
import org.meltbook.kernel.Outcome;
import org.meltbook.kernel.Outlet;

/** Keeps what a cell puts out, in the order in which it comes. Text without end is cut, and says so. */
final class Recorder implements Outlet {
    /** Longest printed text that is kept of one cell at a time, in characters. */
    static final int LONGEST = 1_000_000;

    private final List<Output> outputs = new ArrayList<>();
    private final List<String> displayIds = new ArrayList<>();
    private int printed;
    private boolean clearNext;

    @Override
    public synchronized void out(String text) {
        print("stdout", text);
    }

    @Override
    public synchronized void err(String text) {
        print("stderr", text);
    }

    @Override
    public synchronized void display(MimeBundle bundle) {
        add(new Output.Value(bundle, Optional.empty()), bundle.displayId());
    }

    @Override
    public synchronized void update(MimeBundle bundle) {
        for (int i = 0; i < outputs.size(); i++) {
            if (!bundle.displayId().isEmpty() && displayIds.get(i).equals(bundle.displayId())) {
                outputs.set(i, new Output.Value(bundle, Optional.empty()));
            }
        }
    }

    @Override
    public synchronized void clear(boolean wait) {
        clearNext = wait;
        if (!wait) {
            outputs.clear();
            displayIds.clear();
            printed = 0;
        }
    }

    @Override
    public String ask(String prompt, boolean secret) {
        String question = prompt.isBlank() ? "" : ": " + prompt;
        throw new UncheckedIOException(new IOException("nobody can be asked in a headless run" + question));
    }

    /** Adds how the cell ended, and gives all that it has put out. */
    synchronized List<Output> ended(Outcome outcome, int count) {
        if (outcome instanceof Outcome.Done done) {
            done.result().ifPresent(bundle -> add(new Output.Value(bundle, Optional.of(count)), ""));
        } else if (outcome instanceof Outcome.Failed failed) {
            add(new Output.Failure(failed.kind(), failed.message(), failed.report()), "");
        }
        return List.copyOf(outputs);
    }

    private void print(String name, String text) {
        clearIfAsked();
        int room = LONGEST - printed;
        printed += text.length();
        if (text.length() <= room) {
            add(new Output.Stream(name, text), "");
        } else if (room >= 0) {
            add(new Output.Stream(name, text.substring(0, room) + "\n[cut after " + LONGEST + " characters]\n"), "");
            printed = LONGEST + 1;
        } else {
            printed = LONGEST + 1;
        }
    }

    private void clearIfAsked() {
        if (clearNext) {
            clear(false);
        }
    }

    private void add(Output output, String displayId) {
        clearIfAsked();
        outputs.add(output);
        displayIds.add(displayId);
    }
}
