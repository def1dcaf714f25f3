package org.meltbook.kernel;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import jdk.jshell.spi.ExecutionControl.ClassBytecodes;
import jdk.jshell.spi.ExecutionControl.ClassInstallException;
import org.junit.jupiter.api.Test;

class CellClassesTest {
    @Test
    void a_class_that_cannot_be_loaded_is_remembered_until_the_next_snippet() {
        InProcessControl control = new InProcessControl(new CellLoader(), new CellRun());
        ClassBytecodes[] broken = {new ClassBytecodes("Broken", new byte[] {1, 2, 3})};
        assertThrows(ClassInstallException.class, () -> control.load(broken));
        assertTrue(control.notLoaded().isPresent());
        control.clear();
        assertTrue(control.notLoaded().isEmpty());
    }

    /** A loop that begins with its method jumps to the method's very start. */
    @Test
    void methods_that_begin_with_a_loop_are_loaded_and_run() {
        try (JShellEvaluator evaluator = JShellEvaluator.open(Settings.plain())) {
            String cell = "int[] left = {3};\nvoid count() {\n    while (left[0] > 0) left[0]--;\n}\ncount();\nleft[0]";
            Outcome.Done done = assertInstanceOf(Outcome.Done.class, evaluator.run(cell, new Collected()));
            assertEquals("0", done.result().orElseThrow().plainText());
        }
    }
}
