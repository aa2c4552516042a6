package org.stillpath.path;

import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Level;

/** Media whose optical length between any two points is known in closed form. */
final class ClosedForms {
    private ClosedForms() {}

    /** A medium and its optical length between two points, metres. */
    interface Case {
        IndexField field();

        double opticalLength(Vector from, Vector to);
    }

    /** The same index everywhere. */
    static Case uniform(double n) {
        return slope(n, Vector.ZERO);
    }

    /**
     * n² = n0² + 2 a·q, with parabolas q + pτ + aτ²/2 for rays (Luneburg, Mathematical Theory of Optics). From p = d/τ − aτ/2
     * and |p|² = n² at the start, with e the mean of n² at both ends: a²τ⁴/4 − eτ² + d² = 0; the flat trajectory has the lesser
     * root. S = ∫n²dτ = eτ − a²τ³/6.
     */
    static Case slope(double n0, Vector a) {
        return new Case() {
            @Override
            public IndexField field() {
                return (x, y, z, count, order, out) -> {
                    for (int i = 0; i < count; i++) {
                        out.value[i] = (n0 - 1) * (n0 + 1) + 2 * (a.x() * x[i] + a.y() * y[i] + a.z() * z[i]);
                        gradient(out, i, a);
                    }
                };
            }

            @Override
            public double opticalLength(Vector from, Vector to) {
                double d2 = to.minus(from).dot(to.minus(from));
                double a2 = a.dot(a);
                double e = n0 * n0 + a.dot(from.plus(to));
                double tau = Math.sqrt(2 * d2 / (e + Math.sqrt(e * e - a2 * d2)));
                return e * tau - a2 * tau * tau * tau / 6;
            }
        };
    }

    /**
     * Maxwell's fisheye n = n0/(1 + ρ²/a²): the stereographic image of a sphere of radius n0 a/2, whose arcs are the optical
     * lengths (Luneburg, section 28). With u = q/a the point of the unit sphere is (2u, u² − 1)/(u² + 1), so the chord between
     * two is 2|u − v|/√((1 + u²)(1 + v²)), twice the sine of half the arc.
     */
    static Case fisheye(double n0, double a) {
        return new Case() {
            @Override
            public IndexField field() {
                return (x, y, z, count, order, out) -> {
                    for (int i = 0; i < count; i++) {
                        double w = 1 + (x[i] * x[i] + y[i] * y[i] + z[i] * z[i]) / (a * a);
                        double n = n0 / w;
                        out.value[i] = (n - 1) * (n + 1);
                        gradient(out, i, new Vector(x[i], y[i], z[i]).times(-2 * n * n / (w * a * a)));
                    }
                };
            }

            @Override
            public double opticalLength(Vector from, Vector to) {
                double u2 = from.dot(from) / (a * a);
                double v2 = to.dot(to) / (a * a);
                return n0 * a * Math.asin(from.minus(to).norm() / a / Math.sqrt((1 + u2) * (1 + v2)));
            }
        };
    }

    /** A field with a limit besides. */
    static IndexField limited(IndexField field, Margin margin) {
        Level level = new Level() {
            @Override
            public double value(double x, double y, double z, double[] gradient) {
                return margin.at(x, y, z);
            }

            @Override
            public String describe() {
                return "the margin";
            }
        };
        return new IndexField() {
            @Override
            public void sample(double[] x, double[] y, double[] z, int count, Order order, Samples out) {
                field.sample(x, y, z, count, order, out);
            }

            @Override
            public java.util.List<Level> limits() {
                return java.util.List.of(level);
            }
        };
    }

    /** Positive inside. */
    interface Margin {
        double at(double x, double y, double z);
    }

    private static void gradient(Samples out, int i, Vector g) {
        out.gx[i] = g.x();
        out.gy[i] = g.y();
        out.gz[i] = g.z();
    }
}
