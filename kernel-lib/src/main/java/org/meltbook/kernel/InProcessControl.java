package org.meltbook.kernel;

import java.lang.reflect.Field;
import java.lang.reflect.InvocationTargetException;
import java.lang.reflect.Method;
import java.lang.reflect.Modifier;
import java.util.HashMap;
import java.util.Map;
import java.util.Optional;
import jdk.jshell.execution.DirectExecutionControl;
import jdk.jshell.spi.ExecutionControl;
import jdk.jshell.spi.ExecutionControlProvider;
import jdk.jshell.spi.ExecutionEnv;
import jdk.jshell.spi.SPIResolutionException;

/**
 * Runs snippets in this process and keeps their values as objects: JShell gets a key in the place of a text, and the
 * evaluator trades the key for the object.
 */
final class InProcessControl extends DirectExecutionControl {
    private final CellRun run;
    private final Map<String, Object> values = new HashMap<>();
    private long nextKey;
    private Throwable thrown;
    private Throwable notLoaded;
    private Class<?> lastClass;

    InProcessControl(CellLoader loader, CellRun run) {
        super(loader);
        this.run = run;
    }

    /** This control, in the form in which JShell asks for it. */
    ExecutionControlProvider provider() {
        return new ExecutionControlProvider() {
            @Override
            public String name() {
                return "meltbook";
            }

            @Override
            public ExecutionControl generate(ExecutionEnv environment, Map<String, String> parameters) {
                return InProcessControl.this;
            }
        };
    }

    /** The object behind a key, once; a holder is returned because the object may be null. */
    Optional<Value> take(String key) {
        return key != null && values.containsKey(key) ? Optional.of(new Value(values.remove(key))) : Optional.empty();
    }

    /** What the last snippet threw, as it was thrown; empty if it ran to its end. */
    Optional<Throwable> thrown() {
        return Optional.ofNullable(thrown);
    }

    /** Why the classes of the last snippet cannot be loaded, which JShell passes over; empty if they were. */
    Optional<Throwable> notLoaded() {
        return Optional.ofNullable(notLoaded);
    }

    /** Forgets what was kept for the last snippet. */
    void clear() {
        values.clear();
        thrown = null;
        notLoaded = null;
        lastClass = null;
    }

    /** Lets go of the object in a variable of the last snippet: a result that nobody can name is not kept for ever. */
    void release(String variable) {
        try {
            Field field = lastClass.getDeclaredField(variable);
            if (!field.getType().isPrimitive() && !Modifier.isFinal(field.getModifiers())) {
                field.setAccessible(true);
                field.set(null, null);
            }
        } catch (ReflectiveOperationException e) {
            throw new IllegalStateException("no variable " + variable + " in " + lastClass, e);
        }
    }

    @Override
    public void load(ClassBytecodes[] classes)
            throws ClassInstallException, NotImplementedException, EngineTerminationException {
        try {
            super.load(classes);
        } catch (ClassInstallException e) {
            notLoaded = e;
            throw e;
        }
    }

    @Override
    protected String invoke(Method snippet) throws Exception {
        lastClass = snippet.getDeclaringClass();
        try {
            run.enterCellCode();
            Object value = snippet.invoke(null);
            return snippet.getReturnType() == void.class ? null : keep(value);
        } catch (InvocationTargetException e) {
            Throwable cause = e.getCause();
            if (cause instanceof SPIResolutionException) {
                throw e;
            }
            throw told(cause);
        } catch (CellStopped e) {
            throw told(e);
        } finally {
            run.leaveCellCode();
        }
    }

    /** JShell takes exceptions in this form only, and loses errors that come in another. */
    private UserException told(Throwable cause) {
        thrown = cause;
        return new UserException(
                String.valueOf(cause.getMessage()), cause.getClass().getName(), cause.getStackTrace());
    }

    private String keep(Object value) {
        String key = Long.toString(nextKey++);
        values.put(key, value);
        return key;
    }

    /** An object that may be null. */
    record Value(Object object) {}
}
