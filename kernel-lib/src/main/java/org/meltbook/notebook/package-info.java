/**
 * Where kernel and library meet: the facade for cells, renderers, the headless runner, the command line.
 *
 * <p>May use: everything.
 */
package org.meltbook.notebook;
