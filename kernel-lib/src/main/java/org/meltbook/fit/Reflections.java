package org.meltbook.fit;

/** Householder's reduction of a matrix, held column by column in one array, to a triangle; in place. */
final class Reflections {
    private Reflections() {}

    /**
     * Turns the matrix into its upper triangle R and the right-hand side along with it; what stood below is left over.
     *
     * @param matrix element of row i and column j at {@code j * rows + i}
     * @param rows   at least as many as columns
     * @param heads  filled with what {@link #turn} needs besides what is left below the triangle
     */
    static void reduce(double[] matrix, int rows, int columns, double[] right, double[] heads) {
        for (int k = 0; k < columns; k++) {
            int base = k * rows;
            double square = Sums.products(matrix, base + k, matrix, base + k, rows - k);
            heads[k] = 0;
            if (square == 0) {
                continue;
            }
            double length = matrix[base + k] > 0 ? -Math.sqrt(square) : Math.sqrt(square);
            double head = matrix[base + k] - length;
            double scale = Math.sqrt(-1 / (length * head)); // √2 / |v|: the axis v becomes one of length √2
            matrix[base + k] = head;
            for (int i = k; i < rows; i++) {
                matrix[base + i] *= scale;
            }
            heads[k] = matrix[base + k];
            for (int j = k + 1; j < columns; j++) {
                turn(matrix, j * rows + k, matrix, base + k, rows - k);
            }
            turn(right, k, matrix, base + k, rows - k);
            matrix[base + k] = length;
        }
    }

    /** Turns one more right-hand side as a matrix was turned by {@link #reduce}. */
    static void turn(double[] matrix, int rows, int columns, double[] right, double[] heads) {
        for (int k = 0; k < columns; k++) {
            if (heads[k] != 0) {
                int pivot = k * rows + k;
                double length = matrix[pivot];
                matrix[pivot] = heads[k];
                turn(right, k, matrix, pivot, rows - k);
                matrix[pivot] = length;
            }
        }
    }

    /** Reflects {@code count} numbers of a column from {@code at} on along an axis of length √2. */
    private static void turn(double[] column, int at, double[] axis, int from, int count) {
        double product = 0;
        for (int i = 0; i < count; i++) {
            product += axis[from + i] * column[at + i];
        }
        for (int i = 0; i < count; i++) {
            column[at + i] -= product * axis[from + i];
        }
    }
}
