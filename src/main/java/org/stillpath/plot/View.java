package org.stillpath.plot;

/**
 * From metres to points on paper.
 *
 * @param u0 metres at x0; {@code v0} metres at y0
 * @param across points a metre to the right; {@code up} points a metre upward
 */
record View(double u0, double v0, double x0, double y0, double across, double up) {
    double x(double u) {
        return x0 + (u - u0) * across;
    }

    double y(double v) {
        return y0 - (v - v0) * up;
    }

    double u(double x) {
        return u0 + (x - x0) / across;
    }

    double v(double y) {
        return v0 - (y - y0) / up;
    }

    Polyline line(double[] u, double[] v) {
        double[] x = new double[u.length];
        double[] y = new double[u.length];
        for (int i = 0; i < u.length; i++) {
            x[i] = x(u[i]);
            y[i] = y(v[i]);
        }
        return new Polyline(x, y);
    }
}
