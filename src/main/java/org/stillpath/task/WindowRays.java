package org.stillpath.task;

import java.util.List;
import java.util.stream.IntStream;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;

/**
 * Many rays through one train, on all cores. Each is computed by itself, so that the digits do not depend on how many cores
 * there are.
 *
 * <p>Up to {@value #JUDGED} rays are computed as {@link Tracer#trace} does it, twice each. Of more, that many are, spread
 * evenly over the list; the others once, at a tolerance that is loose at first. The judged ones are computed that way too,
 * and how far they then are from what they were is what all are trusted to, three times over; if that is more than the
 * asked accuracy, the others are computed again, at the tolerance of the second of two runs. That costs half and less of
 * two runs a ray, and the error estimate still comes from the computation.
 *
 * @param rays in the order given
 * @param errors the largest of each sort
 * @param accurate whether they are within the asked accuracy
 */
record WindowRays(List<Traced> rays, Traced.Errors errors, boolean accurate) {
    private static final int JUDGED = 200;
    private static final double LOOSE = 100;
    private static final double LOOSEST = 1e-6;
    private static final double TIGHT = 0.01;
    private static final double SAFETY = 3;

    WindowRays {
        rays = List.copyOf(rays);
    }

    /**
     * Traces rays.
     *
     * @param tracer with the asked accuracy
     * @param starts where they start
     * @param accuracy the asked accuracy
     */
    static WindowRays of(Tracer tracer, List<RayStart> starts, double accuracy) {
        int every = Math.max(1, starts.size() / JUDGED);
        int[] judged =
                IntStream.range(0, starts.size()).filter(i -> i % every == 0).toArray();
        List<Traced> sure = IntStream.range(0, judged.length)
                .parallel()
                .mapToObj(i -> tracer.trace(starts.get(judged[i])))
                .toList();
        Traced.Errors own = largest(sure);
        boolean accurate = sure.stream().allMatch(Traced::accurate);
        if (every == 1) {
            return new WindowRays(sure, own, accurate);
        }
        double loose = Math.max(TIGHT * accuracy, Math.min(LOOSE * accuracy, LOOSEST));
        Traced.Errors departure = departure(tracer, starts, judged, sure, loose);
        double length = sure.stream().mapToDouble(Traced::length).min().orElse(0);
        boolean enough = departure.opticalLength() <= accuracy * length
                && departure.position() <= accuracy * length
                && departure.direction() <= accuracy;
        double tolerance = enough ? loose : TIGHT * accuracy;
        List<Traced> rays = IntStream.range(0, starts.size())
                .parallel()
                .mapToObj(i -> i % every == 0 ? sure.get(i / every) : tracer.glance(starts.get(i), tolerance))
                .toList();
        return new WindowRays(rays, enough ? larger(own, departure) : own, accurate);
    }

    /** How far rays that are computed once are from what they were; without bound where one ends otherwise. */
    private static Traced.Errors departure(
            Tracer tracer, List<RayStart> starts, int[] judged, List<Traced> sure, double tolerance) {
        List<Traced.Errors> list = IntStream.range(0, judged.length)
                .parallel()
                .mapToObj(i -> {
                    Traced a = sure.get(i);
                    Traced b = tracer.glance(starts.get(judged[i]), tolerance);
                    if (a.status() != b.status()) {
                        double all = Double.POSITIVE_INFINITY;
                        return new Traced.Errors(all, all, all, all, 0);
                    }
                    return new Traced.Errors(
                            SAFETY * a.position().minus(b.position()).norm(),
                            SAFETY * a.direction().minus(b.direction()).norm(),
                            SAFETY * Math.abs(a.opticalLength() - b.opticalLength()),
                            SAFETY * Math.abs(a.length() - b.length()),
                            0);
                })
                .toList();
        return list.stream().reduce(new Traced.Errors(0, 0, 0, 0, 0), WindowRays::larger);
    }

    private static Traced.Errors largest(List<Traced> rays) {
        return rays.stream()
                .filter(t -> t.status() == Status.ARRIVED)
                .map(Traced::errors)
                .reduce(new Traced.Errors(0, 0, 0, 0, 0), WindowRays::larger);
    }

    private static Traced.Errors larger(Traced.Errors a, Traced.Errors b) {
        return new Traced.Errors(
                Math.max(a.position(), b.position()),
                Math.max(a.direction(), b.direction()),
                Math.max(a.opticalLength(), b.opticalLength()),
                Math.max(a.length(), b.length()),
                Math.max(a.drift(), b.drift()));
    }
}
