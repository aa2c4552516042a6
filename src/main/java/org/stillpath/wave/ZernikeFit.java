package org.stillpath.wave;

import java.util.Arrays;

/**
 * A wavefront as a sum of Zernike's polynomials, by weighted least squares. Over a full, evenly weighted pupil that is the
 * projection on each of them; over a vignetted or unevenly weighted one the polynomials are no longer orthogonal, and the fit
 * is what the light that comes through tells.
 */
public final class ZernikeFit {
    private final Zernike basis;
    private final double[] coefficients;
    private final double residual;

    private ZernikeFit(Zernike basis, double[] coefficients, double residual) {
        this.basis = basis;
        this.coefficients = coefficients;
        this.residual = residual;
    }

    /**
     * Fits the first so many polynomials.
     *
     * @param wave what is fitted
     * @param terms from 1 to {@link Zernike#MOST}; more than there are weighted samples cannot be told apart, and the fit of
     *     least norm is then taken
     */
    public static ZernikeFit of(Wavefront wave, int terms) {
        Zernike basis = Zernike.of(terms);
        double[] c = BasisFit.of(wave, terms, basis::values);
        double[] values = new double[terms];
        double sum = 0;
        for (int s = 0; s < wave.size(); s++) {
            if (wave.weight(s) > 0) {
                basis.values(wave.x(s), wave.y(s), values);
                double left = wave.path(s) - dot(c, values);
                sum += wave.weight(s) * left * left;
            }
        }
        return new ZernikeFit(basis, c, Math.sqrt(sum));
    }

    /** The coefficients, metres, Noll's number 1 first (a copy). */
    public double[] coefficients() {
        return coefficients.clone();
    }

    /** Root of the weighted mean square of what the sum leaves, metres. */
    public double residual() {
        return residual;
    }

    /** The sum at a point of the disk, metres. */
    public double at(double x, double y) {
        double[] values = new double[coefficients.length];
        basis.values(x, y, values);
        return dot(coefficients, values);
    }

    /** Root of the sum of squares of the coefficients from a number of Noll's on, metres: the rms that they stand for. */
    public double rmsFrom(int number) {
        return Math.sqrt(
                Arrays.stream(coefficients).skip(number - 1L).map(c -> c * c).sum());
    }

    private static double dot(double[] a, double[] b) {
        double sum = 0;
        for (int i = 0; i < a.length; i++) {
            sum += a[i] * b[i];
        }
        return sum;
    }
}
