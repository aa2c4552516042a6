package org.stillpath.geometry;

/**
 * A form whose points have moved a little along its z: the face of a heated plate. F is that of the form less the
 * displacement, so that rays refract at the true surface, with its true slope and curvature.
 *
 * <p>A straight line is met by Newton's method from where it meets the form itself, two or three evaluations; that holds
 * for displacements that are small against the distances between crossings, as those of heated plates are. Far from the
 * surface, by more than {@value #FAR} times the largest displacement, F is left as that of the form: only its sign and
 * its course matter there, and rays look at it at every step.
 *
 * @param form the form before it moved
 * @param by how far its points moved
 * @param most the largest displacement, metres
 */
public record Displaced(Form form, Displacement by, double most) implements Form {
    private static final double FAR = 100;
    private static final int MOST_STEPS = 30;
    private static final double NEAR = 1e-16;

    @Override
    public void evaluate(double x, double y, double z, double[] out) {
        form.evaluate(x, y, z, out);
        if (Math.abs(out[0]) > FAR * most) {
            return;
        }
        double[] moved = new double[10];
        by.evaluate(x, y, z, moved);
        for (int i = 0; i < 10; i++) {
            out[i] -= moved[i];
        }
    }

    @Override
    public boolean onCap(double x, double y, double z) {
        return form.onCap(x, y, z);
    }

    @Override
    public int crossings(double x, double y, double z, double dx, double dy, double dz, double reach, double[] out) {
        int found = form.crossings(x, y, z, dx, dy, dz, reach, out);
        int count = 0;
        double[] f = new double[10];
        for (int i = 0; i < found; i++) {
            double s = out[i];
            for (int k = 0; k < MOST_STEPS; k++) {
                evaluate(x + s * dx, y + s * dy, z + s * dz, f);
                double step = f[0] / (f[1] * dx + f[2] * dy + f[3] * dz);
                s -= step;
                if (!(Math.abs(step) > NEAR * (1 + Math.abs(s)))) {
                    break;
                }
            }
            if (Double.isFinite(s)) {
                out[count++] = s;
            }
        }
        return count;
    }

    @Override
    public double sag(double x, double y) {
        double sag = form.sag(x, y);
        double[] moved = new double[10];
        by.evaluate(x, y, sag, moved);
        return sag + moved[0];
    }

    @Override
    public boolean closed() {
        return false;
    }

    @Override
    public double curvature() {
        return form.curvature();
    }
}
