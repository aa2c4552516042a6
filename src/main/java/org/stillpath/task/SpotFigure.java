package org.stillpath.task;

import java.util.List;

/**
 * Where rays meet a plane, as data: a spot for each field, all to one scale.
 *
 * @param name name of the figure and stem of its files
 * @param question what it answers, in a few words
 * @param answer the answer as a sentence
 * @param angles whether places are angles in radians, not lengths
 * @param spots one for each field, at least one
 */
public record SpotFigure(String name, String question, String answer, boolean angles, List<Spot> spots)
        implements Figure {
    public SpotFigure {
        spots = List.copyOf(spots);
        if (spots.isEmpty()) {
            throw new IllegalArgumentException("spots must be one or more: 0");
        }
    }

    /**
     * One spot about its middle.
     *
     * @param title what field it is of
     * @param note words below it: its size
     * @param colours the rays of each wavelength, the first wavelength first
     * @param circles what the rays are held against
     */
    public record Spot(String title, String note, List<Colour> colours, List<Circle> circles) {
        public Spot {
            colours = List.copyOf(colours);
            circles = List.copyOf(circles);
        }
    }

    /**
     * Rays of one wavelength.
     *
     * @param label the wavelength; empty where there is one only
     * @param points places about the spot's middle, metres
     */
    public record Colour(String label, Points points) {}

    /**
     * A circle about a spot's middle.
     *
     * @param label what it is, for the legend
     * @param radius metres
     */
    public record Circle(String label, double radius) {}
}
