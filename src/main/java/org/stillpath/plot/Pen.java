package org.stillpath.plot;

import java.util.List;

/**
 * How a line is drawn.
 *
 * @param ink colour
 * @param width points
 * @param dashes lengths on and off, points; empty for a firm line
 */
record Pen(Ink ink, double width, List<Double> dashes) {
    Pen {
        dashes = List.copyOf(dashes);
    }

    static Pen firm(Ink ink, double width) {
        return new Pen(ink, width, List.of());
    }

    static Pen dashed(Ink ink, double width, Double... dashes) {
        return new Pen(ink, width, List.of(dashes));
    }
}
