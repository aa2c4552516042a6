package org.stillpath.wave;

import java.util.Arrays;

/**
 * Optical path differences over a pupil. Samples carry weights of area (or of irradiance); what averages say does not depend
 * on the sampling once it is enough. Samples of weight 0 are left out of averages and count for the extremes.
 *
 * <p>Nothing is removed unless a method's name says so. Tilt and focus are removed by weighted least squares over the
 * samples there are, so a vignetted pupil is judged by the part that light comes through.
 */
public final class Wavefront {
    private final double[] x;
    private final double[] y;
    private final double[] weight;
    private final double[] path;

    /**
     * @param x places in the pupil over its radius
     * @param y likewise
     * @param weight of each sample, not negative; scaled so that they add up to 1
     * @param path optical path difference of each sample, metres, positive where the path is longer
     * @throws IllegalArgumentException if lengths differ, no weight is positive or a number is not finite
     */
    public Wavefront(double[] x, double[] y, double[] weight, double[] path) {
        if (x.length != y.length || x.length != weight.length || x.length != path.length) {
            throw new IllegalArgumentException("x, y, weight and path must be equally long: " + x.length + ", "
                    + y.length + ", " + weight.length + ", " + path.length);
        }
        this.x = x.clone();
        this.y = y.clone();
        this.weight = weight.clone();
        this.path = path.clone();
        double sum = 0;
        for (int i = 0; i < weight.length; i++) {
            if (!(weight[i] >= 0) || !Double.isFinite(x[i] + y[i] + path[i] + weight[i])) {
                throw new IllegalArgumentException("samples must be finite, weights not negative: sample " + i + ", "
                        + x[i] + ", " + y[i] + ", " + weight[i] + ", " + path[i]);
            }
            sum += weight[i];
        }
        if (!(sum > 0)) {
            throw new IllegalArgumentException("one weight at least must be positive: their sum is " + sum);
        }
        for (int i = 0; i < weight.length; i++) {
            this.weight[i] /= sum;
        }
    }

    /** Number of samples. */
    public int size() {
        return path.length;
    }

    /** Place of a sample over the pupil's radius, along x. */
    public double x(int sample) {
        return x[sample];
    }

    /** Place of a sample over the pupil's radius, along y. */
    public double y(int sample) {
        return y[sample];
    }

    /** Weight of a sample; all add up to 1. */
    public double weight(int sample) {
        return weight[sample];
    }

    /** Path difference of a sample, metres. */
    public double path(int sample) {
        return path[sample];
    }

    /** Weighted mean, metres. */
    public double mean() {
        double sum = 0;
        for (int i = 0; i < path.length; i++) {
            sum += weight[i] * path[i];
        }
        return sum;
    }

    /** Root of the weighted mean square about the mean, metres. */
    public double rms() {
        double mean = mean();
        double sum = 0;
        for (int i = 0; i < path.length; i++) {
            sum += weight[i] * (path[i] - mean) * (path[i] - mean);
        }
        return Math.sqrt(sum);
    }

    /** Largest less smallest path of the samples, metres. It grows with their number until rim and extremes are among them. */
    public double peakToValley() {
        return Arrays.stream(path).max().orElse(0) - Arrays.stream(path).min().orElse(0);
    }

    /**
     * Irradiance at the centre of the image over that without path differences: |⟨exp(2πiW/λ)⟩|² itself, not an estimate
     * (Born &amp; Wolf, <i>Principles of Optics</i>, 9.1).
     *
     * @param wavelength vacuum wavelength, metres
     */
    public double strehl(double wavelength) {
        double mean = mean();
        double re = 0;
        double im = 0;
        for (int i = 0; i < path.length; i++) {
            double phase = 2 * Math.PI * (path[i] - mean) / wavelength;
            re += weight[i] * Math.cos(phase);
            im += weight[i] * Math.sin(phase);
        }
        return re * re + im * im;
    }

    /**
     * The usual estimate of the Strehl ratio from the rms alone, exp(−(2πσ/λ)²) after Maréchal and Mahajan; good for rms
     * values of a tenth of a wave and less.
     *
     * @param wavelength vacuum wavelength, metres
     */
    public double marechal(double wavelength) {
        double phase = 2 * Math.PI * rms() / wavelength;
        return Math.exp(-phase * phase);
    }

    /** The plane a + bx + cy that fits best, as {a, b, c}, metres. */
    public double[] plane() {
        double[] c = BasisFit.of(this, 3, Zernike.of(3)::values);
        return new double[] {c[0], 2 * c[1], 2 * c[2]};
    }

    /** The paraboloid a + bx + cy + d(x² + y²) that fits best, as {a, b, c, d}, metres: tilt and focus. */
    public double[] sphere() {
        double[] c = BasisFit.of(this, 4, Zernike.of(4)::values);
        return new double[] {c[0] - Math.sqrt(3) * c[3], 2 * c[1], 2 * c[2], 2 * Math.sqrt(3) * c[3]};
    }

    /** Without its best plane. */
    public Wavefront withoutTilt() {
        double[] p = plane();
        return less(p[0], p[1], p[2], 0);
    }

    /** Without its best plane and sphere: refocused. */
    public Wavefront withoutTiltAndFocus() {
        double[] p = sphere();
        return less(p[0], p[1], p[2], p[3]);
    }

    private Wavefront less(double a, double b, double c, double d) {
        double[] left = new double[path.length];
        for (int i = 0; i < left.length; i++) {
            left[i] = path[i] - a - b * x[i] - c * y[i] - d * (x[i] * x[i] + y[i] * y[i]);
        }
        return new Wavefront(x, y, weight, left);
    }
}
