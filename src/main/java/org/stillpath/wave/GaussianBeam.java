package org.stillpath.wave;

import java.util.Arrays;
import org.hipparchus.complex.Complex;

/**
 * A Gaussian beam, astigmatic or not, beside a ray: its field over a plane across z is exp(ik[½(r − c)ᵀM(r − c) + qᵀ(r − c)])
 * with k = 2π/λ in vacuum, a complex symmetric M, a centre c and a slope q (index times direction cosines, as in the ray-transfer
 * matrix). A 4×4 matrix [[A, B], [C, D]] takes M to (C + DM)(A + BM)⁻¹ and (c, q) as it takes rays: the law of Kogelnik and
 * Li (Appl. Opt. 5 (1966) 1550) and of Arnaud (Bell Syst. Tech. J. 49 (1970) 2311) for any medium, simple or general
 * astigmatism. It is paraxial: exact to second order about the ray of the matrix, and it knows neither aberrations nor edges.
 *
 * <p>Chosen against a beam a meridian, which costs less and fails where a train turns its meridians into each other.
 */
public final class GaussianBeam {
    private final double wavelength;
    private final double[] centre;
    private final double[] slope;
    private final Complex xx;
    private final Complex xy;
    private final Complex yy;

    private GaussianBeam(double wavelength, double[] centre, double[] slope, Complex xx, Complex xy, Complex yy) {
        this.wavelength = wavelength;
        this.centre = centre;
        this.slope = slope;
        this.xx = xx;
        this.xy = xy;
        this.yy = yy;
    }

    /**
     * A beam at its waist on the ray of the matrix.
     *
     * @param wavelength vacuum wavelength, metres
     * @param radiusX radius at which the irradiance is 1/e² of that in the middle, along x, metres; {@code radiusY} along y
     */
    public static GaussianBeam atWaist(double wavelength, double radiusX, double radiusY) {
        if (!(wavelength > 0 && radiusX > 0 && radiusY > 0)) {
            throw new IllegalArgumentException(
                    "wavelength and radii must be positive: " + wavelength + ", " + radiusX + ", " + radiusY);
        }
        return new GaussianBeam(
                wavelength,
                new double[2],
                new double[2],
                new Complex(0, wavelength / (Math.PI * radiusX * radiusX)),
                Complex.ZERO,
                new Complex(0, wavelength / (Math.PI * radiusY * radiusY)));
    }

    /**
     * The same moved and turned.
     *
     * @param dx added to the centre along x, metres; {@code dy} along y
     * @param qx added to index times direction cosine along x; {@code qy} along y
     */
    public GaussianBeam moved(double dx, double dy, double qx, double qy) {
        return new GaussianBeam(
                wavelength,
                new double[] {centre[0] + dx, centre[1] + dy},
                new double[] {slope[0] + qx, slope[1] + qy},
                xx,
                xy,
                yy);
    }

    /**
     * The beam behind a train.
     *
     * @param m 4×4 ray-transfer matrix by rows, of (x, y, px, py)
     */
    public GaussianBeam through(double[][] m) {
        // (A + BM) and (C + DM), 2×2 complex
        Complex[][] below = product(m, 0);
        Complex[][] above = product(m, 2);
        Complex det = below[0][0].multiply(below[1][1]).subtract(below[0][1].multiply(below[1][0]));
        Complex[][] inverse = {
            {below[1][1].divide(det), below[0][1].negate().divide(det)},
            {below[1][0].negate().divide(det), below[0][0].divide(det)}
        };
        Complex[][] after = new Complex[2][2];
        for (int i = 0; i < 2; i++) {
            for (int j = 0; j < 2; j++) {
                after[i][j] = above[i][0].multiply(inverse[0][j]).add(above[i][1].multiply(inverse[1][j]));
            }
        }
        double[] old = {centre[0], centre[1], slope[0], slope[1]};
        double[] ray = new double[4];
        for (int i = 0; i < 4; i++) {
            for (int j = 0; j < 4; j++) {
                ray[i] += m[i][j] * old[j];
            }
        }
        return new GaussianBeam(
                wavelength,
                new double[] {ray[0], ray[1]},
                new double[] {ray[2], ray[3]},
                after[0][0],
                after[0][1].add(after[1][0]).divide(2),
                after[1][1]);
    }

