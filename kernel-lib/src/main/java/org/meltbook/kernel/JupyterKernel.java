package org.meltbook.kernel;

import com.google.gson.JsonObject;
import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.security.GeneralSecurityException;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.concurrent.CompletionException;
import java.util.concurrent.CountDownLatch;
import org.dflib.jjava.jupyter.kernel.KernelConnectionProperties;
import org.zeromq.SocketType;
import org.zeromq.ZMQ;
import org.zeromq.ZMQException;

/**
 * Serves one Jupyter client, or several that share the session, until it is told to shut down. Each channel has a
 * thread of its own that waits without polling; cells run on yet another, the only one that is ever interrupted.
 */
public final class JupyterKernel {
    private static final int LINGER_MILLIS = 1000;

    private final KernelConnectionProperties connection;
    private final ZMQ.Context context = ZMQ.context(1);
    private final CountDownLatch shutDown = new CountDownLatch(1);
    private final List<Thread> threads = new ArrayList<>();
    private final Wire wire;
    private final Broadcast broadcast;
    private final Prompt prompt;
    private final Execution execution;

    private JupyterKernel(KernelConnectionProperties connection, Settings settings) throws GeneralSecurityException {
        this.connection = connection;
        wire = new Wire(connection.createHMACGenerator());
        broadcast = new Broadcast(wire, bound(SocketType.PUB, connection.getIopubPort()));
        prompt = new Prompt(wire, bound(SocketType.ROUTER, connection.getStdinPort()));
        execution = new Execution(settings, broadcast, prompt);
    }

    /**
     * Serves the connection described in a file that Jupyter wrote, and returns when the kernel was shut down, or when
     * the process that Jupyter named as its parent ended.
     *
     * @throws UncheckedIOException     if the file cannot be read
     * @throws IllegalArgumentException if it does not describe a connection that can be served, or if an import of the
     *                                  settings cannot be compiled
     */
    public static void serve(Path connectionFile, Settings settings) {
        try {
            KernelConnectionProperties connection = KernelConnectionProperties.parse(Files.readString(connectionFile));
            if (!"tcp".equals(connection.getTransport())) {
                throw new IllegalArgumentException(
                        connectionFile + ": transport '" + connection.getTransport() + "', expected 'tcp'");
            }
            new JupyterKernel(connection, settings).run();
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        } catch (GeneralSecurityException e) {
            throw new IllegalArgumentException(connectionFile + ": messages cannot be signed: " + e.getMessage(), e);
        } catch (InterruptedException e) {
            Thread.currentThread().interrupt();
        }
    }

    private void run() throws InterruptedException {
        endWithParent();
        broadcast.start();
        prompt.start();
        start("meltbook-heartbeat", this::echo, bound(SocketType.REP, connection.getHbPort()));
        start("meltbook-control", this::listen, bound(SocketType.ROUTER, connection.getControlPort()));
        start("meltbook-shell", this::listen, bound(SocketType.ROUTER, connection.getShellPort()));
        execution.start().exceptionally(failure -> {
            shutDown.countDown();
            return null;
        });
        broadcast.send(new JsonObject(), "status", state("starting"));
        shutDown.await();
        close();
    }

    private void close() throws InterruptedException {
        try {
            execution.close();
        } catch (CompletionException e) {
            throw e.getCause() instanceof IllegalArgumentException wrong ? wrong : e;
        } finally {
            broadcast.close();
            prompt.close();
            context.term();
            for (Thread thread : threads) {
                thread.join();
            }
        }
    }

    private ZMQ.Socket bound(SocketType type, int port) {
        ZMQ.Socket socket = context.socket(type);
        socket.setLinger(LINGER_MILLIS);
        if (type == SocketType.PUB) {
            socket.setSndHWM(0);
        }
        socket.bind("tcp://" + connection.getIp() + ":" + port);
        return socket;
    }

    private void start(String name, Channel channel, ZMQ.Socket socket) {
        Thread thread = new Thread(
                () -> {
                    try {
                        channel.serve(socket);
                    } catch (ZMQException e) {
                        // The context was closed under the waiting socket: that is how a channel ends.
                        shutDown.countDown();
                    } finally {
                        socket.close();
                    }
                },
                name);
        thread.setDaemon(true);
        threads.add(thread);
        thread.start();
    }

    private void echo(ZMQ.Socket socket) {
        while (shutDown.getCount() > 0) {
            socket.send(socket.recv());
        }
    }

