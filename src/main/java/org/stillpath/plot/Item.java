package org.stillpath.plot;

/** One thing drawn, in points, y downward. Arrays are made for the item alone and not changed afterwards. */
sealed interface Item {
    /** A line through points. */
    record Stroke(double[] x, double[] y, Pen pen) implements Item {}

    /** A filled polygon. */
    record Area(double[] x, double[] y, Ink ink) implements Item {}

    /** A filled circle. */
    record Dot(double x, double y, double radius, Ink ink) implements Item {}

    /**
     * Colours on a raster over a rectangle.
     *
     * @param x left edge; {@code y} upper edge
     * @param argb 0xAARRGGBB by rows from above
     */
    record Colours(double x, double y, double width, double height, int columns, int rows, int[] argb)
            implements Item {}

    /**
     * Words on one line.
     *
     * @param x left end of the baseline
     * @param y baseline
     * @param halo whether the ground shows as a rim about the letters
     */
    record Words(String text, double x, double y, double size, Typeface face, Ink ink, boolean halo) implements Item {}
}
