package org.meltbook.notebook;

import com.google.gson.FormattingStyle;
import com.google.gson.Gson;
import com.google.gson.GsonBuilder;
import com.google.gson.JsonArray;
import com.google.gson.JsonElement;
import com.google.gson.JsonNull;
import com.google.gson.JsonObject;
import com.google.gson.JsonPrimitive;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import java.util.Set;
import java.util.TreeMap;
import org.meltbook.kernel.MimeBundle;

/** Turns a notebook into the text of its file. */
final class NotebookWriter {
    private static final Gson GSON = new GsonBuilder()
            .setFormattingStyle(FormattingStyle.PRETTY.withIndent(" "))
            .disableHtmlEscaping()
            .serializeNulls()
            .create();
    /** What Jupyter writes line by line, besides {@code text/…}. */
    private static final Set<String> LINEWISE = Set.of("application/javascript", "image/svg+xml");

    private NotebookWriter() {}

    static String write(Notebook notebook) {
        JsonObject root = new JsonObject();
        JsonArray cells = new JsonArray();
        notebook.cells().forEach(cell -> cells.add(cell(cell)));
        root.add("cells", cells);
        root.add("metadata", notebook.metadata());
        root.addProperty("nbformat", 4);
        root.addProperty("nbformat_minor", 5);
        return GSON.toJson(sorted(root)) + "\n";
    }

    private static JsonObject cell(Notebook.Cell cell) {
        JsonObject json = cell.extras();
        json.addProperty("cell_type", cell.kind().name().toLowerCase(Locale.ROOT));
        json.addProperty("id", cell.id());
        json.add("source", lines(cell.source()));
        if (cell.kind() == Notebook.Kind.CODE) {
            json.add("execution_count", number(cell.count()));
            JsonArray outputs = new JsonArray();
            cell.outputs().forEach(output -> outputs.add(output(output)));
            json.add("outputs", outputs);
        }
        return json;
    }

    private static JsonObject output(Output output) {
        JsonObject json = new JsonObject();
        if (output instanceof Output.Stream stream) {
            json.addProperty("output_type", "stream");
            json.addProperty("name", stream.name());
            json.add("text", lines(stream.text()));
        } else if (output instanceof Output.Value value) {
            json.addProperty("output_type", value.count().isPresent() ? "execute_result" : "display_data");
            value.count().ifPresent(count -> json.addProperty("execution_count", count));
            json.add("data", data(value.bundle()));
            json.add("metadata", GSON.toJsonTree(value.bundle().metadata()));
        } else if (output instanceof Output.Failure failure) {
            json.addProperty("output_type", "error");
            json.addProperty("ename", failure.kind());
            json.addProperty("evalue", failure.message());
            json.add("traceback", GSON.toJsonTree(failure.lines()));
        }
        return json;
    }

    private static JsonObject data(MimeBundle bundle) {
        JsonObject data = new JsonObject();
        bundle.data().forEach((mime, form) -> {
            boolean linewise = mime.startsWith("text/") || LINEWISE.contains(mime);
            data.add(mime, linewise && form instanceof String text ? lines(text) : GSON.toJsonTree(form));
        });
        return data;
    }

    private static JsonArray lines(String text) {
        JsonArray lines = new JsonArray();
        int from = 0;
        while (from < text.length()) {
            int end = text.indexOf('\n', from);
            int next = end < 0 ? text.length() : end + 1;
            lines.add(text.substring(from, next));
            from = next;
        }
        return lines;
    }

    private static JsonElement number(Optional<Integer> count) {
        return count.<JsonElement>map(JsonPrimitive::new).orElse(JsonNull.INSTANCE);
    }

    private static JsonElement sorted(JsonElement element) {
        if (element instanceof JsonObject object) {
            TreeMap<String, JsonElement> entries = new TreeMap<>(object.asMap());
            JsonObject sorted = new JsonObject();
            entries.forEach((key, value) -> sorted.add(key, sorted(value)));
            return sorted;
        } else if (element instanceof JsonArray array) {
            JsonArray sorted = new JsonArray();
            List<JsonElement> elements = array.asList();
            elements.forEach(e -> sorted.add(sorted(e)));
            return sorted;
        }
        return element;
    }
}
