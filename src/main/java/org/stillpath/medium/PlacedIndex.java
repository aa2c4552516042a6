package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import org.jspecify.annotations.Nullable;
import org.stillpath.formula.Order;
import org.stillpath.formula.PerThread;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Vector;

/**
 * The index field of a scalar field that stands in a frame: points are carried into the frame, derivatives back.
 *
 * <p>The index is n = factor·(base + f) with the scalar f. Where {@code base} is 1 the scalar is a refractivity, and n² −
 * 1 = N(2 + N), n∇n = (1 + N)∇N keep its digits. A frame that is only shifted costs three subtractions a point, the
 * job's own frame nothing.
 */
final class PlacedIndex implements IndexField {
    private final ScalarField scalar;
    private final boolean fromOne;
    private final double excessFactor;
    private final double wavelength;
    private final Frame frame;
    private final boolean moved;
    private final boolean turned;
    private final List<Level> limits;
    private final List<Seam> seams;
    private final PerThread<Scratch> scratch;
    /**
     * Pieces between the knots of a single seam, made when they are first asked for. Several threads may make the same
     * one; all its fields are final, so that either serves.
     */
    private final @Nullable PlacedIndex[] pieces;
    /** Samples many points of this field at once; null where it was not made ready for that. */
    private final ScalarField.@Nullable ManyPoints many;

    /**
     * Places a scalar field.
     *
     * @param scalar the scalar f in its own frame
     * @param fromOne whether f is n − 1, else n
     * @param excessFactor what the index is multiplied with, less 1: the refractivity of air for an index relative to it
     * @param wavelength vacuum wavelength in metres; NaN where none is needed
     * @param frame where the scalar's frame lies in the job
     * @param valid further margins, in the scalar's frame
     */
    PlacedIndex(
            ScalarField scalar,
            boolean fromOne,
            double excessFactor,
            double wavelength,
            Frame frame,
            List<Level> valid) {
        this.scalar = scalar;
        this.fromOne = fromOne;
        this.excessFactor = excessFactor;
        this.wavelength = wavelength;
        this.frame = frame;
        this.moved = !frame.equals(Frame.JOB);
        this.turned = !frame.isShiftOnly();
        List<Level> margins = new ArrayList<>();
        for (Level l : valid) {
            margins.add(FramedLevel.of(l, frame));
        }
        for (Level l : scalar.limits()) {
            margins.add(FramedLevel.of(l, frame));
        }
        this.limits = List.copyOf(margins);
        this.seams = scalar.seams(wavelength).stream()
                .map(s -> new Seam(FramedLevel.of(s.coordinate(), frame), s.knots()))
                .toList();
        this.scratch = PerThread.of(Scratch::new);
        this.pieces = new PlacedIndex[seams.size() == 1 ? seams.get(0).count() + 1 : 0];
        this.many = null;
    }

    /** A piece of a field: the same but for its scalar, and smooth. */
    private PlacedIndex(PlacedIndex whole, ScalarField piece) {
        this(whole, piece, null);
    }

    private PlacedIndex(PlacedIndex whole, ScalarField piece, ScalarField.@Nullable ManyPoints many) {
        this.scalar = piece;
        this.fromOne = whole.fromOne;
        this.excessFactor = whole.excessFactor;
        this.wavelength = whole.wavelength;
        this.frame = whole.frame;
        this.moved = whole.moved;
        this.turned = whole.turned;
        this.limits = whole.limits;
        this.seams = List.of();
        this.scratch = whole.scratch;
        this.pieces = new PlacedIndex[0];
        this.many = many;
    }

    @Override
    public IndexField forBundles() {
        if (!seams.isEmpty() || excessFactor != 0) {
            return this;
        }
        return scalar.manyPoints(fromOne)
                .map(ready -> new PlacedIndex(this, scalar, ready))
                .orElse(this);
    }

    @Override
    public void sample(double[] x, double[] y, double[] z, int count, Order order, Samples out) {
        if (many != null && order != Order.VALUE) {
            if (moved) {
                Scratch s = scratch.get().with(count);
                carry(x, y, z, count, s);
                many.sample(s.x, s.y, s.z, count, wavelength, order, out);
                for (int i = 0; turned && i < count; i++) {
                    turn(order, out, i);
                }
            } else {
                many.sample(x, y, z, count, wavelength, order, out);
            }
            return;
        }
        if (moved) {
            Scratch s = scratch.get().with(count);
            carry(x, y, z, count, s);
            scalar.sample(s.x, s.y, s.z, count, wavelength, order, out);
        } else {
            scalar.sample(x, y, z, count, wavelength, order, out);
        }
        fill(count, order, out);
    }

    @Override
    public boolean ofHeightAlone() {
        return scalar.ofHeightAlone();
    }

    @Override
    public List<Level> limits() {
        return limits;
    }

    @Override
    public List<Seam> seams() {
        return seams;
    }

    @Override
    public boolean runsThroughSeams() {
        return seams.isEmpty() || scalar.runsThroughSeams();
    }

    @Override
    public IndexField piece(int[] cells) {
        if (pieces.length == 0) {
            ScalarField piece = scalar.piece(cells);
            return piece == scalar ? this : new PlacedIndex(this, piece);
        }
        PlacedIndex known = pieces[cells[0]];
        if (known == null) {
            ScalarField piece = scalar.piece(cells);
            known = piece == scalar ? this : new PlacedIndex(this, piece);
            pieces[cells[0]] = known;
        }
        return known;
    }

