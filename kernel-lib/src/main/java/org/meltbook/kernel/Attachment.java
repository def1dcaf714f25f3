package org.meltbook.kernel;

import com.google.gson.GsonBuilder;
import java.io.IOException;
import java.io.UncheckedIOException;
import java.net.URISyntaxException;
import java.net.URL;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.InvalidPathException;
import java.nio.file.Path;
import java.nio.file.StandardCopyOption;
import java.security.CodeSource;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.stream.Stream;

/**
 * Makes the kernel known to every Jupyter of one user, and takes it away again. Jupyter looks for kernels in a data
 * folder of the user; attaching puts a folder {@code kernels/meltbook} there with a copy of the program.
 */
public final class Attachment {
    private static final String KERNEL = "meltbook";
    private static final String JAR = "meltbook.jar";
    private static final String SPEC = "kernel.json";

    private final Path folder;

    private Attachment(Path dataFolder) {
        folder = dataFolder.resolve("kernels").resolve(KERNEL).toAbsolutePath().normalize();
    }

    /** The attachment for the user who runs this process. */
    public static Attachment forUser() {
        return in(dataFolder(
                System.getenv(), System.getProperty("os.name", ""), Path.of(System.getProperty("user.home"))));
    }

    /** The attachment in the given Jupyter data folder. */
    public static Attachment in(Path dataFolder) {
        return new Attachment(dataFolder);
    }

    /**
     * Jupyter's data folder: {@code JUPYTER_DATA_DIR} if set, else the platform's place.
     *
     * @param environment environment variables
     * @param osName      name of the operating system as Java gives it
     * @param home        the user's home folder
     */
    public static Path dataFolder(Map<String, String> environment, String osName, Path home) {
        Optional<Path> asked = folderNamed(environment, "JUPYTER_DATA_DIR");
        if (asked.isPresent()) {
            return asked.get();
        }
        String os = osName.toLowerCase(Locale.ROOT);
        if (os.startsWith("mac")) {
            return home.resolve("Library").resolve("Jupyter");
        }
        if (os.startsWith("windows")) {
            return folderNamed(environment, "APPDATA")
                    .orElse(home.resolve("AppData").resolve("Roaming"))
                    .resolve("jupyter");
        }
        return folderNamed(environment, "XDG_DATA_HOME")
                .orElse(home.resolve(".local").resolve("share"))
                .resolve("jupyter");
    }

    /**
     * The jar from which this program runs.
     *
     * @throws AttachmentException if it runs from a folder of classes
     */
    public static Path runningJar() {
        CodeSource source = Attachment.class.getProtectionDomain().getCodeSource();
        URL place = source == null ? null : source.getLocation();
        try {
            Path path = place == null ? Path.of("unknown") : Path.of(place.toURI());
            if (Files.isRegularFile(path)) {
                return path;
            }
            throw new AttachmentException("cannot attach: this program runs from the folder " + path
                    + ", not from a jar. Build it with `mvn package` and run `java -jar kernel-lib/target/meltbook.jar"
                    + " attach`.");
        } catch (URISyntaxException e) {
            throw new AttachmentException("cannot attach: this program runs from " + place + ", which is no file", e);
        }
    }

    /** Where the kernel is, or would be, attached. */
    public Path folder() {
        return folder;
    }

    /**
     * Copies the program and writes the kernel spec; an earlier attachment is replaced.
     *
     * @param jar     the runnable jar
     * @param maxHeap largest heap of the kernel as the JVM's {@code -Xmx} takes it, such as {@code 2g}
     * @return what was done and where, in a few lines
     * @throws AttachmentException if there is no such jar or the folder cannot be written
     */
    public String attach(Path jar, String maxHeap) {
        if (!Files.isRegularFile(jar)) {
            throw new AttachmentException("cannot attach: there is no jar " + jar.toAbsolutePath());
        }
        boolean replaced = isOurs();
        if (!replaced && Files.exists(folder)) {
            throw new AttachmentException(
                    "cannot attach: " + folder + " exists and was not made by attach; move it away");
        }
        Path aside = folder.resolveSibling(
                "." + KERNEL + "-" + ProcessHandle.current().pid());
        try {
            Files.createDirectories(aside);
            Files.copy(jar, aside.resolve(JAR), StandardCopyOption.REPLACE_EXISTING);
            Files.writeString(aside.resolve(SPEC), spec(maxHeap), StandardCharsets.UTF_8);
            Files.createDirectories(folder);
            // The spec comes last: without it Jupyter does not see the kernel.
            moved(aside.resolve(JAR), folder.resolve(JAR));
            moved(aside.resolve(SPEC), folder.resolve(SPEC));
        } catch (IOException | UncheckedIOException e) {
            throw new AttachmentException("cannot attach: " + folder + " cannot be written: " + reason(e), e);
        } finally {
            removeAside(aside);
        }
        return (replaced ? "Attached again" : "Attached") + " kernel '" + KERNEL + "' (shown as Java (Meltbook)) in\n  "
                + folder + "\nThe program was copied there, so the build folder may go. Undo with `detach`.";
    }

