/**
 * A Java notebook kernel: cells are evaluated by JShell in this process, and spoken to over the Jupyter wire or by a
 * headless runner, through one {@link org.meltbook.kernel.Evaluator}. Knows nothing of rheology.
 *
 * <p>May use: nothing of Meltbook. Example: {@code evaluator.run("1 + 2", outlet)} gives a
 * {@link org.meltbook.kernel.Outcome.Done} whose bundle holds {@code text/plain} = {@code 3}.
 */
package org.meltbook.kernel;
