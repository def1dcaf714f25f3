package org.meltbook.kernel;

import java.io.IOException;
import java.nio.file.Path;
import java.util.List;

/** The kernel as a program of its own, for the tests of the wire; without an argument it waits until its input ends. */
public final class KernelProgram {
    private KernelProgram() {}

    public static void main(String[] arguments) throws IOException {
        if (arguments.length == 0) {
            System.in.readAllBytes();
            return;
        }
        JupyterKernel.serve(
                Path.of(arguments[0]),
                Settings.plain().importing(List.of("import java.util.*;", "import org.meltbook.base.*;")));
        System.exit(0);
    }
}
