/**
 * The invented company's data and the truth behind it. {@link org.meltbook.scenario.ScenarioGenerator} writes
 * {@code data/scenario} from {@link org.meltbook.scenario.Truth}; tests hold what the library finds against the same
 * truth. All of it lies in the test tree: neither the library nor a notebook can see it. May use: what tests may use.
 * Example: {@code Truth.load().fluid(lot, 463.15).viscosity(1)} is the true viscosity in Pa·s of a lot at 190 °C.
 */
package org.meltbook.scenario;
