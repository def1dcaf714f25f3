package org.meltbook.notebook;

import java.io.FileDescriptor;
import java.io.FileOutputStream;
import java.io.PrintStream;
import java.io.PrintWriter;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Path;
import java.time.Duration;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.concurrent.Callable;
import java.util.concurrent.CountDownLatch;
import java.util.concurrent.TimeUnit;
import org.meltbook.base.MeltbookException;
import org.meltbook.kernel.Attachment;
import org.meltbook.kernel.AttachmentException;
import org.meltbook.kernel.JShellEvaluator;
import org.meltbook.kernel.JupyterKernel;
import org.meltbook.kernel.Settings;
import picocli.CommandLine;
import picocli.CommandLine.ArgGroup;
import picocli.CommandLine.Command;
import picocli.CommandLine.IVersionProvider;
import picocli.CommandLine.Option;
import picocli.CommandLine.Parameters;

/**
 * The program. Exit codes: 0 all is well; 1 a notebook failed, differs from what is stored, or is not tidy; 2 wrong
 * use, or something asked for could not be done at all; 130 ended by Ctrl-C, with nothing half-written.
 */
@Command(
        name = "meltbook",
        description = "Notebooks in Java for people who measure polymer melts.",
        mixinStandardHelpOptions = true,
        versionProvider = Main.Version.class,
        synopsisSubcommandLabel = "COMMAND",
        exitCodeListHeading = "%nExit codes:%n",
        exitCodeList = {
            "0:all is well",
            "1:a notebook failed, differs from what is stored, or is not tidy",
            "2:wrong use, or something asked for could not be done at all",
            "130:ended by Ctrl-C, with nothing half-written"
        })
public final class Main {
    private static final int DIFFERS = 1;
    private static final int CANNOT = 2;
    /** How long, in ms, the end of the process waits for a stopped cell. */
    private static final long PATIENCE = 5_000;

    private final PrintStream out;

    private Main(PrintStream out) {
        this.out = out;
    }

    /** Runs the program and ends the process with its exit code. */
    public static void main(String... arguments) {
        // Results must not depend on where they are made.
        Locale.setDefault(Locale.ROOT);
        System.setProperty("java.awt.headless", "true");
        PrintStream out = utf8(FileDescriptor.out);
        PrintStream err = utf8(FileDescriptor.err);
        int code = run(out, err, arguments);
        out.flush();
        err.flush();
        Runtime.getRuntime().exit(code);
    }

    /** Does what the arguments ask, and gives the exit code. */
    static int run(PrintStream out, PrintStream err, String... arguments) {
        return new CommandLine(new Main(out))
                .addSubcommand(new Run(out, err))
                .addSubcommand(new TidyUp(out))
                .addSubcommand(new Attach(out))
                .addSubcommand(new Detach(out))
                .addSubcommand(new Kernel())
                // These reach only the subcommands that are there already.
                .setOut(new PrintWriter(out, true, StandardCharsets.UTF_8))
                .setErr(new PrintWriter(err, true, StandardCharsets.UTF_8))
                .setExecutionExceptionHandler((e, command, parsed) -> refuse(e, err))
                .execute(arguments.length == 0 ? new String[] {"--help"} : arguments);
    }

    private static int refuse(Exception e, PrintStream err) throws Exception {
        if (e instanceof MeltbookException || e instanceof AttachmentException || e instanceof UncheckedIOException) {
            err.println("meltbook: " + e.getMessage());
            return CANNOT;
        }
        throw e;
    }

    private static PrintStream utf8(FileDescriptor descriptor) {
        return new PrintStream(new FileOutputStream(descriptor), true, StandardCharsets.UTF_8);
    }

    private static Settings settings() {
        return Settings.plain()
                .importing(StartImports.LINES)
                .rendering(Renderers.all())
                .trustingMessagesOf(MeltbookException.class::isInstance);
    }

    /** {@code meltbook run}. */
    @Command(
            name = "run",
            mixinStandardHelpOptions = true,
            description = "Runs notebooks; writes the executed notebooks, a page for each, and an index.")
    private static final class Run implements Callable<Integer> {
        private final PrintStream out;
        private final PrintStream err;

        @Parameters(arity = "1..*", paramLabel = "PATH", description = "a notebook, or a folder of notebooks")
        private List<Path> paths;

        @Option(
                names = "--into",
                paramLabel = "DIR",
                defaultValue = "target/reports",
                description = "where the results go (default: ${DEFAULT-VALUE})")
        private Path into;

        @Option(
                names = "--limit",
                paramLabel = "SECONDS",
                defaultValue = "600",
                description = "longest time a cell may take (default: ${DEFAULT-VALUE})")
        private double limit;

        @ArgGroup
        private Stored stored = new Stored();

        Run(PrintStream out, PrintStream err) {
            this.out = out;
            this.err = err;
        }

        @Override
        public Integer call() {
            if (!(limit >= 0.001 && limit <= TimeUnit.DAYS.toSeconds(365))) {
                throw new NotebookException("--limit is a number of seconds above zero, found " + limit);
            }
            Plan plan = new Plan(into, stored.choice(), Duration.ofMillis(Math.round(limit * 1000)));
            List<Path> notebooks = Runner.notebooks(paths);
            Runner runner = new Runner(() -> JShellEvaluator.open(settings()), out);
            CountDownLatch done = new CountDownLatch(1);
            Thread hook = stopOnSignal(runner, done);
            try {
                return report(runner.run(notebooks, plan), notebooks.size());
            } finally {
                done.countDown();
                forget(hook);
            }
        }

