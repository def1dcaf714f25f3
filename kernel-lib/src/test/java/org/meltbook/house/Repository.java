package org.meltbook.house;

import java.nio.file.Files;
import java.nio.file.Path;

/** Where the checked-in data lie, whichever folder of the repository the program was started in. */
public final class Repository {
    private Repository() {}

    /** The {@code data} folder of the repository. */
    public static Path data() {
        for (Path folder = Path.of("").toAbsolutePath(); folder != null; folder = folder.getParent()) {
            if (Files.isRegularFile(folder.resolve("data/README.md"))) {
                return folder.resolve("data");
            }
        }
        throw new IllegalStateException("no folder above " + Path.of("").toAbsolutePath() + " holds data/README.md");
    }
}
