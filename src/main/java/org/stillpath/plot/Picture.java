package org.stillpath.plot;

import java.util.List;

/**
 * A laid-out figure: strokes, areas and words at places in points, 1/72 inch, x to the right and y downward from the upper
 * left corner. Immutable.
 */
public final class Picture {
    private final String title;
    private final String description;
    private final double width;
    private final double height;
    private final List<Item> items;
    private final List<Label> labels;
    private final List<String> unplaced;

    Picture(
            String title,
            String description,
            double width,
            double height,
            List<Item> items,
            List<Label> labels,
            List<String> unplaced) {
        this.title = title;
        this.description = description;
        this.width = width;
        this.height = height;
        this.items = List.copyOf(items);
        this.labels = List.copyOf(labels);
        this.unplaced = List.copyOf(unplaced);
    }

    /**
     * Words in the picture and the room that they take, in points.
     *
     * @param text the words
     * @param left left edge; {@code top}, {@code right} and {@code bottom} likewise, y downward
     */
    public record Label(String text, double left, double top, double right, double bottom) {}

    /** The picture's title, which is the figure's answer. */
    public String title() {
        return title;
    }

    /** What the picture shows, in words, for readers who cannot see it. */
    public String description() {
        return description;
    }

    /** Width in millimetres. */
    public double widthMillimetres() {
        return width / 72 * 25.4;
    }

    /** Height in millimetres. */
    public double heightMillimetres() {
        return height / 72 * 25.4;
    }

    /** Width in points. */
    double width() {
        return width;
    }

    /** Height in points. */
    double height() {
        return height;
    }

    /** What is drawn, from the back to the front. */
    List<Item> items() {
        return items;
    }

    /** Every piece of text with its place: title, ticks, labels. */
    public List<Label> labels() {
        return labels;
    }

    /** Labels for which no free place was found; {@link #description()} tells them. */
    public List<String> unplaced() {
        return unplaced;
    }

    /**
     * The picture as an SVG document, without an XML declaration, so that it may stand in a page. Encode it as UTF-8.
     */
    public String svg() {
        return new SvgWriter(this).document();
    }

    /** The picture as a PNG file of 200 dots an inch. */
    public byte[] png() {
        return new Raster(this).png();
    }
}
