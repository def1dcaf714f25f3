package org.meltbook.jupyter;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.google.gson.JsonArray;
import com.google.gson.JsonElement;
import com.google.gson.JsonObject;
import com.google.gson.JsonParser;
import java.io.IOException;
import java.net.URI;
import java.net.http.HttpClient;
import java.net.http.HttpRequest;
import java.net.http.HttpResponse;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.StandardCopyOption;
import java.time.Duration;
import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.TimeUnit;
import java.util.stream.Stream;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.Assumptions;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

/**
 * The attached kernel in Jupyter itself: run by nbconvert, and in Jupyter Notebook shown by Chromium. Where these are
 * not installed the tests say so in one line and are passed over; with the environment variable
 * {@code MELTBOOK_REQUIRE_JUPYTER} set they fail instead.
 */
class JupyterIT {
    private static final Path ROOT = Path.of(System.getProperty("meltbook.root"));
    private static final Path JAR = Path.of(System.getProperty("meltbook.jar"));
    private static final Path SCREENS = ROOT.resolve("kernel-lib/target/screens");

    @TempDir
    static Path home;

    private static boolean attached;

    @BeforeAll
    static void attach() throws IOException, InterruptedException {
        if (!present("jupyter", "--version")) {
            return;
        }
        String said = run(List.of(java(), "-jar", JAR.toString(), "attach"), Duration.ofMinutes(1));
        assertTrue(said.contains(home.resolve("data").toString()), said);
        attached = true;
    }

    @AfterAll
    static void detach() throws IOException, InterruptedException {
        if (attached) {
            run(List.of(java(), "-jar", JAR.toString(), "detach"), Duration.ofMinutes(1));
            assertFalse(Files.exists(home.resolve("data/kernels/meltbook")));
        }
    }

    @Test
    void nbconvert_runs_the_first_notebook_in_the_attached_kernel() throws IOException, InterruptedException {
        needs("jupyter", "nbconvert", "--version");
        Path project = copyOfTheProject();
        run(
                List.of(
                        "jupyter",
                        "nbconvert",
                        "--to",
                        "notebook",
                        "--execute",
                        "--ExecutePreprocessor.timeout=300",
                        "--output=executed.ipynb",
                        project.resolve("notebooks/00-first-look.ipynb").toString()),
                Duration.ofMinutes(8));
        JsonObject executed = JsonParser.parseString(Files.readString(project.resolve("notebooks/executed.ipynb")))
                .getAsJsonObject();
        JsonObject stored = JsonParser.parseString(Files.readString(ROOT.resolve("notebooks/00-first-look.ipynb")))
                .getAsJsonObject();
        assertEquals(plainTexts(stored), plainTexts(executed), "Jupyter and the headless runner must agree");
    }

    @Test
    void notebook_in_the_browser_runs_all_cells_and_shows_table_and_figure() throws IOException, InterruptedException {
        needs("jupyter", "notebook", "--version");
        needs("chromedriver", "--version");
        Path project = copyOfTheProject();
        URI address = URI.create("http://127.0.0.1:" + Browser.freePort() + "/");
        Process server = command(List.of(
                        "jupyter",
                        "notebook",
                        "--no-browser",
                        "--allow-root",
                        "--ip=127.0.0.1",
                        "--port=" + address.getPort(),
                        "--NotebookApp.port_retries=0",
                        "--NotebookApp.token=",
                        "--NotebookApp.password=",
                        "--notebook-dir=" + project))
                .redirectOutput(home.resolve("notebook.log").toFile())
                .start();
        try (Browser browser = Browser.open(Files.createDirectories(home.resolve("profile")))) {
            answering(server, address);
            browser.go(address + "notebooks/notebooks/00-first-look.ipynb");
            Waiting.until(
                    "the notebook is open and its kernel idle",
                    Duration.ofMinutes(2),
                    () -> browser.holds("window.Jupyter && Jupyter.notebook && Jupyter.notebook.kernel"
                            + " && Jupyter.notebook.kernel.is_connected() && !Jupyter.notebook.kernel_busy"));
            browser.script("Jupyter.notebook.clear_all_output(); Jupyter.notebook.execute_all_cells();");
            Waiting.until(
                    "every cell has run",
                    Duration.ofMinutes(5),
                    () -> browser.holds("Jupyter.notebook.get_cells().filter(c => c.cell_type === 'code')"
                            + ".every(c => /^\\d+$/.test(String(c.input_prompt_number)))"
                            + " && !Jupyter.notebook.kernel_busy"));
            browser.script("document.querySelector('.output_area table').scrollIntoView();");
            browser.screenshot(SCREENS.resolve("notebook-table.png"));
            assertTrue(browser.holds("document.querySelectorAll('.output_area table td').length > 10"), "a table");
            assertTrue(
                    browser.holds("Array.from(document.querySelectorAll('.output_area img'))"
                            + ".some(i => i.complete && i.naturalWidth > 300 && i.naturalHeight > 200)"),
                    "a figure");
            assertTrue(browser.holds("document.querySelectorAll('.output_error').length === 0"), "no error");
            browser.script("document.querySelector('.output_area img').scrollIntoView();");
            browser.screenshot(SCREENS.resolve("notebook-figure.png"));
        } finally {
            end(server);
        }
    }

