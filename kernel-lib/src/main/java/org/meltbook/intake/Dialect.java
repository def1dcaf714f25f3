package org.meltbook.intake;

/**
 * How a file is written.
 *
 * @param encoding  how its bytes are letters
 * @param delimiter what stands between cells
 * @param decimal   how numbers are written
 */
record Dialect(String encoding, Delimiter delimiter, DecimalSign decimal) {}
