package org.stillpath.path;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Level;

/** Chooses the region about two points in which the least path between them is looked for; see {@link FrontGrid}. */
final class Surroundings {
    /** Samples along the chord, and across it to each side. */
    private static final int SAMPLES = 33;

    /** How much room is left about the ellipse that holds the path. */
    private static final double ROOM = 1.25;
    /** The narrowest region, as a part of the points' distance. */
    private static final double NARROW = 1e-3;

    private static final int WIDENINGS = 12;

    private final IndexField field;
    private final Vector from;
    private final double length;
    private final Vector along;
    private final Vector across;

    Surroundings(IndexField field, Vector from, Vector to) {
        this.field = field;
        this.from = from;
        this.length = distance(from, to);
        this.along = to.minus(from).unit();
        this.across = steepest();
    }

    Surroundings(IndexField field, Vector from, Vector to, Vector across) {
        this.field = field;
        this.from = from;
        this.length = distance(from, to);
        this.along = to.minus(from).unit();
        Vector a = perpendicular(across);
        if (!(a.norm() > 1e-9 * across.norm())) {
            throw new IllegalArgumentException("across must span a plane with the two points: " + across);
        }
        // once more, so that what was nearly along the chord is perpendicular to rounding
        this.across = perpendicular(a.unit()).unit();
    }

    private static double distance(Vector from, Vector to) {
        double d = to.minus(from).norm();
        if (!(d > 0)) {
            throw new IllegalArgumentException("the two points must differ: " + from);
        }
        return d;
    }

    FrontGrid grid(int dimensions, int cells) {
        if (cells < 16 || cells % 4 != 0) {
            throw new IllegalArgumentException("cells must be a multiple of 4, at least 16: " + cells);
        }
        double reach = reach();
        double step = length / cells;
        // so much the ellipse is longer than the chord, at each end
        double over = ROOM * (Math.hypot(length, 2 * reach) - length) / 2;
        int margin = 4 * (int) Math.max(1, Math.min(cells / 8.0, Math.ceil(over / step / 4)));
        List<FrontGrid.Axis> axes = new ArrayList<>();
        axes.add(new FrontGrid.Axis(along, step, cells + 2 * margin + 1));
        Vector origin = from.plus(-margin * step, along);
        Vector[] directions = {across, perpendicular(along.cross(across)).unit()};
        for (int k = 1; k < dimensions; k++) {
            Vector e = directions[k - 1];
            double low = free(e.times(-1), reach);
            double high = free(e, reach);
            // the chord keeps its place on a node that all three grids have
            int below = 4 * (int) Math.max(1, Math.min(cells / 4 - 1, Math.round(cells * low / (low + high) / 4)));
            double spacing = Math.max(low / below, high / (cells - below));
            axes.add(new FrontGrid.Axis(e, spacing, cells + 1));
            origin = origin.plus(-below * spacing, e);
        }
        return new FrontGrid(origin, axes);
    }

    /** Half the width of the region: the half width of the ellipse |q − from| + |q − to| ≤ S/n with the least n in it. */
    private double reach() {
        if (field.uniform()) {
            return length / 4;
        }
        Samples out = line(Vector.ZERO);
        double sum = 0;
        for (int i = 0; i < SAMPLES; i++) {
            // Simpson's rule
            double w = i == 0 || i == SAMPLES - 1 ? 1 : i % 2 == 1 ? 4 : 2;
            sum += w * refractivity(out.value[i]) / (3.0 * (SAMPLES - 1));
        }
        if (Double.isNaN(sum)) {
            return length;
        }
        double width = NARROW * length;
        for (int i = 0; i < WIDENINGS && width < length; i++) {
            double least = sum;
            for (Vector e : List.of(across, along.cross(across))) {
                for (int j = -SAMPLES; j <= SAMPLES; j++) {
                    Samples side = line(e.times(width * j / SAMPLES));
                    for (int m = 0; m < SAMPLES; m++) {
                        double n = refractivity(side.value[m]);
                        least = n < least ? n : least;
                    }
                }
            }
            // S/n = L(1 + t), half width ½L√((1 + t)² − 1)
            double t = (sum - least) / (1 + least);
            double need = ROOM * 0.5 * length * Math.sqrt(t * (2 + t));
            if (need <= width) {
                return width;
            }
            width = Math.max(1.5 * width, Math.min(need, 2 * width));
        }
        return Math.min(width, length);
    }

    private static double refractivity(double e) {
        return e / (1 + Math.sqrt(1 + e));
    }

    /** How far across the chord the field reaches, at most {@code reach}. */
    private double free(Vector direction, double reach) {
        for (int j = SAMPLES; j > 0; j--) {
            Samples out = line(direction.times(reach * j / SAMPLES));
            for (int i = 0; i < SAMPLES; i++) {
                if (!Double.isNaN(out.value[i])) {
                    return reach * j / SAMPLES;
                }
            }
        }
        return reach / SAMPLES;
    }

    /** The perpendicular direction in which n² changes most along the chord. */
    private Vector steepest() {
        Samples out = line(Vector.ZERO);
        Vector best = Vector.ZERO;
        for (int i = 0; i < SAMPLES; i++) {
            if (Double.isFinite(out.gx[i] + out.gy[i] + out.gz[i])) {
                Vector g = perpendicular(new Vector(out.gx[i], out.gy[i], out.gz[i]));
                best = g.norm() > best.norm() ? g : best;
            }
        }
        Vector up = perpendicular(Vector.Z);
        if (best.norm() * length > 1e-14) {
            Vector e = perpendicular(best.unit()).unit();
            return e.dot(up) < 0 ? e.times(-1) : e;
        }
        return up.norm() > 1e-6 ? perpendicular(up.unit()).unit() : along.perpendicular();
    }

    private Vector perpendicular(Vector v) {
        return v.plus(-v.dot(along), along);
    }

    /** Samples on the chord moved aside; NaN at points outside the field's limits. */
    private Samples line(Vector aside) {
        double[] x = new double[SAMPLES];
        double[] y = new double[SAMPLES];
        double[] z = new double[SAMPLES];
        for (int i = 0; i < SAMPLES; i++) {
            Vector p = from.plus(length * i / (SAMPLES - 1), along).plus(aside);
            x[i] = p.x();
            y[i] = p.y();
            z[i] = p.z();
        }
        Samples out = new Samples(SAMPLES);
        field.sample(x, y, z, SAMPLES, Order.GRADIENT, out);
        double[] g = new double[3];
        for (int i = 0; i < SAMPLES; i++) {
            boolean inside = out.value[i] > -1;
            for (Level l : field.limits()) {
                inside = inside && l.value(x[i], y[i], z[i], g) >= 0;
            }
            out.value[i] = inside ? out.value[i] : Double.NaN;
        }
        return out;
    }
}
