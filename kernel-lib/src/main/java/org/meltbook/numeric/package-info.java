/**
 * The little that Commons Math lacks: {@link org.meltbook.numeric.NonNegativeLeastSquares},
 * {@link org.meltbook.numeric.MatrixExponential}, and the slope of a curve in logarithms,
 * {@link org.meltbook.numeric.LogLogLine}.
 *
 * <p>May use: {@code base}. Example: {@code NonNegativeLeastSquares.solve(a, b, Progress.QUIET).unknowns()}.
 */
package org.meltbook.numeric;