        private int report(List<RunResult> results, int asked) {
            List<String> problems =
                    results.stream().flatMap(r -> r.problems().stream()).toList();
            problems.forEach(err::println);
            long good = results.stream().filter(RunResult::isGood).count();
            boolean whole = results.stream().noneMatch(RunResult::isInterrupted) && results.size() == asked;
            out.println(good + " of " + asked + " notebooks " + (stored.check ? "ran and gave what is stored" : "ran")
                    + (whole ? "; see " + into.resolve("index.html") : "; the run was interrupted"));
            return problems.isEmpty() && whole ? 0 : DIFFERS;
        }

        /** On Ctrl-C the running cell is stopped, so that the run can end by itself; nothing is left half-written. */
        private static Thread stopOnSignal(Runner runner, CountDownLatch done) {
            Thread hook = new Thread(() -> {
                runner.interrupt();
                try {
                    done.await(PATIENCE, TimeUnit.MILLISECONDS);
                } catch (InterruptedException e) {
                    Thread.currentThread().interrupt();
                }
            });
            Runtime.getRuntime().addShutdownHook(hook);
            return hook;
        }

        private static void forget(Thread hook) {
            try {
                Runtime.getRuntime().removeShutdownHook(hook);
            } catch (IllegalStateException e) {
                // The process is ending already, and the hook with it.
                return;
            }
        }
    }

    /** What to do about stored results: one of two, or neither. */
    private static final class Stored {
        @Option(names = "--check", description = "fail where fresh results differ from the stored ones")
        private boolean check;

        @Option(names = "--store", description = "put the fresh results into the notebooks")
        private boolean store;

        Plan.Stored choice() {
            return check ? Plan.Stored.CHECK : store ? Plan.Stored.REPLACE : Plan.Stored.LEAVE;
        }
    }

    /** {@code meltbook tidy}. */
    @Command(
            name = "tidy",
            mixinStandardHelpOptions = true,
            description = "Puts ids, counts, metadata and layout of notebooks right, without running them.")
    private static final class TidyUp implements Callable<Integer> {
        private final PrintStream out;

        @Parameters(arity = "1..*", paramLabel = "PATH", description = "a notebook, or a folder of notebooks")
        private List<Path> paths;

        TidyUp(PrintStream out) {
            this.out = out;
        }

        @Override
        public Integer call() {
            List<String> texts = new ArrayList<>();
            List<Path> notebooks = Runner.notebooks(paths);
            // All are read before the first is written: a broken one stops the command with nothing changed.
            notebooks.forEach(file -> texts.add(NotebookFile.write(Tidy.of(NotebookFile.read(file)))));
            for (int i = 0; i < notebooks.size(); i++) {
                boolean same = texts.get(i).equals(NotebookFile.text(notebooks.get(i)));
                if (!same) {
                    WholeFile.write(notebooks.get(i), texts.get(i));
                }
                out.println(notebooks.get(i) + (same ? ": tidy already" : ": tidied"));
            }
            return 0;
        }
    }

    /** {@code meltbook attach}. */
    @Command(
            name = "attach",
            mixinStandardHelpOptions = true,
            description = "Makes the kernel known to every Jupyter of this user.")
    private static final class Attach implements Callable<Integer> {
        private final PrintStream out;

        @Option(
                names = "--heap",
                paramLabel = "SIZE",
                defaultValue = "2g",
                description = "largest heap of a kernel (default: ${DEFAULT-VALUE})")
        private String heap;

        Attach(PrintStream out) {
            this.out = out;
        }

        @Override
        public Integer call() {
            if (!heap.matches("[1-9][0-9]*[kKmMgG]?")) {
                throw new NotebookException("--heap is a size such as 512m or 2g, found '" + heap + "'");
            }
            out.println(Attachment.forUser().attach(Attachment.runningJar(), heap));
            return 0;
        }
    }

    /** {@code meltbook detach}. */
    @Command(
            name = "detach",
            mixinStandardHelpOptions = true,
            description = "Takes the kernel away from Jupyter again.")
    private static final class Detach implements Callable<Integer> {
        private final PrintStream out;

        Detach(PrintStream out) {
            this.out = out;
        }

        @Override
        public Integer call() {
            out.println(Attachment.forUser().detach());
            return 0;
        }
    }

    /** {@code meltbook kernel}. */
    @Command(
            name = "kernel",
            mixinStandardHelpOptions = true,
            description = "Serves a Jupyter client; Jupyter calls this.")
    private static final class Kernel implements Callable<Integer> {
        @Parameters(paramLabel = "CONNECTION_FILE", description = "the file that Jupyter wrote")
        private Path connection;

        @Override
        public Integer call() {
            try {
                JupyterKernel.serve(connection, settings());
                return 0;
            } catch (IllegalArgumentException e) {
                throw new NotebookException(connection + ": cannot be served: " + e.getMessage(), e);
            }
        }
    }

    /** The version of the program. */
    static final class Version implements IVersionProvider {
        @Override
        public String[] getVersion() {
            String version = Main.class.getPackage().getImplementationVersion();
            return new String[] {
                "Meltbook " + (version == null ? "(built from source)" : version) + ", Java "
                        + Runtime.version().feature()
            };
        }
    }
}
