package org.meltbook.notebook;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;

import java.io.UncheckedIOException;
import java.util.List;
import java.util.Optional;
import org.junit.jupiter.api.Test;
import org.meltbook.kernel.Outcome;

class RecorderTest {
    private static final Outcome DONE = new Outcome.Done(Optional.empty());

    private final Recorder recorder = new Recorder();

    @Test
    void text_that_was_cleared_leaves_room_for_new_text() {
        recorder.out("x".repeat(Recorder.LONGEST));
        recorder.clear(true);
        recorder.out("the end");
        assertEquals(List.of(new Output.Stream("stdout", "the end")), recorder.ended(DONE, 1));
    }

    @Test
    void text_without_end_is_cut_once_and_says_so() {
        recorder.out("x".repeat(Recorder.LONGEST - 1));
        recorder.out("yz");
        recorder.out("gone");
        recorder.err("gone");
        List<Output> outputs = recorder.ended(DONE, 1);
        assertEquals(2, outputs.size());
        assertEquals(new Output.Stream("stdout", "y\n[cut after 1000000 characters]\n"), outputs.get(1));
    }

    @Test
    void says_that_nobody_can_be_asked_with_the_question_if_there_is_one() {
        UncheckedIOException plain = assertThrows(UncheckedIOException.class, () -> recorder.ask("", false));
        assertEquals("nobody can be asked in a headless run", plain.getCause().getMessage());
        UncheckedIOException named = assertThrows(UncheckedIOException.class, () -> recorder.ask("T / °C", false));
        assertEquals(
                "nobody can be asked in a headless run: T / °C",
                named.getCause().getMessage());
    }
}
