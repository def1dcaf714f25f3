package org.meltbook.kernel;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.google.gson.JsonObject;
import java.io.File;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.concurrent.TimeUnit;
import java.util.jar.Attributes;
import java.util.jar.JarOutputStream;
import java.util.jar.Manifest;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.junit.jupiter.api.Timeout;
import org.junit.jupiter.api.io.TempDir;
import org.meltbook.kernel.WireClient.Exchange;

/** A client over ZeroMQ speaks to the kernel in its own process; expectations are those of Jupyter messaging 5.3. */
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
@Timeout(value = 120, unit = TimeUnit.SECONDS)
class JupyterKernelTest {
    private static final String MAIN = KernelProgram.class.getName();

    @TempDir
    static Path folder;

    private WireClient client;

    @BeforeAll
    void start() throws IOException {
        client = launched();
    }

    @AfterAll
    void stop() {
        client.close();
    }

    private static WireClient launched() throws IOException {
        return WireClient.start(folder, program("-cp", System.getProperty("java.class.path"), MAIN), Map.of());
    }

    private static List<String> program(String... arguments) {
        List<String> command = new ArrayList<>();
        command.add(Path.of(System.getProperty("java.home"), "bin", "java").toString());
        command.addAll(List.of("-Xmx256m", "-XX:+UseSerialGC", "-Djava.awt.headless=true"));
        command.addAll(List.of(arguments));
        return command;
    }

    /** A jar that holds only a manifest: the entries that the packaged program has, and this test's class path. */
    private static Path jarOfThisClassPath() throws IOException {
        Manifest manifest = new Manifest();
        Attributes entries = manifest.getMainAttributes();
        entries.put(Attributes.Name.MANIFEST_VERSION, "1.0");
        entries.put(Attributes.Name.MAIN_CLASS, MAIN);
        entries.putValue("Launcher-Agent-Class", ExitGuard.class.getName());
        entries.putValue("Can-Retransform-Classes", "true");
        List<String> urls = new ArrayList<>();
        for (String entry : System.getProperty("java.class.path").split(File.pathSeparator)) {
            urls.add(Path.of(entry).toUri().toString());
        }
        entries.put(Attributes.Name.CLASS_PATH, String.join(" ", urls));
        Path jar = folder.resolve("kernel.jar");
        new JarOutputStream(Files.newOutputStream(jar), manifest).close();
        return jar;
    }

    @Test
    void tells_what_it_is_on_shell_and_control() {
        for (Exchange told : List.of(
                client.exchange("kernel_info_request", Map.of()), client.onControl("kernel_info_request", Map.of()))) {
            assertEquals("ok", told.status());
            assertEquals("kernel_info_reply", WireClient.type(told.reply()));
            assertEquals("meltbook", told.content().get("implementation").getAsString());
            assertEquals("5.3", told.content().get("protocol_version").getAsString());
            JsonObject language = told.content().getAsJsonObject("language_info");
            assertEquals("java", language.get("name").getAsString());
            assertEquals("text/x-java-source", language.get("mimetype").getAsString());
            assertEquals(".java", language.get("file_extension").getAsString());
        }
    }

    @Test
    void is_busy_before_and_idle_after_each_request() {
        for (String type : List.of("kernel_info_request", "history_request", "comm_info_request")) {
            List<JsonObject> said = client.exchange(type, Map.of()).broadcasts();
            assertTrue(WireClient.isState(said.get(0), "busy"), type);
            assertTrue(WireClient.isState(said.get(said.size() - 1), "idle"), type);
        }
    }

    @Test
    void runs_a_cell_and_gives_input_output_and_result_in_order() {
        Exchange ran = client.execute("System.out.println(\"η₀\");\nSystem.err.print(\"!\");\n6 * 7");
        assertEquals("ok", ran.status());
        assertEquals(
                List.of("status", "execute_input", "stream", "stream", "execute_result", "status"),
                ran.broadcasts().stream().map(WireClient::type).toList());
        assertEquals("η₀" + System.lineSeparator(), ran.printed("stdout"));
        assertEquals("!", ran.printed("stderr"));
        assertEquals("42", ran.resultText());
        int count = ran.content().get("execution_count").getAsInt();
        assertEquals(
                count, ran.all("execute_result").get(0).get("execution_count").getAsInt());
        assertEquals(
                count + 1, client.execute("1").content().get("execution_count").getAsInt());
    }

