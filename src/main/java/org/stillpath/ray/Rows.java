package org.stillpath.ray;

/**
 * Weighted sums of rows of numbers, one number a ray, in loops short enough for HotSpot to turn them into vector code: its limit
 * on unrolling leaves longer ones scalar, and one loop over all terms was twice as slow.
 */
final class Rows {
    /** Terms in one loop at most. */
    private static final int MOST = 6;

    private Rows() {}

    /** out = Σ w_j rows_j over the used j, at least one. */
    static void sum(double[] weights, int[] used, double[][] rows, int n, double[] out) {
        int first = used.length % MOST == 0 ? MOST : used.length % MOST;
        begin(weights, used, first, rows, n, out);
        for (int at = first; at < used.length; at += MOST) {
            add6(
                    rows[used[at]],
                    weights[used[at]],
                    rows[used[at + 1]],
                    weights[used[at + 1]],
                    rows[used[at + 2]],
                    weights[used[at + 2]],
                    rows[used[at + 3]],
                    weights[used[at + 3]],
                    rows[used[at + 4]],
                    weights[used[at + 4]],
                    rows[used[at + 5]],
                    weights[used[at + 5]],
                    n,
                    out);
        }
    }

    private static void begin(double[] w, int[] u, int terms, double[][] r, int n, double[] out) {
        switch (terms) {
            case 1 -> sum1(r[u[0]], w[u[0]], n, out);
            case 2 -> sum2(r[u[0]], w[u[0]], r[u[1]], w[u[1]], n, out);
            case 3 -> sum3(r[u[0]], w[u[0]], r[u[1]], w[u[1]], r[u[2]], w[u[2]], n, out);
            case 4 -> sum4(r[u[0]], w[u[0]], r[u[1]], w[u[1]], r[u[2]], w[u[2]], r[u[3]], w[u[3]], n, out);
            case 5 ->
                sum5(r[u[0]], w[u[0]], r[u[1]], w[u[1]], r[u[2]], w[u[2]], r[u[3]], w[u[3]], r[u[4]], w[u[4]], n, out);
            default ->
                sum6(
                        r[u[0]], w[u[0]], r[u[1]], w[u[1]], r[u[2]], w[u[2]], r[u[3]], w[u[3]], r[u[4]], w[u[4]],
                        r[u[5]], w[u[5]], n, out);
        }
    }

    private static void sum1(double[] a, double wa, int n, double[] out) {
        for (int i = 0; i < n; i++) {
            out[i] = wa * a[i];
        }
    }

    private static void sum2(double[] a, double wa, double[] b, double wb, int n, double[] out) {
        for (int i = 0; i < n; i++) {
            out[i] = Math.fma(wb, b[i], wa * a[i]);
        }
    }

    private static void sum3(double[] a, double wa, double[] b, double wb, double[] c, double wc, int n, double[] out) {
        for (int i = 0; i < n; i++) {
            out[i] = Math.fma(wc, c[i], Math.fma(wb, b[i], wa * a[i]));
        }
    }

    private static void sum4(
            double[] a,
            double wa,
            double[] b,
            double wb,
            double[] c,
            double wc,
            double[] d,
            double wd,
            int n,
            double[] out) {
        for (int i = 0; i < n; i++) {
            out[i] = Math.fma(wd, d[i], Math.fma(wc, c[i], Math.fma(wb, b[i], wa * a[i])));
        }
    }

    private static void sum5(
            double[] a,
            double wa,
            double[] b,
            double wb,
            double[] c,
            double wc,
            double[] d,
            double wd,
            double[] e,
            double we,
            int n,
            double[] out) {
        for (int i = 0; i < n; i++) {
            out[i] = Math.fma(we, e[i], Math.fma(wd, d[i], Math.fma(wc, c[i], Math.fma(wb, b[i], wa * a[i]))));
        }
    }

    private static void sum6(
            double[] a,
            double wa,
            double[] b,
            double wb,
            double[] c,
            double wc,
            double[] d,
            double wd,
            double[] e,
            double we,
            double[] f,
            double wf,
            int n,
            double[] out) {
        for (int i = 0; i < n; i++) {
            double low = Math.fma(wc, c[i], Math.fma(wb, b[i], wa * a[i]));
            out[i] = Math.fma(wf, f[i], Math.fma(we, e[i], Math.fma(wd, d[i], low)));
        }
    }

    private static void add6(
            double[] a,
            double wa,
            double[] b,
            double wb,
            double[] c,
            double wc,
            double[] d,
            double wd,
            double[] e,
            double we,
            double[] f,
            double wf,
            int n,
            double[] out) {
        for (int i = 0; i < n; i++) {
            double low = Math.fma(wc, c[i], Math.fma(wb, b[i], Math.fma(wa, a[i], out[i])));
            out[i] = Math.fma(wf, f[i], Math.fma(we, e[i], Math.fma(wd, d[i], low)));
        }
    }

    /** out = q + h (c p + h s). */
    static void place(double[] q, double[] p, double[] s, double[] h, double c, int n, double[] out) {
        for (int i = 0; i < n; i++) {
            out[i] = Math.fma(h[i], Math.fma(h[i], s[i], c * p[i]), q[i]);
        }
    }

    /** out = p + h s. */
    static void slope(double[] p, double[] s, double[] h, int n, double[] out) {
        for (int i = 0; i < n; i++) {
            out[i] = Math.fma(h[i], s[i], p[i]);
        }
    }

    /** out += (k s)². */
    static void addSquare(double[] s, double k, int n, double[] out) {
        for (int i = 0; i < n; i++) {
            double v = k * s[i];
            out[i] = Math.fma(v, v, out[i]);
        }
    }

    /** out = h² (h² a + b). */
    static void error(double[] a, double[] b, double[] h, int n, double[] out) {
        for (int i = 0; i < n; i++) {
            double hh = h[i] * h[i];
            out[i] = hh * Math.fma(hh, a[i], b[i]);
        }
    }

    /** out = n − 1 from e = n² − 1. */
    static void lessOne(double[] e, int n, double[] out) {
        for (int i = 0; i < n; i++) {
            out[i] = e[i] / (1 + Math.sqrt(1 + e[i]));
        }
    }

    /** Hessian times a column: out = a x + b y + c z. */
    static void product(double[] a, double[] x, double[] b, double[] y, double[] c, double[] z, int n, double[] out) {
        for (int i = 0; i < n; i++) {
            out[i] = Math.fma(c[i], z[i], Math.fma(b[i], y[i], a[i] * x[i]));
        }
    }
}
