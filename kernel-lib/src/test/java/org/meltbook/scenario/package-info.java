/**
 * The invented company's data and the truth behind it. {@link org.meltbook.scenario.ScenarioGenerator} writes
 * {@code data/scenario} from {@link org.meltbook.scenario.Truth}; tests hold what the library finds against the same truth.
 * All of it lies in the test tree: neither the library nor a notebook can see it.
 */
package org.meltbook.scenario;
