package org.meltbook.notebook;

import com.google.gson.JsonObject;
import java.util.ArrayList;
import java.util.List;

/** Short notebooks for tests: {@code #} starts prose, anything else is code. */
final class NotebookText {
    private NotebookText() {}

    static Notebook of(String... sources) {
        List<Notebook.Cell> cells = new ArrayList<>();
        for (String source : sources) {
            JsonObject extras = new JsonObject();
            extras.add("metadata", new JsonObject());
            Notebook.Kind kind = source.startsWith("#") ? Notebook.Kind.MARKDOWN : Notebook.Kind.CODE;
            cells.add(Notebook.Cell.of(kind, "cell" + (cells.size() + 1), source, extras));
        }
        return new Notebook(cells, new JsonObject());
    }
}
