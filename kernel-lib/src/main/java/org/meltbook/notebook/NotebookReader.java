package org.meltbook.notebook;

import com.google.gson.Gson;
import com.google.gson.GsonBuilder;
import com.google.gson.JsonArray;
import com.google.gson.JsonElement;
import com.google.gson.JsonObject;
import com.google.gson.ToNumberPolicy;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.meltbook.kernel.MimeBundle;

/** Turns the JSON of a notebook into its document, and says in one line what is wrong with it. */
final class NotebookReader {
    private static final int FORMAT = 4;
    /** Whole numbers stay whole, so that reading and writing changes nothing. */
    private static final Gson GSON = new GsonBuilder()
            .setObjectToNumberStrategy(ToNumberPolicy.LONG_OR_DOUBLE)
            .create();

    private final String name;

    NotebookReader(String name) {
        this.name = name;
    }

    Notebook notebook(JsonObject root) {
        JsonElement format = root.get("nbformat");
        if (format == null || !format.isJsonPrimitive() || !format.getAsString().equals(String.valueOf(FORMAT))) {
            String found = format == null ? "no nbformat" : "nbformat " + format;
            throw wrong("expected nbformat " + FORMAT + ", found " + found + "; open and save it in Jupyter to bring it"
                    + " to the present format");
        }
        if (!(root.get("cells") instanceof JsonArray array)) {
            throw wrong("expected a list of cells, found " + NotebookFile.kind(root.get("cells")));
        }
        List<Notebook.Cell> cells = new ArrayList<>();
        for (JsonElement cell : array) {
            cells.add(cell(cell, "cell " + (cells.size() + 1)));
        }
        return new Notebook(cells, object(root, "metadata", "the notebook"));
    }

    private Notebook.Cell cell(JsonElement element, String where) {
        if (!(element instanceof JsonObject json)) {
            throw wrong(where + " is " + NotebookFile.kind(element) + ", expected an object");
        }
        String type = json.has("cell_type") ? text(json.get("cell_type"), where + ", cell_type") : "nothing";
        Notebook.Kind kind =
                switch (type) {
                    case "code" -> Notebook.Kind.CODE;
                    case "markdown" -> Notebook.Kind.MARKDOWN;
                    case "raw" -> Notebook.Kind.RAW;
                    default -> throw wrong(where + ": expected cell_type code, markdown or raw, found " + type);
                };
        JsonObject extras = new JsonObject();
        extras.add("metadata", object(json, "metadata", where));
        if (json.has("attachments")) {
            extras.add("attachments", object(json, "attachments", where));
        }
        String id = json.has("id") ? text(json.get("id"), where + ", id") : "";
        Notebook.Cell cell = Notebook.Cell.of(kind, id, text(json.get("source"), where + ", source"), extras);
        return kind == Notebook.Kind.CODE ? cell.with(count(json), outputs(json, where)) : cell;
    }

    private List<Output> outputs(JsonObject cell, String where) {
        if (!(cell.get("outputs") instanceof JsonArray array)) {
            throw wrong(where + ": expected a list of outputs, found " + NotebookFile.kind(cell.get("outputs")));
        }
        List<Output> outputs = new ArrayList<>();
        for (JsonElement output : array) {
            String place = where + ", output " + (outputs.size() + 1);
            if (!(output instanceof JsonObject json)) {
                throw wrong(place + " is " + NotebookFile.kind(output) + ", expected an object");
            }
            outputs.add(output(json, place));
        }
        return outputs;
    }

    private Output output(JsonObject json, String where) {
        String type = text(json.get("output_type"), where + ", output_type");
        return switch (type) {
            case "stream" -> new Output.Stream(
                    text(json.get("name"), where + ", name"), text(json.get("text"), where + ", text"));
            case "display_data" -> new Output.Value(bundle(json, where), Optional.empty());
            case "execute_result" -> new Output.Value(
                    bundle(json, where), count(json).or(() -> Optional.of(0)));
            case "error" -> new Output.Failure(
                    text(json.get("ename"), where + ", ename"),
                    text(json.get("evalue"), where + ", evalue"),
                    lines(json.get("traceback"), where));
            default -> throw wrong(where + ": unknown output_type " + type);
        };
    }

    private MimeBundle bundle(JsonObject json, String where) {
        Map<String, Object> data = new LinkedHashMap<>();
        object(json, "data", where).entrySet().forEach(form -> {
            String mime = form.getKey();
            data.put(
                    mime,
                    isJson(mime)
                            ? GSON.fromJson(form.getValue(), Object.class)
                            : text(form.getValue(), where + ", " + mime));
        });
        Map<String, Object> metadata = new LinkedHashMap<>();
        object(json, "metadata", where)
                .entrySet()
                .forEach(e -> metadata.put(e.getKey(), GSON.fromJson(e.getValue(), Object.class)));
        return new MimeBundle(data, metadata, "");
    }

    static boolean isJson(String mime) {
        return mime.equals("application/json") || mime.endsWith("+json");
    }

    private static Optional<Integer> count(JsonObject json) {
        JsonElement count = json.get("execution_count");
        return count == null || count.isJsonNull() ? Optional.empty() : Optional.of(count.getAsInt());
    }

    private List<String> lines(JsonElement value, String where) {
        if (!(value instanceof JsonArray array)) {
            throw wrong(where + ": expected a traceback, found " + NotebookFile.kind(value));
        }
        return array.asList().stream()
                .map(line -> text(line, where + ", traceback"))
                .toList();
    }

    /** Text in one piece or as a list of lines. */
    private String text(JsonElement value, String where) {
        if (value != null && value.isJsonPrimitive()) {
            return value.getAsString();
        }
        if (value instanceof JsonArray array && array.asList().stream().allMatch(JsonElement::isJsonPrimitive)) {
            StringBuilder text = new StringBuilder();
            array.forEach(line -> text.append(line.getAsString()));
            return text.toString();
        }
        throw wrong(where + ": expected text, found " + NotebookFile.kind(value));
    }

    private JsonObject object(JsonObject json, String key, String where) {
        if (json.get(key) instanceof JsonObject object) {
            return object;
        }
        throw wrong(where + ": expected " + key + ", found " + NotebookFile.kind(json.get(key)));
    }

    private NotebookException wrong(String what) {
        return new NotebookException(name + ": not a notebook that can be run: " + what);
    }
}
