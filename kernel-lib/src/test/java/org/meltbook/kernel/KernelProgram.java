package org.meltbook.kernel;

import java.nio.file.Path;
import java.util.List;

/** The kernel as a program of its own, for the tests of the wire. */
public final class KernelProgram {
    private KernelProgram() {}

    public static void main(String[] arguments) {
        JupyterKernel.serve(
                Path.of(arguments[0]),
                Settings.plain().importing(List.of("import java.util.*;", "import org.meltbook.base.*;")));
    }
}
