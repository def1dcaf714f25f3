/**
 * The little that Commons Math lacks: non-negative least squares first.
 *
 * <p>May use: {@code base}.
 */
package org.meltbook.numeric;
