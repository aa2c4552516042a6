package org.stillpath.medium;

import java.util.List;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;

/**
 * The same index everywhere, kept as n − 1 so that thin air loses no digits.
 *
 * @param refractivity n − 1, above −1
 * @param limits margins of the region where the medium is valid, in the job's coordinates
 */
record UniformIndex(double refractivity, List<Level> limits) implements IndexField {
    UniformIndex {
        if (!(refractivity > -1 && Double.isFinite(refractivity))) {
            throw new IllegalArgumentException("refractivity must be above -1: " + refractivity);
        }
        limits = List.copyOf(limits);
    }

    @Override
    public void sample(double[] x, double[] y, double[] z, int count, Order order, Samples out) {
        double value = refractivity * (2 + refractivity);
        for (int i = 0; i < count; i++) {
            out.value[i] = value;
            if (order != Order.VALUE) {
                out.gx[i] = 0;
                out.gy[i] = 0;
                out.gz[i] = 0;
            }
            if (order == Order.HESSIAN) {
                out.hxx[i] = 0;
                out.hxy[i] = 0;
                out.hxz[i] = 0;
                out.hyy[i] = 0;
                out.hyz[i] = 0;
                out.hzz[i] = 0;
            }
        }
    }

    @Override
    public boolean uniform() {
        return true;
    }
}
