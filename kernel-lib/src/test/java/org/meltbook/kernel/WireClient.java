package org.meltbook.kernel;

import com.google.gson.Gson;
import com.google.gson.JsonObject;
import java.io.IOException;
import java.net.ServerSocket;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.security.GeneralSecurityException;
import java.util.ArrayList;
import java.util.HexFormat;
import java.util.List;
import java.util.Map;
import java.util.UUID;
import java.util.function.Predicate;
import javax.crypto.Mac;
import javax.crypto.spec.SecretKeySpec;
import org.zeromq.SocketType;
import org.zeromq.ZMQ;

/**
 * A Jupyter client, written from the protocol's text (Jupyter messaging, version 5.3: "The wire protocol", "Messages on
 * the shell ROUTER/DEALER channel") and signing with the JDK's HMAC, so that it shares no code with the kernel.
 */
final class WireClient implements AutoCloseable {
    private static final Gson GSON = new Gson();
    private static final int LIMIT_MILLIS = 60_000;

    final Process process;
    private final ZMQ.Context context = ZMQ.context(1);
    private final String key;
    private final ZMQ.Socket shell;
    private final ZMQ.Socket control;
    private final ZMQ.Socket stdin;
    private final ZMQ.Socket iopub;
    private final ZMQ.Socket heartbeat;

    private WireClient(Process process, String key, List<Integer> ports) {
        this.process = process;
        this.key = key;
        byte[] identity = UUID.randomUUID().toString().getBytes(StandardCharsets.US_ASCII);
        iopub = connected(SocketType.SUB, ports.get(0), identity);
        iopub.subscribe(ZMQ.SUBSCRIPTION_ALL);
        shell = connected(SocketType.DEALER, ports.get(1), identity);
        control = connected(SocketType.DEALER, ports.get(2), identity);
        stdin = connected(SocketType.DEALER, ports.get(3), identity);
        heartbeat = connected(SocketType.REQ, ports.get(4), identity);
    }

    /** Starts the program with a connection file in {@code folder} and connects to it. */
    static WireClient start(Path folder, List<String> command, Map<String, String> environment) throws IOException {
        List<Integer> ports = freePorts(5);
        String key = UUID.randomUUID().toString();
        List<String> whole = new ArrayList<>(command);
        whole.add(connectionFile(folder, key, ports).toString());
        ProcessBuilder builder = new ProcessBuilder(whole)
                .redirectErrorStream(true)
                .redirectOutput(folder.resolve("kernel-" + key + ".log").toFile());
        builder.environment().putAll(environment);
        Process process = builder.start();
        WireClient client = new WireClient(process, key, ports);
        client.untilListening();
        return client;
    }

    /** A connection file as Jupyter writes it, for the given ports of iopub, shell, control, stdin and heartbeat. */
    static Path connectionFile(Path folder, String key, List<Integer> ports) throws IOException {
        JsonObject connection = new JsonObject();
        connection.addProperty("ip", "127.0.0.1");
        connection.addProperty("transport", "tcp");
        connection.addProperty("key", key);
        connection.addProperty("signature_scheme", "hmac-sha256");
        List<String> channels = List.of("iopub_port", "shell_port", "control_port", "stdin_port", "hb_port");
        for (int i = 0; i < channels.size(); i++) {
            connection.addProperty(channels.get(i), ports.get(i));
        }
        return Files.writeString(folder.resolve("connection-" + key + ".json"), GSON.toJson(connection));
    }

    /** A subscription takes a moment: ask until an answer is also heard on iopub, as the protocol's servers do. */
    private void untilListening() {
        iopub.setReceiveTimeOut(250);
        for (int i = 0; i < 240; i++) {
            request(shell, "kernel_info_request", Map.of());
            byte[] first = iopub.recv();
            if (first != null) {
                drain(iopub);
                iopub.setReceiveTimeOut(LIMIT_MILLIS);
                JsonObject last = exchange("kernel_info_request", Map.of()).reply();
                if (!last.has("content")) {
                    throw new IllegalStateException("no kernel");
                }
                return;
            }
            if (!process.isAlive()) {
                throw new IllegalStateException("the kernel ended with " + process.exitValue());
            }
        }
        throw new IllegalStateException("the kernel does not answer");
    }

