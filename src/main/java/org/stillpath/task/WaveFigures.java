package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import org.stillpath.unit.Display;
import org.stillpath.wave.Pupil;
import org.stillpath.wave.Wavefront;
import org.stillpath.wave.Zernike;
import org.stillpath.wave.ZernikeFit;

/** The figures of a wavefront, for every task that has one. */
final class WaveFigures {
    private static final int SIDE = 101;
    /** Noll's number of the first term that is an aberration: piston and tilts come before it. */
    private static final int FIRST = 4;
    /** Bars that are always drawn where there are no more. */
    private static final int FEW = 4;
    /** Size of a term over the largest below which it has no bar. */
    private static final double SMALL = 1e-3;
    /** Samples at most among which the nearest to a place is looked for. */
    private static final int MOST_NEAR = 4000;

    private WaveFigures() {}

    /**
     * The map {@code wavefront}. Drawn is the sum of the fit's terms, which is smooth between the samples; what it leaves is
     * told in the question's line where it is more than a twentieth of the rms.
     *
     * @param answer the title
     * @param wave the samples, with what is to be removed removed
     * @param fit of these samples
     * @param lost places of the pupil from which no light came through
     * @param radius of the pupil, metres
     * @param wavelength vacuum wavelength, metres
     */
    static WavefrontFigure map(
            String answer, Wavefront wave, ZernikeFit fit, List<Pupil.Point> lost, double radius, double wavelength) {
        return map("How far is the wave from a sphere?", answer, wave, fit, lost, radius, wavelength);
    }

    /** The same under a question of one's own. */
    static WavefrontFigure map(
            String asked,
            String answer,
            Wavefront wave,
            ZernikeFit fit,
            List<Pupil.Point> lost,
            double radius,
            double wavelength) {
        double[] values = new double[SIDE * SIDE];
        List<double[]> near = lost.isEmpty() ? List.of() : nearest(wave, lost);
        for (int r = 0; r < SIDE; r++) {
            double y = 2.0 * r / (SIDE - 1) - 1;
            for (int c = 0; c < SIDE; c++) {
                double x = 2.0 * c / (SIDE - 1) - 1;
                values[r * SIDE + c] = isLost(near, x, y) ? Double.NaN : fit.at(x, y);
            }
        }
        String question = asked;
        if (!lost.isEmpty()) {
            question += " Grey: no light comes through.";
        }
        if (fit.residual() > 0.05 * wave.rms()) {
            question += " Drawn: the sum of " + fit.coefficients().length + " Zernike terms, which leaves "
                    + Display.of(fit.residual(), "m", 0.01 * fit.residual());
        }
        return new WavefrontFigure(
                "wavefront", question, answer, "x in the pupil", "y in the pupil", radius, wavelength, SIDE, values);
    }

    private static List<double[]> nearest(Wavefront wave, List<Pupil.Point> lost) {
        List<double[]> near = new ArrayList<>();
        int stride = 1 + (wave.size() + lost.size()) / MOST_NEAR;
        for (int i = 0; i < wave.size(); i += stride) {
            near.add(new double[] {wave.x(i), wave.y(i), 0});
        }
        for (int i = 0; i < lost.size(); i += stride) {
            near.add(new double[] {lost.get(i).x(), lost.get(i).y(), 1});
        }
        return near;
    }

    private static boolean isLost(List<double[]> near, double x, double y) {
        double least = Double.POSITIVE_INFINITY;
        boolean lost = false;
        for (double[] p : near) {
            double d = (p[0] - x) * (p[0] - x) + (p[1] - y) * (p[1] - y);
            if (d < least) {
                least = d;
                lost = p[2] > 0;
            }
        }
        return lost;
    }

    /**
     * The bars {@code zernike}: each term behind piston and tilt that is not next to nothing, and what all of them
     * leave.
     *
     * @param where what the title says of the place behind "the largest term", empty or with a blank first
     */
    static BarFigure zernike(String where, ZernikeFit fit, double wavelength) {
        double[] c = fit.coefficients();
        List<BarFigure.Bar> bars = new ArrayList<>();
        int first = Math.min(FIRST, c.length);
        int most = first;
        for (int j = first; j <= c.length; j++) {
            most = Math.abs(c[j - 1]) > Math.abs(c[most - 1]) ? j : most;
        }
        String answer = c.length < FIRST
                ? "The sampling tells no aberrations apart"
                : "The largest term" + where + " is " + Zernike.mode(most).name() + ", "
                        + waves(c[most - 1], wavelength) + " rms";
        double largest = Math.max(fit.residual(), Math.abs(c[most - 1]));
        for (int j = first; j <= c.length; j++) {
            if (c.length - first > FEW && Math.abs(c[j - 1]) < SMALL * largest) {
                continue;
            }
            bars.add(new BarFigure.Bar(j + "  " + Zernike.mode(j).name(), c[j - 1], waves(c[j - 1], wavelength)));
        }
        int left = c.length - first + 1 - bars.size();
        bars.add(new BarFigure.Bar("left by all of these (rms)", fit.residual(), waves(fit.residual(), wavelength)));
        return new BarFigure(
                "zernike",
                "Which aberrations are in the wave? Zernike terms " + first + " to " + c.length
                        + " after Noll, each its own rms"
                        + (left > 0 ? "; " + left + " are below 0.1 % of the largest" : ""),
                answer,
                new ChartFigure.Axis("coefficient", "m", ""),
                bars,
                0);
    }

    /** A path in waves, for people. */
    static String waves(double path, double wavelength) {
        double w = path / wavelength;
        double size = Math.abs(w);
        if (size < 5e-7) {
            return "0 λ";
        }
        return size < 1e-3 ? String.format(Locale.ROOT, "%.2g mλ", 1e3 * w) : String.format(Locale.ROOT, "%.4f λ", w);
    }
}
