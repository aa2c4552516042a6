package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.formula.Order;
import org.stillpath.formula.PerThread;
import org.stillpath.formula.Samples;

/**
 * A quantity on the nodes of a rectilinear grid, joined by the tensor product of natural cubic splines: C² throughout.
 *
 * <p>There is one B-spline coefficient a node and a rim of one node around, where a table of ready polynomials would keep
 * 64 numbers a cell; an evaluation sums over 64 neighbours instead, which the processor's cache likes better. Solving for
 * the coefficients takes time in proportion to the number of nodes, line by line along each axis. The cells between
 * grid faces are remembered from point to point within one call only, so that a grid may be shared between threads.
 */
public final class Grid implements ScalarField {
    private static final Along[] AXES = {Along.X, Along.Y, Along.Z};

    private final KnotBasis bx;
    private final KnotBasis by;
    private final KnotBasis bz;
    private final double[] coefficients;
    private final boolean hold;
    private final PerThread<double[]> weights = PerThread.of(() -> new double[36]);

    private Grid(KnotBasis bx, KnotBasis by, KnotBasis bz, double[] coefficients, boolean hold) {
        this.bx = bx;
        this.by = by;
        this.bz = bz;
        this.coefficients = coefficients;
        this.hold = hold;
    }

    /**
     * Joins a grid.
     *
     * @param x places of the nodes along x in metres, ascending, at least two; likewise {@code y} and {@code z}
     * @param values by node, x running fastest, then y: {@code values[i + nx·(j + ny·k)]}; finite
     * @param beyond {@link Beyond#FAULT} or {@link Beyond#HOLD}, the value at the nearest point of the grid
     */
    public static Grid of(double[] x, double[] y, double[] z, double[] values, Beyond beyond) {
        if (beyond != Beyond.FAULT && beyond != Beyond.HOLD) {
            throw new IllegalArgumentException("beyond must be fault or hold: " + beyond);
        }
        if ((long) x.length * y.length * z.length != values.length) {
            throw new IllegalArgumentException("values must be as many as nodes, " + x.length + " x " + y.length + " x "
                    + z.length + ": " + values.length);
        }
        KnotBasis bx = new KnotBasis(x);
        KnotBasis by = new KnotBasis(y);
        KnotBasis bz = new KnotBasis(z);
        return new Grid(bx, by, bz, solved(bx, by, bz, values), beyond == Beyond.HOLD);
    }

    @Override
    public void sample(double[] x, double[] y, double[] z, int count, double wavelength, Order order, Samples out) {
        double[] w = weights.get();
        int ci = 0;
        int cj = 0;
        int ck = 0;
        for (int m = 0; m < count; m++) {
            double px = x[m];
            double py = y[m];
            double pz = z[m];
            if (hold) {
                px = Math.max(bx.first(), Math.min(bx.last(), px));
                py = Math.max(by.first(), Math.min(by.last(), py));
                pz = Math.max(bz.first(), Math.min(bz.last(), pz));
            } else if (!(bx.reaches(px) && by.reaches(py) && bz.reaches(pz))) {
                out.undefine(order, m);
                continue;
            }
            ci = bx.holds(ci, px) ? ci : bx.cell(px);
            cj = by.holds(cj, py) ? cj : by.cell(py);
            ck = bz.holds(ck, pz) ? ck : bz.cell(pz);
            point(ci, cj, ck, px, py, pz, w, order, out, m);
            if (hold && order != Order.VALUE) {
                flatten(px != x[m], py != y[m], pz != z[m], order, out, m);
            }
        }
    }

    private void point(
            int ci, int cj, int ck, double x, double y, double z, double[] w, Order order, Samples out, int m) {
        bx.weights(ci, x, w, 0);
        by.weights(cj, y, w, 12);
        bz.weights(ck, z, w, 24);
        if (order == Order.VALUE) {
            value(w, ci, cj, ck, out, m);
        } else if (order == Order.GRADIENT) {
            gradient(w, ci, cj, ck, out, m);
        } else {
            all(w, ci, cj, ck, out, m);
        }
    }

    @Override
    public List<Level> limits() {
        if (hold) {
            return List.of();
        }
        List<Level> list = new ArrayList<>();
        KnotBasis[] bases = {bx, by, bz};
        for (int i = 0; i < 3; i++) {
            list.add(new EdgeLevel(new AlongLevel(AXES[i]), bases[i].first(), false));
            list.add(new EdgeLevel(new AlongLevel(AXES[i]), bases[i].last(), true));
        }
        return List.copyOf(list);
    }

    @Override
    public List<Seam> seams(double wavelength) {
        return List.of(
                new Seam(new AlongLevel(Along.X), bx.knots()),
                new Seam(new AlongLevel(Along.Y), by.knots()),
                new Seam(new AlongLevel(Along.Z), bz.knots()));
    }

    /** All but a held one, whose slopes jump at its faces. */
    @Override
    public boolean runsThroughSeams() {
        return !hold;
    }

