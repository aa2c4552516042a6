package org.stillpath.task;

import java.util.List;
import java.util.Optional;
import org.stillpath.job.Section;
import org.stillpath.job.Value;
import org.stillpath.unit.Kind;
import org.stillpath.wave.GaussianBeam;

/**
 * The key {@code fibres} of a lens: a single-mode fibre at the object and one at the sensor, both with Gaussian modes at their
 * flat ends. The receiver stands where the source's image falls after the ray-transfer matrix, along z, and is then moved and
 * turned.
 *
 * @param mode radius of the source's mode where its irradiance is 1/e² of that in the middle, metres; {@code receiver}
 *     likewise
 * @param dx the receiver's place beside the image, metres; {@code dy} likewise
 * @param ax turn of the receiver about x, then {@code ay} about the turned y, radians, as a surface is tilted
 */
record Fibres(double mode, double receiver, double dx, double dy, double ax, double ay) {

    /** Reads {@code {mode-radius: 5.2 um, receiver-mode-radius: 5.2 um, offset: [0, 2 um], tilt: [0, 0]}}. */
    static Optional<Fibres> read(Value value) {
        Section s = value.section();
        double mode = s.need("mode-radius", "5.2 um").positive(Kind.LENGTH);
        double receiver =
                s.find("receiver-mode-radius").map(v -> v.positive(Kind.LENGTH)).orElse(mode);
        double[] offset = pair(s, "offset", Kind.LENGTH, "two lengths such as [0, 2 um]");
        double[] tilt = pair(s, "tilt", Kind.ANGLE, "two angles such as [0, 1 deg]");
        s.finish();
        boolean sound = mode > 0 && receiver > 0 && Double.isFinite(offset[0] + offset[1] + tilt[0] + tilt[1]);
        return sound
                ? Optional.of(new Fibres(mode, receiver, offset[0], offset[1], tilt[0], tilt[1]))
                : Optional.empty();
    }

    private static double[] pair(Section s, String key, Kind kind, String wanted) {
        double[] two = new double[2];
        s.find(key).ifPresent(v -> {
            List<Value> items = v.items();
            if (items.size() != 2) {
                v.fault(items.size() + " values stand here; " + wanted + " are needed");
                return;
            }
            two[0] = items.get(0).quantity(kind);
            two[1] = items.get(1).quantity(kind);
        });
        return two;
    }

    /**
     * The share of the source's light that goes on in the receiver.
     *
     * @param wavelength vacuum wavelength, metres
     * @param m ray-transfer matrix along the axis from the source's end to the receiver's
     * @param height of the source above the axis, metres
     * @param index of the medium before the receiver
     */
    double efficiency(double wavelength, double[][] m, double height, double index) {
        // the receiver's axis is (sin ay, −sin ax cos ay, cos ax cos ay)
        GaussianBeam taken = GaussianBeam.atWaist(wavelength, receiver, receiver)
                .moved(
                        dx + m[0][1] * height,
                        dy + m[1][1] * height,
                        index * Math.sin(ay),
                        -index * Math.sin(ax) * Math.cos(ay));
        return arriving(wavelength, m, height).overlap(taken);
    }

    /** The source's light at the receiver's end. */
    GaussianBeam arriving(double wavelength, double[][] m, double height) {
        return GaussianBeam.atWaist(wavelength, mode, mode)
                .moved(0, height, 0, 0)
                .through(m);
    }

    /**
     * Error of the efficiency over itself, from that of the matrix: an element off by e changes a mode's phase at its edge, w²
     * times the curvature that e makes.
     */
    double error(double wavelength, Axial axial, double before, double behind) {
        double angle = wavelength / (Math.PI * Math.min(mode, receiver));
        double wide = Math.max(mode, angle * (before + behind + axial.scale()));
        double phase = 2 * Math.PI / wavelength * (wide * wide / axial.scale() + wide * angle) * axial.error();
        return Math.max(phase, 1e-15);
    }

    /** A ray-transfer matrix between vertices, with the gaps before and behind it, lengths along the light over index. */
    static double[][] between(double before, double[][] train, double behind) {
        double[][] m = new double[4][4];
        for (int i = 0; i < 4; i++) {
            for (int j = 0; j < 4; j++) {
                m[i][j] = train[i][j] + (j < 2 ? 0 : before * train[i][j - 2]);
            }
        }
        for (int i = 0; i < 2; i++) {
            for (int j = 0; j < 4; j++) {
                m[i][j] += behind * m[i + 2][j];
            }
        }
        return m;
    }
}
