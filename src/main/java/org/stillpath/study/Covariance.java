package org.stillpath.study;

import java.util.ArrayList;
import java.util.List;
import org.hipparchus.linear.Array2DRowRealMatrix;
import org.hipparchus.linear.RealMatrix;
import org.hipparchus.linear.SingularValueDecomposition;

/**
 * How well a fit determines its unknowns: (JᵀJ)⁻¹ of the weighted derivatives, from the singular values of J with its
 * columns scaled to length 1, so that units do not matter. Directions whose singular value is rounding are left out of
 * the inverse and named: no value tells the unknowns in them apart.
 *
 * @param standard standard uncertainties; NaN for an unknown in a direction that is not determined
 * @param correlation coefficients; 0 beside an unknown without an uncertainty
 * @param condition greatest over least singular value; infinite where a direction is not determined
 * @param weakest by unknown, its part in the direction that is determined least, from 0 to 1
 */
record Covariance(double[] standard, double[][] correlation, double condition, double[] weakest) {
    private static final double LOST = 1e-9;

    /**
     * Of weighted derivatives.
     *
     * @param jacobian by values, then by unknowns
     * @param scale what the standard uncertainties are multiplied with
     */
    static Covariance of(double[][] jacobian, double scale) {
        int n = jacobian[0].length;
        double[] norms = new double[n];
        double[][] scaled = new double[jacobian.length][n];
        for (int j = 0; j < n; j++) {
            double sum = 0;
            for (double[] row : jacobian) {
                sum = Math.hypot(sum, row[j]);
            }
            norms[j] = sum;
            for (int i = 0; i < jacobian.length; i++) {
                scaled[i][j] = sum > 0 ? jacobian[i][j] / sum : 0;
            }
        }
        SingularValueDecomposition svd = new SingularValueDecomposition(new Array2DRowRealMatrix(scaled, false));
        double[] s = svd.getSingularValues();
        RealMatrix v = svd.getV();
        double[] standard = new double[n];
        double[][] c = new double[n][n];
        List<Integer> lost = new ArrayList<>();
        for (int k = 0; k < n; k++) {
            if (k >= s.length || s[k] <= LOST * s[0] || s[k] == 0) {
                lost.add(k);
                continue;
            }
            for (int i = 0; i < n; i++) {
                for (int j = 0; j < n; j++) {
                    c[i][j] += v.getEntry(i, k) * v.getEntry(j, k) / (s[k] * s[k]);
                }
            }
        }
        boolean[] free = new boolean[n];
        for (int j = 0; j < n; j++) {
            for (int k : lost) {
                free[j] |= Math.abs(v.getEntry(j, k)) > 1e-6;
            }
            standard[j] = free[j] || norms[j] == 0 ? Double.NaN : scale * Math.sqrt(c[j][j]) / norms[j];
        }
        double[][] r = new double[n][n];
        for (int i = 0; i < n; i++) {
            for (int j = 0; j < n; j++) {
                boolean known = !Double.isNaN(standard[i]) && !Double.isNaN(standard[j]);
                double both = Math.sqrt(c[i][i] * c[j][j]);
                r[i][j] = i == j ? 1 : known && both > 0 ? c[i][j] / both : 0;
            }
        }
        int last = n - 1;
        double[] weakest = new double[n];
        for (int j = 0; j < n; j++) {
            weakest[j] = Math.abs(v.getEntry(j, last));
        }
        double condition = lost.isEmpty() ? s[0] / s[last] : Double.POSITIVE_INFINITY;
        return new Covariance(standard, r, condition, weakest);
    }

    /** Whether an unknown takes part in the direction that is determined least. */
    boolean isWeak(int unknown) {
        return weakest[unknown] > 0.1;
    }
}