    @Test
    void joins_many_small_prints_into_few_messages() {
        Exchange ran = client.execute("for (int i = 0; i < 20_000; i++) System.out.print(i % 10);");
        assertEquals(20_000, ran.printed("stdout").length());
        assertTrue(ran.all("stream").size() < 200, () -> ran.all("stream").size() + " messages");
    }

    @Test
    void sends_what_is_printed_while_the_cell_still_runs() {
        String id = client.send("execute_request", Map.of("code", "System.out.print(\"on my way\");\nwhile (true) {}"));
        JsonObject said = client.heard(m -> WireClient.type(m).equals("stream"));
        assertEquals("on my way", said.getAsJsonObject("content").get("text").getAsString());
        client.sendOnControl("interrupt_request");
        assertEquals("Interrupted", client.collect(id).content().get("ename").getAsString());
        client.interruptReply();
    }

    @Test
    void keeps_silent_when_asked_to() {
        int before = client.execute("1").content().get("execution_count").getAsInt();
        Exchange ran = client.exchange("execute_request", Map.of("code", "41 + 1", "silent", true));
        assertEquals(
                List.of("status", "status"),
                ran.broadcasts().stream().map(WireClient::type).toList());
        assertEquals(before, ran.content().get("execution_count").getAsInt());
    }

    @Test
    void tells_an_error_in_reply_and_broadcast() {
        Exchange ran = client.execute("int zero = 0;\n1 / zero");
        assertEquals("error", ran.status());
        assertEquals("ArithmeticException", ran.content().get("ename").getAsString());
        assertEquals("/ by zero", ran.content().get("evalue").getAsString());
        JsonObject error = ran.all("error").get(0);
        assertEquals(
                "line 2: 1 / zero", error.getAsJsonArray("traceback").get(1).getAsString());
    }

    @Test
    void aborts_the_cells_that_wait_behind_a_failed_one() {
        String failing = client.send(
                "execute_request",
                Map.of("code", "System.in.read();\nthrow new RuntimeException();", "allow_stdin", true));
        String waiting = client.send("execute_request", Map.of("code", "int never = 1;"));
        String info = client.send("kernel_info_request", Map.of());
        client.answer(client.question(), "go on");
        assertEquals("error", client.collect(failing).status());
        assertEquals("aborted", client.collect(waiting).status());
        assertEquals("ok", client.collect(info).status());
    }

    @Test
    void runs_the_next_cell_after_a_failed_one_if_asked_not_to_stop() {
        String failing =
                client.send("execute_request", Map.of("code", "throw new RuntimeException();", "stop_on_error", false));
        String waiting = client.send("execute_request", Map.of("code", "int still = 1;"));
        assertEquals("error", client.collect(failing).status());
        assertEquals("ok", client.collect(waiting).status());
    }

    @Test
    void counts_the_cursor_in_code_points_when_it_completes() {
        String code = "var flames = \"🜂🜂\"; flames.subs";
        int points = code.codePointCount(0, code.length());
        Exchange found = client.exchange("complete_request", Map.of("code", code, "cursor_pos", points));
        assertEquals("ok", found.status());
        assertEquals(
                "substring(", found.content().getAsJsonArray("matches").get(0).getAsString());
        assertEquals(points - 4, found.content().get("cursor_start").getAsInt());
        assertEquals(points, found.content().get("cursor_end").getAsInt());
    }

