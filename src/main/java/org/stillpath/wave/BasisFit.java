package org.stillpath.wave;

import org.hipparchus.linear.Array2DRowRealMatrix;
import org.hipparchus.linear.ArrayRealVector;
import org.hipparchus.linear.DecompositionSolver;
import org.hipparchus.linear.SingularValueDecomposition;

/**
 * Weighted least squares on a basis that is nearly orthonormal under the weights: normal equations, and one more pass over
 * what the first left. The second pass takes back the digits that normal equations lose; a factorisation of the tall matrix
 * would hold all samples in memory at once. Where the samples cannot tell two functions apart, the solution of least norm is
 * taken.
 */
final class BasisFit {
    private BasisFit() {}

    /** Functions that are fitted. */
    interface Basis {
        /** The values of all functions at a point of the unit disk, into {@code out}. */
        void values(double x, double y, double[] out);
    }

    /** The coefficients of {@code count} functions that fit best. */
    static double[] of(Wavefront wave, int count, Basis basis) {
        double[] values = new double[count];
        double[] found = new double[count];
        double[] right = new double[count];
        double[][] normal = new double[count][count];
        project(wave, basis, found, values, right, normal);
        for (int i = 0; i < count; i++) {
            for (int j = 0; j < i; j++) {
                normal[j][i] = normal[i][j];
            }
        }
        DecompositionSolver solver =
                new SingularValueDecomposition(new Array2DRowRealMatrix(normal, false)).getSolver();
        add(found, solver, right);
        right = new double[count];
        project(wave, basis, found, values, right, new double[0][]);
        add(found, solver, right);
        return found;
    }

    private static void add(double[] found, DecompositionSolver solver, double[] right) {
        double[] more = solver.solve(new ArrayRealVector(right, false)).toArray();
        for (int i = 0; i < found.length; i++) {
            found[i] += more[i];
        }
    }

    /** What the sum so far leaves, projected on each function; and the functions on each other, where that is wanted. */
    private static void project(
            Wavefront wave, Basis basis, double[] found, double[] values, double[] right, double[][] normal) {
        int count = found.length;
        for (int s = 0; s < wave.size(); s++) {
            double w = wave.weight(s);
            if (w == 0) {
                continue;
            }
            basis.values(wave.x(s), wave.y(s), values);
            double left = wave.path(s);
            for (int i = 0; i < count; i++) {
                left -= found[i] * values[i];
            }
            for (int i = 0; i < count; i++) {
                right[i] += w * left * values[i];
            }
            for (int i = 0; i < normal.length; i++) {
                double wi = w * values[i];
                double[] row = normal[i];
                for (int j = 0; j <= i; j++) {
                    row[j] += wi * values[j];
                }
            }
        }
    }
}
