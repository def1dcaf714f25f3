package org.meltbook.kernel;

import java.util.List;
import java.util.Map;
import java.util.Optional;
import jdk.jshell.JShell;
import jdk.jshell.SourceCodeAnalysis;
import jdk.jshell.SourceCodeAnalysis.Documentation;

/** Tells what is known of a name in a cell. */
final class Inspection {
    private final SourceCodeAnalysis analysis;

    Inspection(JShell shell, ClassLoader classes) {
        analysis = shell.sourceCodeAnalysis();
    }

    Optional<MimeBundle> of(String cell, int cursor) {
        List<String> s = analysis.documentation(cell, cursor, false).stream().map(Documentation::signature).toList();
        return s.isEmpty() ? Optional.empty() : Optional.of(MimeBundle.of(Map.of("text/plain", String.join("\n", s))));
    }
}
