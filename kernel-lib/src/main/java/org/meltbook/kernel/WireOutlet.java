package org.meltbook.kernel;

import com.google.gson.JsonObject;
import java.io.IOException;
import java.io.UncheckedIOException;

/** What one request's cell shows and asks, as messages about that request. */
final class WireOutlet implements Outlet {
    private final Envelope request;
    private final boolean mayAsk;
    private final Broadcast broadcast;
    private final Prompt prompt;

    WireOutlet(Envelope request, boolean mayAsk, Broadcast broadcast, Prompt prompt) {
        this.request = request;
        this.mayAsk = mayAsk;
        this.broadcast = broadcast;
        this.prompt = prompt;
    }

    /** A bundle as the content of a message that shows it. */
    static JsonObject content(MimeBundle bundle) {
        JsonObject content = new JsonObject();
        content.add("data", Wire.GSON.toJsonTree(bundle.data()));
        content.add("metadata", Wire.GSON.toJsonTree(bundle.metadata()));
        JsonObject passing = new JsonObject();
        if (!bundle.displayId().isEmpty()) {
            passing.addProperty("display_id", bundle.displayId());
        }
        content.add("transient", passing);
        return content;
    }

    @Override
    public void out(String text) {
        broadcast.print(request.header(), "stdout", text);
    }

    @Override
    public void err(String text) {
        broadcast.print(request.header(), "stderr", text);
    }

    @Override
    public void display(MimeBundle bundle) {
        broadcast.send(request.header(), "display_data", content(bundle));
    }

    @Override
    public void update(MimeBundle bundle) {
        broadcast.send(request.header(), "update_display_data", content(bundle));
    }

    @Override
    public void clear(boolean wait) {
        JsonObject content = new JsonObject();
        content.addProperty("wait", wait);
        broadcast.send(request.header(), "clear_output", content);
    }

    @Override
    public String ask(String text, boolean secret) {
        if (!mayAsk) {
            throw new UncheckedIOException(
                    new IOException("this front end does not take input: put the value into the cell"));
        }
        broadcast.flush();
        return prompt.ask(request, text, secret);
    }
}
