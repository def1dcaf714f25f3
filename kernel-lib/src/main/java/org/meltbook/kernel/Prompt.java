package org.meltbook.kernel;

import com.google.gson.JsonObject;
import java.io.IOException;
import java.io.InterruptedIOException;
import java.io.UncheckedIOException;
import java.util.Optional;
import java.util.concurrent.CompletableFuture;
import java.util.concurrent.ExecutionException;
import java.util.concurrent.LinkedBlockingQueue;
import org.zeromq.ZMQ;
import org.zeromq.ZMQException;

/** Asks the person at the keyboard, from a thread of its own, so that an interrupt never reaches the socket. */
final class Prompt {
    private static final int LOOK_UP_MILLIS = 100;

    private final Wire wire;
    private final ZMQ.Socket socket;
    private final LinkedBlockingQueue<Optional<Question>> questions = new LinkedBlockingQueue<>();
    private final Thread thread = new Thread(this::askAll, "meltbook-stdin");

    Prompt(Wire wire, ZMQ.Socket socket) {
        this.wire = wire;
        this.socket = socket;
        socket.setReceiveTimeOut(LOOK_UP_MILLIS);
        thread.setDaemon(true);
    }

    void start() {
        thread.start();
    }

    /**
     * Asks who sent {@code request} and waits for the answer.
     *
     * @throws UncheckedIOException if the wait is interrupted or the kernel shuts down
     */
    String ask(Envelope request, String text, boolean secret) {
        Question question = new Question(request, text, secret, new CompletableFuture<>());
        questions.add(Optional.of(question));
        try {
            return question.answer.get();
        } catch (InterruptedException e) {
            question.answer.cancel(false);
            Thread.currentThread().interrupt();
            throw new UncheckedIOException(new InterruptedIOException("the question was interrupted"));
        } catch (ExecutionException e) {
            throw new UncheckedIOException(new IOException("the question was not answered", e.getCause()));
        }
    }

    void close() throws InterruptedException {
        questions.add(Optional.empty());
        thread.join();
    }

    private void askAll() {
        try {
            Optional<Question> next = questions.take();
            while (next.isPresent()) {
                ask(next.get());
                next = questions.take();
            }
        } catch (InterruptedException | ZMQException e) {
            questions.forEach(q -> q.ifPresent(open -> open.answer.completeExceptionally(e)));
        } finally {
            socket.close();
        }
    }

    private void ask(Question question) {
        while (wire.poll(socket, ZMQ.DONTWAIT).isPresent()) {
            // An answer to a question that was given up: it answers nothing now.
            continue;
        }
        JsonObject content = new JsonObject();
        content.addProperty("prompt", question.text);
        content.addProperty("password", question.secret);
        wire.send(socket, wire.reply(question.request, "input_request", content));
        while (!question.answer.isDone() && !closing()) {
            wire.poll(socket, 0)
                    .filter(m -> m.type().equals("input_reply") && m.content().has("value"))
                    .ifPresent(m ->
                            question.answer.complete(m.content().get("value").getAsString()));
        }
        question.answer.completeExceptionally(new IOException("the kernel shuts down"));
    }

    private boolean closing() {
        return questions.stream().anyMatch(Optional::isEmpty);
    }

    private record Question(Envelope request, String text, boolean secret, CompletableFuture<String> answer) {}
}
