package org.meltbook.kernel;

import java.util.Collections;
import java.util.LinkedHashMap;
import java.util.Map;

/**
 * One value in every form in which it can be shown, by MIME type, as Jupyter and notebook files know it.
 *
 * @param data      the forms: text as String, pictures as base64 String, JSON as Map or List
 * @param metadata  notes by MIME type; often empty
 * @param displayId the name under which a later bundle may replace this one; empty if none
 */
public record MimeBundle(Map<String, Object> data, Map<String, Object> metadata, String displayId) {
    /** Copies the maps, keeping their order. */
    public MimeBundle {
        data = Collections.unmodifiableMap(new LinkedHashMap<>(data));
        metadata = Collections.unmodifiableMap(new LinkedHashMap<>(metadata));
    }

    /** A bundle without notes and without a name. */
    public static MimeBundle of(Map<String, Object> data) {
        return new MimeBundle(data, Map.of(), "");
    }

    /** The plain text form; empty if there is none. */
    public String plainText() {
        return data.getOrDefault("text/plain", "").toString();
    }
}
