package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.ray.Action;
import org.stillpath.ray.Element;
import org.stillpath.ray.Ending;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.ray.Train;

/**
 * Rays from a point of the object through given places of the pupil: places at the first vertex' plane, or where the train has
 * a stop, places in the stop, for which a ray is aimed.
 *
 * <p>Aiming traces real rays to the stop and corrects their start by the same linear map each time (a chord method), which
 * takes three to six short traces a ray; interpolating between aimed rays would be cheaper and leaves places that are not
 * those asked for. Apertures before the stop do not hinder the aiming; whether light passes them is for the trace to say.
 */
final class PupilRays {
    private static final int ROUNDS = 40;
    /** Miss at the stop that is good enough, over the pupil's radius. */
    private static final double MISS = 1e-11;

    private final FieldPoint field;
    private final double radius;
    private final double first;
    private final double back;
    private final Optional<Aim> aim;

    /** What aiming needs. */
    private record Aim(Tracer front, Surface stop, double[] centre, double[] inverse) {}

    /**
     * @param train the train
     * @param stop index of the stop's element; −1 where there is none
     * @param radius of the pupil, metres
     * @param accuracy of the traces to the stop
     */
    PupilRays(Train train, int stop, FieldPoint field, double radius, double accuracy) {
        this.field = field;
        this.radius = radius;
        this.first = train.elements().get(0).surface().vertex().z();
        // a beam starts before the first surface, whose rim may stand before its vertex
        this.back = 2 * radius;
        this.aim = stop < 0 ? Optional.empty() : aim(train, stop, accuracy);
    }

    /** Index of a train's stop: its only surface that is one; −1 where there is none. */
    static int stopOf(Train train) {
        for (int i = 0; i < train.elements().size(); i++) {
            if (train.elements().get(i).action() instanceof Action.Stop) {
                return i;
            }
        }
        return -1;
    }

    /** The train with one of its apertures open. */
    static Train opened(Train train, int element) {
        List<Element> elements = new ArrayList<>(train.elements());
        Element e = elements.get(element);
        elements.set(element, new Element(e.surface().withAperture(Double.POSITIVE_INFINITY), e.action(), e.into()));
        return new Train(train.from(), elements);
    }

    /**
     * The ray through a place of the pupil; empty where none reaches it.
     *
     * @param x over the pupil's radius; likewise {@code y}
     */
    Optional<RayStart> start(double x, double y) {
        if (aim.isEmpty()) {
            return Optional.of(toward(x * radius, y * radius));
        }
        Aim a = aim.get();
        double[] m = a.inverse();
        double u = a.centre()[0] + m[0] * x * radius + m[1] * y * radius;
        double v = a.centre()[1] + m[2] * x * radius + m[3] * y * radius;
        return aimed(a.front(), a.stop(), m, x * radius, y * radius, new double[] {u, v})
                .map(p -> toward(p[0], p[1]));
    }

    /** The ray from the object through a place of the first vertex' plane. */
    private RayStart toward(double u, double v) {
        Vector to = new Vector(u, v, first);
        if (field.atInfinity()) {
            Vector d = field.direction();
            Vector corner = new Vector(0, 0, first).plus(-back, d);
            return new RayStart(to.plus(-to.minus(corner).dot(d), d), d, true);
        }
        Vector from = new Vector(field.x(), field.y(), first - field.distance());
        return RayStart.of(from, to.minus(from));
    }

    private Optional<Aim> aim(Train train, int stop, double accuracy) {
        Train front = new Train(train.from(), train.elements().subList(0, stop + 1));
        for (int i = 0; i <= stop; i++) {
            front = opened(front, i);
        }
        Tracer tracer = new Tracer(front, new Ending.AtLastSurface(), new Tracer.Settings(accuracy, false, false));
        Surface surface = train.elements().get(stop).surface();
        double step = 1e-3 * radius;
        Optional<double[]> o = met(tracer, surface, 0, 0);
        Optional<double[]> a = met(tracer, surface, step, 0);
        Optional<double[]> b = met(tracer, surface, 0, step);
        if (o.isEmpty() || a.isEmpty() || b.isEmpty()) {
            return Optional.empty();
        }
        double xx = (a.get()[0] - o.get()[0]) / step;
        double yx = (a.get()[1] - o.get()[1]) / step;
        double xy = (b.get()[0] - o.get()[0]) / step;
        double yy = (b.get()[1] - o.get()[1]) / step;
        double det = xx * yy - xy * yx;
        double[] inverse = {yy / det, -xy / det, -yx / det, xx / det};
        return aimed(tracer, surface, inverse, 0, 0, new double[2])
                .map(centre -> new Aim(tracer, surface, centre, inverse));
    }

    /** Where on the first vertex' plane a ray must go to meet the stop at a place; empty where the search does not end. */
    private Optional<double[]> aimed(
            Tracer tracer, Surface stop, double[] inverse, double x, double y, double[] start) {
        double[] p = start.clone();
        double last = Double.POSITIVE_INFINITY;
        for (int i = 0; i < ROUNDS; i++) {
            Optional<double[]> met = met(tracer, stop, p[0], p[1]);
            if (met.isEmpty()) {
                return Optional.empty();
            }
            double ex = x - met.get()[0];
            double ey = y - met.get()[1];
            double miss = Math.hypot(ex, ey);
            if (miss <= MISS * radius || (miss <= 1e3 * MISS * radius && miss >= last)) {
                return Optional.of(p);
            }
            last = miss;
            p[0] += inverse[0] * ex + inverse[1] * ey;
            p[1] += inverse[2] * ex + inverse[3] * ey;
        }
        return Optional.empty();
    }

    /** Place in the stop's own frame that a ray through a place of the first vertex' plane meets. */
    private Optional<double[]> met(Tracer tracer, Surface stop, double u, double v) {
        Traced t = tracer.glance(toward(u, v), 1e-12);
        if (t.status() != Status.ARRIVED) {
            return Optional.empty();
        }
        Vector p = stop.frame().fromJob(t.position());
        return Optional.of(new double[] {p.x(), p.y()});
    }
}
