package org.meltbook.kernel;

import com.google.gson.Gson;
import com.google.gson.GsonBuilder;
import com.google.gson.JsonObject;
import com.google.gson.JsonParseException;
import java.nio.charset.StandardCharsets;
import java.security.MessageDigest;
import java.time.Instant;
import java.time.temporal.ChronoUnit;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import java.util.UUID;
import org.dflib.jjava.jupyter.messages.HMACGenerator;
import org.dflib.jjava.jupyter.messages.Header;
import org.zeromq.ZMQ;

/** Messages to signed frames and back. A message with a wrong signature, or one that cannot be read, is passed over. */
final class Wire {
    static final Gson GSON = new GsonBuilder().disableHtmlEscaping().create();

    private static final byte[] DELIMITER = "<IDS|MSG>".getBytes(StandardCharsets.US_ASCII);
    private static final int PARTS = 4;

    private final HMACGenerator signer;
    private final String session = UUID.randomUUID().toString();

    Wire(HMACGenerator signer) {
        this.signer = signer;
    }

    /** Waits for the next readable message. */
    Envelope receive(ZMQ.Socket socket) {
        while (true) {
            Optional<Envelope> message = decode(frames(socket, 0));
            if (message.isPresent()) {
                return message.get();
            }
        }
    }

    /** The next message if it is there, or comes within the socket's receive timeout; empty if not. */
    Optional<Envelope> poll(ZMQ.Socket socket, int flags) {
        List<byte[]> frames = frames(socket, flags);
        return frames.isEmpty() ? Optional.empty() : decode(frames);
    }

    /** A message that answers, or tells something about, {@code request}. */
    Envelope reply(Envelope request, String type, JsonObject content) {
        return message(request.route(), request.header(), type, content);
    }

    /** A message to everyone, about the request with the given header; that is empty if about none. */
    Envelope broadcast(JsonObject about, String type, JsonObject content) {
        return message(List.of(type.getBytes(StandardCharsets.US_ASCII)), about, type, content);
    }

    void send(ZMQ.Socket socket, Envelope message) {
        byte[][] parts = {
            bytes(message.header()), bytes(message.parent()), bytes(message.metadata()), bytes(message.content())
        };
        for (byte[] step : message.route()) {
            socket.sendMore(step);
        }
        socket.sendMore(DELIMITER);
        socket.sendMore(signer.calculateSignature(parts).getBytes(StandardCharsets.US_ASCII));
        for (int i = 0; i < PARTS - 1; i++) {
            socket.sendMore(parts[i]);
        }
        socket.send(parts[PARTS - 1]);
    }

    private Envelope message(List<byte[]> route, JsonObject parent, String type, JsonObject content) {
        JsonObject header = new JsonObject();
        header.addProperty("msg_id", UUID.randomUUID().toString());
        header.addProperty("session", session);
        header.addProperty("username", "kernel");
        header.addProperty("date", Instant.now().truncatedTo(ChronoUnit.MICROS).toString());
        header.addProperty("msg_type", type);
        header.addProperty("version", Header.PROTOCOL_VERISON);
        return new Envelope(route, header, parent, new JsonObject(), content);
    }

    private static List<byte[]> frames(ZMQ.Socket socket, int flags) {
        List<byte[]> frames = new ArrayList<>();
        byte[] first = socket.recv(flags);
        if (first != null) {
            frames.add(first);
            while (socket.hasReceiveMore()) {
                frames.add(socket.recv());
            }
        }
        return frames;
    }

    private Optional<Envelope> decode(List<byte[]> frames) {
        int mark = 0;
        while (mark < frames.size() && !Arrays.equals(frames.get(mark), DELIMITER)) {
            mark++;
        }
        if (frames.size() < mark + 2 + PARTS) {
            return Optional.empty();
        }
        byte[][] parts = frames.subList(mark + 2, mark + 2 + PARTS).toArray(byte[][]::new);
        String expected = signer.calculateSignature(parts);
        if (!MessageDigest.isEqual(expected.getBytes(StandardCharsets.US_ASCII), frames.get(mark + 1))) {
            return Optional.empty();
        }
        try {
            Envelope message = new Envelope(
                    frames.subList(0, mark), object(parts[0]), object(parts[1]), object(parts[2]), object(parts[3]));
            return message.header().has("msg_type") ? Optional.of(message) : Optional.empty();
        } catch (JsonParseException | IllegalStateException e) {
            return Optional.empty();
        }
    }

    private static JsonObject object(byte[] json) {
        JsonObject object = GSON.fromJson(new String(json, StandardCharsets.UTF_8), JsonObject.class);
        return object == null ? new JsonObject() : object;
    }

    private static byte[] bytes(JsonObject json) {
        return GSON.toJson(json).getBytes(StandardCharsets.UTF_8);
    }
}
