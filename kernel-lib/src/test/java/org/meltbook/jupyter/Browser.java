package org.meltbook.jupyter;

import com.google.gson.Gson;
import com.google.gson.JsonElement;
import com.google.gson.JsonObject;
import com.google.gson.JsonParser;
import java.io.IOException;
import java.net.ServerSocket;
import java.net.URI;
import java.net.http.HttpClient;
import java.net.http.HttpRequest;
import java.net.http.HttpResponse;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.Duration;
import java.util.Base64;
import java.util.List;
import java.util.Map;
import java.util.concurrent.TimeUnit;

/** Chromium without a window, driven through the W3C WebDriver protocol by chromedriver. */
final class Browser implements AutoCloseable {
    private static final Gson GSON = new Gson();
    private final HttpClient client = HttpClient.newHttpClient();
    private final Process driver;
    private final String session;

    private Browser(Process driver, int port, Path profile) throws IOException, InterruptedException {
        this.driver = driver;
        String root = "http://127.0.0.1:" + port;
        Waiting.until("chromedriver answers", Duration.ofSeconds(30), () -> ready(root));
        Map<String, Object> options = Map.of(
                "args",
                List.of(
                        "--headless=new",
                        "--no-sandbox",
                        "--disable-gpu",
                        "--disable-dev-shm-usage",
                        "--no-first-run",
                        "--disable-background-networking",
                        "--disable-component-update",
                        "--disable-sync",
                        "--window-size=1280,1800",
                        "--user-data-dir=" + profile));
        JsonObject made = post(
                        root + "/session",
                        Map.of("capabilities", Map.of("alwaysMatch", Map.of("goog:chromeOptions", options))))
                .getAsJsonObject();
        this.session = root + "/session/" + made.get("sessionId").getAsString();
    }

    /** A browser with an empty profile in {@code profile}. */
    static Browser open(Path profile) throws IOException, InterruptedException {
        int port = freePort();
        Process driver = new ProcessBuilder("chromedriver", "--port=" + port)
                .redirectErrorStream(true)
                .redirectOutput(profile.resolve("chromedriver.log").toFile())
                .start();
        try {
            return new Browser(driver, port, profile);
        } catch (IOException | InterruptedException | RuntimeException failed) {
            driver.destroyForcibly();
            throw failed;
        }
    }

    /** A port of this machine that nobody listens at. */
    static int freePort() throws IOException {
        try (ServerSocket free = new ServerSocket(0)) {
            return free.getLocalPort();
        }
    }

    private boolean ready(String root) {
        try {
            return get(root + "/status").getAsJsonObject().get("ready").getAsBoolean();
        } catch (IOException notYet) {
            return false;
        } catch (InterruptedException stopped) {
            Thread.currentThread().interrupt();
            return false;
        }
    }

    /** Opens a page. */
    void go(String url) throws IOException, InterruptedException {
        post(session + "/url", Map.of("url", url));
    }

    /** What a script gives when run in the page. */
    JsonElement script(String body) throws IOException, InterruptedException {
        return post(session + "/execute/sync", Map.of("script", body, "args", List.of()));
    }

    /** Whether a script gives true; false while the page is not ready for it. */
    boolean holds(String condition) {
        try {
            JsonElement answer = script("return Boolean(" + condition + ");");
            return answer.isJsonPrimitive() && answer.getAsBoolean();
        } catch (IOException notYet) {
            return false;
        } catch (InterruptedException stopped) {
            Thread.currentThread().interrupt();
            return false;
        }
    }

    /** Stores what the window shows as PNG. */
    void screenshot(Path file) throws IOException, InterruptedException {
        Files.createDirectories(file.getParent());
        Files.write(
                file, Base64.getDecoder().decode(get(session + "/screenshot").getAsString()));
    }

    private JsonElement get(String url) throws IOException, InterruptedException {
        return answer(HttpRequest.newBuilder(URI.create(url)).GET());
    }

    private JsonElement post(String url, Map<String, ?> body) throws IOException, InterruptedException {
        return answer(HttpRequest.newBuilder(URI.create(url))
                .header("Content-Type", "application/json")
                .POST(HttpRequest.BodyPublishers.ofString(GSON.toJson(body))));
    }

    private JsonElement answer(HttpRequest.Builder request) throws IOException, InterruptedException {
        HttpResponse<String> response =
                client.send(request.timeout(Duration.ofSeconds(60)).build(), HttpResponse.BodyHandlers.ofString());
        JsonElement value =
                JsonParser.parseString(response.body()).getAsJsonObject().get("value");
        if (response.statusCode() != 200) {
            throw new IOException("WebDriver said " + response.statusCode() + ": " + value);
        }
        return value;
    }

    @Override
    public void close() throws IOException, InterruptedException {
        try {
            client.send(
                    HttpRequest.newBuilder(URI.create(session)).DELETE().build(),
                    HttpResponse.BodyHandlers.discarding());
        } finally {
            driver.destroy();
            if (!driver.waitFor(10, TimeUnit.SECONDS)) {
                driver.destroyForcibly();
            }
        }
    }
}
