package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.geometry.Vector;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Train;
import org.stillpath.wave.Pupil;

/**
 * A collimated beam that meets a window.
 *
 * @param radius half its diameter, at 1/e² of the irradiance for a Gaussian one, metres
 * @param gaussian whether its profile is Gaussian, else uniform
 * @param truncation where a Gaussian beam is cut off, in beam radii
 * @param centreX where its axis meets the plane of the first vertex, metres; likewise {@code centreY}
 * @param incidence angle to z in the yz plane, toward +y, radians
 */
record WindowBeam(
        double radius, boolean gaussian, double truncation, double centreX, double centreY, double incidence) {
    private static final double MARGIN = 0.05;
    private static final int MOST_STEPS_BACK = 40;

    /** Radius of the pupil that is sampled, metres: that of the beam, or where a Gaussian one is cut off. */
    double pupilRadius() {
        return gaussian ? truncation * radius : radius;
    }

    /** The direction of its light. */
    Vector direction() {
        return new Vector(0, Math.sin(incidence), Math.cos(incidence));
    }

    /** The irradiance at a place of the pupil, over that on the axis. */
    double irradiance(double x, double y) {
        return gaussian ? Math.exp(-2 * truncation * truncation * (x * x + y * y)) : 1;
    }

    /** Where the beam's axis meets the plane of the first vertex. */
    Vector centre(Train train) {
        double z = train.elements().get(0).surface().vertex().z();
        return new Vector(centreX, centreY, z);
    }

    /**
     * The rays, from a plane across the beam before the first surface, the beam's axis last.
     *
     * @param train what they meet
     * @param points places in the pupil
     * @param least smallest distance of that plane's middle from the first vertex plane along the beam, metres
     */
    List<RayStart> starts(Train train, List<Pupil.Point> points, double least) {
        double back = Math.max(least, clear(train, points));
        List<RayStart> list = new ArrayList<>(points.size() + 1);
        for (Pupil.Point p : points) {
            list.add(new RayStart(place(train, p.x(), p.y(), back), direction(), true));
        }
        list.add(new RayStart(place(train, 0, 0, back), direction(), true));
        return list;
    }

    private Vector place(Train train, double x, double y, double back) {
        Vector across = new Vector(0, Math.cos(incidence), -Math.sin(incidence));
        return centre(train)
                .plus(pupilRadius() * x, new Vector(1, 0, 0))
                .plus(pupilRadius() * y, across)
                .plus(-back, direction());
    }

    /** How far back the whole pupil lies before the first surface. */
    double clear(Train train, List<Pupil.Point> points) {
        int last = train.elements().size() - 1;
        double length = train.elements()
                .get(last)
                .surface()
                .vertex()
                .minus(train.elements().get(0).surface().vertex())
                .norm();
        double back = 1.1 * pupilRadius() * Math.abs(Math.tan(incidence)) + MARGIN * (pupilRadius() + length);
        double[] f = new double[10];
        for (int i = 0; i < MOST_STEPS_BACK; i++) {
            double from = back;
            boolean before = points.stream().allMatch(p -> {
                Vector q = place(train, p.x(), p.y(), from);
                train.elements().get(0).surface().evaluate(q.x(), q.y(), q.z(), f);
                return f[0] < 0;
            });
            if (before) {
                break;
            }
            back *= 1.5;
        }
        return back;
    }
}