    private void listen(ZMQ.Socket socket) {
        while (shutDown.getCount() > 0) {
            serve(socket, wire.receive(socket));
        }
    }

    private void serve(ZMQ.Socket socket, Envelope request) {
        broadcast.send(request.header(), "status", state("busy"));
        List<Envelope> queued = List.of();
        try {
            Optional<JsonObject> reply = reply(request);
            broadcast.flush();
            // What waits must be known before the reply goes out: a cell sent after that is not behind the failed one.
            queued = execution.abortsAfter(request, reply) ? waiting(socket) : List.of();
            reply.ifPresent(content -> send(socket, request, content));
        } catch (ZMQException e) {
            throw e;
        } catch (RuntimeException | Error e) {
            // The compiler fails with an error on code nested too deeply, also when only asked about it: no channel
            // ends with that.
            String kind = e.getClass().getSimpleName();
            send(socket, request, Execution.error(kind, String.valueOf(e.getMessage()), List.of()));
        } finally {
            broadcast.send(request.header(), "status", state("idle"));
        }
        abort(socket, queued);
        if (request.type().equals("shutdown_request")) {
            shutDown.countDown();
        }
    }

    private List<Envelope> waiting(ZMQ.Socket socket) {
        List<Envelope> queued = new ArrayList<>();
        Optional<Envelope> next = wire.poll(socket, ZMQ.DONTWAIT);
        while (next.isPresent()) {
            queued.add(next.get());
            next = wire.poll(socket, ZMQ.DONTWAIT);
        }
        return queued;
    }

    /** Refuses the cells that waited behind a failed one; other requests among them are served. */
    private void abort(ZMQ.Socket socket, List<Envelope> queued) {
        for (Envelope request : queued) {
            if (request.type().equals("execute_request")) {
                answer(socket, request, execution.aborted());
            } else {
                serve(socket, request);
            }
        }
    }

    private void answer(ZMQ.Socket socket, Envelope request, JsonObject content) {
        broadcast.send(request.header(), "status", state("busy"));
        send(socket, request, content);
        broadcast.send(request.header(), "status", state("idle"));
    }

    private void send(ZMQ.Socket socket, Envelope request, JsonObject content) {
        wire.send(socket, wire.reply(request, request.type().replace("_request", "_reply"), content));
    }

    /** The reply; empty for what takes none, and for what this kernel does not know. */
    private Optional<JsonObject> reply(Envelope request) {
        JsonObject content = request.content();
        return switch (request.type()) {
            case "execute_request" -> Optional.of(execution.run(request));
            case "complete_request" -> Optional.of(Answers.completion(content, execution.evaluator()));
            case "inspect_request" -> Optional.of(Answers.inspection(content, execution.evaluator()));
            case "is_complete_request" -> Optional.of(Answers.completeness(content, execution.evaluator()));
            case "kernel_info_request" -> Optional.of(Answers.kernelInfo());
            case "history_request" -> Optional.of(Answers.history());
            case "comm_info_request" -> Optional.of(Answers.comms());
            case "shutdown_request" -> Optional.of(Answers.shutdown(content));
            case "interrupt_request" -> {
                execution.interrupt();
                yield Optional.of(Answers.ok(new JsonObject()));
            }
            case "comm_open" -> {
                refuseComm(request);
                yield Optional.empty();
            }
            default -> Optional.empty();
        };
    }

    /** No comm target is known here, and the protocol wants an unknown one to be closed at once. */
    private void refuseComm(Envelope request) {
        JsonObject content = new JsonObject();
        content.add("comm_id", request.content().get("comm_id"));
        content.add("data", new JsonObject());
        broadcast.send(request.header(), "comm_close", content);
    }

    private void endWithParent() {
        try {
            long parent = Long.parseLong(System.getenv().getOrDefault("JPY_PARENT_PID", "0"));
            boolean handle = System.getProperty("os.name", "").startsWith("Windows");
            if (parent > 1 && !handle) {
                ProcessHandle.of(parent).ifPresent(p -> p.onExit().thenRun(shutDown::countDown));
            }
        } catch (NumberFormatException e) {
            // Not a process id: there is no parent to watch, and the kernel ends on request only.
            return;
        }
    }

    private static JsonObject state(String name) {
        JsonObject content = new JsonObject();
        content.addProperty("execution_state", name);
        return content;
    }

    @FunctionalInterface
    private interface Channel {
        void serve(ZMQ.Socket socket);
    }
}
