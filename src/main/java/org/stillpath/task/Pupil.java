package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import org.hipparchus.analysis.integration.gauss.GaussIntegrator;
import org.hipparchus.analysis.integration.gauss.GaussIntegratorFactory;
import org.stillpath.job.Section;
import org.stillpath.job.Value;

/**
 * Sampling of a unit pupil: Gauss points in the square of the radius times equal angles from +x, ring by ring from the
 * inside, so that averages with these weights do not depend on the count once it is enough (Forbes, J. Opt. Soc. Am. A 5
 * (1988) 1943).
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
    static Pupil read(Value value) {
        Section s = value.section();
        int radial = s.need("radial", "6").count(1, MOST_RINGS);
        int angular = s.need("angular", "12").count(1, MOST_ANGLES);
        s.finish();
        return new Pupil(radial, angular);
    }

    /** The points, ring by ring from the inside. */
    public List<Point> points() {
        GaussIntegrator gauss = new GaussIntegratorFactory().legendre(radial, 0, 1);
        List<Point> points = new ArrayList<>(radial * angular);
        for (int i = 0; i < radial; i++) {
            double r = Math.sqrt(gauss.getPoint(i));
            for (int k = 0; k < angular; k++) {
                double angle = 2 * Math.PI * k / angular;
                points.add(new Point(r * Math.cos(angle), r * Math.sin(angle), gauss.getWeight(i) / angular));
            }
        }
        return points;
    }
}
