package org.meltbook.notebook;

import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;

/**
 * Finds the files that notebooks read. Notebooks lie in a folder of the project and data in another, and Jupyter starts
 * a kernel beside the notebook: so a name such as {@code data/published/x.csv}, or short {@code published/x.csv}, is
 * looked for beside the notebook, then one folder up, and so on to the first folder that has it.
 */
public final class DataFolder {
    /** The folder of the notebook that is run without Jupyter: the process has one working folder for all of them. */
    private static final String FOLDER = "meltbook.notebook.folder";

    private DataFolder() {}

    /**
     * The file or folder of that name, nearest first.
     *
     * @throws NotebookException if there is none; the message lists where it was looked for
     */
    public static Path find(String name) {
        return find(name, Path.of(System.getProperty(FOLDER, "")).toAbsolutePath());
    }

    static Path find(String name, Path start) {
        List<Path> looked = new ArrayList<>();
        for (Path folder = start.normalize(); folder != null; folder = folder.getParent()) {
            for (Path candidate :
                    List.of(folder.resolve(name), folder.resolve("data").resolve(name))) {
                if (Files.exists(candidate)) {
                    return candidate;
                }
                looked.add(candidate);
            }
        }
        StringBuilder message = new StringBuilder("no file '" + name + "'; looked for");
        looked.forEach(path -> message.append("\n  ").append(path));
        throw new NotebookException(message.toString());
    }

    /** From now on names are looked for from {@code folder} upwards, until {@link Place#restore}. */
    static Place enter(Path folder) {
        Place before = new Place(Optional.ofNullable(System.getProperty(FOLDER)));
        System.setProperty(FOLDER, folder.toString());
        return before;
    }

    /** Where names were looked for before. */
    record Place(Optional<String> folder) {
        void restore() {
            folder.ifPresentOrElse(f -> System.setProperty(FOLDER, f), () -> System.clearProperty(FOLDER));
        }
    }
}
