package org.meltbook.notebook;

import java.util.List;

/** What a session knows before its first cell. */
final class StartImports {
    /** The imports, in the order in which they are made. */
    static final List<String> LINES = List.of(
            "import java.nio.file.Path;",
            "import java.util.*;",
            "import java.util.stream.*;",
            "import org.meltbook.base.*;",
            "import org.meltbook.units.*;",
            "import org.meltbook.figure.*;",
            "import org.meltbook.measure.*;",
            "import org.meltbook.intake.*;",
            "import org.meltbook.numeric.*;",
            "import org.meltbook.fit.*;",
            "import org.meltbook.viscosity.*;",
            "import org.meltbook.spectrum.*;",
            "import org.meltbook.flow.*;",
            "import org.meltbook.constitutive.*;",
            "import tech.tablesaw.api.*;",
            "import static org.meltbook.notebook.Cells.*;");

    private StartImports() {}
}
