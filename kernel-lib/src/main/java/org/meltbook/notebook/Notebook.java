package org.meltbook.notebook;

import com.google.gson.JsonObject;
import java.util.List;
import java.util.Optional;

/**
 * A notebook as a document: cells from top to bottom, and metadata. Immutable; what this class does not know of the
 * metadata is kept as it was read.
 */
public final class Notebook {
    private final List<Cell> cells;
    private final JsonObject metadata;

    /** A notebook with the given cells and metadata. */
    public Notebook(List<Cell> cells, JsonObject metadata) {
        this.cells = List.copyOf(cells);
        this.metadata = metadata.deepCopy();
    }

    /** The cells from top to bottom. */
    public List<Cell> cells() {
        return cells;
    }

    /** A copy of the metadata. */
    public JsonObject metadata() {
        return metadata.deepCopy();
    }

    /** What a cell holds. */
    public enum Kind {
        /** Java to be run. */
        CODE,
        /** Prose. */
        MARKDOWN,
        /** Text that is neither run nor shown as prose. */
        RAW
    }

    /** One cell. */
    public static final class Cell {
        private final Kind kind;
        private final String id;
        private final String source;
        private final JsonObject extras;
        private final Optional<Integer> count;
        private final List<Output> outputs;

        private Cell(Kind kind, String id, String source, JsonObject extras, Results results) {
            this.kind = kind;
            this.id = id;
            this.source = source;
            this.extras = extras.deepCopy();
            this.count = results.count;
            this.outputs = results.outputs;
        }

        /**
         * A cell that was not run.
         *
         * @param id     its id, blank if it has none yet
         * @param extras its {@code metadata} and, if it has pictures pasted in, its {@code attachments}
         */
        static Cell of(Kind kind, String id, String source, JsonObject extras) {
            return new Cell(kind, id, source, extras, new Results(Optional.empty(), List.of()));
        }

        /** The same cell after a run. */
        public Cell with(Optional<Integer> count, List<Output> outputs) {
            return new Cell(kind, id, source, extras, new Results(count, List.copyOf(outputs)));
        }

        /** The same cell under another id. */
        public Cell named(String other) {
            return new Cell(kind, other, source, extras, new Results(count, outputs));
        }

        /** The same cell with other metadata and attachments. */
        Cell with(JsonObject otherExtras) {
            return new Cell(kind, id, source, otherExtras, new Results(count, outputs));
        }

        /** What the cell holds. */
        public Kind kind() {
            return kind;
        }

        /** The id that stays when cells move; blank if the file had none. */
        public String id() {
            return id;
        }

        /** Its text. */
        public String source() {
            return source;
        }

        /** When it was run, counted from 1; empty if it was not. */
        public Optional<Integer> count() {
            return count;
        }

        /** What it has put out. */
        public List<Output> outputs() {
            return outputs;
        }

        /** Whether there is something to run. */
        public boolean isRunnable() {
            return kind == Kind.CODE && !source.isBlank();
        }

        JsonObject extras() {
            return extras.deepCopy();
        }

        private record Results(Optional<Integer> count, List<Output> outputs) {}
    }
}
