/**
 * Floor 9: a result and its figures as text for a terminal and as one self-contained page.
 *
 * <p>Both start with the answer. {@link org.stillpath.report.TextReport} is plain text of at most 80 columns; {@link
 * org.stillpath.report.HtmlReport} is one file without scripts or outside references. Labels for people are made here
 * only: names of quantities, statuses, methods and conventions.
 */
@NullMarked
package org.stillpath.report;

import org.jspecify.annotations.NullMarked;
