package org.meltbook.kernel;

import com.google.gson.JsonObject;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.dflib.jjava.jupyter.kernel.LanguageInfo;
import org.dflib.jjava.jupyter.messages.Header;
import org.dflib.jjava.jupyter.messages.reply.CommInfoReply;
import org.dflib.jjava.jupyter.messages.reply.CompleteReply;
import org.dflib.jjava.jupyter.messages.reply.HistoryReply;
import org.dflib.jjava.jupyter.messages.reply.KernelInfoReply;
import org.dflib.jjava.jupyter.messages.request.CompleteRequest;
import org.dflib.jjava.jupyter.messages.request.InspectRequest;

/** Answers to all requests that run no cell. On the wire a cursor counts code points, in the evaluator UTF-16 units. */
final class Answers {
    private static final String LANGUAGE = "java";

    private Answers() {}

    static JsonObject kernelInfo() {
        String version = Optional.ofNullable(Answers.class.getPackage().getImplementationVersion())
                .orElse("unpackaged");
        String java = Integer.toString(Runtime.version().feature());
        LanguageInfo language = new LanguageInfo.Builder(LANGUAGE)
                .version(java)
                .mimetype("text/x-java-source")
                .fileExtension(".java")
                .pygments(LANGUAGE)
                .codemirror("text/x-java")
                .build();
        String banner = "Meltbook " + version + ": Java " + java + " for people who measure polymer melts";
        return ok(new KernelInfoReply(Header.PROTOCOL_VERISON, "meltbook", version, language, banner, List.of()));
    }

    static JsonObject completion(JsonObject content, Evaluator evaluator) {
        CompleteRequest request = Wire.GSON.fromJson(content, CompleteRequest.class);
        String cell = request.getCode();
        Evaluator.Completion found = evaluator.complete(cell, units(cell, request.getCursorPos()));
        return ok(new CompleteReply(found.options(), points(cell, found.start()), points(cell, found.end()), Map.of()));
    }

    static JsonObject inspection(JsonObject content, Evaluator evaluator) {
        InspectRequest request = Wire.GSON.fromJson(content, InspectRequest.class);
        String cell = request.getCode();
        Optional<MimeBundle> found = evaluator.inspect(cell, units(cell, request.getCursorPos()));
        JsonObject reply = WireOutlet.content(found.orElse(MimeBundle.of(Map.of())));
        reply.remove("transient");
        reply.addProperty("found", found.isPresent());
        return ok(reply);
    }

    static JsonObject completeness(JsonObject content, Evaluator evaluator) {
        JsonObject reply = new JsonObject();
        switch (evaluator.completeness(content.get("code").getAsString())) {
            case COMPLETE -> reply.addProperty("status", "complete");
            case INVALID -> reply.addProperty("status", "invalid");
            case INCOMPLETE -> {
                reply.addProperty("status", "incomplete");
                reply.addProperty("indent", "    ");
            }
        }
        return reply;
    }

    /** No history is kept: front ends keep their own. */
    static JsonObject history() {
        return ok(new HistoryReply(List.of()));
    }

    static JsonObject comms() {
        return ok(new CommInfoReply(Map.of()));
    }

    static JsonObject shutdown(JsonObject content) {
        JsonObject reply = new JsonObject();
        reply.addProperty(
                "restart", content.has("restart") && content.get("restart").getAsBoolean());
        return ok(reply);
    }

    /** The reply as JSON, with the status that the wire library leaves out of some. */
    static JsonObject ok(Object reply) {
        JsonObject json = Wire.GSON.toJsonTree(reply).getAsJsonObject();
        json.addProperty("status", "ok");
        return json;
    }

    private static int units(String text, int points) {
        int count = text.codePointCount(0, text.length());
        return text.offsetByCodePoints(0, Math.max(0, Math.min(points, count)));
    }

    private static int points(String text, int units) {
        return text.codePointCount(0, units);
    }
}
