package org.stillpath.task;

import java.util.Arrays;
import java.util.List;
import java.util.Optional;

/**
 * A cut through a scene: rays or paths over the index as shading, surfaces, stops, object and image. All coordinates in
 * metres: u runs to the right, v upward.
 *
 * @param name {@code rays}, {@code construction}, ..
 * @param question see {@link Figure#question()}
 * @param answer see {@link Figure#answer()}
 * @param across what u is: {@code z}, {@code distance along the sight}
 * @param up what v is: {@code y}, {@code height above ground}
 * @param shading the index over the section, if it varies
 * @param fronts optical length from the start, drawn as its level lines, if it was computed
 * @param lines everything drawn as a line, in drawing order
 * @param marks named points
 */
public record SectionFigure(
        String name,
        String question,
        String answer,
        String across,
        String up,
        Optional<Shading> shading,
        Optional<Shading> fronts,
        List<Line> lines,
        List<Mark> marks)
        implements Figure {

    public SectionFigure {
        lines = List.copyOf(lines);
        marks = List.copyOf(marks);
    }

    /** A section without wavefronts. */
    public SectionFigure(
            String name,
            String question,
            String answer,
            String across,
            String up,
            Optional<Shading> shading,
            List<Line> lines,
            List<Mark> marks) {
        this(name, question, answer, across, up, shading, Optional.empty(), lines, marks);
    }

    /** What a line is, which decides how it is drawn. */
    public enum Role {
        /** A ray of light. */
        RAY,
        /** A stationary path that no neighbour is shorter than. */
        MINIMUM,
        /** A stationary path with shorter and longer neighbours. */
        SADDLE,
        /** A stationary path with neighbours that are equally long to second order. */
        DEGENERATE,
        /** A path from a sighted target that shows it erect. */
        ERECT,
        /** A path from a sighted target that shows it inverted. */
        INVERTED,
        /** The distance between a path and the ground at its lowest. */
        CLEARANCE,
        /** A ray that ended early: clipped, missed, outside, totally reflected or lost. */
        LOST_RAY,
        /** One of the principal rays of the construction of an image. */
        PRINCIPAL_RAY,
        /** The backward extension of light to a virtual image, and other helping lines. */
        EXTENSION,
        /** A refracting surface or an edge of a lens. */
        SURFACE,
        /** A mirror. */
        MIRROR,
        /** The ground of a sightline, hatched below. */
        GROUND,
        /** An ideal thin lens, drawn as a line with tips. */
        THIN_LENS,
        /** The opaque part of a stop, or the rim of an aperture. */
        STOP,
        /** The optical axis. */
        AXIS,
        /** A principal or focal plane, or another plane of reference. */
        PLANE,
        /** The object, an arrow from its foot (first point) to its tip (last point). */
        OBJECT,
        /** A real image, an arrow likewise. */
        IMAGE,
        /** A virtual image, an arrow likewise. */
        VIRTUAL_IMAGE
    }

    /**
     * A line through points, pen down throughout.
     *
     * @param role what it is
     * @param label words beside the line; empty for none
     * @param points metres, two or more
     */
    public record Line(Role role, String label, Points points) {
        public Line {
            if (points.across() != points.up() || points.across() < 2) {
                throw new IllegalArgumentException(
                        "a line needs two or more points: " + points.across() + ", " + points.up());
            }
        }

        public Line(Role role, String label, double[] u, double[] v) {
            this(role, label, new Points(u, v));
        }

        /** Values to the right (a copy). */
        public double[] u() {
            return points.x();
        }

        /** Values upward (a copy). */
        public double[] v() {
            return points.y();
        }
    }

    /**
     * A named point: F, F′, H, H′, the target.
     *
     * @param label its name
     * @param u coordinate to the right, metres
     * @param v coordinate upward, metres
     */
    public record Mark(String label, double u, double v) {}

    /**
     * A scalar on a raster of cell centres over a rectangle.
     *
     * @param quantity what it is: {@code refractive index}
     * @param unit its unit symbol; {@code 1} for none
     * @param u0 left edge of the rectangle; {@code u1} right edge, {@code v0} lower and {@code v1} upper edge, metres
     * @param columns number of cells across; {@code rows} number upward
     * @param values by rows from below, left to right; NaN where there is no medium to show
     */
    public record Shading(
            String quantity,
            String unit,
            double u0,
            double u1,
            double v0,
            double v1,
            int columns,
            int rows,
            double[] values) {
        public Shading {
            if (values.length != columns * rows) {
                throw new IllegalArgumentException(
                        columns + " x " + rows + " cells need as many values, not " + values.length);
            }
            values = values.clone();
        }

        /** The values by rows from below (a copy). */
        @Override
        public double[] values() {
            return values.clone();
        }

        /** The value of one cell, column and row counted from 0, rows from below. */
        public double value(int column, int row) {
            return values[row * columns + column];
        }

        @Override
        public boolean equals(Object o) {
            return o instanceof Shading s
                    && quantity.equals(s.quantity)
                    && u0 == s.u0
                    && u1 == s.u1
                    && v0 == s.v0
                    && v1 == s.v1
                    && columns == s.columns
                    && Arrays.equals(values, s.values);
        }

        @Override
        public int hashCode() {
            return Arrays.hashCode(values);
        }
    }
}
