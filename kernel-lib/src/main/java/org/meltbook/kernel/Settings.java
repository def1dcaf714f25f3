package org.meltbook.kernel;

import java.io.File;
import java.util.List;
import java.util.Objects;
import java.util.function.Predicate;
import org.dflib.jjava.jupyter.kernel.display.Renderer;

/**
 * What a session is opened with.
 *
 * @param classPath       jars and folders that cells are compiled against; the classes themselves come from this
 *                        process where it has them
 * @param imports         import declarations run before the first cell, as written in Java
 * @param renderer        turns a cell's value into the forms in which it can be shown
 * @param speaksForItself tells the exceptions whose message is all that a reader needs: shown without kind and frames
 */
public record Settings(
        List<String> classPath, List<String> imports, Renderer renderer, Predicate<Throwable> speaksForItself) {
    /** Copies the lists. */
    public Settings {
        classPath = List.copyOf(classPath);
        imports = List.copyOf(imports);
        Objects.requireNonNull(renderer, "renderer");
        Objects.requireNonNull(speaksForItself, "speaksForItself");
    }

    /** Settings with the class path of this process, no imports, and a renderer that knows text only. */
    public static Settings plain() {
        String path = System.getProperty("java.class.path", "");
        List<String> entries = path.isEmpty() ? List.of() : List.of(path.split(File.pathSeparator));
        return new Settings(entries, List.of(), new Renderer(), thrown -> false);
    }

    /** The same with other imports. */
    public Settings importing(List<String> declarations) {
        return new Settings(classPath, declarations, renderer, speaksForItself);
    }

    /** The same with another renderer. */
    public Settings rendering(Renderer other) {
        return new Settings(classPath, imports, other, speaksForItself);
    }

    /** The same with another rule for the exceptions whose message is enough. */
    public Settings trustingMessagesOf(Predicate<Throwable> rule) {
        return new Settings(classPath, imports, renderer, rule);
    }
}