    @Test
    void inspects_a_name_and_says_when_nothing_is_known() {
        Exchange found =
                client.exchange("inspect_request", Map.of("code", "Rows.titled", "cursor_pos", 11, "detail_level", 0));
        assertEquals("ok", found.status());
        assertTrue(found.content().get("found").getAsBoolean());
        String text = found.content().getAsJsonObject("data").get("text/plain").getAsString();
        assertTrue(text.contains("titled(String title)"), text);
        Exchange none = client.exchange("inspect_request", Map.of("code", "nix", "cursor_pos", 3, "detail_level", 0));
        assertEquals("ok", none.status());
        assertFalse(none.content().get("found").getAsBoolean());
    }

    @Test
    void tells_whether_a_cell_is_complete() {
        Map<String, String> expected = Map.of("1 + 2", "complete", "if (true) {", "incomplete", "}", "invalid");
        expected.forEach((code, status) -> assertEquals(
                status,
                client.exchange("is_complete_request", Map.of("code", code)).status()));
    }

    @Test
    void answers_history_and_comm_info_though_it_has_none() {
        Exchange history = client.exchange(
                "history_request", Map.of("output", false, "raw", true, "hist_access_type", "tail", "n", 10));
        assertEquals("ok", history.status());
        assertEquals(0, history.content().getAsJsonArray("history").size());
        Exchange comms = client.exchange("comm_info_request", Map.of());
        assertEquals("ok", comms.status());
        assertEquals(0, comms.content().getAsJsonObject("comms").size());
    }

    @Test
    void closes_a_comm_that_nobody_here_knows() {
        client.send("comm_open", Map.of("comm_id", "c-1", "target_name", "unknown", "data", Map.of()));
        JsonObject closed = client.heard(m -> WireClient.type(m).equals("comm_close"));
        assertEquals("c-1", closed.getAsJsonObject("content").get("comm_id").getAsString());
    }

    @Test
    void asks_for_input_and_takes_the_answer() {
        String id = client.send(
                "execute_request", Map.of("code", "new Scanner(System.in, \"UTF-8\").nextLine()", "allow_stdin", true));
        JsonObject question = client.question();
        assertEquals("input_request", WireClient.type(question));
        client.answer(question, "190 °C");
        assertEquals("190 °C", client.collect(id).resultText());
    }

    @Test
    void lives_on_after_a_question_about_what_is_nested_too_deeply() {
        Exchange asked = client.collect(client.send("is_complete_request", Map.of("code", "f(".repeat(9_000))));
        assertEquals("error", asked.content().get("status").getAsString());
        assertEquals("42", client.execute("42").resultText());
    }

    @Test
    void stops_a_question_on_interrupt() {
        String id = client.send("execute_request", Map.of("code", "System.in.read()", "allow_stdin", true));
        client.question();
        client.sendOnControl("interrupt_request");
        assertEquals("Interrupted", client.collect(id).content().get("ename").getAsString());
        client.interruptReply();
        assertEquals("42", client.execute("42").resultText());
    }

    @Test
    void stops_an_endless_loop_and_a_sleep_on_interrupt() {
        for (String endless : List.of("while (true) {}", "Thread.sleep(10_000_000);")) {
            String id = client.send("execute_request", Map.of("code", "System.out.print(\"go\");\n" + endless));
            client.heard(m -> WireClient.type(m).equals("stream"));
            client.sendOnControl("interrupt_request");
            Exchange ended = client.collect(id);
            assertEquals("error", ended.status());
            assertEquals("Interrupted", ended.content().get("ename").getAsString());
            assertEquals("ok", client.interruptReply().get("status").getAsString());
            assertEquals("42", client.execute("42").resultText());
        }
    }

    @Test
    void says_no_to_system_exit_and_lives() {
        Exchange ran = client.execute("System.exit(0);");
        assertEquals("error", ran.status());
        assertEquals("ExitRefused", ran.content().get("ename").getAsString());
        assertTrue(client.process.isAlive());
        assertEquals("42", client.execute("42").resultText());
    }

    @Test
    void passes_over_what_is_wrongly_signed_or_no_message() {
        client.sendSignedWith("not the key", "execute_request", Map.of("code", "int forged = 1;"));
        client.sendFrames("nonsense");
        client.sendFrames("<IDS|MSG>", "signature", "{");
        client.sendFrames("<IDS|MSG>", "signature", "{}", "{}", "{}", "not json");
        Exchange ran = client.execute("forged");
        assertEquals("CompileError", ran.content().get("ename").getAsString());
    }

