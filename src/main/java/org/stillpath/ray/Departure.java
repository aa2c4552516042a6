package org.stillpath.ray;

import org.stillpath.medium.IndexField;

/**
 * Decides which targets a ray stands on at the start of a piece, and moves their zeros slightly behind it, so that the start
 * itself is not met and a return is.
 */
final class Departure {
    /** What counts as standing on a target, as a fraction of the scene's scale. */
    static final double ON = 1e-11;

    private Departure() {}

    /**
     * For each target what to add to its value while looking for its zero: nothing, or for a target that the ray stands on a
     * trifle of the sign in which it leaves.
     */
    static double[] biases(double[] y, double[] rate, IndexField field, Flow flow, Target[] targets, double scale) {
        double[] bias = new double[targets.length];
        double n = flow.index();
        double fx = flow.samples().gx[0];
        double fy = flow.samples().gy[0];
        double fz = flow.samples().gz[0];
        double[] ahead = new double[y.length];
        for (int i = 0; i < targets.length; i++) {
            double trifle = ON * scale * targets[i].steepness(y, n);
            double value = targets[i].value(y);
            if (Math.abs(value) <= trifle) {
                double leaving = targets[i].rate(y, n, fx, fy, fz);
                if (Math.abs(leaving) < 1e-7 * n * targets[i].steepness(y, n)) {
                    // along the target: where the curve of ray and target leads decides
                    System.arraycopy(y, 0, ahead, 0, y.length);
                    if (flow.rate(field, ahead, rate)) {
                        flow.shift(ahead, rate, 1e-4 * scale);
                        leaving = targets[i].value(ahead) - value;
                    }
                }
                bias[i] = Math.copySign(2 * trifle, leaving);
            }
        }
        return bias;
    }
}
