package org.meltbook.kernel;

import com.google.gson.JsonObject;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.concurrent.CancellationException;
import java.util.concurrent.CompletableFuture;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.TimeUnit;
import org.dflib.jjava.jupyter.messages.reply.ErrorReply;
import org.dflib.jjava.jupyter.messages.reply.ExecuteReply;
import org.dflib.jjava.jupyter.messages.request.ExecuteRequest;

/** Runs the cells of a kernel one after another on their own thread, and tells how they went. */
final class Execution {
    private static final long PATIENCE_MILLIS = 1000;

    private final Settings settings;
    private final Broadcast broadcast;
    private final Prompt prompt;
    private final ExecutorService cellThread = Executors.newSingleThreadExecutor(task -> {
        Thread thread = new Thread(task, "meltbook-cell");
        thread.setDaemon(true);
        return thread;
    });
    private final CompletableFuture<Evaluator> evaluator = new CompletableFuture<>();
    private final CompletableFuture<Void> closing = new CompletableFuture<>();
    private int count;

    Execution(Settings settings, Broadcast broadcast, Prompt prompt) {
        this.settings = settings;
        this.broadcast = broadcast;
        this.prompt = prompt;
    }

    /** Opens the session; requests that need it wait until it is there. */
    CompletableFuture<Evaluator> start() {
        CompletableFuture.<Evaluator>supplyAsync(() -> JShellEvaluator.open(settings), cellThread)
                .whenComplete((opened, failure) -> {
                    if (failure == null) {
                        evaluator.complete(opened);
                    } else {
                        evaluator.completeExceptionally(failure.getCause() == null ? failure : failure.getCause());
                    }
                });
        return evaluator;
    }

    Evaluator evaluator() {
        return evaluator.join();
    }

    /** Runs the cell of an {@code execute_request} and gives the content of its reply. */
    JsonObject run(Envelope request) {
        ExecuteRequest asked = Wire.GSON.fromJson(request.content(), ExecuteRequest.class);
        boolean counts = !asked.isSilent() && flag(request, "store_history", true);
        count += counts ? 1 : 0;
        if (!asked.isSilent()) {
            JsonObject input = new JsonObject();
            input.addProperty("code", asked.getCode());
            input.addProperty("execution_count", count);
            broadcast.send(request.header(), "execute_input", input);
        }
        Outlet outlet = new WireOutlet(request, flag(request, "allow_stdin", true), broadcast, prompt);
        Outcome outcome = outcome(asked.getCode(), outlet);
        if (outcome instanceof Outcome.Failed failed) {
            JsonObject error = error(failed.kind(), failed.message(), failed.report());
            broadcast.send(request.header(), "error", error);
            error.addProperty("execution_count", count);
            return error;
        }
        Optional<MimeBundle> result = ((Outcome.Done) outcome).result();
        result.filter(bundle -> !asked.isSilent()).ifPresent(bundle -> {
            JsonObject content = WireOutlet.content(bundle);
            content.addProperty("execution_count", count);
            broadcast.send(request.header(), "execute_result", content);
        });
        return Answers.ok(new ExecuteReply(count, Map.of()));
    }

    /** Whether cells that wait behind this request must not run. */
    boolean abortsAfter(Envelope request, Optional<JsonObject> reply) {
        return request.type().equals("execute_request")
                && flag(request, "stop_on_error", true)
                && reply.filter(r -> r.get("status").getAsString().equals("error"))
                        .isPresent();
    }

    /** The reply to a cell that is not run because one before it failed. */
    JsonObject aborted() {
        JsonObject reply = new JsonObject();
        reply.addProperty("status", "aborted");
        reply.addProperty("execution_count", count);
        return reply;
    }

    void interrupt() {
        if (evaluator.isDone() && !evaluator.isCompletedExceptionally()) {
            evaluator.join().interrupt();
        }
    }

    /**
     * Ends the session; a cell that does not stop is left behind.
     *
     * @throws java.util.concurrent.CompletionException if the session could not be opened
     */
    void close() throws InterruptedException {
        closing.complete(null);
        interrupt();
        cellThread.shutdown();
        cellThread.awaitTermination(PATIENCE_MILLIS, TimeUnit.MILLISECONDS);
        evaluator.join().close();
    }

    static JsonObject error(String kind, String message, List<String> report) {
        return Wire.GSON.toJsonTree(new ErrorReply(kind, message, report)).getAsJsonObject();
    }

    private Outcome outcome(String cell, Outlet outlet) {
        Evaluator session = evaluator();
        CompletableFuture<Outcome> outcome = CompletableFuture.supplyAsync(() -> session.run(cell, outlet), cellThread);
        CompletableFuture.anyOf(outcome, closing).join();
        if (!outcome.isDone()) {
            throw new CancellationException("the kernel shuts down");
        }
        return outcome.join();
    }

    private static boolean flag(Envelope request, String name, boolean otherwise) {
        return request.content().has(name) ? request.content().get(name).getAsBoolean() : otherwise;
    }
}
