package org.meltbook.kernel;

import com.google.gson.JsonObject;
import java.util.ArrayDeque;
import java.util.Deque;
import org.zeromq.ZMQ;

/**
 * Sends to everyone who listens, from a thread of its own, in the order of the calls. Printed text waits a moment for
 * more of its kind, so that a loop of prints becomes few messages. A caller's interrupt never reaches the socket.
 */
final class Broadcast {
    private static final long PAUSE_NANOS = 40_000_000;
    private static final int LARGEST = 1 << 16;
    private static final int MOST_WAITING = 1000;

    private final Wire wire;
    private final ZMQ.Socket socket;
    private final Deque<Item> waiting = new ArrayDeque<>();
    private final Thread thread = new Thread(this::sendAll, "meltbook-iopub");
    private long given;
    private long sent;
    private boolean closed;

    Broadcast(Wire wire, ZMQ.Socket socket) {
        this.wire = wire;
        this.socket = socket;
        thread.setDaemon(true);
    }

    void start() {
        thread.start();
    }

    /** Sends a message about the request with the given header. */
    synchronized void send(JsonObject about, String type, JsonObject content) {
        add(new Item(about, type, content, ""));
    }

    /** Sends printed text; waits if far too much is waiting already. */
    synchronized void print(JsonObject about, String stream, String text) {
        Item last = waiting.peekLast();
        if (last != null && last.takes(about, stream)) {
            last.text.append(text);
        } else {
            Item item = new Item(about, "stream", new JsonObject(), stream);
            item.text.append(text);
            add(item);
        }
    }

    /** Returns when all that was given before has been sent; what others go on giving is not waited for. */
    synchronized void flush() {
        waiting.forEach(item -> item.due = System.nanoTime());
        notifyAll();
        boolean interrupted = false;
        long last = given;
        while (!closed && sent < last) {
            interrupted |= !pause(0);
        }
        restore(interrupted);
    }

    /** Sends what waits, then closes the socket. */
    void close() throws InterruptedException {
        flush();
        end();
        thread.join();
    }

    private void add(Item item) {
        boolean interrupted = false;
        while (!closed && waiting.size() >= MOST_WAITING) {
            interrupted |= !pause(0);
        }
        if (!waiting.isEmpty()) {
            waiting.peekLast().due = System.nanoTime();
        }
        waiting.add(item);
        given++;
        notifyAll();
        restore(interrupted);
    }

    private void sendAll() {
        try {
            while (true) {
                Item item = take();
                if (item == null) {
                    return;
                }
                wire.send(socket, wire.broadcast(item.about, item.type, item.whole()));
                sent();
            }
        } finally {
            end();
            socket.close();
        }
    }

    private synchronized void end() {
        closed = true;
        notifyAll();
    }

    private synchronized Item take() {
        while (!closed) {
            long now = System.nanoTime();
            if (!waiting.isEmpty() && waiting.peekFirst().due - now <= 0) {
                return waiting.removeFirst();
            }
            pause(waiting.isEmpty() ? 0 : 1 + (waiting.peekFirst().due - now) / 1_000_000);
        }
        return null;
    }

    private synchronized void sent() {
        sent++;
        notifyAll();
    }

    /** Waits for a change; false if the thread was interrupted, which is then cleared. */
    private boolean pause(long millis) {
        try {
            wait(millis);
            return true;
        } catch (InterruptedException e) {
            return false;
        }
    }

    private static void restore(boolean interrupted) {
        if (interrupted) {
            Thread.currentThread().interrupt();
        }
    }

    private static final class Item {
        private final JsonObject about;
        private final String type;
        private final JsonObject content;
        private final String stream;
        private final StringBuilder text = new StringBuilder();
        private long due = System.nanoTime();

        Item(JsonObject about, String type, JsonObject content, String stream) {
            this.about = about;
            this.type = type;
            this.content = content;
            this.stream = stream;
            if (!stream.isEmpty()) {
                due += PAUSE_NANOS;
            }
        }

        boolean takes(JsonObject request, String name) {
            return stream.equals(name) && about == request && text.length() < LARGEST;
        }

        JsonObject whole() {
            if (!stream.isEmpty()) {
                content.addProperty("name", stream);
                content.addProperty("text", text.toString());
            }
            return content;
        }
    }
}
