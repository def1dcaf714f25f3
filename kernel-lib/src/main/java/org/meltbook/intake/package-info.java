/**
 * Any export becomes measurements with an intake log: the one room that knows file dialects.
 *
 * <p>May use: {@code measure}.
 */
package org.meltbook.intake;