    @Override
    public String explain(double x, double y, double z) {
        Vector p = frame.fromJob(new Vector(x, y, z));
        String why = scalar.explain(p.x(), p.y(), p.z(), wavelength);
        if (!why.isEmpty()) {
            return why + at(x, y, z);
        }
        Scratch s = new Scratch().point(p.x(), p.y(), p.z());
        scalar.sample(s.x, s.y, s.z, 1, wavelength, Order.VALUE, s.samples);
        double n = s.samples.value[0] + (fromOne ? 1 : 0);
        if (n > 0 && Double.isFinite(n)) {
            return "";
        }
        return String.format(Locale.ROOT, "the index is %.6g, and it must be above 0%s", n, at(x, y, z));
    }

    private static String at(double x, double y, double z) {
        return ", at [" + Told.length(x) + ", " + Told.length(y) + ", " + Told.length(z) + "]";
    }

    /** Turns samples of the scalar into samples of n² − 1, in place. */
    private void fill(int count, Order order, Samples out) {
        double k = 1 + excessFactor;
        for (int i = 0; i < count; i++) {
            double f = out.value[i];
            // N = k(1 + f) − 1 = (k − 1) + k f, or k f − 1
            double refractivity = fromOne ? excessFactor + k * f : k * f - 1;
            double n = fromOne ? 1 + refractivity : k * f;
            if (!(n > 0 && n < Double.POSITIVE_INFINITY)) {
                out.value[i] = Double.NaN;
            } else {
                out.value[i] = refractivity * (2 + refractivity);
            }
            if (order == Order.VALUE) {
                continue;
            }
            double gx = k * out.gx[i];
            double gy = k * out.gy[i];
            double gz = k * out.gz[i];
            out.gx[i] = n * gx;
            out.gy[i] = n * gy;
            out.gz[i] = n * gz;
            if (order == Order.HESSIAN) {
                double nk = n * k;
                out.hxx[i] = nk * out.hxx[i] + gx * gx;
                out.hxy[i] = nk * out.hxy[i] + gx * gy;
                out.hxz[i] = nk * out.hxz[i] + gx * gz;
                out.hyy[i] = nk * out.hyy[i] + gy * gy;
                out.hyz[i] = nk * out.hyz[i] + gy * gz;
                out.hzz[i] = nk * out.hzz[i] + gz * gz;
            }
            if (turned) {
                turn(order, out, i);
            }
        }
    }

    private void carry(double[] x, double[] y, double[] z, int count, Scratch s) {
        Vector o = frame.origin();
        double ox = o.x();
        double oy = o.y();
        double oz = o.z();
        if (!turned) {
            for (int i = 0; i < count; i++) {
                s.x[i] = x[i] - ox;
                s.y[i] = y[i] - oy;
                s.z[i] = z[i] - oz;
            }
            return;
        }
        Vector a = frame.ex();
        Vector b = frame.ey();
        Vector c = frame.ez();
        for (int i = 0; i < count; i++) {
            double dx = x[i] - ox;
            double dy = y[i] - oy;
            double dz = z[i] - oz;
            s.x[i] = dx * a.x() + dy * a.y() + dz * a.z();
            s.y[i] = dx * b.x() + dy * b.y() + dz * b.z();
            s.z[i] = dx * c.x() + dy * c.y() + dz * c.z();
        }
    }

    /** Turns gradient and Hessian from the frame's axes to the job's: g → R g, H → R H Rᵀ with R = (ex ey ez). */
    private void turn(Order order, Samples out, int i) {
        Vector a = frame.ex();
        Vector b = frame.ey();
        Vector c = frame.ez();
        double gx = out.gx[i];
        double gy = out.gy[i];
        double gz = out.gz[i];
        out.gx[i] = gx * a.x() + gy * b.x() + gz * c.x();
        out.gy[i] = gx * a.y() + gy * b.y() + gz * c.y();
        out.gz[i] = gx * a.z() + gy * b.z() + gz * c.z();
        if (order != Order.HESSIAN) {
            return;
        }
        double xx = out.hxx[i];
        double xy = out.hxy[i];
        double xz = out.hxz[i];
        double yy = out.hyy[i];
        double yz = out.hyz[i];
        double zz = out.hzz[i];
        // columns of H Rᵀ: H times the rows of R, which are (a.x b.x c.x), (a.y b.y c.y), (a.z b.z c.z)
        double px = xx * a.x() + xy * b.x() + xz * c.x();
        double py = xy * a.x() + yy * b.x() + yz * c.x();
        double pz = xz * a.x() + yz * b.x() + zz * c.x();
        double qx = xx * a.y() + xy * b.y() + xz * c.y();
        double qy = xy * a.y() + yy * b.y() + yz * c.y();
        double qz = xz * a.y() + yz * b.y() + zz * c.y();
        double rx = xx * a.z() + xy * b.z() + xz * c.z();
        double ry = xy * a.z() + yy * b.z() + yz * c.z();
        double rz = xz * a.z() + yz * b.z() + zz * c.z();
        out.hxx[i] = a.x() * px + b.x() * py + c.x() * pz;
        out.hxy[i] = a.x() * qx + b.x() * qy + c.x() * qz;
        out.hxz[i] = a.x() * rx + b.x() * ry + c.x() * rz;
        out.hyy[i] = a.y() * qx + b.y() * qy + c.y() * qz;
        out.hyz[i] = a.y() * rx + b.y() * ry + c.y() * rz;
        out.hzz[i] = a.z() * rx + b.z() * ry + c.z() * rz;
    }
}
