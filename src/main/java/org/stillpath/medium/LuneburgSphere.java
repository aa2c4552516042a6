package org.stillpath.medium;

import org.hipparchus.analysis.integration.gauss.GaussIntegrator;
import org.hipparchus.analysis.integration.gauss.GaussIntegratorFactory;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;

/**
 * The generalised Luneburg lens: a sphere of index 1 at its rim that images two points on a line through its centre sharply
 * onto each other, one on either side, each at the rim or outside it.
 *
 * <p>With lengths in units of the radius, ρ the distance from the centre and s = nρ (Luneburg, <i>Mathematical Theory of
 * Optics</i>, section 29; Morgan, J. Appl. Phys. 29 (1958) 1358):
 *
 * <pre>  n = exp(ω(s, r₀) + ω(s, r₁))    ω(s, r) = (1/π) ∫ₛ¹ arcsin(t/r)/√(t² − s²) dt </pre>
 *
 * <p>This gives n and ρ as functions of s, or of w = √(1 − s²), in which both are analytic. ln n is taken over once into a
 * Chebyshev series in ρ², so that a sample costs a recurrence of some tens of terms; an integral and an inversion a sample
 * would cost a thousand times that. Beyond the rim the series' last value and derivatives are continued, so that a step may
 * reach past it; the sphere's surface belongs in the train.
 */
public final class LuneburgSphere implements ScalarField {
    private static final int NODES = 48;
    private static final int MOST_TERMS = 512;
    private static final double TRIFLE = 4e-16;

    private final double radius;
    private final double[] series;

    private LuneburgSphere(double radius, double[] series) {
        this.radius = radius;
        this.series = series;
    }

    /**
     * A sphere.
     *
     * @param radius metres, positive
     * @param object distance of one point from the centre, metres, at least the radius; may be infinite
     * @param image distance of the other, likewise
     */
    public static LuneburgSphere of(double radius, double object, double image) {
        if (!(radius > 0 && radius < Double.POSITIVE_INFINITY)) {
            throw new IllegalArgumentException("radius must be positive and finite: " + radius);
        }
        if (!(object >= radius && image >= radius)) {
            throw new IllegalArgumentException(
                    "distances must be at least the radius, " + radius + ": " + object + ", " + image);
        }
        GaussIntegrator gauss = new GaussIntegratorFactory().legendre(NODES, 0, 1);
        double r0 = object / radius;
        double r1 = image / radius;
        for (int terms = 16; ; terms *= 2) {
            double[] series = series(terms, r0, r1, gauss);
            int used = terms;
            while (used > 1 && Math.abs(series[used - 1]) < TRIFLE) {
                used--;
            }
            if (used <= terms * 3 / 4 || terms == MOST_TERMS) {
                return new LuneburgSphere(radius, java.util.Arrays.copyOf(series, used));
            }
        }
    }

    /** Chebyshev coefficients of ln n over u = ρ² from 0 to 1, from its values at the series' own nodes. */
    private static double[] series(int terms, double r0, double r1, GaussIntegrator gauss) {
        double[] values = new double[terms];
        for (int i = 0; i < terms; i++) {
            double u = 0.5 + 0.5 * Math.cos(Math.PI * (i + 0.5) / terms);
            values[i] = logarithm(waist(u, r0, r1, gauss), r0, r1, gauss);
        }
        double[] c = new double[terms];
        for (int k = 0; k < terms; k++) {
            double sum = 0;
            for (int i = 0; i < terms; i++) {
                // the angle's multiple of a turn taken off in whole numbers, where it costs no digits
                int part = k * (2 * i + 1) % (4 * terms);
                sum += values[i] * Math.cos(Math.PI * part / (2 * terms));
            }
            c[k] = (k == 0 ? 1.0 : 2.0) / terms * sum;
        }
        return c;
    }

    /** w for ρ² = u: u = (1 − w²) exp(−2 ln n(w)) falls from 1 to 0 as w goes from 0 to 1. */
    private static double waist(double u, double r0, double r1, GaussIntegrator gauss) {
        double low = 0;
        double high = 1;
        for (int i = 0; i < 60 && high - low > 1e-16; i++) {
            double w = 0.5 * (low + high);
            double at = (1 - w * w) * Math.exp(-2 * logarithm(w, r0, r1, gauss));
            if (at > u) {
                low = w;
            } else {
                high = w;
            }
        }
        return 0.5 * (low + high);
    }

    private static double logarithm(double w, double r0, double r1, GaussIntegrator gauss) {
        return omega(w, r0, gauss) + omega(w, r1, gauss);
    }

    /** ω with t² = 1 − w²(1 − v²): (w/π) ∫₀¹ arcsin(t/r)/t dv; ½ ln(1 + w) for r = 1, where the integrand is not smooth. */
    private static double omega(double w, double r, GaussIntegrator gauss) {
        if (r == Double.POSITIVE_INFINITY) {
            return 0;
        }
        if (r == 1) {
            return 0.5 * Math.log1p(w);
        }
        return w
                / Math.PI
                * gauss.integrate(v -> {
                    double t = Math.sqrt(1 - w * w * (1 - v) * (1 + v));
                    return t < 1e-8 ? 1 / r : Math.asin(t / r) / t;
                });
    }

    @Override
    public void sample(double[] x, double[] y, double[] z, int count, double wavelength, Order order, Samples out) {
        double scale = 1 / (radius * radius);
        for (int i = 0; i < count; i++) {
            double u = (x[i] * x[i] + y[i] * y[i] + z[i] * z[i]) * scale;
            double inside = Math.min(u, 1);
            // Clenshaw's recurrence for the series and its first two derivatives over ξ = 2u − 1
            double xi = 2 * inside - 1;
            double b1 = 0;
            double b2 = 0;
            double d1 = 0;
            double d2 = 0;
            double e1 = 0;
            double e2 = 0;
            for (int k = series.length - 1; k >= 1; k--) {
                double e0 = 2 * xi * e1 - e2 + 4 * d1;
                double d0 = 2 * xi * d1 - d2 + 2 * b1;
                double b0 = 2 * xi * b1 - b2 + series[k];
                e2 = e1;
                e1 = e0;
                d2 = d1;
                d1 = d0;
                b2 = b1;
                b1 = b0;
            }
            double log = xi * b1 - b2 + series[0];
            double first = 2 * (b1 + xi * d1 - d2);
            double second = 4 * (2 * d1 + xi * e1 - e2);
            double past = u - inside;
            log += past * (first + 0.5 * past * second);
            first += past * second;
            double n = Math.exp(log);
            out.value[i] = Math.expm1(log);
            if (order == Order.VALUE) {
                continue;
            }
            double g = 2 * scale * n * first;
            out.gx[i] = g * x[i];
            out.gy[i] = g * y[i];
            out.gz[i] = g * z[i];
            if (order == Order.HESSIAN) {
                double h = 4 * scale * scale * n * (second + first * first);
                out.hxx[i] = g + h * x[i] * x[i];
                out.hxy[i] = h * x[i] * y[i];
                out.hxz[i] = h * x[i] * z[i];
                out.hyy[i] = g + h * y[i] * y[i];
                out.hyz[i] = h * y[i] * z[i];
                out.hzz[i] = g + h * z[i] * z[i];
            }
        }
    }
}
