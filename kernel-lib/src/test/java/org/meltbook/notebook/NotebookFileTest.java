package org.meltbook.notebook;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.networknt.schema.InputFormat;
import com.networknt.schema.JsonSchema;
import com.networknt.schema.JsonSchemaFactory;
import com.networknt.schema.SpecVersion;
import java.io.IOException;
import java.io.InputStream;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.meltbook.kernel.MimeBundle;

class NotebookFileTest {
    @TempDir
    Path folder;

    @ParameterizedTest(name = "{1}")
    @CsvSource(
            delimiter = '|',
            quoteCharacter = '~',
            textBlock =
                    """
            this is no JSON | it is not JSON
            {"cells": [}    | it is not JSON (wrong at line 1 column
            {"cells": []    | it is not JSON
            {} {}           | it is not JSON
            {'cells': []}   | it is not JSON
            []              | expected a JSON object, found a list
            {}              | expected nbformat 4, found no nbformat
            {"nbformat": 3} | expected nbformat 4, found nbformat 3
            {"nbformat": 4} | expected a list of cells, found nothing
            {"nbformat": 4, "cells": [1]} | cell 1 is a single value, expected an object
            {"nbformat": 4, "cells": [{"cell_type": "graph"}]} | cell 1: expected cell_type code, markdown or raw, found graph
            {"nbformat": 4, "cells": [{"cell_type": "code", "metadata": {}, "source": 1.5}]} | expected a list of outputs
            {"nbformat": 4, "cells": [{"cell_type": "raw", "metadata": {}}]} | cell 1, source: expected text, found nothing
            """)
    void a_file_that_is_no_notebook_is_refused_in_one_line(String text, String part) throws IOException {
        Path file = Files.writeString(folder.resolve("broken.ipynb"), text);
        String message = assertThrows(NotebookException.class, () -> NotebookFile.read(file))
                .getMessage();
        assertTrue(message.startsWith(file + ": not a notebook"), message);
        assertTrue(message.contains(part), message);
        assertEquals(1, message.lines().count());
    }

    @Test
    void an_empty_a_binary_and_a_missing_file_are_refused_in_one_line() throws IOException {
        Path empty = Files.createFile(folder.resolve("empty.ipynb"));
        Path binary = Files.write(folder.resolve("binary.ipynb"), new byte[] {(byte) 0xff, (byte) 0xfe, 0, 1});
        Path missing = folder.resolve("missing.ipynb");
        for (Path file : List.of(empty, binary, missing)) {
            String message = assertThrows(NotebookException.class, () -> NotebookFile.read(file))
                    .getMessage();
            assertTrue(message.startsWith(file + ": "), message);
            assertEquals(1, message.lines().count());
        }
    }

    @Test
    void what_is_written_is_valid_by_the_official_schema_of_format_4_5() throws IOException {
        Notebook notebook = everyKind();
        assertEquals(List.of(), violations(NotebookFile.write(notebook)));
        assertEquals(List.of(), violations(NotebookFile.write(Tidy.of(notebook))));
    }

    @Test
    void the_schema_check_itself_finds_a_wrong_notebook() throws IOException {
        String wrong =
                NotebookFile.write(everyKind()).replace("\"output_type\": \"stream\"", "\"output_type\": \"flow\"");
        assertFalse(violations(wrong).isEmpty());
    }

    @Test
    void reading_back_and_writing_again_changes_nothing() {
        String text = NotebookFile.write(everyKind());
        assertEquals(text, NotebookFile.write(NotebookFile.parse(text, "again")));
    }

    @Test
    void a_file_is_laid_out_as_jupyter_lays_it_out() {
        // Source: json.dumps(indent=1, sort_keys=True, ensure_ascii=False) and a newline, as nbformat 5.5.0 writes it.
        String expected =
                """
                {
                 "cells": [
                  {
                   "cell_type": "markdown",
                   "id": "cell1",
                   "metadata": {},
                   "source": [
                    "# η\\n",
                    "<b>"
                   ]
                  },
                  {
                   "cell_type": "code",
                   "execution_count": null,
                   "id": "cell2",
                   "metadata": {},
                   "outputs": [],
                   "source": []
                  }
                 ],
                 "metadata": {},
                 "nbformat": 4,
                 "nbformat_minor": 5
                }
                """;
        assertEquals(expected, NotebookFile.write(NotebookText.of("# η\n<b>", "")));
    }

    @Test
    void pictures_pasted_into_prose_and_unknown_metadata_are_kept() {
        String text =
                "{\"nbformat\": 4, \"metadata\": {\"own\": 1}, \"cells\": [{\"cell_type\": \"markdown\", \"id\": \"a\","
                        + " \"metadata\": {\"tags\": [\"keep\"]}, \"attachments\": {\"a.png\": {\"image/png\": \"AAAA\"}},"
                        + " \"source\": \"x\"}]}";
        String written = NotebookFile.write(Tidy.of(NotebookFile.parse(text, "x")));
        assertTrue(written.contains("\"a.png\"") && written.contains("\"keep\"") && written.contains("\"own\": 1"));
    }

    /** A notebook with each kind of cell and of output. */
    static Notebook everyKind() {
        Notebook plain = NotebookText.of("# Prose\n\nγ̇", "one", "two", "fail");
        MimeBundle rich = new MimeBundle(
                Map.of(
                        "text/plain",
                        "a\nb",
                        "text/html",
                        "<p>a\n</p>",
                        "image/png",
                        "AAAA",
                        FigureData.MIME,
                        List.of(Map.of("title", "t", "n", 3L, "v", 0.5))),
                Map.of("image/png", Map.of("width", 10L)),
                "");
        List<Notebook.Cell> cells = List.of(
                plain.cells().get(0),
                plain.cells()
                        .get(1)
                        .with(
                                Optional.of(1),
                                List.of(
                                        new Output.Stream("stdout", "a\nb\n"),
                                        new Output.Stream("stderr", "c"),
                                        new Output.Value(rich, Optional.empty()))),
                plain.cells().get(2).with(Optional.of(2), List.of(new Output.Value(rich, Optional.of(2)))),
                plain.cells()
                        .get(3)
                        .with(Optional.of(3), List.of(new Output.Failure("E", "m", List.of("E: m", "line 1")))));
        return new Notebook(cells, plain.metadata());
    }

    static List<String> violations(String notebook) throws IOException {
        try (InputStream in = NotebookFileTest.class.getResourceAsStream("/nbformat/nbformat.v4.5.schema.json")) {
            JsonSchema schema =
                    JsonSchemaFactory.getInstance(SpecVersion.VersionFlag.V4).getSchema(in);
            return schema.validate(notebook, InputFormat.JSON).stream()
                    .map(Object::toString)
                    .toList();
        }
    }
}
