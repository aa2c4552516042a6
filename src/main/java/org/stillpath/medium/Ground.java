package org.stillpath.medium;

import java.util.Optional;
import java.util.OptionalDouble;

/** The height of the ground above the datum against the distance along the datum, both in metres. Immutable. */
public sealed interface Ground permits Ground.Incline, Ground.Terrain {
    /** Ground of one height. */
    static Ground level(double height) {
        return new Incline(height, 0);
    }

    /**
     * Ground that rises evenly with the distance.
     *
     * @param height at the distance 0
     * @param slope rise over distance
     */
    static Ground slope(double height, double slope) {
        return new Incline(height, slope);
    }

    /** Ground that is tabulated. */
    static Ground profile(Spline heights) {
        return new Terrain(heights, Terrain.WHOLE);
    }

    /** Its height at a distance. */
    double height(double distance);

    /** First derivative of the height. */
    double slope(double distance);

    /** Second derivative of the height, 1/m. */
    double curvature(double distance);

    /** Whether it has one height everywhere. */
    boolean isLevel();

    /** The greatest distance at which it is known; empty where it goes on. */
    OptionalDouble end();

    /** Distances where a derivative of the height jumps, ascending; empty for none. */
    Optional<double[]> knots();

    /** The smooth piece between knots, continued beyond them; {@code cell} counts the knots before it. */
    Ground piece(int cell);

    /**
     * Even ground.
     *
     * @param start height at the distance 0, metres
     * @param rise rise over distance
     */
    record Incline(double start, double rise) implements Ground {
        public Incline {
            if (!Double.isFinite(start) || !Double.isFinite(rise)) {
                throw new IllegalArgumentException("height and slope must be finite: " + start + ", " + rise);
            }
        }

        @Override
        public double height(double distance) {
            return start + rise * distance;
        }

        @Override
        public double slope(double distance) {
            return rise;
        }

        @Override
        public double curvature(double distance) {
            return 0;
        }

        @Override
        public boolean isLevel() {
            return rise == 0;
        }

        @Override
        public OptionalDouble end() {
            return OptionalDouble.empty();
        }

        @Override
        public Optional<double[]> knots() {
            return Optional.empty();
        }

        @Override
        public Ground piece(int cell) {
            return this;
        }
    }

    /**
     * Tabulated ground.
     *
     * @param heights height against distance
     * @param cell the spline's cell that holds everywhere; {@link #WHOLE}: each its own
     */
    record Terrain(Spline heights, int cell) implements Ground {
        /** No cell in particular. */
        static final int WHOLE = -2;

        @Override
        public double height(double distance) {
            return heights.value(at(distance), distance);
        }

        @Override
        public double slope(double distance) {
            return heights.slope(at(distance), distance);
        }

        @Override
        public double curvature(double distance) {
            return heights.curvature(at(distance), distance);
        }

        @Override
        public boolean isLevel() {
            return false;
        }

        @Override
        public OptionalDouble end() {
            return OptionalDouble.of(heights.last());
        }

        @Override
        public Optional<double[]> knots() {
            return Optional.of(heights.knots());
        }

        @Override
        public Ground piece(int knotsBefore) {
            return new Terrain(heights, knotsBefore - 1);
        }

        private int at(double distance) {
            return cell == WHOLE ? heights.cell(distance) : cell;
        }
    }
}
