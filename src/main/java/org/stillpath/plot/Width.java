package org.stillpath.plot;

/** The two widths of a figure on paper. */
public enum Width {
    /** 160 mm: the text width of a page. */
    FULL(160),
    /** 80 mm: one of two columns. */
    HALF(80);

    private final double millimetres;

    Width(double millimetres) {
        this.millimetres = millimetres;
    }

    /** The width in millimetres. */
    public double millimetres() {
        return millimetres;
    }

    /** The width in points, 1/72 inch. */
    double points() {
        return millimetres / 25.4 * 72;
    }
}
