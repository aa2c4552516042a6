package org.stillpath.medium;

import java.util.Arrays;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;

/**
 * A quantity that is the same everywhere.
 *
 * @param value in SI
 */
record Constant(double value) implements ScalarField {
    @Override
    public void sample(double[] x, double[] y, double[] z, int count, double wavelength, Order order, Samples out) {
        Arrays.fill(out.value, 0, count, value);
        if (order != Order.VALUE) {
            Arrays.fill(out.gx, 0, count, 0);
            Arrays.fill(out.gy, 0, count, 0);
            Arrays.fill(out.gz, 0, count, 0);
        }
        if (order == Order.HESSIAN) {
            Arrays.fill(out.hxx, 0, count, 0);
            Arrays.fill(out.hxy, 0, count, 0);
            Arrays.fill(out.hxz, 0, count, 0);
            Arrays.fill(out.hyy, 0, count, 0);
            Arrays.fill(out.hyz, 0, count, 0);
            Arrays.fill(out.hzz, 0, count, 0);
        }
    }

    @Override
    public boolean isConstant() {
        return true;
    }
}
