/**
 * The report: what a field's gas does, on one page for people and in one JSON document for machines.
 *
 * <p><b>Words.</b> The <em>numbers</em> are the JSON document ({@link org.whither.io.report.ReportNumbers}); every figure
 * on the page is looked up in it by a JSON pointer, so that the two cannot differ. The <em>page</em>
 * ({@link org.whither.io.report.ReportPage}) is made from a text template with escaping on: no text of a field file is
 * ever taken for markup. Nothing in the numbers depends on the time, the machine or the number of threads; the date of a
 * report stands on its page alone.
 */
package org.whither.io.report;
