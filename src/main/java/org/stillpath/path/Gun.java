package org.stillpath.path;

import java.util.ArrayList;
import java.util.EnumMap;
import java.util.List;
import java.util.Map;
import org.stillpath.geometry.Vector;
import org.stillpath.ray.Columns;
import org.stillpath.ray.Ending;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.ray.Train;

/** Shoots rays from a start past a target, and keeps count. Mutable, one a search. */
final class Gun {
    /** Most passages of one ray past the target that are looked at. */
    static final int PASSAGES = 6;

    private final Train train;
    private final Vector from;
    private final Vector to;
    private final Columns columns;
    private final Tracer scout;
    private final Map<Status, Integer> ended = new EnumMap<>(Status.class);
    private int shots;
    private long evaluations;

    Gun(Train train, Vector from, Vector to, Columns columns) {
        this.train = train;
        this.from = from;
        this.to = to;
        this.columns = columns;
        this.scout = tracer(PASSAGES, 1e-9, false, columns);
    }

    private Tracer tracer(int passage, double accuracy, boolean trail, Columns how) {
        return new Tracer(
                train,
                new Ending.Nearest(to, passage),
                new Tracer.Settings(accuracy, true, trail, how, PathSearch.REACH));
    }

    /** The passages of the ray in a direction, none where it ends before the first. */
    List<Passage> shoot(Vector direction, double tolerance) {
        shots++;
        Tracer.Passing ray = scout.passages(RayStart.of(from, direction), tolerance);
        evaluations += ray.end().evaluations();
        if (ray.passages().isEmpty()) {
            ended.merge(ray.end().status(), 1, Integer::sum);
        }
        List<Passage> list = new ArrayList<>(ray.passages().size());
        for (Traced t : ray.passages()) {
            list.add(Passage.of(direction, list.size() + 1, t, to, columns));
        }
        return list;
    }

    /** The ray in a direction to one passage, with the estimates of its errors. */
    Traced trace(Vector direction, int passage, double accuracy, boolean trail, Columns how) {
        shots++;
        Traced t = tracer(passage, accuracy, trail, how).trace(RayStart.of(from, direction));
        evaluations += t.evaluations();
        return t;
    }

    /** Number of rays traced. */
    int shots() {
        return shots;
    }

    /** Number of points at which fields were sampled. */
    long evaluations() {
        return evaluations;
    }

    /** How many rays ended before they passed the target, by the way they did. */
    Map<Status, Integer> ended() {
        return Map.copyOf(ended);
    }
}
