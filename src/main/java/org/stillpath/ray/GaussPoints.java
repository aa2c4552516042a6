package org.stillpath.ray;

import org.hipparchus.analysis.integration.gauss.GaussIntegrator;
import org.hipparchus.analysis.integration.gauss.GaussIntegratorFactory;

/** Gauss-Legendre points on the interval from 0 to 1, as plain arrays. */
record GaussPoints(double[] points, double[] weights) {
    static GaussPoints of(int count) {
        GaussIntegrator gauss = new GaussIntegratorFactory().legendre(count, 0, 1);
        double[] points = new double[count];
        double[] weights = new double[count];
        for (int i = 0; i < count; i++) {
            points[i] = gauss.getPoint(i);
            weights[i] = gauss.getWeight(i);
        }
        return new GaussPoints(points, weights);
    }

    int count() {
        return points.length;
    }

    double at(int i) {
        return points[i];
    }

    double weight(int i) {
        return weights[i];
    }
}
