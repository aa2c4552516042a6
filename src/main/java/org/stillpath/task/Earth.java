package org.stillpath.task;

import java.util.Optional;
import org.stillpath.job.Section;
import org.stillpath.job.Value;
import org.stillpath.unit.Kind;

/**
 * The shape of the earth along a sight.
 *
 * @param radius of the sphere that stands for it, metres; infinite for a flat earth
 * @param words what it is, for people
 */
record Earth(double radius, String words) {
    /** Mean radius of the earth, metres: the one that is taken where nothing is said. */
    static final double MEAN = 6_371_000;

    /** Semi-major axis of WGS84 and of GRS80, metres. */
    private static final double AXIS = 6_378_137;

    private static final double LEAST = 1e3;
    private static final double MOST = 1e9;

    /** A sphere of the mean radius. */
    static Earth mean() {
        return new Earth(MEAN, "a sphere of 6371 km");
    }

    /** Reads {@code earth:}; empty after a fault. */
    static Optional<Earth> read(Value v) {
        if (v.isText()) {
            return v.word("flat").isEmpty()
                    ? Optional.empty()
                    : Optional.of(new Earth(Double.POSITIVE_INFINITY, "a flat earth"));
        }
        Section s = v.section();
        boolean sphere = s.has("radius");
        boolean ellipsoid = s.has("ellipsoid");
        if (sphere == ellipsoid && !s.isPlaceholder()) {
            s.fault((sphere ? "only " : "") + "one of `radius: 6371 km`, `ellipsoid: WGS84` and `flat` is needed");
            return Optional.empty();
        }
        if (sphere) {
            double r = s.at("radius").positive(Kind.LENGTH);
            s.finish();
            if (r < LEAST || r > MOST) {
                s.fault("radius", "a radius from 1 km to 1000000 km is needed; the earth's is about 6371 km");
                return Optional.empty();
            }
            return Double.isNaN(r) ? Optional.empty() : Optional.of(new Earth(r, "a sphere of " + km(r)));
        }
        String name = s.find("ellipsoid").map(e -> e.word("WGS84", "GRS80")).orElse("");
        double latitude = s.need("latitude", "52 deg").quantity(Kind.ANGLE);
        double azimuth = s.need("azimuth", "30 deg").quantity(Kind.ANGLE);
        s.finish();
        if (Math.abs(latitude) > 0.5 * Math.PI + 1e-12) {
            s.fault("latitude", "a latitude lies between -90 deg and 90 deg");
            return Optional.empty();
        }
        if (name.isEmpty() || Double.isNaN(latitude + azimuth)) {
            return Optional.empty();
        }
        double r = euler(name.equals("WGS84") ? 298.257223563 : 298.257222101, latitude, azimuth);
        return Optional.of(new Earth(
                r, name + " at latitude " + deg(latitude) + ", azimuth " + deg(azimuth) + ": a sphere of " + km(r)));
    }

    /**
     * Euler's radius of curvature of a normal section, 1/R = cos²A/M + sin²A/N with the meridian's M = a(1 − e²)/W³ and the
     * prime vertical's N = a/W, W² = 1 − e² sin²φ (for example Torge, <i>Geodesy</i>, section 4.1.3).
     *
     * @param flattening 1/f
     * @param latitude φ, rad
     * @param azimuth A, rad
     */
    static double euler(double flattening, double latitude, double azimuth) {
        double f = 1 / flattening;
        double e2 = f * (2 - f);
        double sin = Math.sin(latitude);
        double w2 = 1 - e2 * sin * sin;
        double n = AXIS / Math.sqrt(w2);
        double m = n * (1 - e2) / w2;
        double c = Math.cos(azimuth);
        double s = Math.sin(azimuth);
        return 1 / (c * c / m + s * s / n);
    }

    boolean flat() {
        return Double.isInfinite(radius);
    }

    private static String km(double metres) {
        return org.stillpath.unit.Display.in(metres, "km", 1) + "";
    }

    private static String deg(double rad) {
        return org.stillpath.unit.Display.in(rad, "deg", Math.toRadians(1e-4)) + "";
    }
}
