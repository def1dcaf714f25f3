package org.meltbook.kernel;

import com.google.gson.Gson;
import com.google.gson.JsonObject;
import com.google.gson.reflect.TypeToken;
import java.util.Arrays;
import java.util.LinkedHashMap;
import java.util.Map;
import org.dflib.jjava.jupyter.kernel.display.DisplayData;
import org.dflib.jjava.jupyter.kernel.display.Renderer;

/** Turns values into bundles by way of a renderer, which knows what to do by class, interface and superclass. */
final class Rendering {
    private static final Gson GSON = new Gson();
    private static final String TEXT = "text/plain";
    private static final TypeToken<Map<String, Object>> FORMS = new TypeToken<>() {};

    private Rendering() {}

    static MimeBundle of(Object value, Renderer renderer) {
        return value == null ? MimeBundle.of(Map.of(TEXT, "null")) : of(renderer.render(value), value);
    }

    private static MimeBundle of(DisplayData display, Object value) {
        // The wire library has no other way to list what a display holds.
        JsonObject json = GSON.toJsonTree(display).getAsJsonObject();
        Map<String, Object> data = part(json, "data");
        if (isAddress(String.valueOf(data.get(TEXT)), value)) {
            data.put(TEXT, withoutAddress(value));
        }
        String id = display.hasDisplayId() ? display.getDisplayId() : "";
        return new MimeBundle(data, part(json, "metadata"), id);
    }

    private static Map<String, Object> part(JsonObject display, String name) {
        return display.has(name) ? GSON.fromJson(display.get(name), FORMS) : new LinkedHashMap<>();
    }

    /** Whether the text is what {@code Object.toString} gives, which differs from run to run. */
    private static boolean isAddress(String text, Object value) {
        return text.equals(value.getClass().getName() + "@" + Integer.toHexString(System.identityHashCode(value)));
    }

    private static String withoutAddress(Object value) {
        if (value.getClass().isArray()) {
            String boxed = Arrays.deepToString(new Object[] {value});
            return boxed.substring(1, boxed.length() - 1);
        }
        return value.getClass().getName();
    }
}
