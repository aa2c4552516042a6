package org.stillpath.ray;

import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.medium.IndexField;

/** Index fields written by hand, with closed-form rays, so that the engines are tested without the formula compiler. */
final class Fields {
    private Fields() {}

    /** The same index everywhere. */
    static IndexField uniform(double n) {
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
    static IndexField rod(double n0, double g) {
        double w = n0 * n0 * g * g;
        return (x, y, z, count, order, out) -> {
            for (int i = 0; i < count; i++) {
                out.value[i] = n0 * n0 - 1 - w * (x[i] * x[i] + y[i] * y[i]);
                out.gx[i] = -w * x[i];
                out.gy[i] = -w * y[i];
                out.gz[i] = 0;
                out.hxx[i] = -w;
                out.hxy[i] = 0;
                out.hxz[i] = 0;
                out.hyy[i] = -w;
                out.hyz[i] = 0;
                out.hzz[i] = 0;
            }
        };
    }

    /** n = n0/(1 + (ρ/a)²). */
    static IndexField fisheye(double n0, double a) {
        return (x, y, z, count, order, out) -> {
            for (int i = 0; i < count; i++) {
                double u = 1 + (x[i] * x[i] + y[i] * y[i] + z[i] * z[i]) / (a * a);
                double n = n0 / u;
                out.value[i] = (n - 1) * (n + 1);
                // n² = n0² u⁻², ½∇n² = −n0² u⁻³ ∇u, ∇u = 2q/a²
                double first = -2 * n0 * n0 / (u * u * u * a * a);
                double second = 12 * n0 * n0 / (u * u * u * u * a * a * a * a);
                out.gx[i] = first * x[i];
                out.gy[i] = first * y[i];
                out.gz[i] = first * z[i];
                out.hxx[i] = first + second * x[i] * x[i];
                out.hxy[i] = second * x[i] * y[i];
                out.hxz[i] = second * x[i] * z[i];
                out.hyy[i] = first + second * y[i] * y[i];
                out.hyz[i] = second * y[i] * z[i];
                out.hzz[i] = first + second * z[i] * z[i];
            }
        };
    }
}
