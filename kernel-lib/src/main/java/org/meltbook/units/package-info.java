/**
 * What a number measures and in which unit: {@link org.meltbook.units.Quantity} kinds, unit symbols as laboratories
 * write them (JSR 385 and UCUM behind {@code LabUnit}), checks of arguments, and
 * {@link org.meltbook.units.Prediction}, the form in which a number leaves the house.
 *
 * <p>May use: {@code base}. Example: {@code LabUnit.parse("mPa·s").toSi(Quantity.VISCOSITY, 12)} is 0.012 Pa·s.
 */
package org.meltbook.units;
