package org.meltbook.notebook;

import com.google.gson.JsonElement;
import com.google.gson.JsonObject;
import com.google.gson.JsonParseException;
import com.google.gson.JsonParser;
import com.google.gson.Strictness;
import com.google.gson.stream.JsonReader;
import java.io.IOException;
import java.io.StringReader;
import java.nio.charset.CharacterCodingException;
import java.nio.file.Files;
import java.nio.file.NoSuchFileException;
import java.nio.file.Path;

/**
 * Notebook files of format 4.5 (and 4.0 to 4.4, whose cells have no ids yet): read into a {@link Notebook} and written
 * back as Jupyter writes them, key for key, so that a change in git is a change in the notebook.
 */
public final class NotebookFile {
    private NotebookFile() {}

    /**
     * The notebook in a file.
     *
     * @throws NotebookException if it cannot be read, is not JSON, or no notebook of format 4; one line names the file
     */
    public static Notebook read(Path file) {
        return parse(text(file), file.toString());
    }

    /** The text of a file. */
    static String text(Path file) {
        try {
            return Files.readString(file);
        } catch (NoSuchFileException e) {
            throw new NotebookException(file + ": there is no such file", e);
        } catch (CharacterCodingException e) {
            throw new NotebookException(file + ": not a notebook: it is not UTF-8 text", e);
        } catch (IOException e) {
            throw new NotebookException(file + ": cannot be read: " + e.getMessage(), e);
        }
    }

    /**
     * The notebook in a text.
     *
     * @param name what messages call it
     * @throws NotebookException if the text is not JSON, or not a notebook of format 4
     */
    public static Notebook parse(String text, String name) {
        JsonElement root = json(text, name);
        if (!root.isJsonObject()) {
            throw new NotebookException(name + ": not a notebook: expected a JSON object, found " + kind(root));
        }
        return new NotebookReader(name).notebook(root.getAsJsonObject());
    }

    /** The notebook as the text of a file: keys sorted, one space of indent, text line by line, a final newline. */
    public static String write(Notebook notebook) {
        return NotebookWriter.write(notebook);
    }

    private static JsonElement json(String text, String name) {
        if (text.isBlank()) {
            throw new NotebookException(name + ": not a notebook: the file is empty");
        }
        try (JsonReader reader = new JsonReader(new StringReader(text))) {
            reader.setStrictness(Strictness.STRICT);
            JsonElement root = JsonParser.parseReader(reader);
            // A strict reader throws here if text follows.
            reader.peek();
            return root;
        } catch (IOException | JsonParseException | IllegalStateException e) {
            throw new NotebookException(name + ": not a notebook: it is not JSON (" + place(e) + ")", e);
        }
    }

    private static String place(Exception e) {
        String message = String.valueOf(e.getMessage()).lines().findFirst().orElse("");
        int at = message.indexOf("at line ");
        int path = message.indexOf(" path ");
        return at < 0 ? "it ends too early" : "wrong " + message.substring(at, path < at ? message.length() : path);
    }

    /** What a JSON value is, in a word. */
    static String kind(JsonElement value) {
        if (value instanceof JsonObject) {
            return "an object";
        }
        return value == null || value.isJsonNull() ? "nothing" : value.isJsonArray() ? "a list" : "a single value";
    }
}