    private static void drain(ZMQ.Socket socket) {
        while (socket.hasReceiveMore() || socket.recv() != null) {
            while (socket.hasReceiveMore()) {
                socket.recv();
            }
        }
    }

    /** Sends a request on the shell and collects what is said about it until the kernel is idle again. */
    Exchange exchange(String type, Map<String, ?> content) {
        return collect(request(shell, type, content), shell);
    }

    Exchange onControl(String type, Map<String, ?> content) {
        return collect(request(control, type, content), control);
    }

    void sendOnControl(String type) {
        request(control, type, Map.of());
    }

    /** Content of the next reply to an interrupt. */
    JsonObject interruptReply() {
        JsonObject reply = receive(control);
        while (!type(reply).equals("interrupt_reply")) {
            reply = receive(control);
        }
        return reply.getAsJsonObject("content");
    }

    Exchange execute(String code) {
        return exchange(
                "execute_request",
                Map.of(
                        "code",
                        code,
                        "silent",
                        false,
                        "store_history",
                        true,
                        "user_expressions",
                        Map.of(),
                        "allow_stdin",
                        false,
                        "stop_on_error",
                        true));
    }

    String send(String type, Map<String, ?> content) {
        return request(shell, type, content);
    }

    Exchange collect(String id) {
        return collect(id, shell);
    }

    /** The next broadcast that fits. */
    JsonObject heard(Predicate<JsonObject> wanted) {
        while (true) {
            JsonObject message = receive(iopub);
            if (wanted.test(message)) {
                return message;
            }
        }
    }

    JsonObject question() {
        return receive(stdin);
    }

    void answer(JsonObject question, String value) {
        send(stdin, "input_reply", question.getAsJsonObject("header"), Map.of("value", value), key);
    }

    void sendSignedWith(String wrongKey, String type, Map<String, ?> content) {
        send(shell, type, new JsonObject(), content, wrongKey);
    }

    void sendFrames(String... frames) {
        for (int i = 0; i < frames.length; i++) {
            shell.send(frames[i], i + 1 < frames.length ? ZMQ.SNDMORE : 0);
        }
    }

    String beat(String text) {
        heartbeat.send(text);
        return heartbeat.recvStr();
    }

    private String request(ZMQ.Socket socket, String type, Map<String, ?> content) {
        return send(socket, type, new JsonObject(), content, key);
    }

    private String send(ZMQ.Socket socket, String type, JsonObject parent, Map<String, ?> content, String with) {
        String id = UUID.randomUUID().toString();
        String header = GSON.toJson(Map.of(
                "msg_id",
                id,
                "session",
                "test",
                "username",
                "test",
                "date",
                "2026-01-01T00:00:00Z",
                "msg_type",
                type,
                "version",
                "5.3"));
        List<String> parts = List.of(header, GSON.toJson(parent), "{}", GSON.toJson(content));
        socket.sendMore("<IDS|MSG>");
        socket.sendMore(signature(parts, with));
        for (int i = 0; i < 3; i++) {
            socket.sendMore(parts.get(i).getBytes(StandardCharsets.UTF_8));
        }
        socket.send(parts.get(3).getBytes(StandardCharsets.UTF_8));
        return id;
    }

    private Exchange collect(String id, ZMQ.Socket socket) {
        List<JsonObject> broadcasts = new ArrayList<>();
        boolean idle = false;
        while (!idle) {
            JsonObject message = receive(iopub);
            if (id.equals(parentId(message))) {
                broadcasts.add(message);
                idle = isState(message, "idle");
            }
        }
        JsonObject reply = receive(socket);
        while (!id.equals(parentId(reply))) {
            reply = receive(socket);
        }
        return new Exchange(reply, broadcasts);
    }

