package org.stillpath.task;

import java.util.LinkedHashMap;
import java.util.Map;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.medium.IndexField;
import org.stillpath.ray.Element;
import org.stillpath.ray.Train;

/**
 * What a rod's gradient is called by: its pitch and its numerical aperture. On the axis n² = n₀²(1 − (gr)² + ..), so g² is
 * minus the second derivative of n²/2 across the axis over n²; the pitch is g·L/2π (Gomez-Reino, Pérez &amp; Bao 2002).
 */
final class Gradient {
    /** Difference over g² up to which a gradient counts as the same along and round the axis. */
    private static final double SAME = 1e-9;

    private Gradient() {}

    /** {@code pitch} and {@code gradient-numerical-aperture} of a train with one rod; nothing for others. */
    static Map<String, Quantity> quantities(Train train) {
        Map<String, Quantity> found = new LinkedHashMap<>();
        int rod = -1;
        for (int i = 0; i + 1 < train.elements().size(); i++) {
            if (!train.behind(i).uniform()) {
                if (rod >= 0) {
                    return found;
                }
                rod = i;
            }
        }
        if (rod < 0) {
            return found;
        }
        Element front = train.elements().get(rod);
        Element back = train.elements().get(rod + 1);
        double z0 = front.surface().vertex().z();
        double z1 = back.surface().vertex().z();
        double aperture = Math.min(front.surface().aperture(), back.surface().aperture());
        double edge = Double.isFinite(aperture) ? aperture : 0;
        double[] x = {0, 0, 0, edge};
        double[] y = new double[4];
        double[] z = {z0, 0.5 * (z0 + z1), z1, 0.5 * (z0 + z1)};
        Samples s = new Samples(4);
        IndexField field = train.behind(rod);
        field.sample(x, y, z, 4, Order.HESSIAN, s);
        double square = -s.hxx[1] / (1 + s.value[1]);
        boolean same = true;
        for (int i = 0; i < 3; i++) {
            same &= Math.abs(-s.hxx[i] / (1 + s.value[i]) - square) <= SAME * square
                    && Math.abs(-s.hyy[i] / (1 + s.value[i]) - square) <= SAME * square
                    && s.value[i] - s.value[1] == 0;
        }
        if (!(square > 0) || !same || z1 <= z0) {
            return found;
        }
        double pitch = Math.sqrt(square) * (z1 - z0) / (2 * Math.PI);
        found.put("pitch", new Quantity.Amount(pitch, "1", 1e-14 * pitch));
        double aside = s.value[1] - s.value[3];
        if (edge > 0 && aside > 0) {
            double na = Math.sqrt(aside);
            found.put("gradient-numerical-aperture", new Quantity.Amount(na, "1", 4e-16 / na));
        }
        return found;
    }
}
