package org.meltbook.kernel;

import java.nio.file.Path;

/** Serves one Jupyter client, or several that share the session, until it is told to shut down. */
public final class JupyterKernel {
    private JupyterKernel() {}

    /**
     * Serves the connection described in a file that Jupyter wrote, and returns when the kernel was shut down.
     *
     * @throws java.io.UncheckedIOException if the file cannot be read
     */
    public static void serve(Path connectionFile, Settings settings) {
        throw new UnsupportedOperationException("not yet");
    }
}