    @Test
    void lives_on_after_a_request_whose_content_makes_no_sense() {
        assertEquals(
                "error",
                client.exchange("complete_request", Map.of("cursor_pos", "x")).status());
        assertEquals("error", client.exchange("is_complete_request", Map.of()).status());
        assertEquals("42", client.execute("42").resultText());
    }

    @Test
    void echoes_the_heartbeat() {
        assertEquals("melt", client.beat("melt"));
    }

    @Test
    void ends_when_told_to_even_while_a_cell_runs() throws Exception {
        for (String code : List.of("int idle = 1;", "System.out.print(\"go\");\nwhile (true) {}")) {
            try (WireClient other = launched()) {
                other.send("execute_request", Map.of("code", code));
                if (code.contains("go")) {
                    other.heard(m -> WireClient.type(m).equals("stream"));
                }
                Exchange told = other.onControl("shutdown_request", Map.of("restart", false));
                assertEquals("ok", told.status());
                assertFalse(told.content().get("restart").getAsBoolean());
                assertTrue(other.process.waitFor(30, TimeUnit.SECONDS), "still there");
                assertEquals(0, other.process.exitValue());
            }
        }
    }

    @Test
    void says_no_to_an_exit_by_reflection_and_ends_itself_all_the_same() throws Exception {
        try (WireClient other =
                WireClient.start(folder, program("-jar", jarOfThisClassPath().toString()), Map.of())) {
            for (String name : List.of("exit", "halt")) {
                Exchange ran = other.execute("var way = Runtime.class.getMethod(\"" + name + "\", int.class);\n"
                        + "way.invoke(Runtime.getRuntime(), 3);");
                assertEquals(
                        "InvocationTargetException", ran.content().get("ename").getAsString());
                String said = ran.content().getAsJsonArray("traceback").toString();
                assertTrue(said.contains("SecurityException: " + ExitRefused.MESSAGE), said);
            }
            assertEquals("42", other.execute("42").resultText());
            other.exchange("shutdown_request", Map.of("restart", false));
            assertTrue(other.process.waitFor(30, TimeUnit.SECONDS), "still there");
            assertEquals(0, other.process.exitValue());
        }
    }

    @Test
    void ends_when_its_parent_ends() throws Exception {
        Process parent = new ProcessBuilder(program("-cp", System.getProperty("java.class.path"), MAIN)).start();
        List<String> command = program("-cp", System.getProperty("java.class.path"), MAIN);
        try (WireClient other =
                WireClient.start(folder, command, Map.of("JPY_PARENT_PID", Long.toString(parent.pid())))) {
            assertEquals("42", other.execute("42").resultText());
            parent.getOutputStream().close();
            assertTrue(other.process.waitFor(30, TimeUnit.SECONDS), "still there");
        } finally {
            parent.destroy();
        }
    }

    @Test
    void does_not_serve_with_imports_that_cannot_be_compiled() throws IOException {
        Path file = WireClient.connectionFile(folder, "some-key", WireClient.freePorts(5));
        Settings wrong = Settings.plain().importing(List.of("import no.such.Thing;"));
        IllegalArgumentException thrown =
                assertThrows(IllegalArgumentException.class, () -> JupyterKernel.serve(file, wrong));
        assertTrue(thrown.getMessage().contains("import no.such.Thing;"), thrown.getMessage());
    }

    @Test
    void says_why_it_cannot_serve() throws Exception {
        List<String> command = program("-cp", System.getProperty("java.class.path"), MAIN, "no-such-file.json");
        Process process = new ProcessBuilder(command).redirectErrorStream(true).start();
        String said = new String(process.getInputStream().readAllBytes(), StandardCharsets.UTF_8);
        assertEquals(1, process.waitFor());
        assertTrue(said.contains("no-such-file.json"), said);
    }
}
