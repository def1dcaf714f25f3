package org.meltbook.notebook;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertNotEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.HashSet;
import java.util.List;
import java.util.Optional;
import org.junit.jupiter.api.Test;

class TidyTest {
    @Test
    void tidying_twice_changes_nothing() {
        String once = NotebookFile.write(Tidy.of(untidy()));
        assertEquals(once, NotebookFile.write(Tidy.of(NotebookFile.parse(once, "once"))));
    }

    @Test
    void valid_ids_are_kept_and_others_are_made_unique() {
        List<String> ids =
                Tidy.of(untidy()).cells().stream().map(Notebook.Cell::id).toList();
        assertEquals("load-sweep", ids.get(0));
        assertEquals(ids.size(), new HashSet<>(ids).size());
        assertTrue(ids.stream().allMatch(id -> id.matches("[A-Za-z0-9_-]{1,64}")), ids.toString());
    }

    @Test
    void a_made_id_does_not_change_when_cells_move() {
        List<Notebook.Cell> cells = new ArrayList<>(untidy().cells());
        String before =
                Tidy.of(new Notebook(cells, untidy().metadata())).cells().get(1).id();
        cells.add(0, NotebookText.of("# new").cells().get(0));
        assertEquals(
                before,
                Tidy.of(new Notebook(cells, untidy().metadata())).cells().get(2).id());
    }

    @Test
    void cells_that_were_run_count_from_one_and_others_do_not_count() {
        List<Optional<Integer>> counts =
                Tidy.of(untidy()).cells().stream().map(Notebook.Cell::count).toList();
        assertEquals(List.of(Optional.of(1), Optional.of(2), Optional.empty(), Optional.empty()), counts);
    }

    @Test
    void printed_text_in_pieces_becomes_one_piece_of_each_kind() {
        List<Output> outputs = Tidy.of(untidy()).cells().get(0).outputs();
        assertEquals(List.of(new Output.Stream("stdout", "ab"), new Output.Stream("stderr", "x")), outputs);
    }

    @Test
    void what_differs_from_machine_to_machine_is_gone() {
        String text = NotebookFile.write(Tidy.of(untidy()));
        for (String gone : List.of("ExecuteTime", "17.0.15", "widgets", "other-kernel")) {
            assertFalse(text.contains(gone), gone);
        }
        assertTrue(text.contains("\"display_name\": \"Java (Meltbook)\""));
        assertNotEquals(text, NotebookFile.write(untidy()));
    }

    private static Notebook untidy() {
        return NotebookFile.parse(
                """
                {"nbformat": 4, "nbformat_minor": 4,
                 "metadata": {"kernelspec": {"name": "other-kernel"}, "widgets": {"a": 1},
                              "language_info": {"name": "java", "version": "17.0.15"}},
                 "cells": [
                  {"cell_type": "code", "id": "load-sweep", "metadata": {"ExecuteTime": {"start": 1}}, "source": "a",
                   "execution_count": 7, "outputs": [
                    {"output_type": "stream", "name": "stdout", "text": "a"},
                    {"output_type": "stream", "name": "stderr", "text": "x"},
                    {"output_type": "stream", "name": "stdout", "text": "b"}]},
                  {"cell_type": "code", "id": "load-sweep", "metadata": {}, "source": "b", "execution_count": 9,
                   "outputs": []},
                  {"cell_type": "code", "id": "not valid!", "metadata": {}, "source": "b", "execution_count": null,
                   "outputs": []},
                  {"cell_type": "markdown", "metadata": {}, "source": "b"}]}
                """,
                "untidy");
    }
}