    /** Rows {@code top} and {@code top} + 1 of the matrix times (1, M)ᵀ. */
    private Complex[][] product(double[][] m, int top) {
        Complex[][] p = new Complex[2][2];
        for (int i = 0; i < 2; i++) {
            double[] row = m[top + i];
            p[i][0] = xx.multiply(row[2]).add(xy.multiply(row[3])).add(row[0]);
            p[i][1] = xy.multiply(row[2]).add(yy.multiply(row[3])).add(row[1]);
        }
        return p;
    }

    /** Centre x and y beside the ray of the matrix, metres (a copy). */
    public double[] centre() {
        return centre.clone();
    }

    /** Index times direction cosines along x and y, beside those of the ray of the matrix (a copy). */
    public double[] slope() {
        return slope.clone();
    }

    /** Semi-axes of the ellipse on which the irradiance is 1/e² of that in the middle, metres, the larger one first. */
    public double[] radii() {
        double[] e = eigenvalues(xx.getImaginary(), xy.getImaginary(), yy.getImaginary());
        return new double[] {Math.sqrt(wavelength / (Math.PI * e[0])), Math.sqrt(wavelength / (Math.PI * e[1]))};
    }

    /** Curvatures of the phase in its two principal sections times the index, 1/m, ascending; positive: diverging. */
    public double[] curvatures() {
        return eigenvalues(xx.getReal(), xy.getReal(), yy.getReal());
    }

    private static double[] eigenvalues(double a, double b, double c) {
        double mean = 0.5 * (a + c);
        double half = Math.hypot(0.5 * (a - c), b);
        return new double[] {mean - half, mean + half};
    }

    /**
     * The share of this beam's power that a receiver with the other beam's field takes up: |∬E₁E₂*|²/(∬|E₁|²∬|E₂|²) over the
     * plane, in closed form for any sizes, curvatures, offsets and tilts (Marcuse 1977 and Joyce &amp; DeLoach 1984 for round
     * beams). Reflections are not in it.
     *
     * @param other a beam of the same wavelength in the same plane, beside the same ray
     * @throws IllegalArgumentException if the wavelengths differ
     */
    public double overlap(GaussianBeam other) {
        if (Math.abs(wavelength - other.wavelength) > 1e-12 * wavelength) {
            throw new IllegalArgumentException(
                    "both beams must have one wavelength: " + wavelength + ", " + other.wavelength);
        }
        double k = 2 * Math.PI / wavelength;
        // exponent about this beam's centre: −½ rᵀSr + tᵀr + u, with S = −ik(M₁ − M₂*)
        Complex ik = new Complex(0, k);
        Complex sxx = ik.multiply(other.xx.conjugate().subtract(xx));
        Complex sxy = ik.multiply(other.xy.conjugate().subtract(xy));
        Complex syy = ik.multiply(other.yy.conjugate().subtract(yy));
        double dx = other.centre[0] - centre[0];
        double dy = other.centre[1] - centre[1];
        Complex mdx = other.xx.conjugate().multiply(dx).add(other.xy.conjugate().multiply(dy));
        Complex mdy = other.xy.conjugate().multiply(dx).add(other.yy.conjugate().multiply(dy));
        Complex tx = ik.multiply(mdx.add(slope[0] - other.slope[0]));
        Complex ty = ik.multiply(mdy.add(slope[1] - other.slope[1]));
        Complex u = ik.multiply(mdx.multiply(dx).add(mdy.multiply(dy)).multiply(-0.5))
                .add(ik.multiply(other.slope[0] * dx + other.slope[1] * dy));
        Complex det = sxx.multiply(syy).subtract(sxy.multiply(sxy));
        Complex quadratic = tx.multiply(tx)
                .multiply(syy)
                .subtract(tx.multiply(ty).multiply(sxy).multiply(2))
                .add(ty.multiply(ty).multiply(sxx))
                .divide(det)
                .multiply(0.5);
        double exponent = 2 * quadratic.add(u).getReal();
        double both = 4 * k * k * Math.sqrt(imaginaryDet() * other.imaginaryDet());
        return both / det.norm() * Math.exp(exponent);
    }

    private double imaginaryDet() {
        return xx.getImaginary() * yy.getImaginary() - xy.getImaginary() * xy.getImaginary();
    }

    @Override
    public String toString() {
        return "GaussianBeam[radii " + Arrays.toString(radii()) + " m, curvatures " + Arrays.toString(curvatures())
                + " 1/m]";
    }
}
