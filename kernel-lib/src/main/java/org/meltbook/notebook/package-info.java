/**
 * Where kernel and library meet: the facade for cells, renderers, the headless runner, the command line.
 *
 * <p>May use: everything. Example: {@code meltbook run notebooks --into target/reports --check}.
 */
package org.meltbook.notebook;
