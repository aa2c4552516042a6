/**
 * Floor 8: figures as data to pictures, in one house theme.
 *
 * <p>{@link org.stillpath.plot.Pictures#of Pictures.of(figure, width)} lays a {@link org.stillpath.task.Figure} out once,
 * in points (1/72 inch), and gives a {@link org.stillpath.plot.Picture}: a list of strokes, areas and words that is written
 * as SVG (words stay words) or painted as PNG at 200 dots an inch. Axes and lines are a JFreeChart ({@code Chart}), which
 * draws on a sheet that keeps its strokes as items; what stands beside them, and where labels find room, is decided here.
 * A new kind of figure is one class beside {@code SectionDrawing} and one line in {@code Pictures}.
 *
 * <p>Words are set with a typeface that ships with the program and is read here, not by the Java font system: that one
 * fails at the first word on a machine without fontconfig, even for a font of one's own, and its widths depend on the
 * machine. So a picture needs nothing from the system but Java's own rasteriser ({@code libawt}), and comes out the same
 * everywhere.
 *
 * <p>An SVG may be put into a page as it stands: it has no ids, no scripts and no style sheet. Elements in neutral colours
 * carry a class, so that a dark page can turn them about: {@code s-} (stroke) or {@code f-} (fill) with {@code ink},
 * {@code grey}, {@code light} or {@code paper}; the shading is {@code image.shading}.
 */
@NullMarked
package org.stillpath.plot;

import org.jspecify.annotations.NullMarked;
