package org.meltbook.bench;

import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.concurrent.TimeUnit;
import org.meltbook.base.Doubles;
import org.meltbook.base.Progress;
import org.meltbook.fit.Fit;
import org.meltbook.fit.Parameter;
import org.meltbook.fit.Problem;
import org.meltbook.fit.Solver;
import org.meltbook.viscosity.CarreauYasuda;
import org.openjdk.jmh.annotations.Benchmark;
import org.openjdk.jmh.annotations.BenchmarkMode;
import org.openjdk.jmh.annotations.Fork;
import org.openjdk.jmh.annotations.Measurement;
import org.openjdk.jmh.annotations.Mode;
import org.openjdk.jmh.annotations.OutputTimeUnit;
import org.openjdk.jmh.annotations.Scope;
import org.openjdk.jmh.annotations.Setup;
import org.openjdk.jmh.annotations.State;
import org.openjdk.jmh.annotations.Warmup;

/**
 * The Carreau–Yasuda law with all five parameters free on 40 points, misfits of ln η, bounds on every parameter: one fit
 * with all that it reports, its solution alone, and 1,000 fits to resampled points started at the optimum. One thread.
 * {@code main} prints what was reached, to be held against another solver.
 */
@State(Scope.Thread)
@BenchmarkMode(Mode.AverageTime)
@OutputTimeUnit(TimeUnit.MICROSECONDS)
@Warmup(iterations = 3, time = 2)
@Measurement(iterations = 5, time = 2)
@Fork(value = 1, jvmArgsAppend = "-XX:+UseSerialGC")
public class CarreauYasudaBench {
    private Problem problem;
    private Solver solver;
    private double[] start;
    private double[] optimum;
    private double[][] counts;

    /** Reads the points and the draws, and finds the optimum. */
    @Setup
    public void read() {
        List<double[]> points = numbers("viscosity_curve.csv", 1);
        problem = Problem.of(CarreauYasuda.FAMILY.freeing("etaInf").model())
                .data(column(points, 0), column(points, 1))
                .logarithmic()
                .parameter(bounded("eta0", 1, 1e7))
                .parameter(bounded("lambda", 1e-4, 1e3))
                .parameter(bounded("a", 0.2, 6))
                .parameter(bounded("n", 0.02, 0.98))
                .parameter(bounded("etaInf", 0, 1e3))
                .from(Map.of("eta0", 8000.0, "etaInf", 5.0, "lambda", 0.3, "a", 2.0, "n", 0.5));
        solver = Solver.of(problem);
        start = new double[5];
        solver.coordinates(start);
        optimum = problem.solve().coordinates().toArray();
        counts = numbers("resampled_rows.csv", 0).stream()
                .map(rows -> counted(rows, points.size()))
                .toArray(double[][]::new);
    }

    private static Parameter bounded(String name, double low, double high) {
        return CarreauYasuda.FAMILY.freeing("etaInf").parameters().stream()
                .filter(parameter -> parameter.name().equals(name))
                .findFirst()
                .orElseThrow()
                .within(low, high);
    }

    /** One fit with estimates, errors and intervals. */
    @Benchmark
    public Fit fit() {
        return problem.solve();
    }

    /** The optimum alone. */
    @Benchmark
    public double solution() {
        solver.workspace().counting(ones());
        solver.start(start);
        solver.solve(Progress.QUIET);
        return solver.cost();
    }

    private double[] ones() {
        double[] ones = new double[counts[0].length];
        Arrays.fill(ones, 1);
        return ones;
    }

    /** 1,000 fits to resampled points. */
    @Benchmark
    public double thousandRefits() {
        double sum = 0;
        for (double[] count : counts) {
            solver.workspace().counting(count);
            solver.start(optimum);
            solver.solve(Progress.QUIET);
            sum += solver.cost();
        }
        return sum;
    }

    private static double[] counted(double[] rows, int points) {
        double[] count = new double[points];
        for (double row : rows) {
            count[(int) row]++;
        }
        return count;
    }

    private static Doubles column(List<double[]> rows, int column) {
        return Doubles.of(rows.stream().mapToDouble(row -> row[column]).toArray());
    }

    private static List<double[]> numbers(String file, int headings) {
        try (InputStream in = CarreauYasudaBench.class.getResourceAsStream("/bench/" + file)) {
            String text = new String(in.readAllBytes(), StandardCharsets.UTF_8);
            return text.lines()
                    .skip(headings)
                    .map(line ->
                            Arrays.stream(line.split(",")).mapToDouble(Double::parseDouble).toArray())
                    .toList();
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    /** Prints the optimum and the spread of the refits. */
    public static void main(String[] arguments) {
        CarreauYasudaBench bench = new CarreauYasudaBench();
        bench.read();
        Fit fit = bench.fit();
        System.out.println(fit.estimates() + " sum of squares " + fit.sumOfSquares() + ", " + fit.evaluations()
                + " trials, " + fit.status());
        double[][] all = new double[5][bench.counts.length];
        double[] coordinates = new double[5];
        double[] values = new double[5];
        double sum = 0;
        int trials = 0;
        for (int b = 0; b < bench.counts.length; b++) {
            bench.solver.workspace().counting(bench.counts[b]);
            bench.solver.start(bench.optimum);
            Fit.Status status = bench.solver.solve(Progress.QUIET);
            if (status != Fit.Status.CONVERGED) {
                System.out.println("draw " + b + ": " + status);
            }
            trials += bench.solver.evaluations();
            sum += bench.solver.cost();
            bench.solver.coordinates(coordinates);
            bench.solver.workspace().outward(coordinates, values);
            for (int p = 0; p < 5; p++) {
                all[p][b] = values[p];
            }
        }
        System.out.println("refits: mean sum of squares " + sum / bench.counts.length + ", trials " + trials);
        for (double[] parameter : all) {
            Arrays.sort(parameter);
            System.out.println("  16 % " + parameter[160] + ", median " + (parameter[499] + parameter[500]) / 2
                    + ", 84 % " + parameter[839]);
        }
    }
}
