package org.meltbook.kernel;

import com.sun.source.doctree.DocCommentTree;
import com.sun.source.tree.ClassTree;
import com.sun.source.tree.CompilationUnitTree;
import com.sun.source.tree.MethodTree;
import com.sun.source.tree.Tree;
import com.sun.source.tree.VariableTree;
import com.sun.source.util.DocTrees;
import com.sun.source.util.JavacTask;
import com.sun.source.util.TreePath;
import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.io.Writer;
import java.net.JarURLConnection;
import java.net.URI;
import java.net.URISyntaxException;
import java.net.URL;
import java.net.URLConnection;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Collections;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.jar.JarEntry;
import java.util.jar.JarFile;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import java.util.stream.Stream;
import javax.tools.JavaCompiler;
import javax.tools.JavaFileObject;
import javax.tools.SimpleJavaFileObject;
import javax.tools.ToolProvider;

/**
 * Doc comments of the classes whose sources lie on the class path below {@code META-INF/meltbook/sources}. A source is
 * read when it is first asked for.
 */
final class SourceComments {
    private static final String ROOT = "META-INF/meltbook/sources";
    private static final String SUFFIX = ".java";
    private static final Pattern VALUE = Pattern.compile("\\{@value #(\\w+)}");
    private static final int DEEPEST = 5;

    private final ClassLoader classes;
    private final Map<String, Parsed> parsed = new HashMap<>();
    private Optional<List<String>> sources = Optional.empty();

    SourceComments(ClassLoader classes) {
        this.classes = classes;
    }

    /** The comment of a type or member; of the same member in a supertype if it has none itself. */
    Optional<DocCommentTree> of(Named named) {
        return of(named, 0);
    }

    private Optional<DocCommentTree> of(Named named, int depth) {
        for (String source : sourcesOf(named.type())) {
            Parsed unit = parsed.computeIfAbsent(source, this::parse);
            Optional<TreePath> type = unit.type(named.type(), source);
            if (type.isPresent()) {
                Optional<DocCommentTree> own = unit.comment(type.get(), named);
                return own.isPresent() || named.name().isEmpty() || depth == DEEPEST
                        ? own
                        : inherited(type.get(), named, depth);
            }
        }
        return Optional.empty();
    }

    private Optional<DocCommentTree> inherited(TreePath type, Named named, int depth) {
        ClassTree declaration = (ClassTree) type.getLeaf();
        List<Tree> above = new ArrayList<>(declaration.getImplementsClause());
        Optional.ofNullable(declaration.getExtendsClause()).ifPresent(above::add);
        return above.stream()
                .flatMap(tree -> namesOf(Named.simple(tree.toString()), named.type()))
                .map(name -> new Named(name, named.name(), named.parameters(), named.method()))
                .flatMap(candidate -> of(candidate, depth + 1).stream())
                .findFirst();
    }

    /** What a simple name may mean in the declaration of {@code type}: a neighbour in the outer type, or a file. */
    private static Stream<String> namesOf(String simple, String type) {
        int dot = type.lastIndexOf('.');
        return dot < 0 ? Stream.of(simple) : Stream.of(type.substring(0, dot + 1) + simple, simple);
    }

    /** Sources that may hold a type of this name: some segment of the name is the name of the file. */
    private List<String> sourcesOf(String type) {
        List<String> segments = List.of(type.split("\\."));
        String path = "/" + type.replace('.', '/') + "/";
        List<String> fitting = new ArrayList<>();
        for (String source : sources()) {
            String stem = source.substring(0, source.length() - SUFFIX.length());
            String file = stem.substring(stem.lastIndexOf('/') + 1);
            boolean packaged = path.startsWith("/" + stem + "/");
            if (packaged || (segments.get(0).equals(file))) {
                fitting.add(packaged ? 0 : fitting.size(), source);
            }
        }
        return fitting;
    }

    private List<String> sources() {
        if (sources.isEmpty()) {
            sources = Optional.of(listed());
        }
        return sources.get();
    }

    private List<String> listed() {
        try {
            List<String> all = new ArrayList<>();
            for (URL root : Collections.list(classes.getResources(ROOT))) {
                URLConnection connection = root.openConnection();
                if (connection instanceof JarURLConnection jar) {
                    all.addAll(within(jar));
                } else {
                    all.addAll(below(Path.of(root.toURI())));
                }
            }
            return all;
        } catch (IOException | URISyntaxException e) {
            throw new IllegalStateException("the sources on the class path cannot be listed", e);
        }
    }

