/**
 * Pages: markdown, formulas, tables and pictures to HTML that needs no network.
 *
 * <p>May use: everything but {@code table}, {@code chart}, {@code kernel}, {@code notebook}. Example:
 * {@code Page.of("Melt A", "", List.of(new Block.Prose("# Melt A")), new Formulas()).html()}.
 */
package org.meltbook.report;
