package org.stillpath.ray;

import java.util.Locale;
import java.util.Optional;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.SolidMedium;

/**
 * A solid between two faces of a train, as drawn.
 *
 * @param medium what it is made of
 * @param own the medium's frame in the job
 * @param front number of the surface that leads into it
 * @param back number of the next surface that refracts or reflects
 * @param frontFace the surface that leads into it
 * @param backFace the surface behind
 */
public record Plate(SolidMedium medium, Frame own, int front, int back, Surface frontFace, Surface backFace) {
    private static final int RINGS = 12;
    private static final int ANGLES = 24;
    private static final int DEPTHS = 8;

    /**
     * Temperatures met in a plate.
     *
     * @param coldest kelvin; NaN where no place was known
     * @param hottest kelvin
     */
    public record Span(double coldest, double hottest) {
        /** The difference, K. */
        public double width() {
            return hottest - coldest;
        }
    }

    /** How the plate swells. */
    Swelling swelling() {
        return new Swelling(medium, own, frontFace, backFace).settled();
    }

    /** The half of the diameter that the job gives, else the smaller aperture of its faces; 0 where neither is said. */
    public double radius() {
        double aperture = Math.min(frontFace.aperture(), backFace.aperture());
        return medium.diameter() > 0 ? 0.5 * medium.diameter() : Double.isInfinite(aperture) ? 0 : aperture;
    }

    /** The distance between the vertices, metres. */
    public double thickness() {
        return backFace.vertex().minus(frontFace.vertex()).norm();
    }

    /** The temperatures within a radius about the front face's axis, from a sample of places. */
    public Span span(double within) {
        Frame plate = frontFace.frame();
        double depth = plate.fromJob(backFace.vertex()).z();
        int rings = within > 0 ? RINGS : 0;
        int count = (1 + rings * ANGLES) * (DEPTHS + 1);
        double[] x = new double[count];
        double[] y = new double[count];
        double[] z = new double[count];
        int n = 0;
        for (int i = 0; i <= rings; i++) {
            double r = rings == 0 ? 0 : within * i / rings;
            for (int k = 0; k < (i == 0 ? 1 : ANGLES); k++) {
                double angle = 2 * Math.PI * k / ANGLES;
                for (int d = 0; d <= DEPTHS; d++) {
                    Vector p = own.fromJob(
                            plate.toJob(new Vector(r * Math.cos(angle), r * Math.sin(angle), depth * d / DEPTHS)));
                    x[n] = p.x();
                    y[n] = p.y();
                    z[n++] = p.z();
                }
            }
        }
        double coldest = Double.POSITIVE_INFINITY;
        double hottest = Double.NEGATIVE_INFINITY;
        for (double t : medium.temperatures(x, y, z)) {
            if (!Double.isNaN(t)) {
                coldest = Math.min(coldest, t);
                hottest = Math.max(hottest, t);
            }
        }
        return coldest <= hottest ? new Span(coldest, hottest) : new Span(Double.NaN, Double.NaN);
    }

    /** Why it cannot be told how a free plate bulges; empty if it can. */
    Optional<String> refusal() {
        if (!medium.free()) {
            return Optional.empty();
        }
        if (frontFace.whole() || backFace.whole()) {
            return Optional.of(
                    "medium `" + medium.name() + "` expands freely, which is computed for plates between two "
                            + "faces, not for whole spheres; leave `expansion: free` out");
        }
        Swelling swelling = new Swelling(medium, own, frontFace, backFace);
        double radius = 0.5 * medium.diameter();
        for (int k = 0; k <= ANGLES; k++) {
            double r = k == ANGLES ? 0 : radius;
            double angle = 2 * Math.PI * k / ANGLES;
            if (Double.isNaN(swelling.mean(r * Math.cos(angle), r * Math.sin(angle)))) {
                return Optional.of(String.format(
                        Locale.ROOT,
                        "medium `%s` expands freely, and its temperature is not known all over its diameter of %.6g mm: "
                                + "not at (%.6g, %.6g) mm from the axis of its front face; give `beyond: hold`, or the "
                                + "diameter that the temperatures cover",
                        medium.name(),
                        1e3 * medium.diameter(),
                        1e3 * r * Math.cos(angle),
                        1e3 * r * Math.sin(angle)));
            }
        }
        return Optional.empty();
    }
}
