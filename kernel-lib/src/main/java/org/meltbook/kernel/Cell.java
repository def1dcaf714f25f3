package org.meltbook.kernel;

import java.io.PrintStream;
import java.util.concurrent.atomic.AtomicReference;
import java.util.function.BiConsumer;
import org.dflib.jjava.jupyter.kernel.display.Renderer;

/**
 * What the code of a cell may call: it shows values on the way, before the cell ends. The methods are static because
 * cell code has no other way to reach its session; the last session that began a cell is the one they reach.
 */
public final class Cell {
    private static final AtomicReference<Stage> STAGE = new AtomicReference<>();

    private Cell() {}

    /** Shows {@code value} as if it were a result; outside a session its text goes to standard output. */
    public static void display(Object value) {
        put(value, "", Outlet::display);
    }

    /**
     * Shows {@code value} under a name, so that {@link #update} can replace it; outside a session its text goes to
     * standard output.
     */
    public static void display(Object value, String id) {
        put(value, id, Outlet::display);
    }

    /** Replaces what was shown under a name; outside a session the text goes to standard output. */
    public static void update(Object value, String id) {
        put(value, id, Outlet::update);
    }

    /** Clears what the cell has shown, when the next thing comes; outside a session nothing happens. */
    public static void clear() {
        Stage stage = STAGE.get();
        if (stage != null) {
            stage.outlet.clear(true);
        }
    }

    static Stage enter(Renderer renderer, Outlet outlet) {
        Stage stage = new Stage(renderer, outlet);
        STAGE.set(stage);
        return stage;
    }

    static void leave(Stage stage) {
        STAGE.compareAndSet(stage, null);
    }

    private static void put(Object value, String id, BiConsumer<Outlet, MimeBundle> how) {
        Stage stage = STAGE.get();
        if (stage == null) {
            // Who calls this without a session sits at a console, as in the jshell tool.
            PrintStream console = System.out;
            console.println(value);
            return;
        }
        MimeBundle bundle = Rendering.of(value, stage.renderer);
        how.accept(stage.outlet, id.isEmpty() ? bundle : new MimeBundle(bundle.data(), bundle.metadata(), id));
    }

    /** Where the running cell shows its values. */
    record Stage(Renderer renderer, Outlet outlet) {}
}
