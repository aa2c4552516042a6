package org.stillpath.wave;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.geometry.GaussPoints;
import org.stillpath.job.Section;
import org.stillpath.job.Value;

/**
 * Sampling of a unit pupil: Gauss points in the square of the radius times equal angles from +x, ring by ring from the
 * inside, so that averages with these weights do not depend on the count once it is enough (Forbes, J. Opt. Soc. Am. A 5
 * (1988) 1943). Polynomials of the pupil's coordinates are averaged exactly up to the degree 4·radial − 2 as long as their
 * angular order stays below the number of angles.
 *
 * @param radial number of rings
 * @param angular number of points a ring
 */
public record Pupil(int radial, int angular) {
    private static final int MOST_RINGS = 200;
    private static final int MOST_ANGLES = 2000;

    /**
     * One point of the pupil.
     *
     * @param x place over the pupil's radius; likewise {@code y}
     * @param weight of an average; all weights add up to 1
     */
    public record Point(double x, double y, double weight) {}

    public Pupil {
        if (radial < 1 || angular < 1) {
            throw new IllegalArgumentException("a pupil needs rings and angles: " + radial + ", " + angular);
        }
    }

    /** Reads {@code {radial: 6, angular: 12}}. */
    public static Pupil read(Value value) {
        Section s = value.section();
        int radial = s.need("radial", "6").count(1, MOST_RINGS);
        int angular = s.need("angular", "12").count(1, MOST_ANGLES);
        s.finish();
        return new Pupil(radial, angular);
    }

    /** The points, ring by ring from the inside. */
    public List<Point> points() {
        GaussPoints gauss = GaussPoints.of(radial);
        List<Point> points = new ArrayList<>(radial * angular);
        for (int i = 0; i < radial; i++) {
            ring(points, Math.sqrt(gauss.at(i)), gauss.weight(i) / angular);
        }
        return points;
    }

    /**
     * The points, then those of the rim, which weigh nothing: averages leave them out, while extremes and edges, which Gauss
     * points do not reach, need them.
     */
    public List<Point> pointsWithRim() {
        List<Point> points = points();
        ring(points, 1, 0);
        return points;
    }

    private void ring(List<Point> points, double radius, double weight) {
        for (int k = 0; k < angular; k++) {
            double angle = 2 * Math.PI * k / angular;
            points.add(new Point(radius * Math.cos(angle), radius * Math.sin(angle), weight));
        }
    }
}
