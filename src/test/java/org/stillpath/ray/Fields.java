package org.stillpath.ray;

import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;

/** Index fields written by hand, with closed-form rays, so that the engines are tested without the formula compiler. */
public final class Fields {
    private Fields() {}

    /** The same index everywhere. */
    public static IndexField uniform(double n) {
        return new IndexField() {
            @Override
            public void sample(double[] x, double[] y, double[] z, int count, Order order, Samples out) {
                for (int i = 0; i < count; i++) {
                    out.value[i] = (n - 1) * (n + 1);
                    out.gx[i] = 0;
                    out.gy[i] = 0;
                    out.gz[i] = 0;
                    out.hxx[i] = 0;
                    out.hxy[i] = 0;
                    out.hxz[i] = 0;
                    out.hyy[i] = 0;
                    out.hyz[i] = 0;
                    out.hzz[i] = 0;
                }
            }

            @Override
            public boolean uniform() {
                return true;
            }
        };
    }

    /** n² = n0² (1 − (g r)²). */
    public static IndexField rod(double n0, double g) {
        return oscillator(n0, g, 0);
    }

    /** n² = n0² (1 − g²(x² + y²) − gz² z²). */
    public static IndexField oscillator(double n0, double g, double gz) {
        double w = n0 * n0 * g * g;
        double wz = n0 * n0 * gz * gz;
        return (x, y, z, count, order, out) -> {
            for (int i = 0; i < count; i++) {
                out.value[i] = n0 * n0 - 1 - w * (x[i] * x[i] + y[i] * y[i]) - wz * z[i] * z[i];
                out.gx[i] = -w * x[i];
                out.gy[i] = -w * y[i];
                out.gz[i] = -wz * z[i];
                out.hxx[i] = -w;
                out.hxy[i] = 0;
                out.hxz[i] = 0;
                out.hyy[i] = -w;
                out.hyz[i] = 0;
                out.hzz[i] = -wz;
            }
        };
    }

    /** n² = n0² + 2 a·q. */
    public static IndexField slope(double n0, Vector a) {
        return (x, y, z, count, order, out) -> {
            for (int i = 0; i < count; i++) {
                out.value[i] = n0 * n0 - 1 + 2 * (a.x() * x[i] + a.y() * y[i] + a.z() * z[i]);
                out.gx[i] = a.x();
                out.gy[i] = a.y();
                out.gz[i] = a.z();
                out.hxx[i] = 0;
                out.hxy[i] = 0;
                out.hxz[i] = 0;
                out.hyy[i] = 0;
                out.hyz[i] = 0;
                out.hzz[i] = 0;
            }
        };
    }

    /** n² = 2a/ρ − 1. */
    public static IndexField eaton(double a) {
        return (x, y, z, count, order, out) -> {
            for (int i = 0; i < count; i++) {
                double rho2 = x[i] * x[i] + y[i] * y[i] + z[i] * z[i];
                double rho = Math.sqrt(rho2);
                out.value[i] = 2 * a / rho - 2;
                double first = -a / (rho2 * rho);
                double second = 3 * a / (rho2 * rho2 * rho);
                central(x[i], y[i], z[i], first, second, out, i);
            }
        };
    }

    /** A smooth medium of Gaussian bumps n² = n0² + Σ 2 h exp(−|q − c|²/2w²), {@code bumps} rows of cx, cy, cz, h, w. */
    public static IndexField bumps(double n0, double[][] bumps) {
        return (x, y, z, count, order, out) -> {
            for (int i = 0; i < count; i++) {
                out.value[i] = n0 * n0 - 1;
                out.gx[i] = 0;
                out.gy[i] = 0;
                out.gz[i] = 0;
                out.hxx[i] = 0;
                out.hxy[i] = 0;
                out.hxz[i] = 0;
                out.hyy[i] = 0;
                out.hyz[i] = 0;
                out.hzz[i] = 0;
                for (double[] b : bumps) {
                    double u = x[i] - b[0];
                    double v = y[i] - b[1];
                    double w = z[i] - b[2];
                    double k = 1 / (b[4] * b[4]);
                    double f = b[3] * Math.exp(-0.5 * k * (u * u + v * v + w * w));
                    out.value[i] += 2 * f;
                    out.gx[i] -= f * k * u;
                    out.gy[i] -= f * k * v;
                    out.gz[i] -= f * k * w;
                    out.hxx[i] += f * k * (k * u * u - 1);
                    out.hxy[i] += f * k * k * u * v;
                    out.hxz[i] += f * k * k * u * w;
                    out.hyy[i] += f * k * (k * v * v - 1);
                    out.hyz[i] += f * k * k * v * w;
                    out.hzz[i] += f * k * (k * w * w - 1);
                }
            }
        };
    }

    private static void central(double x, double y, double z, double first, double second, Samples out, int i) {
        out.gx[i] = first * x;
        out.gy[i] = first * y;
        out.gz[i] = first * z;
        out.hxx[i] = first + second * x * x;
        out.hxy[i] = second * x * y;
        out.hxz[i] = second * x * z;
        out.hyy[i] = first + second * y * y;
        out.hyz[i] = second * y * z;
        out.hzz[i] = first + second * z * z;
    }

    /** n = n0/(1 + (ρ/a)²). */
    public static IndexField fisheye(double n0, double a) {
        return (x, y, z, count, order, out) -> {
            for (int i = 0; i < count; i++) {
                double u = 1 + (x[i] * x[i] + y[i] * y[i] + z[i] * z[i]) / (a * a);
                double n = n0 / u;
                out.value[i] = (n - 1) * (n + 1);
                // n² = n0² u⁻², ½∇n² = −n0² u⁻³ ∇u, ∇u = 2q/a²
                double first = -2 * n0 * n0 / (u * u * u * a * a);
                double second = 12 * n0 * n0 / (u * u * u * u * a * a * a * a);
                central(x[i], y[i], z[i], first, second, out, i);
            }
        };
    }
}
