package org.stillpath.task;

import java.util.Optional;
import org.stillpath.geometry.Vector;
import org.stillpath.ray.Traced;
import org.stillpath.wave.Wavefront;
import org.stillpath.wave.ZernikeFit;

/**
 * A bundle judged on a plane, or where its image is at infinity by its directions.
 *
 * @param focus plane of the least rms spot, z in metres
 * @param spot rms radius on the plane, metres; of an image at infinity in radians
 * @param encircled radius that holds {@link #SHARE} of the light, metres
 * @param wave path differences less the chief ray's, nothing removed; empty where the chief ray does not come through
 * @param flat the same without tilt
 * @param fit Zernike's terms of {@code wave}
 */
record Judged(
        double focus,
        double spot,
        double encircled,
        Optional<Wavefront> wave,
        Optional<Wavefront> flat,
        Optional<ZernikeFit> fit) {
    /** Share of the light whose circle is told. */
    static final double SHARE = 0.8;

    /**
     * On a plane.
     *
     * @param z the plane
     * @param near a plane near the focus
     * @param last the last vertex
     * @param scale of the train, metres
     * @param along 1 where light runs toward +z behind the train, else −1
     */
    static Judged on(Bundle bundle, double z, double near, Vector last, double scale, double along, int terms) {
        double spot = bundle.rms(z);
        Optional<Wavefront> wave = bundle.chief().map(chief -> {
            double s = (z - chief.position().z()) / chief.direction().z();
            Vector centre = chief.position().plus(s, chief.direction());
            double radius = radius(centre.minus(last).norm(), spot, scale);
            return bundle.toSphere(centre, radius, along * (z - last.z()) >= 0, chief);
        });
        return of(bundle.bestPlane(near), spot, bundle.encircled(z, SHARE), wave, terms);
    }

    /** The sphere through the last vertex, unless the image lies so near to it that the sphere is of no use. */
    static double radius(double toVertex, double spot, double scale) {
        return isFar(toVertex, spot, scale) ? toVertex : scale;
    }

    /** Whether an image point is far enough from the last vertex for a sphere through it. */
    static boolean isFar(double toVertex, double spot, double scale) {
        return toVertex >= Math.max(1e-3 * scale, 100 * spot);
    }

    /** By directions. */
    static Judged atInfinity(Bundle bundle, Vector last, int terms) {
        Vector mean = bundle.meanDirection();
        Optional<Wavefront> wave = bundle.chief().map(chief -> bundle.toPlane(last, mean, chief));
        return of(Double.NaN, bundle.spread(), Double.NaN, wave, terms);
    }

    private static Judged of(double focus, double spot, double encircled, Optional<Wavefront> wave, int terms) {
        return new Judged(
                focus, spot, encircled, wave, wave.map(Wavefront::withoutTilt), wave.map(w -> ZernikeFit.of(w, terms)));
    }

    /** Chief ray's place on a plane, metres from the axis along y. */
    static double height(Traced chief, double z) {
        return chief.position().y()
                + (z - chief.position().z())
                        / chief.direction().z()
                        * chief.direction().y();
    }
}
