package org.meltbook.kernel;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.google.gson.JsonArray;
import com.google.gson.JsonObject;
import com.google.gson.JsonParser;
import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Map;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

/** Attaching and detaching, in a folder of the test's own. */
class AttachmentTest {
    @TempDir
    Path folder;

    private Path jar() throws IOException {
        return Files.writeString(folder.resolve("program.jar"), "the program");
    }

    private static List<String> names(Path in) throws IOException {
        try (Stream<Path> files = Files.list(in)) {
            return files.map(f -> f.getFileName().toString()).sorted().toList();
        }
    }

    /** Places by Jupyter's documentation, "Common directories and file locations: data files". */
    @Test
    void looks_where_jupyter_looks() {
        Path home = Path.of("/home/q");
        assertEquals(
                Path.of("/data"),
                Attachment.dataFolder(Map.of("JUPYTER_DATA_DIR", "/data", "XDG_DATA_HOME", "/x"), "Linux", home));
        assertEquals(Path.of("/home/q/.local/share/jupyter"), Attachment.dataFolder(Map.of(), "Linux", home));
        assertEquals(Path.of("/x/jupyter"), Attachment.dataFolder(Map.of("XDG_DATA_HOME", "/x"), "Linux", home));
        assertEquals(Path.of("/home/q/Library/Jupyter"), Attachment.dataFolder(Map.of(), "Mac OS X", home));
        assertEquals(Path.of("/roam/jupyter"), Attachment.dataFolder(Map.of("APPDATA", "/roam"), "Windows 11", home));
        assertEquals(
                Path.of("/home/q/.local/share/jupyter"),
                Attachment.dataFolder(Map.of("JUPYTER_DATA_DIR", " "), "Linux", home));
    }

    /** Under LANG=C a folder such as /home/jürgen cannot be spelt; a zero byte cannot be in any language. */
    @Test
    void names_the_variable_whose_folder_cannot_be_spelt() {
        AttachmentException refused = assertThrows(
                AttachmentException.class,
                () -> Attachment.dataFolder(Map.of("JUPYTER_DATA_DIR", "/a\0b"), "Linux", Path.of("/home/q")));
        assertTrue(refused.getMessage().startsWith("JUPYTER_DATA_DIR names a folder that"), refused::getMessage);
    }

    @Test
    void writes_a_spec_with_absolute_paths_and_a_copy_of_the_program() throws IOException {
        Attachment attachment = Attachment.in(folder.resolve("jupyter"));
        String said = attachment.attach(jar(), "2g");
        Path kernel = folder.resolve("jupyter/kernels/meltbook");
        assertTrue(said.startsWith("Attached kernel 'meltbook'") && said.contains(kernel.toString()), said);
        assertEquals(List.of("kernel.json", "meltbook.jar"), names(kernel));
        assertEquals(List.of("meltbook"), names(kernel.getParent()));
        assertEquals("the program", Files.readString(kernel.resolve("meltbook.jar")));
        JsonObject spec = JsonParser.parseString(Files.readString(kernel.resolve("kernel.json")))
                .getAsJsonObject();
        assertEquals("Java (Meltbook)", spec.get("display_name").getAsString());
        assertEquals("java", spec.get("language").getAsString());
        assertEquals("message", spec.get("interrupt_mode").getAsString());
        JsonArray command = spec.getAsJsonArray("argv");
        assertTrue(Files.isExecutable(Path.of(command.get(0).getAsString())));
        assertEquals("-Xmx2g", command.get(1).getAsString());
        List<String> tail = List.of(
                "-jar", kernel.resolve("meltbook.jar").toAbsolutePath().toString(), "kernel", "{connection_file}");
        assertEquals(
                tail,
                Stream.iterate(command.size() - 4, i -> i + 1)
                        .limit(4)
                        .map(i -> command.get(i).getAsString())
                        .toList());
    }

    @Test
    void replaces_an_earlier_attachment_and_leaves_the_files_of_others() throws IOException {
        Attachment attachment = Attachment.in(folder.resolve("jupyter"));
        attachment.attach(jar(), "1g");
        Files.writeString(attachment.folder().resolve("logo-64x64.png"), "mine");
        Files.writeString(folder.resolve("program.jar"), "the next program");
        assertTrue(attachment.attach(folder.resolve("program.jar"), "2g").startsWith("Attached again"));
        assertEquals("the next program", Files.readString(attachment.folder().resolve("meltbook.jar")));
        assertTrue(attachment.detach().contains("holds other files and was left"));
        assertEquals(List.of("logo-64x64.png"), names(attachment.folder()));
    }

    @Test
    void can_attach_again_from_the_copy_itself() throws IOException {
        Attachment attachment = Attachment.in(folder.resolve("jupyter"));
        attachment.attach(jar(), "1g");
        attachment.attach(attachment.folder().resolve("meltbook.jar"), "2g");
        assertEquals("the program", Files.readString(attachment.folder().resolve("meltbook.jar")));
    }

    @Test
    void detaches_whole_and_says_so() throws IOException {
        Attachment attachment = Attachment.in(folder.resolve("jupyter"));
        attachment.attach(jar(), "1g");
        assertTrue(attachment.detach().startsWith("Detached kernel 'meltbook'"));
        assertFalse(Files.exists(attachment.folder()));
        assertTrue(attachment.detach().startsWith("Nothing to detach"));
    }

    @Test
    void does_not_touch_a_kernel_of_that_name_that_it_did_not_make() throws IOException {
        Attachment attachment = Attachment.in(folder.resolve("jupyter"));
        Files.createDirectories(attachment.folder());
        Files.writeString(attachment.folder().resolve("kernel.json"), "{}");
        Path jar = jar();
        assertThrows(AttachmentException.class, () -> attachment.attach(jar, "1g"));
        assertTrue(attachment.detach().startsWith("Nothing to detach"));
        assertEquals("{}", Files.readString(attachment.folder().resolve("kernel.json")));
    }

    @Test
    void says_that_the_folder_cannot_be_written() throws IOException {
        Files.writeString(folder.resolve("jupyter"), "a file in the way");
        Attachment attachment = Attachment.in(folder.resolve("jupyter"));
        Path jar = jar();
        AttachmentException thrown = assertThrows(AttachmentException.class, () -> attachment.attach(jar, "1g"));
        assertTrue(thrown.getMessage().contains(attachment.folder() + " cannot be written"), thrown.getMessage());
    }

    @Test
    void says_that_there_is_no_jar() {
        Attachment attachment = Attachment.in(folder);
        Path missing = folder.resolve("none.jar");
        AttachmentException thrown = assertThrows(AttachmentException.class, () -> attachment.attach(missing, "1g"));
        assertTrue(thrown.getMessage().contains("none.jar"), thrown.getMessage());
        assertFalse(Files.exists(attachment.folder()));
    }

    @Test
    void says_that_a_program_run_from_classes_cannot_be_attached() {
        AttachmentException thrown = assertThrows(AttachmentException.class, Attachment::runningJar);
        assertTrue(thrown.getMessage().contains("mvn package"), thrown.getMessage());
    }
}
