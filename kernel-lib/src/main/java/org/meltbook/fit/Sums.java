package org.meltbook.fit;

/** Sums over parts of arrays, in four strands so that one addition need not wait for the one before. */
final class Sums {
    private Sums() {}

    /** Sum of the products of {@code count} numbers from the given places on. */
    static double products(double[] a, int fromA, double[] b, int fromB, int count) {
        double s0 = 0;
        double s1 = 0;
        double s2 = 0;
        double s3 = 0;
        int i = 0;
        for (; i + 3 < count; i += 4) {
            s0 += a[fromA + i] * b[fromB + i];
            s1 += a[fromA + i + 1] * b[fromB + i + 1];
            s2 += a[fromA + i + 2] * b[fromB + i + 2];
            s3 += a[fromA + i + 3] * b[fromB + i + 3];
        }
        for (; i < count; i++) {
            s0 += a[fromA + i] * b[fromB + i];
        }
        return s0 + s1 + (s2 + s3);
    }

    /** Whether the first {@code count} numbers are neither NaN nor infinite. */
    static boolean finite(double[] numbers, int count) {
        double s0 = 0;
        double s1 = 0;
        double s2 = 0;
        double s3 = 0;
        int i = 0;
        for (; i + 3 < count; i += 4) {
            s0 += 0 * numbers[i];
            s1 += 0 * numbers[i + 1];
            s2 += 0 * numbers[i + 2];
            s3 += 0 * numbers[i + 3];
        }
        for (; i < count; i++) {
            s0 += 0 * numbers[i];
        }
        return s0 + s1 + (s2 + s3) == 0;
    }
}