    /** The polynomial of one cell; a held grid outside its faces, where axes drop out, is not taken apart. */
    @Override
    public ScalarField piece(int[] cells) {
        int ci = cells[0] - 1;
        int cj = cells[1] - 1;
        int ck = cells[2] - 1;
        boolean inside =
                ci >= 0 && ci < bx.count() - 1 && cj >= 0 && cj < by.count() - 1 && ck >= 0 && ck < bz.count() - 1;
        return inside ? new Piece(this, ci, cj, ck) : this;
    }

    /**
     * The polynomial of one cell, everywhere.
     *
     * @param whole the grid
     * @param ci cell along x; likewise {@code cj} and {@code ck}
     */
    private record Piece(Grid whole, int ci, int cj, int ck) implements ScalarField {
        @Override
        public void sample(double[] x, double[] y, double[] z, int count, double wavelength, Order order, Samples out) {
            double[] w = whole.weights.get();
            for (int m = 0; m < count; m++) {
                whole.point(ci, cj, ck, x[m], y[m], z[m], w, order, out, m);
            }
        }

        @Override
        public String explain(double x, double y, double z, double wavelength) {
            return whole.explain(x, y, z, wavelength);
        }
    }

    @Override
    public String explain(double x, double y, double z, double wavelength) {
        if (hold) {
            return "";
        }
        double[] p = {x, y, z};
        KnotBasis[] bases = {bx, by, bz};
        for (int i = 0; i < 3; i++) {
            if (p[i] < bases[i].first() || p[i] > bases[i].last()) {
                return AXES[i].word() + " = " + Told.length(p[i]) + " is outside the grid, which runs from "
                        + Told.length(bases[i].first()) + " to " + Told.length(bases[i].last());
            }
        }
        return "";
    }

    /** The coefficients' means, since the spline is a sum of products: Gauss's rule in each cell is exact for its cubics. */
    @Override
    public Optional<ScalarField> meanAlongZ(double from, double to) {
        double slack = 1e-9 * (bz.last() - bz.first());
        double low = Math.max(from, bz.first());
        double high = Math.min(to, bz.last());
        if (!(high > low) || low - from > slack || to - high > slack) {
            return Optional.empty();
        }
        int nz = bz.count();
        double[] knots = bz.knots();
        double[] share = new double[nz + 2];
        double[] w = new double[12];
        for (int c = 0; c < nz - 1; c++) {
            double a = Math.max(low, knots[c]);
            double b = Math.min(high, knots[c + 1]);
            for (int side = -1; side <= 1 && b > a; side += 2) {
                bz.weights(c, 0.5 * (a + b) + side * 0.5 * (b - a) / Math.sqrt(3), w, 0);
                for (int k = 0; k < 4; k++) {
                    share[c + k] += 0.5 * (b - a) / (high - low) * w[k];
                }
            }
        }
        int sheet = (bx.count() + 2) * (by.count() + 2);
        double[] mean = new double[4 * sheet];
        for (int k = 0; k < nz + 2; k++) {
            for (int i = 0; i < sheet; i++) {
                mean[i] += share[k] * coefficients[i + sheet * k];
            }
        }
        for (int k = 1; k < 4; k++) {
            // B-splines add up to 1: four equal sheets are the same at all heights
            System.arraycopy(mean, 0, mean, sheet * k, sheet);
        }
        return Optional.of(new Grid(bx, by, new KnotBasis(new double[] {low, high}), mean, hold));
    }

    /** Coefficients, x running fastest, with a rim of one on every side. */
    private static double[] solved(KnotBasis bx, KnotBasis by, KnotBasis bz, double[] values) {
        int nx = bx.count();
        int ny = by.count();
        int nz = bz.count();
        int row = nx + 2;
        int sheet = row * (ny + 2);
        double[] c = new double[Math.multiplyExact(sheet, nz + 2)];
        double[] line = new double[Math.max(nx, Math.max(ny, nz)) + 2];
        for (int k = 0; k < nz; k++) {
            for (int j = 0; j < ny; j++) {
                System.arraycopy(values, nx * (j + ny * k), line, 1, nx);
                bx.solve(line);
                System.arraycopy(line, 0, c, row * (j + 1) + sheet * (k + 1), nx + 2);
            }
        }
        for (int k = 1; k <= nz; k++) {
            for (int i = 0; i < row; i++) {
                along(by, c, i + sheet * k, row, line);
            }
        }
        for (int j = 0; j < ny + 2; j++) {
            for (int i = 0; i < row; i++) {
                along(bz, c, i + row * j, sheet, line);
            }
        }
        return c;
    }

    private static void along(KnotBasis basis, double[] c, int start, int stride, double[] line) {
        int n = basis.count();
        for (int m = 1; m <= n; m++) {
            line[m] = c[start + stride * m];
        }
        basis.solve(line);
        for (int m = 0; m <= n + 1; m++) {
            c[start + stride * m] = line[m];
        }
    }

