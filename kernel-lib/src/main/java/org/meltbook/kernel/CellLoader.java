package org.meltbook.kernel;

import java.io.File;
import java.net.MalformedURLException;
import java.net.URL;
import java.net.URLClassLoader;
import java.util.Map;
import java.util.concurrent.ConcurrentHashMap;
import jdk.jshell.execution.LoaderDelegate;
import jdk.jshell.spi.ExecutionControl.ClassBytecodes;
import jdk.jshell.spi.ExecutionControl.ClassInstallException;
import jdk.jshell.spi.ExecutionControl.EngineTerminationException;
import jdk.jshell.spi.ExecutionControl.InternalException;

/** Loads the classes of cells, rewritten, beside the classes of this process. */
final class CellLoader implements LoaderDelegate {
    private final Loader loader = new Loader(CellLoader.class.getClassLoader());

    @Override
    public void load(ClassBytecodes[] classes) throws ClassInstallException {
        boolean[] installed = new boolean[classes.length];
        try {
            for (ClassBytecodes each : classes) {
                loader.declared.put(each.name(), CellClassRewriter.rewrite(each.bytecodes()));
            }
            for (int i = 0; i < classes.length; i++) {
                // Asking for the methods links the class, so that a broken one fails here and not in the middle of a
                // cell.
                loader.loadClass(classes[i].name()).getDeclaredMethods();
                installed[i] = true;
            }
        } catch (ReflectiveOperationException | LinkageError | RuntimeException e) {
            throw new ClassInstallException("a class of the cell cannot be loaded: " + e, installed);
        }
    }

    @Override
    public void classesRedefined(ClassBytecodes[] classes) {
        // Nothing was redefined: InProcessControl refuses it, and JShell then makes a new class instead.
    }

    @Override
    public void addToClasspath(String path) throws EngineTerminationException, InternalException {
        try {
            for (String entry : path.split(File.pathSeparator)) {
                loader.addURL(new File(entry).toURI().toURL());
            }
        } catch (MalformedURLException e) {
            throw new InternalException("not a class path: " + path);
        }
    }

    @Override
    public Class<?> findClass(String name) throws ClassNotFoundException {
        return Class.forName(name, false, loader);
    }

    ClassLoader classes() {
        return loader;
    }

    private static final class Loader extends URLClassLoader {
        private final Map<String, byte[]> declared = new ConcurrentHashMap<>();

        Loader(ClassLoader parent) {
            super(new URL[0], parent);
        }

        @Override
        protected Class<?> findClass(String name) throws ClassNotFoundException {
            byte[] classFile = declared.remove(name);
            return classFile == null ? super.findClass(name) : defineClass(name, classFile, 0, classFile.length);
        }

        @Override
        public void addURL(URL url) {
            super.addURL(url);
        }
    }
}
