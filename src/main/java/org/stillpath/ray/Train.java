package org.stillpath.ray;

import java.util.List;
import org.stillpath.medium.IndexField;

/**
 * Media and surfaces in the order in which light meets them. A train without surfaces is one medium everywhere.
 *
 * @param from the medium before the first surface
 * @param elements the surfaces in order
 */
public record Train(IndexField from, List<Element> elements) {
    public Train {
        elements = List.copyOf(elements);
    }

    /** One medium everywhere. */
    public static Train through(IndexField medium) {
        return new Train(medium, List.of());
    }

    /** The medium behind element {@code i}, or the medium at the start for −1. */
    public IndexField behind(int i) {
        return i < 0 ? from : elements.get(i).into();
    }
}
