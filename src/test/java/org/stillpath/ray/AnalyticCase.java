package org.stillpath.ray;

import java.util.Random;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;

/**
 * A ray whose end is known in closed form after an optical length.
 *
 * @param name of the kind of medium
 * @param field the medium
 * @param from start, metres
 * @param direction unit direction there
 * @param opticalLength optical length to the end, metres
 * @param position where it ends
 * @param momentum index times unit direction there
 * @param length of the scene, metres
 */
record AnalyticCase(
        String name,
        IndexField field,
        Vector from,
        Vector direction,
        double opticalLength,
        Vector position,
        Vector momentum,
        double length) {

    /** Kinds of media with closed forms. */
    enum Kind {
        /** n² = n0²(1 − g²r²): an oscillator across, a free particle along (Luneburg, Mathematical Theory of Optics). */
        ROD {
            @Override
            AnalyticCase random(Random r, double size) {
                double n0 = 1.3 + 0.5 * r.nextDouble();
                double g = (0.1 + r.nextDouble()) / size;
                return oscillator(name(), Fields.rod(n0, g), n0, g, 0, r, size);
            }
        },
        /** n² = n0²(1 − g²ρ²): an oscillator in all directions; Luneburg's lens is n0² = 2. */
        SPHERE {
            @Override
            AnalyticCase random(Random r, double size) {
                double n0 = 1.3 + 0.5 * r.nextDouble();
                double g = (0.1 + 0.5 * r.nextDouble()) / size;
                return oscillator(name(), Fields.oscillator(n0, g, g), n0, g, g, r, size);
            }
        },
        /** n² = n0² + 2 a·q: parabolas (Luneburg). */
        SLOPE {
            @Override
            AnalyticCase random(Random r, double size) {
                double n0 = 1.3 + 0.5 * r.nextDouble();
                Vector a = unit(r).times(0.2 * r.nextDouble() / size);
                Vector q = point(r, 0.5 * size);
                Vector d = unit(r);
                double n = Math.sqrt(n0 * n0 + 2 * a.dot(q));
                Vector p = d.times(n);
                double t = size * (0.2 + r.nextDouble());
                // S = ∫ n² dτ with n² = |p|² along the parabola
                double s = t * (p.dot(p) + t * (p.dot(a) + t * a.dot(a) / 3));
                return new AnalyticCase(
                        name(),
                        Fields.slope(n0, a),
                        q,
                        d,
                        s,
                        q.plus(p.times(t)).plus(a.times(0.5 * t * t)),
                        p.plus(a.times(t)),
                        size);
            }
        },
        /**
         * n = n0/(1 + ρ²/a²): the stereographic image of a sphere of radius n0 a/2 in four dimensions, whose great circles
         * are the rays and whose arc is the optical length (Luneburg, section 28).
         */
        FISHEYE {
            @Override
            AnalyticCase random(Random r, double size) {
                double n0 = 1.3 + r.nextDouble();
                double a = size * (0.5 + r.nextDouble());
                Vector q = point(r, 0.8 * a);
                Vector d = unit(r);
                double rho2 = q.dot(q) / (a * a);
                // X = (2u, ρ² − 1)/(ρ² + 1) with u = q/a; its derivative along d, normalised
                double w = rho2 + 1;
                Vector u = q.times(1 / a);
                double ud = u.dot(d);
                Vector x = u.times(2 / w);
                double x4 = (rho2 - 1) / w;
                Vector v = d.times(2 / w).minus(u.times(4 * ud / (w * w)));
                double v4 = 4 * ud / (w * w);
                double scale = 1 / Math.sqrt(v.dot(v) + v4 * v4);
                double angle = 0.2 + 2 * r.nextDouble();
                double c = Math.cos(angle);
                double sn = Math.sin(angle);
                Vector y = x.times(c).plus(v.times(scale * sn));
                double y4 = x4 * c + v4 * scale * sn;
                Vector vy = v.times(scale * c).minus(x.times(sn));
                double vy4 = v4 * scale * c - x4 * sn;
                Vector end = y.times(a / (1 - y4));
                Vector along = vy.times(1 / (1 - y4)).plus(y.times(vy4 / ((1 - y4) * (1 - y4))));
                double n = n0 / (1 + end.dot(end) / (a * a));
                return new AnalyticCase(
                        name(),
                        Fields.fisheye(n0, a),
                        q,
                        d,
                        angle * n0 * a / 2,
                        end,
                        along.unit().times(n),
                        size);
            }
        },
        /**
         * n² = 2a/ρ − 1, Eaton's lens: Kepler ellipses of semi-major axis a, with dτ = ρ dE and S = 2a ΔE − Δτ for the
         * eccentric anomaly E (any text on celestial mechanics; S follows from n² = 2a/ρ − 1).
         */
        KEPLER {
            @Override
            AnalyticCase random(Random r, double size) {
                double a = size;
                double e = 0.6 * r.nextDouble();
                Vector u = unit(r);
                Vector v = unit(r).cross(u).unit();
                double from = 2 * Math.PI * r.nextDouble();
                double to = from + 0.3 + 2.5 * r.nextDouble();
                double tau = a * (to - from - e * (Math.sin(to) - Math.sin(from)));
                double s = 2 * a * (to - from) - tau;
                Vector p = momentum(u, v, e, from);
                return new AnalyticCase(
                        name(),
                        Fields.eaton(a),
                        place(u, v, a, e, from),
                        p.unit(),
                        s,
                        place(u, v, a, e, to),
                        momentum(u, v, e, to),
                        size);
            }
        };

        abstract AnalyticCase random(Random r, double size);

        private static Vector place(Vector u, Vector v, double a, double e, double anomaly) {
            return u.times(a * (Math.cos(anomaly) - e)).plus(v.times(a * Math.sqrt(1 - e * e) * Math.sin(anomaly)));
        }

        private static Vector momentum(Vector u, Vector v, double e, double anomaly) {
            double w = 1 / (1 - e * Math.cos(anomaly));
            return u.times(-Math.sin(anomaly) * w).plus(v.times(Math.sqrt(1 - e * e) * Math.cos(anomaly) * w));
        }

        private static AnalyticCase oscillator(
                String name, IndexField field, double n0, double g, double gz, Random r, double size) {
            Vector q = point(r, 0.4 / Math.max(g, 1 / size));
            Vector d = new Vector(r.nextDouble() - 0.5, r.nextDouble() - 0.5, 1.5 * r.nextDouble()).unit();
            double n = n0 * Math.sqrt(1 - g * g * (q.x() * q.x() + q.y() * q.y()) - gz * gz * q.z() * q.z());
            Vector p = d.times(n);
            double t = size / n0 * (0.2 + 2 * r.nextDouble());
            double w = n0 * g;
            double[] x = swing(q.x(), p.x(), w, t);
            double[] y = swing(q.y(), p.y(), w, t);
            double[] z = swing(q.z(), p.z(), n0 * gz, t);
            double s = n0 * n0 * t - x[2] - y[2] - z[2];
            return new AnalyticCase(
                    name, field, q, d, s, new Vector(x[0], y[0], z[0]), new Vector(x[1], y[1], z[1]), size);
        }

        /** Place, momentum and ∫ω²x² dτ of an oscillator; of a free particle for ω = 0. */
        private static double[] swing(double x, double p, double w, double t) {
            if (w == 0) {
                return new double[] {x + p * t, p, 0};
            }
            double c = Math.cos(w * t);
            double s = Math.sin(w * t);
            double b = p / w;
            // x = x0 cos + b sin: ∫x² = x0²(t/2 + sc/2w) + b²(t/2 − sc/2w) + x0 b s²/w
            double square = 0.5 * t * (x * x + b * b) + (0.5 * s * c * (x * x - b * b) + x * b * s * s) / w;
            return new double[] {x * c + b * s, p * c - w * x * s, w * w * square};
        }
    }

    static Vector unit(Random r) {
        while (true) {
            Vector v = point(r, 1);
            if (v.norm() > 0.1 && v.norm() < 1) {
                return v.unit();
            }
        }
    }

    static Vector point(Random r, double half) {
        return new Vector(
                half * (2 * r.nextDouble() - 1), half * (2 * r.nextDouble() - 1), half * (2 * r.nextDouble() - 1));
    }
}