    private static List<String> within(JarURLConnection connection) throws IOException {
        connection.setUseCaches(false);
        try (JarFile jar = connection.getJarFile()) {
            return jar.stream()
                    .map(JarEntry::getName)
                    .filter(name -> name.startsWith(ROOT + "/") && name.endsWith(SUFFIX))
                    .map(name -> name.substring(ROOT.length() + 1))
                    .sorted()
                    .toList();
        }
    }

    private static List<String> below(Path root) throws IOException {
        try (Stream<Path> files = Files.walk(root)) {
            return files.map(file -> root.relativize(file).toString().replace('\\', '/'))
                    .filter(name -> name.endsWith(SUFFIX))
                    .sorted()
                    .toList();
        }
    }

    private Parsed parse(String source) {
        try (InputStream in = classes.getResourceAsStream(ROOT + "/" + source)) {
            String text = withValues(new String(in.readAllBytes(), StandardCharsets.UTF_8));
            JavaCompiler compiler = ToolProvider.getSystemJavaCompiler();
            JavacTask task = (JavacTask) compiler.getTask(
                    Writer.nullWriter(), null, problem -> {}, List.of("-proc:none"), null, List.of(file(source, text)));
            return new Parsed(task.parse().iterator().next(), DocTrees.instance(task));
        } catch (IOException e) {
            throw new UncheckedIOException("the source " + source + " cannot be read", e);
        }
    }

    /** The source with the constants of its own file written out where a comment cites one. */
    private static String withValues(String source) {
        return VALUE.matcher(source).replaceAll(cited -> {
            Matcher constant =
                    Pattern.compile("\\b" + cited.group(1) + " = ([^;]+);").matcher(source);
            return Matcher.quoteReplacement(constant.find() ? constant.group(1) : cited.group(1));
        });
    }

    private static JavaFileObject file(String name, String text) {
        return new SimpleJavaFileObject(URI.create("source:///" + name), JavaFileObject.Kind.SOURCE) {
            @Override
            public CharSequence getCharContent(boolean ignoreEncodingErrors) {
                return text;
            }
        };
    }

    private record Parsed(CompilationUnitTree unit, DocTrees trees) {
        /** The declaration of a type, by the segments of its name from the file's own type on. */
        Optional<TreePath> type(String name, String source) {
            String file = source.substring(source.lastIndexOf('/') + 1, source.length() - SUFFIX.length());
            List<String> segments = List.of(name.split("\\."));
            int start = segments.indexOf(file);
            Optional<TreePath> found = declared(new TreePath(unit), unit.getTypeDecls(), file);
            for (int i = start + 1; found.isPresent() && i < segments.size(); i++) {
                found = declared(found.get(), ((ClassTree) found.get().getLeaf()).getMembers(), segments.get(i));
            }
            return found;
        }

        Optional<DocCommentTree> comment(TreePath type, Named named) {
            if (named.name().isEmpty()) {
                return Optional.ofNullable(trees.getDocCommentTree(type));
            }
            List<? extends Tree> members = ((ClassTree) type.getLeaf()).getMembers();
            return members.stream()
                    .filter(member -> isNamed(member, named))
                    .flatMap(member -> Stream.ofNullable(trees.getDocCommentTree(new TreePath(type, member))))
                    .findFirst();
        }

        private static Optional<TreePath> declared(TreePath in, List<? extends Tree> trees, String name) {
            return trees.stream()
                    .filter(tree -> tree instanceof ClassTree type
                            && type.getSimpleName().contentEquals(name))
                    .map(tree -> new TreePath(in, tree))
                    .findFirst();
        }

        private static boolean isNamed(Tree member, Named named) {
            if (member instanceof MethodTree method && named.method()) {
                return method.getName().contentEquals(named.name())
                        && method.getParameters().stream()
                                .map(p -> Named.simple(declaredType(p)))
                                .toList()
                                .equals(named.parameters());
            }
            return member instanceof VariableTree field
                    && !named.method()
                    && field.getName().contentEquals(named.name());
        }

        /** The parameter's type as it stands in the source, with the dots of a variable count. */
        private static String declaredType(VariableTree parameter) {
            String whole = parameter.toString();
            return whole.contains("...")
                    ? parameter.getType().toString().replace("[]", "") + "..."
                    : parameter.getType().toString();
        }
    }
}
