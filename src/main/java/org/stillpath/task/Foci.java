package org.stillpath.task;

import org.stillpath.ray.Traced;

/**
 * Where the narrow bundle about a chief ray comes together: its two focal lines, from the ray-transfer about the ray. With
 * rays (δr, δp) behind the last surface that are linear in what a bundle starts with (δp of a point, δr of a beam), δr(Δz) =
 * δr + Δz·G·δp with G = (1 + p⊥p⊥ᵀ/pz²)/pz, and a focal line lies where that has a null direction: a quadratic in Δz. It is
 * solved as such, since the wavefront's curvature, W = δp·δr⁻¹, has a pole where a focus falls on the last surface
 * (Coddington, generalised; Kneisly, J. Opt. Soc. Am. 54 (1964) 229).
 *
 * @param tangential along z from where the chief ray leaves the last surface, metres: the focus of the fan in the yz plane;
 *     infinite where it has none
 * @param sagittal likewise: of the fan across it
 */
record Foci(double tangential, double sagittal) {
    private static final double SAME = 1e-9;

    /** The focal lines of a bundle about a chief ray that was traced with its transfer. */
    static Foci of(Traced chief, boolean beam) {
        double[][] m = chief.transfer();
        int from = beam ? 0 : 2;
        double[][] r = {{m[0][from], m[0][from + 1]}, {m[1][from], m[1][from + 1]}};
        double[][] p = {{m[2][from], m[2][from + 1]}, {m[3][from], m[3][from + 1]}};
        double[] state = chief.state();
        double px = state[3];
        double py = state[4];
        double pz = state[5];
        double[][] g = {
            {(1 + px * px / (pz * pz)) / pz, px * py / (pz * pz * pz)},
            {px * py / (pz * pz * pz), (1 + py * py / (pz * pz)) / pz}
        };
        double[][] e = new double[2][2];
        for (int i = 0; i < 2; i++) {
            for (int j = 0; j < 2; j++) {
                e[i][j] = g[i][0] * p[0][j] + g[i][1] * p[1][j];
            }
        }
        double a = e[0][0] * e[1][1] - e[0][1] * e[1][0];
        double b = r[0][0] * e[1][1] + r[1][1] * e[0][0] - r[0][1] * e[1][0] - r[1][0] * e[0][1];
        double c = r[0][0] * r[1][1] - r[0][1] * r[1][0];
        if (a == 0) {
            double single = b == 0 ? Double.POSITIVE_INFINITY : -c / b;
            return sorted(r, e, single, Double.POSITIVE_INFINITY);
        }
        double half = Math.sqrt(Math.max(0, b * b - 4 * a * c));
        double q = -0.5 * (b + Math.copySign(half, b));
        double one = q / a;
        double two = q == 0 ? one : c / q;
        return half <= SAME * Math.abs(b) ? new Foci(-0.5 * b / a, -0.5 * b / a) : sorted(r, e, one, two);
    }

    /** The focus whose null direction is upright is that of the tangential fan. */
    private static Foci sorted(double[][] r, double[][] e, double one, double two) {
        double[][] at = {
            {r[0][0] + one * e[0][0], r[0][1] + one * e[0][1]}, {r[1][0] + one * e[1][0], r[1][1] + one * e[1][1]}
        };
        if (!Double.isFinite(one)) {
            at = e;
        }
        // the null direction is across the larger row
        double[] row = Math.hypot(at[0][0], at[0][1]) >= Math.hypot(at[1][0], at[1][1]) ? at[0] : at[1];
        boolean upright = Math.abs(row[0]) >= Math.abs(row[1]);
        return upright ? new Foci(one, two) : new Foci(two, one);
    }
}
