package org.meltbook.fit;

import java.util.ArrayList;
import java.util.List;
import org.meltbook.base.Doubles;
import org.meltbook.numeric.ReferenceTable;

/**
 * A nonlinear regression set of the Statistical Reference Datasets of NIST (public domain), files under
 * {@code reference/strd} as published: data, two starts, and results certified to 11 digits.
 */
record StatisticalReference(
        Doubles x,
        Doubles secondX,
        Doubles y,
        List<Doubles> starts,
        Doubles values,
        Doubles errors,
        double sumOfSquares) {
    static StatisticalReference of(String name) {
        List<String> lines = ReferenceTable.lines("strd/" + name + ".dat");
        List<double[]> parameters = new ArrayList<>();
        List<double[]> points = new ArrayList<>();
        double sum = Double.NaN;
        boolean data = false;
        for (String line : lines) {
            if (line.matches("\\s*b\\d+ =.*")) {
                parameters.add(numbers(line.substring(line.indexOf('=') + 1)));
            } else if (line.startsWith("Residual Sum of Squares:")) {
                sum = numbers(line.substring(line.indexOf(':') + 1))[0];
            } else if (line.matches("Data:\\s+y\\s+x1?(\\s+x2)?\\s*")) {
                data = true;
            } else if (data && !line.isBlank()) {
                points.add(numbers(line));
            }
        }
        return new StatisticalReference(
                column(points, 1),
                column(points, points.get(0).length - 1),
                column(points, 0),
                List.of(column(parameters, 0), column(parameters, 1)),
                column(parameters, 2),
                column(parameters, 3),
                sum);
    }

    private static Doubles column(List<double[]> rows, int column) {
        return Doubles.of(rows.stream().mapToDouble(row -> row[column]).toArray());
    }

    private static double[] numbers(String text) {
        return java.util.Arrays.stream(text.trim().split("\\s+"))
                .mapToDouble(Double::parseDouble)
                .toArray();
    }
}
