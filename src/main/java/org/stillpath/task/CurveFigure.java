package org.stillpath.task;

import java.util.List;

/**
 * Curves over one variable, in one or more panels that show the same data over different ranges.
 *
 * @param name {@code arrival}, ..
 * @param question see {@link Figure#question()}
 * @param answer see {@link Figure#answer()}
 * @param panels from the widest range to the narrowest, at least one
 */
public record CurveFigure(String name, String question, String answer, List<Panel> panels) implements Figure {
    public CurveFigure {
        panels = List.copyOf(panels);
        if (panels.isEmpty()) {
            throw new IllegalArgumentException("panels must be one or more: 0");
        }
    }

    /** What an axis measures, which decides the units it may be written in. */
    public enum Measure {
        /** Metres. */
        LENGTH,
        /** Radians. */
        ANGLE
    }

    /**
     * An axis.
     *
     * @param quantity what it is, in words
     * @param measure what kind of number it is
     * @param low its lower end, SI
     * @param high its upper end, SI, above {@code low}
     * @param linear 0 for a linear axis; else the size up to which it is linear on both sides of zero and beyond which it is
     *     logarithmic
     */
    public record Axis(String quantity, Measure measure, double low, double high, double linear) {
        public Axis {
            if (!(high > low)) {
                throw new IllegalArgumentException("high must be above low, " + low + ": " + high);
            }
            if (!(linear >= 0)) {
                throw new IllegalArgumentException("linear must not be negative: " + linear);
            }
        }
    }

    /**
     * One range of the data.
     *
     * @param title what the range is, in a few words; empty where there is one panel
     * @param across to the right; {@code up} upward
     * @param curves what is drawn as lines
     * @param points what is marked
     */
    public record Panel(String title, Axis across, Axis up, List<Curve> curves, List<Point> points) {
        public Panel {
            curves = List.copyOf(curves);
            points = List.copyOf(points);
        }
    }

    /**
     * A line through samples, with gaps at values that are not numbers.
     *
     * @param label what it is; the same in all panels
     * @param points SI, x ascending, a y for each
     */
    public record Curve(String label, Points points) {
        public Curve {
            if (points.across() != points.up()) {
                throw new IllegalArgumentException(
                        "y must have a value for each x, " + points.across() + ": " + points.up());
            }
        }

        public Curve(String label, double[] x, double[] y) {
            this(label, new Points(x, y));
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
     * A marked point.
     *
     * @param role {@link SectionFigure.Role#MINIMUM}, {@code SADDLE}, {@code DEGENERATE} or, where that is not known,
     *     {@code RAY}
     * @param x SI
     * @param y SI
     */
    public record Point(SectionFigure.Role role, double x, double y) {}
}
