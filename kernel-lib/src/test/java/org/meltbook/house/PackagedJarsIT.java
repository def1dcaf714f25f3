package org.meltbook.house;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.jar.Attributes;
import java.util.jar.JarFile;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;

/** What {@code mvn package} leaves: a plain library jar, and one program that has all it needs inside. */
class PackagedJarsIT {
    private static final Path PROGRAM = Path.of(System.getProperty("meltbook.jar"));

    @Test
    void the_library_jar_holds_the_library_and_nothing_else() throws IOException {
        try (JarFile jar = new JarFile(library().toFile())) {
            assertEquals(
                    List.of(), names(jar).filter(n -> n.contains("/inside/")).toList());
            assertEquals(
                    List.of(), names(jar).filter(n -> n.endsWith("Test.class")).toList());
            assertEquals(
                    List.of(),
                    names(jar)
                            .filter(n -> n.endsWith(".class") && !n.startsWith("org/meltbook/"))
                            .toList());
            assertTrue(text(jar, "META-INF/LICENSE").contains("Apache License"));
            assertEquals("org.meltbook", jar.getManifest().getMainAttributes().getValue("Automatic-Module-Name"));
        }
    }

    @Test
    void the_program_keeps_to_itself_what_must_not_leak_and_leaves_the_renderer_types_in_place() throws IOException {
        try (JarFile jar = new JarFile(PROGRAM.toFile())) {
            for (String hidden : List.of("com/google/gson/", "org/zeromq/", "org/objectweb/", "picocli/")) {
                assertEquals(
                        List.of(),
                        names(jar)
                                .filter(n -> n.startsWith(hidden) && n.endsWith(".class"))
                                .toList());
            }
            assertTrue(names(jar).anyMatch("org/dflib/jjava/jupyter/kernel/display/Renderer.class"::equals));
            assertEquals(
                    List.of(),
                    names(jar).filter(n -> n.endsWith("module-info.class")).toList());
        }
    }

    @Test
    void the_program_has_the_merged_services_the_licences_and_a_whole_manifest() throws IOException {
        try (JarFile jar = new JarFile(PROGRAM.toFile())) {
            // indriya, UCUM and SI each bring a provider of units.
            String providers = text(jar, "META-INF/services/javax.measure.spi.ServiceProvider");
            assertEquals(3, providers.lines().filter(l -> !l.isBlank()).count(), providers);
            assertTrue(text(jar, "META-INF/LICENSE").stripLeading().startsWith("Apache License"));
            assertTrue(text(jar, "META-INF/NOTICE").contains("Apache Commons Math"));
            Attributes manifest = jar.getManifest().getMainAttributes();
            assertEquals("org.meltbook.notebook.Main", manifest.getValue("Main-Class"));
            assertEquals("true", manifest.getValue("Multi-Release"));
        }
    }

    private static Path library() throws IOException {
        try (Stream<Path> files = Files.list(PROGRAM.resolveSibling("."))) {
            return files.filter(f -> f.getFileName().toString().matches("kernel-lib-[0-9.]+\\.jar"))
                    .findFirst()
                    .orElseThrow();
        }
    }

    private static Stream<String> names(JarFile jar) {
        return jar.stream().map(entry -> entry.getName());
    }

    private static String text(JarFile jar, String name) throws IOException {
        return new String(jar.getInputStream(jar.getEntry(name)).readAllBytes(), StandardCharsets.UTF_8);
    }
}