    static boolean isState(JsonObject message, String state) {
        return type(message).equals("status")
                && message.getAsJsonObject("content")
                        .get("execution_state")
                        .getAsString()
                        .equals(state);
    }

    static String type(JsonObject message) {
        return message.getAsJsonObject("header").get("msg_type").getAsString();
    }

    static String parentId(JsonObject message) {
        JsonObject parent = message.getAsJsonObject("parent");
        return parent.has("msg_id") ? parent.get("msg_id").getAsString() : "";
    }

    private JsonObject receive(ZMQ.Socket socket) {
        List<byte[]> frames = new ArrayList<>();
        byte[] first = socket.recv();
        if (first == null) {
            throw new AssertionError("the kernel said nothing for " + LIMIT_MILLIS + " ms");
        }
        frames.add(first);
        while (socket.hasReceiveMore()) {
            frames.add(socket.recv());
        }
        int mark = 0;
        while (!new String(frames.get(mark), StandardCharsets.US_ASCII).equals("<IDS|MSG>")) {
            mark++;
        }
        List<String> parts = frames.subList(mark + 2, mark + 6).stream()
                .map(b -> new String(b, StandardCharsets.UTF_8))
                .toList();
        String told = new String(frames.get(mark + 1), StandardCharsets.US_ASCII);
        if (!told.equals(signature(parts, key))) {
            throw new AssertionError("wrong signature on " + parts);
        }
        JsonObject message = new JsonObject();
        String[] names = {"header", "parent", "metadata", "content"};
        for (int i = 0; i < names.length; i++) {
            message.add(names[i], GSON.fromJson(parts.get(i), JsonObject.class));
        }
        return message;
    }

    private static String signature(List<String> parts, String key) {
        try {
            Mac mac = Mac.getInstance("HmacSHA256");
            mac.init(new SecretKeySpec(key.getBytes(StandardCharsets.US_ASCII), "HmacSHA256"));
            parts.forEach(part -> mac.update(part.getBytes(StandardCharsets.UTF_8)));
            return HexFormat.of().formatHex(mac.doFinal());
        } catch (GeneralSecurityException e) {
            throw new IllegalStateException(e);
        }
    }

    private ZMQ.Socket connected(SocketType type, int port, byte[] identity) {
        ZMQ.Socket socket = context.socket(type);
        socket.setLinger(0);
        socket.setReceiveTimeOut(LIMIT_MILLIS);
        if (type != SocketType.SUB) {
            socket.setIdentity(identity);
        }
        socket.connect("tcp://127.0.0.1:" + port);
        return socket;
    }

    static List<Integer> freePorts(int count) throws IOException {
        List<ServerSocket> held = new ArrayList<>();
        for (int i = 0; i < count; i++) {
            held.add(new ServerSocket(0));
        }
        List<Integer> ports = held.stream().map(ServerSocket::getLocalPort).toList();
        for (ServerSocket socket : held) {
            socket.close();
        }
        return ports;
    }

    @Override
    public void close() {
        List.of(shell, control, stdin, iopub, heartbeat).forEach(ZMQ.Socket::close);
        context.term();
        process.destroyForcibly();
    }

    /** A reply, and what was broadcast about its request. */
    record Exchange(JsonObject reply, List<JsonObject> broadcasts) {
        JsonObject content() {
            return reply.getAsJsonObject("content");
        }

        String status() {
            return content().get("status").getAsString();
        }

        List<JsonObject> all(String type) {
            return broadcasts.stream()
                    .filter(m -> type(m).equals(type))
                    .map(m -> m.getAsJsonObject("content"))
                    .toList();
        }

        String printed(String stream) {
            StringBuilder text = new StringBuilder();
            all("stream").stream()
                    .filter(c -> c.get("name").getAsString().equals(stream))
                    .forEach(c -> text.append(c.get("text").getAsString()));
            return text.toString();
        }

        String resultText() {
            return all("execute_result")
                    .get(0)
                    .getAsJsonObject("data")
                    .get("text/plain")
                    .getAsString();
        }
    }
}
