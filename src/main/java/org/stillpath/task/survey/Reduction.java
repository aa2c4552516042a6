package org.stillpath.task.survey;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.Optional;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.medium.IndexField;
import org.stillpath.path.Chord;
import org.stillpath.path.Sighting;
import org.stillpath.path.Sightings;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;

/**
 * Reduces what was observed along the ray through the air of a job: the point that a zenith angle and a distance lead to, the
 * corrections of a distance, reciprocal heights.
 *
 * <p>The ray of the observed zenith angle is followed until what the instrument measured is used up: the chord, or for a
 * distance meter the path of its signal, ∫ n_g ds with the group index at its carrier. Chosen against applying corrections in
 * turn, which need a k first. Costs three to five rays.
 */
public final class Reduction {
    private static final int ROUNDS = 12;
    private static final double[] NODE = {-Math.sqrt(0.6), 0, Math.sqrt(0.6)};
    private static final double[] WEIGHT = {5 / 18.0, 8 / 18.0, 5 / 18.0};

    private final Sightings sightings;
    private final double radius;
    private final double eye;

    /**
     * Reductions of observations from one eye.
     *
     * @param sightings through the air; for a distance meter, at its carrier
     * @param radius of the datum, metres; infinite for a flat earth
     * @param eye height of the instrument above the datum, metres
     */
    public Reduction(Sightings sightings, double radius, double eye) {
        this.sightings = sightings;
        this.radius = radius;
        this.eye = eye;
    }

    /**
     * A point found through the air.
     *
     * @param distance along the datum, metres
     * @param height above the datum, metres
     * @param chord from the eye, metres
     * @param length of the ray, metres
     * @param arrival elevation of the ray there, rad
     * @param error estimated, of its place, metres
     */
    public record Found(double distance, double height, double chord, double length, double arrival, double error) {}

    /** The point at which the ray of a zenith angle has a chord of the given length, metres; empty where it does not get there. */
    public Optional<Found> byChord(double zenith, double slope) {
        double e = 0.5 * Math.PI - zenith;
        double length = slope;
        for (int i = 0; i < ROUNDS; i++) {
            Sightings.Reached r = sightings.after(eye, e, length);
            if (r.status() != Status.ARRIVED) {
                return Optional.empty();
            }
            if (!(r.distance() > 0)) {
                return Optional.empty();
            }
            Chord chord = new Chord(radius, eye, r.distance(), r.height());
            double step = slope - chord.length();
            if (Math.abs(step) <= 1e-15 * slope + 1e-13 || i == ROUNDS - 1) {
                return Optional.of(new Found(
                        r.distance(),
                        r.height(),
                        chord.length(),
                        length,
                        r.arrival(),
                        r.heightError() + Math.abs(step)));
            }
            length += step;
        }
        return Optional.empty();
    }

    /**
     * The point at which the signal of a distance meter has used up its path.
     *
     * @param zenith zenith angle of the ray, rad
     * @param path ∫ n_g ds of the measurement, metres
     * @param phase the air's field at the carrier
     * @param group the field of the group index there
     */
    public Optional<Found> bySignal(double zenith, double path, IndexField phase, IndexField group) {
        double e = 0.5 * Math.PI - zenith;
        double length = path / (1 + refractivity(group, 0, eye));
        for (int i = 0; i < ROUNDS; i++) {
            Traced t = sightings.along(eye, e, length);
            if (t.status() != Status.ARRIVED) {
                return Optional.empty();
            }
            double[] place = sightings.place(t);
            if (!(place[0] > 0)) {
                return Optional.empty();
            }
            double n = 1 + refractivity(group, t.position().x(), t.position().z());
            double step = (path - signal(t, phase, group)) / n;
            if (Math.abs(step) <= 1e-15 * path + 1e-13 || i == ROUNDS - 1) {
                Chord chord = new Chord(radius, eye, place[0], place[1]);
                return Optional.of(new Found(
                        place[0],
                        place[1],
                        chord.length(),
                        length,
                        sightings.elevationAt(t),
                        t.errors().position() + Math.abs(step)));
            }
            length += step;
        }
        return Optional.empty();
    }

    /**
     * ∫ n_g ds along a ray, metres: the ray's own optical length, and ∫ (n_g − n) ds by Gauss' rule between the places passed.
     * The difference of the indices is some 1e-5 and changes over kilometres, so that the places need not be exact.
     */
    public static double signal(Traced ray, IndexField phase, IndexField group) {
        double[] t = ray.trail();
        int parts = t.length / 3 - 1;
        double sum = 0;
        double drawn = 0;
        for (int i = 0; i < parts; i++) {
            double dx = t[3 * i + 3] - t[3 * i];
            double dz = t[3 * i + 5] - t[3 * i + 2];
            double ds = Math.hypot(dx, dz);
            drawn += ds;
            for (int k = 0; k < 3; k++) {
                double u = 0.5 * (1 + NODE[k]);
                double x = t[3 * i] + u * dx;
                double z = t[3 * i + 2] + u * dz;
                sum += WEIGHT[k] * ds * (refractivity(group, x, z) - refractivity(phase, x, z));
            }
        }
        return ray.opticalLength() + (drawn > 0 ? sum * ray.length() / drawn : 0);
    }