    /** Waits until the server answers at its address. */
    private static void answering(Process server, URI address) throws InterruptedException {
        HttpClient client = HttpClient.newHttpClient();
        HttpRequest status = HttpRequest.newBuilder(address.resolve("api")).build();
        Waiting.until("Jupyter Notebook answers", Duration.ofMinutes(1), () -> {
            try {
                return client.send(status, HttpResponse.BodyHandlers.discarding())
                                .statusCode()
                        == 200;
            } catch (IOException notYet) {
                return false;
            } catch (InterruptedException stopped) {
                Thread.currentThread().interrupt();
                return false;
            }
        });
        assertTrue(server.isAlive(), "another server answers at " + address);
    }

    private static void end(Process server) throws InterruptedException {
        server.descendants().forEach(ProcessHandle::destroy);
        server.destroy();
        if (!server.waitFor(20, TimeUnit.SECONDS)) {
            server.destroyForcibly();
        }
    }

    /** Notebooks and data in a folder of their own, so that a run leaves nothing in the project. */
    private static Path copyOfTheProject() throws IOException {
        Path project = Files.createTempDirectory(home, "project");
        for (String part : List.of("notebooks", "data")) {
            try (Stream<Path> files = Files.walk(ROOT.resolve(part))) {
                for (Path file : files.toList()) {
                    Path copy = project.resolve(ROOT.relativize(file).toString());
                    if (Files.isDirectory(file)) {
                        Files.createDirectories(copy);
                    } else {
                        Files.copy(file, copy, StandardCopyOption.REPLACE_EXISTING);
                    }
                }
            }
        }
        return project;
    }

    private static List<String> plainTexts(JsonObject notebook) {
        List<String> texts = new ArrayList<>();
        for (JsonElement cell : notebook.getAsJsonArray("cells")) {
            if (!cell.getAsJsonObject().has("outputs")) {
                continue;
            }
            for (JsonElement output : cell.getAsJsonObject().getAsJsonArray("outputs")) {
                JsonObject shown = output.getAsJsonObject();
                assertFalse(shown.get("output_type").getAsString().equals("error"), shown.toString());
                if (shown.has("data")) {
                    texts.add(joined(shown.getAsJsonObject("data").get("text/plain")));
                }
            }
        }
        return texts;
    }

    private static String joined(JsonElement text) {
        if (!text.isJsonArray()) {
            return text.getAsString();
        }
        StringBuilder all = new StringBuilder();
        ((JsonArray) text).forEach(line -> all.append(line.getAsString()));
        return all.toString();
    }

    private static void needs(String... command) {
        boolean there = present(command);
        boolean required = System.getenv("MELTBOOK_REQUIRE_JUPYTER") != null;
        assertTrue(there || !required, "required here, but not found: " + String.join(" ", command));
        if (!there) {
            System.out.println(
                    "A test with the real Jupyter was not run: '" + String.join(" ", command) + "' is not there.");
        }
        Assumptions.assumeTrue(there);
    }

    private static boolean present(String... command) {
        try {
            Process process = command(List.of(command))
                    .redirectOutput(ProcessBuilder.Redirect.DISCARD)
                    .start();
            return process.waitFor(60, TimeUnit.SECONDS) && process.exitValue() == 0;
        } catch (IOException absent) {
            return false;
        } catch (InterruptedException stopped) {
            Thread.currentThread().interrupt();
            return false;
        }
    }

    private static String run(List<String> command, Duration limit) throws IOException, InterruptedException {
        Path said = Files.createTempFile(home, "said", ".txt");
        Process process = command(command).redirectOutput(said.toFile()).start();
        boolean ended = process.waitFor(limit.toSeconds(), TimeUnit.SECONDS);
        if (!ended) {
            process.destroyForcibly();
        }
        String text = Files.readString(said, StandardCharsets.UTF_8);
        assertTrue(ended, "did not end within " + limit + ": " + command + "\n" + text);
        assertEquals(0, process.exitValue(), command + "\n" + text);
        return text;
    }

    private static ProcessBuilder command(List<String> words) {
        ProcessBuilder process = new ProcessBuilder(words).redirectErrorStream(true);
        process.environment().put("JUPYTER_DATA_DIR", home.resolve("data").toString());
        process.environment().put("JUPYTER_CONFIG_DIR", home.resolve("config").toString());
        process.environment().put("JUPYTER_RUNTIME_DIR", home.resolve("runtime").toString());
        process.environment().put("IPYTHONDIR", home.resolve("ipython").toString());
        return process;
    }

    private static String java() {
        return ProcessHandle.current().info().command().orElse("java");
    }
}
