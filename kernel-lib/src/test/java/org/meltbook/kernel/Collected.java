package org.meltbook.kernel;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.util.ArrayDeque;
import java.util.ArrayList;
import java.util.Collections;
import java.util.Deque;
import java.util.List;
import java.util.concurrent.CountDownLatch;

/** An outlet that keeps what comes, and answers from a list. */
final class Collected implements Outlet {
    final List<MimeBundle> displays = Collections.synchronizedList(new ArrayList<>());
    final List<MimeBundle> updates = Collections.synchronizedList(new ArrayList<>());
    final Deque<String> answers = new ArrayDeque<>();
    final CountDownLatch printed = new CountDownLatch(1);
    private final StringBuffer out = new StringBuffer();
    private final StringBuffer err = new StringBuffer();

    @Override
    public void out(String text) {
        out.append(text);
        printed.countDown();
    }

    @Override
    public void err(String text) {
        err.append(text);
    }

    @Override
    public void display(MimeBundle bundle) {
        displays.add(bundle);
    }

    @Override
    public void update(MimeBundle bundle) {
        updates.add(bundle);
    }

    @Override
    public void clear(boolean wait) {
        displays.clear();
    }

    @Override
    public String ask(String prompt, boolean secret) {
        if (answers.isEmpty()) {
            throw new UncheckedIOException(new IOException("nobody is here"));
        }
        return answers.removeFirst();
    }

    String printed() {
        return out.toString();
    }

    String complained() {
        return err.toString();
    }
}
