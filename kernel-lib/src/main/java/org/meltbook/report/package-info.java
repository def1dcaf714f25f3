/**
 * Pages: markdown and formulas to HTML that needs no network.
 *
 * <p>May use: everything but {@code table}, {@code chart}, {@code kernel}, {@code notebook}.
 */
package org.meltbook.report;
