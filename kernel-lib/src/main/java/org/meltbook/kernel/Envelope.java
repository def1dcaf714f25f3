package org.meltbook.kernel;

import com.google.gson.JsonObject;
import java.util.List;

/**
 * One message of the Jupyter wire.
 *
 * @param route    where it came from, or goes to, in frames of the socket
 * @param header   its own header
 * @param parent   header of the message that it answers; empty if none
 * @param metadata notes
 * @param content  what it says
 */
record Envelope(List<byte[]> route, JsonObject header, JsonObject parent, JsonObject metadata, JsonObject content) {
    /** Copies the list. */
    Envelope {
        route = List.copyOf(route);
    }

    /** The message's type, such as {@code execute_request}. */
    String type() {
        return header.get("msg_type").getAsString();
    }
}
