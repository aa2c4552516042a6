package org.stillpath.task;

import java.util.List;

/**
 * Panels side by side that share the upward axis: curves, filled shapes, level lines and marks. What a panel shows may lie
 * outside its ranges; it is cut off there.
 *
 * @param name {@code profile}, {@code transfer}, {@code view}
 * @param question see {@link Figure#question()}
 * @param answer see {@link Figure#answer()}
 * @param up the shared axis
 * @param panels from left to right, at least one
 * @param equal whether both directions have one scale, so that shapes keep their form
 */
public record PanelFigure(String name, String question, String answer, Axis up, List<Panel> panels, boolean equal)
        implements Figure {
    public PanelFigure {
        panels = List.copyOf(panels);
        if (panels.isEmpty()) {
            throw new IllegalArgumentException("panels must be one or more: 0");
        }
    }

    /** What an axis measures, which decides the units it may be written in. */
    public enum Measure {
        /** Metres. */
        LENGTH,
        /** Radians, written in minutes of arc or their like. */
        ANGLE,
        /** Kelvin, written in °C. */
        TEMPERATURE,
        /** n − 1, written in ppm. */
        REFRACTIVITY
    }

    /**
     * An axis.
     *
     * @param quantity what it is, in words
     * @param measure what kind of number it is
     * @param low its lower end, SI
     * @param high its upper end, SI, above {@code low}
     */
    public record Axis(String quantity, Measure measure, double low, double high) {
        public Axis {
            if (!(high > low)) {
                throw new IllegalArgumentException("high must be above low, " + low + ": " + high);
            }
        }
    }

    /**
     * One panel.
     *
     * @param title what it shows, in a word or two; may be empty
     * @param across to the right
     * @param shapes filled, from the back to the front
     * @param curves lines
     * @param levels heights of the shared axis that are marked from edge to edge
     * @param marks named points
     */
    public record Panel(
            String title, Axis across, List<Shape> shapes, List<Curve> curves, List<Level> levels, List<Mark> marks) {
        public Panel {
            shapes = List.copyOf(shapes);
            curves = List.copyOf(curves);
            levels = List.copyOf(levels);
            marks = List.copyOf(marks);
        }
    }

    /** Tone of a shape. */
    public enum Tone {
        /** What hides: the ground. */
        GROUND,
        /** Dark parts of a drawn thing. */
        DARK,
        /** Its middle tone. */
        MIDDLE,
        /** Its light parts. */
        WHITE,
        /** Its parts in a signal colour, at the top of a thing. */
        SIGNAL,
        /** Its parts in a second colour, at the foot of a thing. */
        SECOND
    }

    /**
     * A filled polygon.
     *
     * @param points SI, three or more
     */
    public record Shape(Tone tone, Points points) {
        public Shape {
            if (points.across() != points.up() || points.across() < 3) {
                throw new IllegalArgumentException(
                        "a shape needs three or more points: " + points.across() + ", " + points.up());
            }
        }

        public Shape(Tone tone, double[] x, double[] y) {
            this(tone, new Points(x, y));
        }

        /** Values to the right (a copy). */
        public double[] x() {
            return points.x();
        }

        /** Values upward (a copy). */
        public double[] y() {
            return points.y();
        }
    }

    /** What a curve or a mark is, which decides how it is drawn. */
    public enum Style {
        /** A curve of its own. */
        PLAIN,
        /** A second one beside it. */
        SECOND,
        /** A third. */
        THIRD,
        /** Where images are erect. */
        ERECT,
        /** Where images are inverted. */
        INVERTED,
        /** What helps to read the rest. */
        GUIDE,
        /** Where an erect range turns into an inverted one. */
        FOLD,
        /** Words without a mark. */
        NOTE
    }

    /**
     * A line through samples, with gaps at values that are not numbers.
     *
     * @param label what it is, for the legend; empty for none
     * @param points SI, a y for each x
     */
    public record Curve(Style style, String label, Points points) {
        public Curve {
            if (points.across() != points.up()) {
                throw new IllegalArgumentException(
                        "y must have a value for each x, " + points.across() + ": " + points.up());
            }
        }

        public Curve(Style style, String label, double[] x, double[] y) {
            this(style, label, new Points(x, y));
        }

        /** Values to the right (a copy). */
        public double[] x() {
            return points.x();
        }

        /** Values upward (a copy). */
        public double[] y() {
            return points.y();
        }
    }

    /**
     * A marked value of the shared axis.
     *
     * @param label its name; empty for none
     * @param at SI
     */
    public record Level(String label, double at) {}

    /**
     * A marked point.
     *
     * @param label its name; empty for none
     * @param x SI
     * @param y SI
     */
    public record Mark(Style style, String label, double x, double y) {}
}
