package org.stillpath.task;

/**
 * The Gaussian constants of a train in one meridian, from its ray-transfer matrix between the planes of the first and the last
 * vertex (column (height, index × slope)): power Φ = −C, focal points and principal planes as in Welford, <i>Aberrations of
 * Optical Systems</i>, chapter 3, and Hecht, <i>Optics</i>, chapter 6. Distances are counted along the light.
 *
 * @param a element A of [[A, B], [C, D]]; {@code b} (metres), {@code c} (1/m), {@code d} likewise, with A·D − B·C = 1
 * @param before index before the first vertex
 * @param behind index behind the last vertex
 */
record Gaussian(double a, double b, double c, double d, double before, double behind) {
    /** Margin of "at infinity" and "afocal", against the train's scale. */
    static final double MARGIN = 1e-9;

    double power() {
        return -c;
    }

    /** Whether the train has no focus nearer than 1/{@link #MARGIN} of its scale (metres). */
    boolean afocal(double scale) {
        return Math.abs(c) * scale <= MARGIN;
    }

    /** Last vertex to rear focal point, metres. */
    double backFocalDistance() {
        return -behind * a / c;
    }

    /** First vertex to front focal point, metres; negative when before it. */
    double frontFocalDistance() {
        return before * d / c;
    }

    /** First vertex to front principal plane, metres. */
    double frontPrincipalPlane() {
        return before * (d - 1) / c;
    }

    /** Last vertex to rear principal plane, metres. */
    double rearPrincipalPlane() {
        return behind * (1 - a) / c;
    }

    /** Angle behind over angle before, of an afocal train. */
    double angularMagnification() {
        return d * before / behind;
    }

    /** Whether the image of an object at this distance before the first vertex lies at infinity. */
    boolean imagesToInfinity(double distance, double scale) {
        return afocal(scale) ? false : Math.abs(distance + frontFocalDistance()) <= MARGIN * scale;
    }

    /** Last vertex to the image of an object at this distance before the first vertex, metres. */
    double imageDistance(double distance) {
        double s = distance / before;
        return -behind * (a * s + b) / (c * s + d);
    }

    /** Transverse magnification of an object at this distance before the first vertex. */
    double magnification(double distance) {
        return 1 / (c * distance / before + d);
    }

    /** The mean of two meridians, element by element. */
    static Gaussian mean(Gaussian x, Gaussian y) {
        return new Gaussian(
                0.5 * (x.a + y.a), 0.5 * (x.b + y.b), 0.5 * (x.c + y.c), 0.5 * (x.d + y.d), x.before, x.behind);
    }

    /** How far two sets lie apart, element by element, lengths against the scale. */
    double difference(Gaussian o, double scale) {
        return Math.max(
                Math.max(Math.abs(a - o.a), Math.abs(d - o.d)),
                Math.max(Math.abs(b - o.b) / scale, Math.abs(c - o.c) * scale));
    }
}
