package org.meltbook.fit;

/**
 * Puts the parameters that enter linearly where the sum of squares is least for the others, by one linear least-squares
 * problem, so that only the others have to be searched for. A damped step in all parameters, the linear ones undamped
 * and then put there, is the step of variable projection in L. Kaufman's form, BIT 15 (1975) 49 (memory).
 */
final class Projection {
    private final Workspace workspace;
    private final int rows;
    private final int[] places; // coordinates of the linear parameters
    private final int[] used;
    private final double[] residuals;
    private final double[] jacobian;
    private final double[] matrix;
    private final double[] heads;
    private final double[] change;

    Projection(Workspace workspace) {
        this.workspace = workspace;
        this.rows = workspace.points();
        this.places = workspace.linear();
        this.used = new int[places.length];
        boolean any = places.length > 0;
        this.residuals = new double[any ? rows : 0];
        this.jacobian = new double[any ? rows * workspace.coordinates() : 0];
        this.matrix = new double[rows * places.length];
        this.heads = new double[places.length];
        this.change = new double[places.length];
    }

    /** Coordinates of the parameters that enter linearly. */
    int[] places() {
        return places;
    }

    /** Moves the linear coordinates that are not held, unless that would take one out of its bounds. */
    void apply(double[] coordinates, boolean[] held) {
        int m = 0;
        for (int j : places) {
            if (!held[j]) {
                used[m++] = j;
            }
        }
        if (m == 0 || !workspace.linearise(coordinates, residuals, jacobian)) {
            return;
        }
        for (int c = 0; c < m; c++) {
            System.arraycopy(jacobian, used[c] * rows, matrix, c * rows, rows);
        }
        Reflections.reduce(matrix, rows, m, residuals, heads);
        for (int c = m - 1; c >= 0; c--) {
            double sum = -residuals[c];
            for (int d = c + 1; d < m; d++) {
                sum -= matrix[d * rows + c] * change[d];
            }
            change[c] = sum / matrix[c * rows + c];
        }
        for (int c = 0; c < m; c++) {
            double moved = workspace.movedBy(used[c], coordinates[used[c]], change[c]);
            if (!(moved >= workspace.lowest(used[c]) && moved <= workspace.highest(used[c]))) {
                return;
            }
        }
        for (int c = 0; c < m; c++) {
            coordinates[used[c]] = workspace.movedBy(used[c], coordinates[used[c]], change[c]);
        }
    }
}
