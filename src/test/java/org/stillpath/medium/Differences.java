package org.stillpath.medium;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;

/** Holds the derivatives of a field against differences of its values. */
final class Differences {
    private Differences() {}

    /**
     * Compares gradient and Hessian at a point with central differences of values and gradients.
     *
     * @param h step in metres
     * @param tolerance error allowed in the gradient, 1/m; in the Hessian that over {@code scale}
     */
    static void check(IndexField field, double x, double y, double z, double h, double tolerance, double scale) {
        double[] px = {x, x + h, x - h, x, x, x, x};
        double[] py = {y, y, y, y + h, y - h, y, y};
        double[] pz = {z, z, z, z, z, z + h, z - h};
        Samples s = new Samples(7);
        field.sample(px, py, pz, 7, Order.HESSIAN, s);
        double k = 1 / (2 * h);
        // the field's gradient is half that of n²
        assertThat(s.gx[0]).as("d/dx").isCloseTo(0.5 * k * (s.value[1] - s.value[2]), within(tolerance));
        assertThat(s.gy[0]).as("d/dy").isCloseTo(0.5 * k * (s.value[3] - s.value[4]), within(tolerance));
        assertThat(s.gz[0]).as("d/dz").isCloseTo(0.5 * k * (s.value[5] - s.value[6]), within(tolerance));
        double t = tolerance / scale;
        assertThat(s.hxx[0]).as("xx").isCloseTo(k * (s.gx[1] - s.gx[2]), within(t));
        assertThat(s.hxy[0]).as("xy").isCloseTo(k * (s.gy[1] - s.gy[2]), within(t));
        assertThat(s.hxz[0]).as("xz").isCloseTo(k * (s.gz[1] - s.gz[2]), within(t));
        assertThat(s.hyy[0]).as("yy").isCloseTo(k * (s.gy[3] - s.gy[4]), within(t));
        assertThat(s.hyz[0]).as("yz").isCloseTo(k * (s.gz[3] - s.gz[4]), within(t));
        assertThat(s.hzz[0]).as("zz").isCloseTo(k * (s.gz[5] - s.gz[6]), within(t));
    }

    static double value(IndexField field, double x, double y, double z) {
        Samples s = new Samples(1);
        field.sample(new double[] {x}, new double[] {y}, new double[] {z}, 1, Order.VALUE, s);
        return s.value[0];
    }
}
