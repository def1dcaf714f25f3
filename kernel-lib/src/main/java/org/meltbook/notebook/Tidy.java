package org.meltbook.notebook;

import com.google.gson.JsonObject;
import java.nio.charset.StandardCharsets;
import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.util.ArrayList;
import java.util.HashSet;
import java.util.HexFormat;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import java.util.regex.Pattern;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.meltbook.kernel.MimeBundle;

/**
 * Makes a notebook read the same wherever and whenever it was run: each cell has an id that stays, cells that were run
 * count from 1, what differs from machine to machine is gone, printed text is in one piece. Tidying twice changes
 * nothing.
 */
public final class Tidy {
    private static final Pattern VALID_ID = Pattern.compile("[A-Za-z0-9_-]{1,64}");
    private static final int DIGITS = 8;
    private static final Set<String> VOLATILE = Set.of("signature", "widgets", "vscode", "orig_nbformat");
    private static final Set<String> VOLATILE_IN_CELL =
            Set.of("ExecuteTime", "execution", "vscode", "pycharm", "scrolled", "collapsed");

    private Tidy() {}

    /** The notebook, tidied. */
    public static Notebook of(Notebook notebook) {
        List<Notebook.Cell> cells = new ArrayList<>();
        Set<String> taken = new HashSet<>();
        Set<String> kept = new HashSet<>(notebook.cells().stream()
                .map(Notebook.Cell::id)
                .filter(Tidy::isValid)
                .toList());
        int run = 0;
        for (Notebook.Cell cell : notebook.cells()) {
            String id = id(cell, kept, taken);
            taken.add(id);
            boolean counted = cell.isRunnable() && cell.count().isPresent();
            Optional<Integer> count = counted ? Optional.of(++run) : Optional.empty();
            cells.add(cell.named(id).with(tidied(cell.extras())).with(count, outputs(cell.outputs(), count)));
        }
        return new Notebook(cells, metadata(notebook.metadata()));
    }

    private static boolean isValid(String id) {
        return VALID_ID.matcher(id).matches();
    }

    /** A valid id is kept, and the first of equal ones; else the id comes from the text, so that moving keeps it. */
    private static String id(Notebook.Cell cell, Set<String> kept, Set<String> taken) {
        if (isValid(cell.id()) && !taken.contains(cell.id())) {
            return cell.id();
        }
        String base = "cell-" + digest(cell.source());
        String id = base;
        for (int i = 2; taken.contains(id) || kept.contains(id); i++) {
            id = base + "-" + i;
        }
        return id;
    }

    private static String digest(String text) {
        try {
            byte[] hash = MessageDigest.getInstance("SHA-256").digest(text.getBytes(StandardCharsets.UTF_8));
            return HexFormat.of().formatHex(hash).substring(0, DIGITS);
        } catch (NoSuchAlgorithmException e) {
            throw new IllegalStateException("every Java has SHA-256", e);
        }
    }

    private static JsonObject tidied(JsonObject extras) {
        JsonObject metadata = extras.getAsJsonObject("metadata");
        VOLATILE_IN_CELL.forEach(metadata::remove);
        return extras;
    }

    private static JsonObject metadata(JsonObject metadata) {
        VOLATILE.forEach(metadata::remove);
        JsonObject kernel = new JsonObject();
        kernel.addProperty("display_name", "Java (Meltbook)");
        kernel.addProperty("language", "java");
        kernel.addProperty("name", "meltbook");
        metadata.add("kernelspec", kernel);
        JsonObject language = new JsonObject();
        language.addProperty("file_extension", ".java");
        language.addProperty("mimetype", "text/x-java-source");
        language.addProperty("name", "java");
        metadata.add("language_info", language);
        return metadata;
    }

    private static List<Output> outputs(List<Output> outputs, Optional<Integer> count) {
        List<Output> tidied = new ArrayList<>();
        List<Output.Stream> printed = new ArrayList<>();
        for (Output output : outputs) {
            if (output instanceof Output.Stream stream) {
                printed.add(stream);
                continue;
            }
            tidied.addAll(joined(printed));
            printed.clear();
            tidied.add(output instanceof Output.Value value ? counted(value, count) : output);
        }
        tidied.addAll(joined(printed));
        return tidied;
    }

    private static Output counted(Output.Value value, Optional<Integer> count) {
        MimeBundle bundle = new MimeBundle(value.bundle().data(), value.bundle().metadata(), "");
        return new Output.Value(bundle, value.count().isPresent() ? count.or(value::count) : Optional.empty());
    }

    /** Standard output and error come in pieces whose order is chance: output first, then error, each in one piece. */
    private static List<Output.Stream> joined(List<Output.Stream> pieces) {
        return Stream.of("stdout", "stderr")
                .map(name -> new Output.Stream(
                        name,
                        pieces.stream()
                                .filter(piece -> piece.name().equals(name))
                                .map(Output.Stream::text)
                                .collect(Collectors.joining())))
                .filter(stream -> !stream.text().isEmpty())
                .toList();
    }
}