    private void value(double[] w, int ci, int cj, int ck, Samples out, int m) {
        int row = bx.count() + 2;
        int sheet = row * (by.count() + 2);
        double f = 0;
        for (int k = 0; k < 4; k++) {
            double v = 0;
            for (int j = 0; j < 4; j++) {
                int b = ci + row * (cj + j) + sheet * (ck + k);
                v += w[12 + j]
                        * (w[0] * coefficients[b]
                                + w[1] * coefficients[b + 1]
                                + w[2] * coefficients[b + 2]
                                + w[3] * coefficients[b + 3]);
            }
            f += w[24 + k] * v;
        }
        out.value[m] = f;
    }

    /** Two thirds of the work of {@link #all}: what rays without Jacobi columns ask for at every stage. */
    private void gradient(double[] w, int ci, int cj, int ck, Samples out, int m) {
        int row = bx.count() + 2;
        int sheet = row * (by.count() + 2);
        double w0 = w[0];
        double w1 = w[1];
        double w2 = w[2];
        double w3 = w[3];
        double d0 = w[4];
        double d1 = w[5];
        double d2 = w[6];
        double d3 = w[7];
        double f = 0;
        double fx = 0;
        double fy = 0;
        double fz = 0;
        for (int k = 0; k < 4; k++) {
            double v = 0;
            double vx = 0;
            double vy = 0;
            int b = ci + row * cj + sheet * (ck + k);
            for (int j = 0; j < 4; j++) {
                double c0 = coefficients[b];
                double c1 = coefficients[b + 1];
                double c2 = coefficients[b + 2];
                double c3 = coefficients[b + 3];
                double s = w0 * c0 + w1 * c1 + w2 * c2 + w3 * c3;
                v += w[12 + j] * s;
                vx += w[12 + j] * (d0 * c0 + d1 * c1 + d2 * c2 + d3 * c3);
                vy += w[16 + j] * s;
                b += row;
            }
            f += w[24 + k] * v;
            fx += w[24 + k] * vx;
            fy += w[24 + k] * vy;
            fz += w[28 + k] * v;
        }
        out.value[m] = f;
        out.gx[m] = fx;
        out.gy[m] = fy;
        out.gz[m] = fz;
    }

    private void all(double[] w, int ci, int cj, int ck, Samples out, int m) {
        int row = bx.count() + 2;
        int sheet = row * (by.count() + 2);
        double f = 0;
        double fx = 0;
        double fy = 0;
        double fz = 0;
        double fxx = 0;
        double fxy = 0;
        double fxz = 0;
        double fyy = 0;
        double fyz = 0;
        double fzz = 0;
        for (int k = 0; k < 4; k++) {
            double v = 0;
            double vx = 0;
            double vy = 0;
            double vxx = 0;
            double vxy = 0;
            double vyy = 0;
            for (int j = 0; j < 4; j++) {
                int b = ci + row * (cj + j) + sheet * (ck + k);
                double c0 = coefficients[b];
                double c1 = coefficients[b + 1];
                double c2 = coefficients[b + 2];
                double c3 = coefficients[b + 3];
                double s = w[0] * c0 + w[1] * c1 + w[2] * c2 + w[3] * c3;
                double sx = w[4] * c0 + w[5] * c1 + w[6] * c2 + w[7] * c3;
                double sxx = w[8] * c0 + w[9] * c1 + w[10] * c2 + w[11] * c3;
                v += w[12 + j] * s;
                vx += w[12 + j] * sx;
                vxx += w[12 + j] * sxx;
                vy += w[16 + j] * s;
                vxy += w[16 + j] * sx;
                vyy += w[20 + j] * s;
            }
            f += w[24 + k] * v;
            fx += w[24 + k] * vx;
            fy += w[24 + k] * vy;
            fxx += w[24 + k] * vxx;
            fxy += w[24 + k] * vxy;
            fyy += w[24 + k] * vyy;
            fz += w[28 + k] * v;
            fxz += w[28 + k] * vx;
            fyz += w[28 + k] * vy;
            fzz += w[32 + k] * v;
        }
        out.value[m] = f;
        out.gx[m] = fx;
        out.gy[m] = fy;
        out.gz[m] = fz;
        out.hxx[m] = fxx;
        out.hxy[m] = fxy;
        out.hxz[m] = fxz;
        out.hyy[m] = fyy;
        out.hyz[m] = fyz;
        out.hzz[m] = fzz;
    }

    /** Outside a held grid nothing changes along the axes that were left. */
    private static void flatten(boolean fx, boolean fy, boolean fz, Order order, Samples out, int m) {
        out.gx[m] = fx ? 0 : out.gx[m];
        out.gy[m] = fy ? 0 : out.gy[m];
        out.gz[m] = fz ? 0 : out.gz[m];
        if (order == Order.HESSIAN) {
            out.hxx[m] = fx ? 0 : out.hxx[m];
            out.hxy[m] = fx || fy ? 0 : out.hxy[m];
            out.hxz[m] = fx || fz ? 0 : out.hxz[m];
            out.hyy[m] = fy ? 0 : out.hyy[m];
            out.hyz[m] = fy || fz ? 0 : out.hyz[m];
            out.hzz[m] = fz ? 0 : out.hzz[m];
        }
    }
}
