package org.stillpath.path;

/**
 * The straight line between the two ends of a sight in its vertical plane, over a spherical or a flat earth. All forms are
 * without differences of nearly equal numbers, so that a few metres of height over thousands of kilometres of radius keep
 * their digits.
 *
 * @param radius of the datum, metres; infinite for a flat earth
 * @param fromHeight of the start above the datum, metres
 * @param distance along the datum, metres, positive
 * @param toHeight of the target above the datum, metres
 */
public record Chord(double radius, double fromHeight, double distance, double toHeight) {
    public Chord {
        if (!(radius > 0) || !(distance > 0 && distance < 1.5 * radius)) {
            throw new IllegalArgumentException(
                    "radius must be above 0, distance above 0 and below a quarter of the girth: " + radius + ", "
                            + distance);
        }
        if (!(fromHeight > -radius && toHeight > -radius)) {
            throw new IllegalArgumentException(
                    "heights must lie above the earth's centre: " + fromHeight + ", " + toHeight);
        }
    }

    /** Angle between the two earth radii, rad; 0 over a flat earth. */
    public double angle() {
        return distance / radius;
    }

    /** x of the target in the frame of the sight (x along it, z up, origin on the datum below the start), metres. */
    public double x() {
        return flat() ? distance : (radius + toHeight) * Math.sin(angle());
    }

    /** z of the target in that frame, metres. */
    public double z() {
        if (flat()) {
            return toHeight;
        }
        double s = Math.sin(0.5 * angle());
        return toHeight * Math.cos(angle()) - 2 * radius * s * s;
    }

    /** Length, metres. */
    public double length() {
        return Math.hypot(x(), z() - fromHeight);
    }

    /** Elevation at the start above its horizontal, rad. */
    public double elevation() {
        return Math.atan2(z() - fromHeight, x());
    }

    /** Elevation of the line drawn on to the target, above the target's horizontal, rad. */
    public double arrivalElevation() {
        return elevation() + angle();
    }

    /**
     * Where a straight line launched a little off this one meets the target's vertical, above the target, metres.
     *
     * @param off launch elevation less {@link #elevation()}, rad
     */
    public double displacement(double off) {
        double at = arrivalElevation();
        double base =
                flat() ? distance / Math.cos(elevation()) : (radius + fromHeight) * Math.sin(angle()) / Math.cos(at);
        return base * Math.sin(off) / Math.cos(at + off);
    }

    /** d(height at the target's vertical)/d(launch elevation) of straight lines, at this one, m/rad. */
    public double slope() {
        double c = Math.cos(arrivalElevation());
        double base = flat() ? distance : (radius + fromHeight) * Math.sin(angle());
        return base / (c * c);
    }

    private boolean flat() {
        return Double.isInfinite(radius);
    }
}