    /** Refractivity of a field in the plane of the sight. */
    public static double refractivity(IndexField field, double x, double z) {
        Samples s = new Samples(1);
        field.sample(new double[] {x}, new double[] {0}, new double[] {z}, 1, Order.VALUE, s);
        return s.value[0] / (1 + Math.sqrt(1 + s.value[0]));
    }

    /**
     * What became of a measured distance on the way to the straight line.
     *
     * @param raw as measured for the reference refractivity, metres
     * @param reference that refractivity
     * @param ends mean group refractivity of the two ends
     * @param found the point that the signal leads to
     * @param k coefficient of refraction of the ray, for the formulas
     */
    public List<Reduced> distance(double raw, double reference, double ends, Found found, double k) {
        double first = Classical.firstVelocity(raw, reference, ends);
        double corrected = raw + first;
        List<Reduced> list = new ArrayList<>();
        list.add(new Reduced(
                "distance-correction-first",
                first,
                1e-15 * raw,
                first,
                "m",
                "first velocity: d'(N_REF - N_L)/(1 + N_L), N_L the mean of both ends (Rueger 1996)"));
        list.add(new Reduced(
                "distance-correction-second",
                found.length() - corrected,
                found.error(),
                Classical.secondVelocity(corrected, k, radius),
                "m",
                "second velocity: -(k - k^2) d^3/(12 R^2) (Rueger 1996)"));
        list.add(new Reduced(
                "arc-to-chord",
                found.chord() - found.length(),
                2e-16 * found.length(),
                Classical.arcToChord(corrected, k, radius),
                "m",
                "arc to chord: -k^2 d^3/(24 R^2) (Rueger 1996)"));
        list.add(new Reduced(
                "slope-distance",
                found.chord(),
                found.error(),
                corrected + Classical.secondVelocity(corrected, k, radius) + Classical.arcToChord(corrected, k, radius),
                "m",
                "the measured distance with the three corrections"));
        return list;
    }

    /**
     * Heights from zenith angles observed at both ends at the same time.
     *
     * @param distance along the datum, metres
     * @param fore zenith angle at the eye, rad
     * @param back zenith angle at the target, rad
     * @param to about the target's height, metres: that from one end will do
     * @param mark height of the eye's mark, metres
     * @param target height of the sighted point above its mark, metres
     */
    public List<Reduced> reciprocal(double distance, double fore, double back, double to, double mark, double target) {
        double angle = distance / radius;
        // the profile gives how the refraction differs between the ends, the observation its sum
        Optional<Sighting> ray = sightings.find(eye, distance, to).images().stream()
                .min(Comparator.comparingDouble(s -> Math.abs(s.launch() - (0.5 * Math.PI - fore))));
        double uneven = 0;
        double error = 1e-12;
        if (ray.isPresent()) {
            Chord chord = new Chord(radius, eye, distance, to);
            double atFrom = ray.get().launch() - chord.elevation();
            double atTo = chord.arrivalElevation() - ray.get().arrival();
            uneven = atFrom - atTo;
            error = ray.get().errors().launch() + ray.get().errors().arrival();
        }
        double elevation = 0.5 * (back - fore) - 0.5 * angle - 0.5 * uneven;
        double height = eye + rise(elevation, distance);
        double mean = 0.5 * (eye + height);
        List<Reduced> list = new ArrayList<>();
        list.add(new Reduced(
                "reciprocal-height-difference",
                height - target - mark,
                error * distance,
                Classical.reciprocalHeightDifference(distance, fore, back, mean, radius) + (eye - mark) - target,
                "m",
                "D tan((z2 - z1)/2)(1 + Hm/R), for equal refraction at both ends"));
        if (!Double.isInfinite(radius)) {
            double k = Classical.reciprocalCoefficient(distance, fore, back, radius);
            list.add(new Reduced(
                    "reciprocal-coefficient", k, 4e-16 * radius / distance, k, "1", "1 - (z1 + z2 - pi) R/D"));
        }
        return list;
    }

    /** How much higher than the eye a straight line meets the earth radius at a distance. */
    private double rise(double elevation, double distance) {
        if (Double.isInfinite(radius)) {
            return distance * Math.tan(elevation);
        }
        double angle = distance / radius;
        return (radius + eye)
                * 2
                * Math.sin(elevation + 0.5 * angle)
                * Math.sin(0.5 * angle)
                / Math.cos(elevation + angle);
    }
}
