package org.stillpath.medium;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;

/**
 * A quantity tabulated along one coordinate and joined by a spline.
 *
 * <p>Every knot is a seam: a cubic spline's third derivative jumps there even in its smoothest form, which would cost a
 * high-order integrator its order if it stepped across.
 */
public final class Profile implements ScalarField {
    private final Along along;
    private final Spline spline;
    private final List<String> warnings;

    private Profile(Along along, Spline spline, List<String> warnings) {
        this.along = along;
        this.spline = spline;
        this.warnings = warnings;
    }

    /**
     * A profile along a coordinate.
     *
     * @param spline the quantity in SI against the coordinate in metres; for {@link Along#R} and {@link Along#RHO} its
     *     knots must not be negative
     * @param shown what has to be added to a value of the spline to show it in a message: 1 where it holds n − 1
     */
    public static Profile of(Along along, Spline spline, double shown) {
        if (along.isDistance() && spline.first() < 0) {
            throw new IllegalArgumentException("knots along a distance must not be negative: " + spline.first());
        }
        return new Profile(along, spline, told(along.word(), along.isDistance(), spline, shown));
    }

    /**
     * What is doubtful about a table.
     *
     * @param word the coordinate
     * @param distance whether it ends at 0
     * @param shown what has to be added to a value of the spline to show it
     */
    static List<String> told(String word, boolean distance, Spline spline, double shown) {
        List<String> told = new ArrayList<>();
        Spline.Overshoot over = spline.overshoot();
        if (over.cells() > 0) {
            told.add(String.format(
                    Locale.ROOT,
                    "the %s leaves the range of its data by %.3g at %s = %s, between two knots%s; "
                            + "`interpolate: monotone` would not",
                    spline.interpolation().word() + (spline.interpolation() == Interpolation.CLAMPED ? " spline" : ""),
                    over.amount(),
                    word,
                    Told.length(over.place()),
                    over.cells() > 1 ? " (and in " + (over.cells() - 1) + " other places)" : ""));
        }
        if (distance && spline.first() == 0) {
            double slope = spline.slope(0, 0);
            double span = spline.last() - spline.first();
            double range = range(spline);
            if (Math.abs(slope) * span > 1e-9 * range) {
                told.add(String.format(
                        Locale.ROOT,
                        "the slope at %s = 0 is %.3g 1/mm, so that the profile has a tip on the axis; "
                                + "`interpolate: clamped` makes it flat there",
                        word,
                        slope * 1e-3));
            }
        }
        for (int c : new int[] {Spline.BELOW, spline.knots().length - 1}) {
            double edge = c < 0 ? spline.first() : spline.last();
            double rate = spline.slope(spline.cell(edge), edge) / spline.value(edge);
            if (spline.beyond() == Beyond.EXPONENTIAL && (c < 0 ? rate < 0 : rate > 0) && !(distance && edge == 0)) {
                told.add(String.format(
                        Locale.ROOT,
                        "beyond %s = %s the exponential grows away from the value %.9g at the edge",
                        word,
                        Told.length(edge),
                        spline.value(edge) + shown));
            }
        }
        return List.copyOf(told);
    }

    @Override
    public Optional<ScalarField> joinedOtherwise() {
        return spline.joinedOtherwise().map(s -> new Profile(along, s, warnings));
    }

    /** The coordinate that the table runs along. */
    public Along along() {
        return along;
    }

    /** The table. */
    public Spline spline() {
        return spline;
    }

    @Override
    public void sample(double[] x, double[] y, double[] z, int count, double wavelength, Order order, Samples out) {
        for (int i = 0; i < count; i++) {
            double u = along.at(x[i], y[i], z[i]);
            point(spline.cell(u), u, x[i], y[i], z[i], order, out, i);
        }
    }

    private void point(int c, double u, double x, double y, double z, Order order, Samples out, int i) {
        out.value[i] = spline.value(c, u);
        if (order != Order.VALUE) {
            along.spread(u, spline.slope(c, u), spline.curvature(c, u), x, y, z, order, out, i);
        }
    }

    @Override
    public List<Level> limits() {
        if (spline.beyond() != Beyond.FAULT) {
            return List.of();
        }
        List<Level> list = new ArrayList<>();
        if (!(along.isDistance() && spline.first() == 0)) {
            list.add(new EdgeLevel(new AlongLevel(along), spline.first(), false));
        }
        list.add(new EdgeLevel(new AlongLevel(along), spline.last(), true));
        return List.copyOf(list);
    }

    @Override
    public List<Seam> seams(double wavelength) {
        double[] knots = spline.knots();
        return List.of(new Seam(new AlongLevel(along), Arrays.copyOfRange(knots, firstSeam(), knots.length)));
    }

    @Override
    public ScalarField piece(int[] cells) {
        return new Piece(this, cells[0] + firstSeam() - 1);
    }

    /** Number of the knot that is the first seam: a distance never passes below 0. */
    private int firstSeam() {
        return along.isDistance() && spline.first() == 0 ? 1 : 0;
    }

    /**
     * One cell's cubic, or what goes on beyond the table, everywhere.
     *
     * @param whole the profile
     * @param cell cell of its spline
     */
    private record Piece(Profile whole, int cell) implements ScalarField {
        @Override
        public void sample(double[] x, double[] y, double[] z, int count, double wavelength, Order order, Samples out) {
            for (int i = 0; i < count; i++) {
                whole.point(cell, whole.along.at(x[i], y[i], z[i]), x[i], y[i], z[i], order, out, i);
            }
        }

        @Override
        public String explain(double x, double y, double z, double wavelength) {
            return whole.explain(x, y, z, wavelength);
        }
    }

    @Override
    public String explain(double x, double y, double z, double wavelength) {
        return outside(along.word(), along.at(x, y, z), spline);
    }

    /** Why a table has no value at a coordinate, in words; empty where it has one. */
    static String outside(String word, double u, Spline spline) {
        if (spline.beyond() == Beyond.FAULT && (u < spline.first() || u > spline.last())) {
            return word + " = " + Told.length(u) + " is outside the table, which runs from "
                    + Told.length(spline.first()) + " to " + Told.length(spline.last())
                    + "; `beyond:` says what holds there";
        }
        return "";
    }

    @Override
    public List<String> warnings() {
        return warnings;
    }

    private static double range(Spline spline) {
        double low = Double.POSITIVE_INFINITY;
        double high = Double.NEGATIVE_INFINITY;
        for (double v : spline.values()) {
            low = Math.min(low, v);
            high = Math.max(high, v);
        }
        return high - low;
    }
}