    /**
     * Removes what {@link #attach} made, and nothing else.
     *
     * @return what was done and where, in a few lines
     * @throws AttachmentException if the files cannot be removed
     */
    public String detach() {
        if (!isOurs()) {
            return "Nothing to detach: there is no kernel '" + KERNEL + "' in\n  " + folder;
        }
        try {
            boolean empty = removeOurFiles(folder);
            return "Detached kernel '" + KERNEL + "': removed from\n  " + folder
                    + (empty ? "" : "\nThe folder holds other files and was left.");
        } catch (IOException e) {
            throw new AttachmentException("cannot detach: " + folder + " cannot be removed: " + reason(e), e);
        }
    }

    private boolean isOurs() {
        return Files.isRegularFile(folder.resolve(SPEC)) && Files.isRegularFile(folder.resolve(JAR));
    }

    private String spec(String maxHeap) {
        Map<String, Object> spec = new LinkedHashMap<>();
        spec.put(
                "argv",
                List.of(
                        javaProgram(),
                        "-Xmx" + maxHeap,
                        "-XX:+UseSerialGC",
                        "-Djava.awt.headless=true",
                        "-jar",
                        folder.resolve(JAR).toString(),
                        "kernel",
                        "{connection_file}"));
        spec.put("display_name", "Java (Meltbook)");
        spec.put("language", "java");
        spec.put("interrupt_mode", "message");
        return new GsonBuilder()
                        .setPrettyPrinting()
                        .disableHtmlEscaping()
                        .create()
                        .toJson(spec) + "\n";
    }

    private static String javaProgram() {
        return ProcessHandle.current()
                .info()
                .command()
                .orElse(Path.of(System.getProperty("java.home"), "bin", "java").toString());
    }

    private static boolean removeOurFiles(Path folder) throws IOException {
        if (!Files.isDirectory(folder)) {
            return true;
        }
        Files.deleteIfExists(folder.resolve(SPEC));
        Files.deleteIfExists(folder.resolve(JAR));
        try (Stream<Path> rest = Files.list(folder)) {
            if (rest.findAny().isPresent()) {
                return false;
            }
        }
        Files.delete(folder);
        return true;
    }

    private static void removeAside(Path aside) {
        try {
            removeOurFiles(aside);
        } catch (IOException e) {
            // What is left is a hidden folder without meaning to Jupyter; the first failure, if any, is the one to
            // tell.
            return;
        }
    }

    private static void moved(Path from, Path to) throws IOException {
        Files.move(from, to, StandardCopyOption.REPLACE_EXISTING, StandardCopyOption.ATOMIC_MOVE);
    }

    private static Optional<Path> folderNamed(Map<String, String> environment, String variable) {
        return Optional.ofNullable(environment.get(variable))
                .filter(v -> !v.isBlank())
                .map(v -> folder(variable, v));
    }

    private static Path folder(String variable, String name) {
        try {
            return Path.of(name);
        } catch (InvalidPathException e) {
            throw new AttachmentException(
                    variable + " names a folder that this system's language setting (LANG, LC_ALL) cannot spell: '"
                            + name + "'; set a UTF-8 one, such as LC_ALL=C.UTF-8",
                    e);
        }
    }

    private static String reason(Exception e) {
        Throwable cause = e instanceof UncheckedIOException ? e.getCause() : e;
        return cause.getClass().getSimpleName() + " " + cause.getMessage();
    }
}
