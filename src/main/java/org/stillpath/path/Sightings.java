package org.stillpath.path;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.Comparator;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.TreeSet;
import java.util.concurrent.ConcurrentHashMap;
import org.stillpath.formula.Coordinate;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.EarthChart;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.OverGround;
import org.stillpath.ray.Columns;
import org.stillpath.ray.Ending;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.State;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.ray.Train;

/**
 * Sights through air over an earth: all images of a target, the lowest height that is seen where it stands, the horizon, a
 * level sight, and a star's refraction.
 *
 * <p>The images are the zeros of the height at which a ray meets the target's earth radius, less the target's, over the launch
 * elevation ({@link FanSearch}). The first fan is even neither in angle nor in height: its rays turn at heights spread over the
 * air that the sight can reach, and crowd beside those elevations at which a ray only just passes or is only just kept by a
 * layer, since there the height jumps. It is bounded by the chord and the most that the sampled air can bend a ray.
 *
 * <p>Chosen against an engine of its own in height and angle: the general one keeps twelve digits here, since heights over the
 * earth are taken without cancellation, and it needs no second proof. Costs forty to two hundred shots a sight, some 0.01 ms
 * each in smooth air. Immutable.
 */
public final class Sightings {
    /** Rays are followed this far below the ground in the search, metres, so that a target on the ground is met. */
    private static final double SUNK = 1e-4;
    /** Clearance below 0 that still counts as touching, metres. */
    private static final double TOUCH = 1e-6;

    private static final double MOST_BEND = 1;
    /** Part of the distance that the air above both ends is looked at. */
    private static final double UP = 0.02;

    /** Least height that a table covers, metres. */
    private static final double STEP = 128;

    /** Steps in which the least height of a table comes over ground that is not level, metres. */
    private static final double STEEP = 16;

    /** Horizons that are kept. */
    private static final int MOST_HORIZONS = 10_000;

    private static final int POLISHES = 12;
    /** Step of the launch elevation, as a part of it, below which it is settled. */
    private static final double SETTLED = 1e-9;
    /** How many times as large a step may be for the next to be settled by Newton's method. */
    private static final double NEARLY = 1e3;

    private static final Vector PLANE = new Vector(0, -1, 0);
    /** Of the slope of a straight line: below it the target is on a caustic. */
    private static final double CAUSTIC = 1e-6;

    private final IndexField field;
    private final EarthChart chart;
    private final double accuracy;
    private final Train train;
    private final double[] knots;
    /** The tables of the search, by the heights that they cover; made when first asked for. */
    private final Map<Range, Optional<LayerTable>> tables = new ConcurrentHashMap<>();

    /** Horizons by the height of the eye: a batch looks from the same few heights, and each costs rays to the ground. */
    private final Map<Double, Optional<Horizon>> horizons = new ConcurrentHashMap<>();

    private Sightings(IndexField field, EarthChart chart, double accuracy) {
        this.field = field;
        this.chart = chart;
        this.accuracy = accuracy;
        this.train = Train.through(new OverGround(field, chart, SUNK));
        this.knots = HeightProfile.knots(field);
    }

    /**
     * Sights through a field.
     *
     * @param field in the frame of a sight: the origin on the datum below the eye, x along the sight, z up there
     * @param chart the earth and its ground in that frame
     * @param accuracy of launch elevations in rad, of heights against the distance, of optical lengths against themselves
     */
    public static Sightings through(IndexField field, EarthChart chart, double accuracy) {
        return new Sightings(field, chart, accuracy);
    }

    /**
     * What was found of a target.
     *
     * @param images from the highest apparent one down
     * @param transfer launch elevation (rad, ascending), height at the target's distance (metres) and d height/d elevation
     *     (m/rad) of the rays that got there
     * @param blocked launch elevations (rad, ascending) of the rays that did not
     * @param seen heights at the target's distance that some ray reaches: intervals from below up, the last one open above
     * @param limb the lowest of them and how it is bounded
     * @param ducts layers that can keep rays
     * @param lowest launch elevation searched, rad
     * @param highest launch elevation searched, rad
     * @param shots number of rays shot
     * @param note why the eye itself sees nothing; empty where it does
     */
    public record Outcome(
            List<Sighting> images,
            double[][] transfer,
            double[] blocked,
            double[][] seen,
            Optional<Limb> limb,
            List<Duct> ducts,
            double lowest,
            double highest,
            int shots,
            String note) {
        public Outcome {
            images = List.copyOf(images);
            transfer = Arrays.stream(transfer).map(double[]::clone).toArray(double[][]::new);
            blocked = blocked.clone();
            seen = Arrays.stream(seen).map(double[]::clone).toArray(double[][]::new);
            ducts = List.copyOf(ducts);
        }

        /** A copy. */
        @Override
        public double[][] transfer() {
            return Arrays.stream(transfer).map(double[]::clone).toArray(double[][]::new);
        }

        /** A copy. */
        @Override
        public double[] blocked() {
            return blocked.clone();
        }

        /** A copy. */
        @Override
        public double[][] seen() {
            return Arrays.stream(seen).map(double[]::clone).toArray(double[][]::new);
        }
    }

    /**
     * The lowest height that is seen at the target's distance.
     *
     * @param height above the datum, metres
     * @param error estimated, metres
     * @param elevation launch elevation with which it is seen, rad
     * @param bound what bounds it
     * @param contact where the ray touches the ground, metres along the datum; NaN where it does not
     * @param contactError estimated, metres
     */
    public record Limb(
            double height, double error, double elevation, Bound bound, double contact, double contactError) {}

    /** What bounds the heights that are seen. */
    public enum Bound {
        /** Nothing: the ground at the target's distance is seen. */
        NONE,
        /** Rays that touch the ground on the way. */
        GROUND,
        /** The air itself: the rays' heights have a least value, the vanishing line of a mirage. */
        AIR
    }

    /**
     * A layer in which a level ray bends more than the earth curves.
     *
     * @param low its lower edge, metres
     * @param high its upper edge, metres; infinite where it goes on past the heights that the search looks at
     * @param kept rays that leave the eye within this elevation cannot pass its upper edge, rad; NaN where the eye's rays can
     */
    public record Duct(double low, double high, double kept) {}

    /**
     * The apparent horizon.
     *
     * @param dip of the lowest ray that clears the ground, rad, positive downward
     * @param dipError estimated, rad
     * @param distance along the datum to its contact, metres; NaN where it never touches
     * @param distanceError estimated, metres
     */
    public record Horizon(double dip, double dipError, double distance, double distanceError) {}

    /**
     * Where a ray of a given launch meets an earth radius.
     *
     * @param status how it ended; the other values are only sound where it arrived
     * @param height above the datum, metres
     * @param heightError estimated, metres
     * @param arrival elevation there, rad
     * @param opticalLength metres
     * @param length metres
     * @param distance along the datum at which it ended, metres
     * @param note why it ended early; empty where it arrived
     */
    public record Reached(
            Status status,
            double height,
            double heightError,
            double arrival,
            double opticalLength,
            double length,
            double distance,
            String note) {}

    /** One shot of the search. */
    private record Sample(double angle, double height, double slope, Status status) {
        boolean arrived() {
            return status == Status.ARRIVED;
        }
    }

    /**
     * The table of the air from one height to another; empty where the air depends on more. Its range comes in steps that depend
     * on the heights alone, so that a sight's last digits do not depend on the sights before it.
     */
    private Optional<LayerTable> table(double low, double high) {
        if (!field.ofHeightAlone() || field.uniform()) {
            return Optional.empty();
        }
        double step = chart.ground().isLevel() ? 1 : STEEP;
        double from = step * Math.floor((low - 1) / step);
        double until = from + STEP * Math.scalb(1.0, Math.max(0, Math.getExponent((high - from) / STEP) + 1));
        return tables.computeIfAbsent(
                new Range(from, until), r -> LayerTable.of(field, chart.radius(), knots, r.low, r.high));
    }

    private record Range(double low, double high) {}

    /** Finds the images of a target and what else is seen where it stands. */
    public Outcome find(double from, double distance, double to) {
        return find(from, distance, to, horizon(from));
    }

    /**
     * The same where the horizon of the eye is known: its ray bounds what is seen behind it.
     *
     * @param horizon from {@link #horizon}
     */
    public Outcome find(double from, double distance, double to, Optional<Horizon> horizon) {
        return new Search(new Chord(chart.radius(), from, distance, to), horizon).run();
    }

    /**
     * Where the ray of a launch elevation meets the earth radius at a distance.
     *
     * @param from height of the eye, metres
     * @param elevation of the launch, rad
     * @param distance along the datum, metres
     */
    public Reached reach(double from, double elevation, double distance) {
        return reached(
                tracer(new Ending.AtVertical(chart, distance), false, false).trace(start(from, elevation)));
    }

    /** Where the ray of a launch elevation is after a length, metres. */
    public Reached after(double from, double elevation, double length) {
        return reached(tracer(new Ending.AtLength(length), false, false).trace(start(from, elevation)));
    }

    /**
     * The ray of a launch elevation to where its medium ends, or the ground, or a length: for stars.
     *
     * @return the ray as it ended
     */
    public Traced away(double from, double elevation, double length) {
        return tracer(new Ending.AtLength(length), false, false).trace(start(from, elevation));
    }

    /** The coefficient of refraction −(r/n) dn/dh of the air at a place; NaN where it is undefined. */
    public double coefficient(double distance, double height) {
        HeightProfile air = new HeightProfile(field, chart.radius(), distance);
        return -(chart.radius() + height) * air.gradient(height) / (1 + air.refractivity(height));
    }

    /** The ray of a launch elevation over a length, metres, with the places that it passes. */
    public Traced along(double from, double elevation, double length) {
        Tracer.Settings settings = new Tracer.Settings(accuracy, false, true);
        return new Tracer(train, new Ending.AtLength(length), settings).trace(start(from, elevation));
    }

    /** Distance along the datum and height at which a ray ended, metres. */
    public double[] place(Traced t) {
        return place(t.state());
    }

    /** Elevation of a ray at its end above the horizontal there, rad. */
    public double elevationAt(Traced t) {
        return elevation(t.state());
    }

    private Reached reached(Traced t) {
        double[] y = t.state();
        double[] place = place(y);
        return new Reached(
                t.status(),
                place[1],
                t.errors().position(),
                elevation(y),
                t.opticalLength(),
                t.length(),
                place[0],
                t.note());
    }

    private Tracer tracer(Ending ending, boolean columns, boolean trail) {
        Columns how = Columns.RAY.in(PLANE);
        Tracer.Settings settings =
                new Tracer.Settings(accuracy, columns, trail, trail ? how.withConjugates() : how, 20);
        return new Tracer(train, ending, settings);
    }

    private static RayStart start(double from, double elevation) {
        return RayStart.of(new Vector(0, 0, from), new Vector(Math.cos(elevation), 0, Math.sin(elevation)));
    }

    /** Distance along the datum and height of a state. */
    private double[] place(double[] y) {
        return new double[] {coordinate(Coordinate.DISTANCE, y), coordinate(Coordinate.HEIGHT, y)};
    }

    private double coordinate(Coordinate c, double[] y) {
        Samples s = new Samples(1);
        chart.sample(c, new double[] {y[0]}, new double[] {y[1]}, new double[] {y[2]}, 1, Order.VALUE, s);
        return s.value[0];
    }

    /** Sine and cosine of the angle between the earth radii of the eye and of a state. */
    private double[] turn(double[] y) {
        if (Double.isInfinite(chart.radius())) {
            return new double[] {0, 1};
        }
        double up = chart.radius() + y[2];
        double r = Math.hypot(y[0], up);
        return new double[] {y[0] / r, up / r};
    }

    /** Elevation of a ray above the horizontal of its place. */
    private double elevation(double[] y) {
        double[] t = turn(y);
        return Math.atan2(y[3] * t[0] + y[5] * t[1], y[3] * t[1] - y[5] * t[0]);
    }

    /** d(height)/d(launch elevation) and d(arrival elevation)/d(launch elevation) on an earth radius. */
    private double[] slopes(Traced ray) {
        double[] y = ray.state();
        double[] first = ray.start();
        double[] f = ray.force();
        double[] t = turn(y);
        double n1 = Math.sqrt(first[3] * first[3] + first[4] * first[4] + first[5] * first[5]);
        int at = State.COLUMNS + (State.columns(y) - 2) * State.COLUMN;
        double forward = y[3] * t[1] - y[5] * t[0];
        double upward = y[3] * t[0] + y[5] * t[1];
        double ahead = y[at] * t[1] - y[at + 2] * t[0];
        double above = y[at] * t[0] + y[at + 2] * t[1];
        double dt = -ahead / forward;
        double slope = n1 * (above + upward * dt);
        double dpx = y[at + 3] + f[0] * dt;
        double dpz = y[at + 5] + f[2] * dt;
        double pp = forward * forward + upward * upward;
        double bend = n1 * (-y[5] * dpx + y[3] * dpz) / pp;
        return new double[] {slope, bend};
    }

    /**
     * The horizon of an eye: the lowest ray that clears the ground.
     *
     * @param from height of the eye, metres
     * @return empty where every ray clears the ground, or none is known to
     */
    public Optional<Horizon> horizon(double from) {
        Optional<Horizon> known = horizons.get(from);
        if (known == null) {
            known = chart.ground().isLevel() && field.ofHeightAlone() ? levelHorizon(from) : horizonByTracing(from);
            if (horizons.size() < MOST_HORIZONS) {
                horizons.put(from, known);
            }
        }
        return known;
    }

    private Optional<Horizon> levelHorizon(double from) {
        double ground = chart.ground().height(0);
        if (from <= ground) {
            return Optional.empty();
        }
        HeightProfile air = new HeightProfile(field, chart.radius(), 0);
        Lowest low = lowestLift(air, from, ground);
        if (!(low.lift < -1e-15)) {
            return Optional.empty();
        }
        double dip = air.turning(from, low.height);
        if (low.height > ground) {
            return Optional.of(new Horizon(dip, 1e-12, Double.NaN, Double.NaN));
        }
        Optional<Tangent> t = tangent(from, -dip, 1e-9, 0.1);
        // the ray only tells where it touches, and how far it is from Bouguer's closed form
        return t.map(g -> new Horizon(
                dip,
                g.error + 0.1 * Math.abs(dip + g.elevation),
                g.contact,
                g.contactError + 2 * Math.abs(dip + g.elevation) * g.spread));
    }

    private record Lowest(double height, double lift) {}

    /** Where n·r is least between the ground and the eye. */
    private static Lowest lowestLift(HeightProfile air, double from, double ground) {
        Lowest best = new Lowest(from, 0);
        double span = from - ground;
        double[] heights = new double[42];
        for (int i = 0; i <= 39; i++) {
            heights[i] = ground + span * Math.pow(10, -5.0 * i / 39);
        }
        heights[40] = ground;
        heights[41] = from;
        double[] nu = new double[42];
        air.refractivityAndSteepness(heights, nu, new double[42]);
        for (int i = 0; i <= 40; i++) {
            double h = heights[i];
            double l = air.lift(h, nu[i], from, nu[41]);
            if (l < best.lift) {
                best = new Lowest(h, l);
            }
        }
        if (best.height > ground && best.height < from) {
            double low = ground + (best.height - ground) * 0.7;
            double high = Math.min(from, ground + (best.height - ground) * 1.4);
            for (int i = 0; i < 60; i++) {
                double middle = 0.5 * (low + high);
                if (air.rise(middle) > 0) {
                    high = middle;
                } else {
                    low = middle;
                }
            }
            double l = air.lift(high, from);
            best = l < best.lift ? new Lowest(high, l) : best;
        }
        return best;
    }

    private Optional<Horizon> horizonByTracing(double from) {
        double ground = chart.ground().height(0);
        if (from <= ground) {
            return Optional.empty();
        }
        double far = far(from - ground);
        Tracer look = tracer(new Ending.AtVertical(chart, far), true, false);
        double low = -0.3;
        double high = 0.3;
        if (look.glance(start(from, high), 1e-7).status() == Status.GROUNDED
                || look.glance(start(from, low), 1e-7).status() != Status.GROUNDED) {
            return Optional.empty();
        }
        for (int i = 0; i < 45; i++) {
            double middle = 0.5 * (low + high);
            if (look.glance(start(from, middle), 1e-9).status() == Status.GROUNDED) {
                low = middle;
            } else {
                high = middle;
            }
        }
        return tangent(from, high, 1e-2, 0.01)
                .filter(t -> t.contact < far * (1 - 1e-9))
                .map(t -> new Horizon(-t.elevation, t.error, t.contact, t.contactError));
    }

    /** How far a horizon is looked for, metres. */
    private double far(double above) {
        OptionalDouble end = chart.ground().end();
        double limit = Double.isInfinite(chart.radius())
                ? 1000 * Math.max(above, 1)
                : Math.min(0.5 * chart.radius(), 4 * Math.sqrt(2 * above * chart.radius()) + 1e3);
        return end.isPresent() ? Math.min(limit, Math.max(1, end.getAsDouble())) : limit;
    }

    /**
     * A ray that touches the ground.
     *
     * @param spread d(contact)/d(elevation), m/rad, about
     */
    private record Tangent(double elevation, double error, double contact, double contactError, double spread) {}

    /**
     * The ray that touches the ground near a launch elevation: Newton's method on its least clearance.
     *
     * @param within how far from the guess it may lie, rad
     * @param share of the asked accuracy that the rays themselves may use
     */
    private Optional<Tangent> tangent(double from, double guess, double within, double share) {
        double above = Math.max(from - chart.ground().height(0), 0.1);
        double scale = Double.isInfinite(chart.radius())
                ? above / Math.max(Math.abs(guess), 1e-4)
                : Math.sqrt(2 * above * chart.radius());
        Tracer down = tracer(new Ending.AtLowest(chart, scale), true, false);
        double tight = Math.max(1e-15, share * accuracy);
        double e = guess;
        double before = Double.NaN;
        double step = Double.NaN;
        for (int i = 0; i < POLISHES; i++) {
            Traced t = down.glance(start(from, e), tight);
            if (t.status() != Status.ARRIVED) {
                if (i > 6 || Math.abs(e - guess) > within) {
                    return Optional.empty();
                }
                e += Math.max(1e-9 * Math.abs(e), 1e-12) * Math.pow(30, i);
                continue;
            }
            double[] y = t.state();
            double[] c = clearance(y, t);
            step = (1e-10 - c[0]) / c[1];
            // what the ray's own error leaves of the clearance is no reason for another one
            double noise = scale * tight / Math.abs(c[1]);
            if (Math.abs(step) <= Math.max(1e-16 + 1e-13 * Math.abs(e), Math.max(0.01 * accuracy * Math.abs(e), noise))
                    || Math.abs(step) >= 0.5 * Math.abs(before)) {
                double error = 2e-16 + Math.abs(step) + (2e-10 + scale * accuracy * 0.1) / Math.abs(c[1]);
                double bend = Math.abs(c[2]);
                e += Math.abs(step) < 1e-9 ? step : 0;
                return Math.abs(e - guess) > within
                        ? Optional.empty()
                        : Optional.of(new Tangent(e, error, place(y)[0], (0.1 * accuracy + error) / bend, 1 / bend));
            }
            before = step;
            e += step;
        }
        return Optional.empty();
    }

    /** Clearance, its derivative over the launch elevation along the earth's normal, and its second derivative along the ray. */
    private double[] clearance(double[] y, Traced t) {
        Samples s = new Samples(1);
        chart.sample(
                Coordinate.CLEARANCE,
                new double[] {y[0]},
                new double[] {y[1]},
                new double[] {y[2]},
                1,
                Order.HESSIAN,
                s);
        double slope = 0;
        if (State.columns(y) > 0) {
            double[] first = t.start();
            double n1 = Math.sqrt(first[3] * first[3] + first[4] * first[4] + first[5] * first[5]);
            int at = State.COLUMNS + (State.columns(y) - 2) * State.COLUMN;
            slope = n1 * (s.gx[0] * y[at] + s.gy[0] * y[at + 1] + s.gz[0] * y[at + 2]);
        }
        double pp = y[3] * y[3] + y[4] * y[4] + y[5] * y[5];
        double[] f = t.force();
        double along = y[3] * f[0] + y[4] * f[1] + y[5] * f[2];
        double bend = (s.hxx[0] * y[3] * y[3] + 2 * s.hxz[0] * y[3] * y[5] + s.hzz[0] * y[5] * y[5]) / pp
                + (s.gx[0] * (f[0] - along * y[3] / pp) + s.gz[0] * (f[2] - along * y[5] / pp)) / pp;
        double first = (s.gx[0] * y[3] + s.gy[0] * y[4] + s.gz[0] * y[5]) / Math.sqrt(pp);
        return new double[] {s.value[0], slope, bend, first};
    }

    /** One search for one target. */
    private final class Search {
        private final Chord chord;
        private final Optional<Horizon> horizon;
        private final Tracer quick;
        private final List<Sample> samples = new ArrayList<>();
        private final List<Duct> ducts = new ArrayList<>();
        private final Optional<LayerShot> layered;
        private int shots;
        private String note = "";

        Search(Chord chord, Optional<Horizon> horizon) {
            this.chord = chord;
            this.horizon = horizon;
            double top = Math.max(chord.fromHeight(), chord.toHeight()) + 2 * UP * chord.distance();
            double bottom = Math.min(lowestGround(chord.distance()), Math.min(chord.fromHeight(), chord.toHeight()));
            this.layered = table(bottom - SUNK, top)
                    .filter(t -> t.low() <= chord.fromHeight() && t.high() >= chord.fromHeight())
                    .map(t -> new LayerShot(t, chart.ground(), SUNK, chord.distance()));
            this.quick = tracer(new Ending.AtVertical(chart, chord.distance()), true, false);
        }

        Outcome run() {
            double[] angles = fan();
            FanSearch.Outcome found = FanSearch.run(this::shot, angles, chord.distance(), accuracy);
            List<Sighting> images = new ArrayList<>();
            for (FanSearch.Root root : found.roots()) {
                Optional<Sighting> image = polish(root);
                if (image.isEmpty() && layered.isPresent()) {
                    again(root.angle()).stream().filter(s -> isNew(images, s)).forEach(images::add);
                }
                image.filter(s -> isNew(images, s)).ifPresent(images::add);
            }
            if (layered.isPresent()) {
                for (double[] rush : rushes(found)) {
                    again(rush).stream().filter(s -> isNew(images, s)).forEach(images::add);
                }
            }
            samples.sort(Comparator.comparingDouble(Sample::angle));
            images.sort(Comparator.comparingDouble(Sighting::launch).reversed());
            List<double[]> transfer = new ArrayList<>();
            for (Sample s : samples) {
                if (s.arrived()) {
                    transfer.add(new double[] {s.angle, s.height, s.slope});
                }
            }
            return new Outcome(
                    images,
                    transfer.toArray(double[][]::new),
                    samples.stream()
                            .filter(s -> !s.arrived())
                            .mapToDouble(Sample::angle)
                            .toArray(),
                    seen(),
                    limb(),
                    ducts,
                    angles[0],
                    angles[angles.length - 1],
                    shots,
                    transfer.isEmpty() ? note : "");
        }

        /**
         * Pairs of elevations between which the height passes the target's and no image was found: a jump, or a rush so steep that
         * the table's roundings hide it.
         */
        private List<double[]> rushes(FanSearch.Outcome found) {
            List<double[]> list = new ArrayList<>();
            List<FanSearch.Shot> shot = found.samples();
            for (int i = 1; i < shot.size(); i++) {
                FanSearch.Shot a = shot.get(i - 1);
                FanSearch.Shot b = shot.get(i);
                if (a.miss()[0] * b.miss()[0] < 0) {
                    boolean known = found.roots().stream()
                            .anyMatch(r -> r.angle() >= a.angle() - 1e-15 && r.angle() <= b.angle() + 1e-15);
                    boolean near = !list.isEmpty() && a.angle() - list.get(list.size() - 1)[1] < 1e-10;
                    if (!known && !near) {
                        list.add(new double[] {a.angle(), b.angle()});
                    }
                }
            }
            return list;
        }

        /**
         * Searches with the air itself about elevations that the table gives: where the height depends so steeply on the elevation
         * that the table's roundings move the root.
         */
        private List<Sighting> again(double... about) {
            TreeSet<Double> angles = new TreeSet<>();
            for (double e : about) {
                for (int i = 8; i <= 30; i++) {
                    double off = Math.max(Math.abs(e), 1e-6) * Math.pow(10, -0.5 * i);
                    angles.add(e - off);
                    angles.add(e + off);
                }
                angles.add(e);
            }
            FanSearch.Outcome found = FanSearch.run(
                    this::traced,
                    angles.stream().mapToDouble(Double::doubleValue).toArray(),
                    chord.distance(),
                    accuracy);
            List<Sighting> images = new ArrayList<>();
            for (FanSearch.Root r : found.roots()) {
                polish(r).ifPresent(images::add);
            }
            return images;
        }

        private FanSearch.Shot shot(double angle, double tolerance) {
            if (layered.isEmpty() || Math.abs(angle) > 1) {
                return traced(angle, tolerance);
            }
            shots++;
            LayerShot ray = layered.get();
            Status status = ray.to(chord.fromHeight(), angle, tolerance);
            if (status != Status.ARRIVED) {
                samples.add(new Sample(angle, Double.NaN, Double.NaN, status));
                note = status == Status.GROUNDED ? "the ray meets the ground" : "the ray leaves the air that is known";
                return new FanSearch.Shot(angle, new double[] {Double.NaN}, new double[] {Double.NaN});
            }
            samples.add(new Sample(angle, ray.height(), ray.slope(), status));
            return new FanSearch.Shot(
                    angle, new double[] {ray.height() - chord.toHeight()}, new double[] {ray.slope()});
        }

        private FanSearch.Shot traced(double angle, double tolerance) {
            shots++;
            Traced t = quick.glance(start(chord.fromHeight(), angle), tolerance);
            if (t.status() != Status.ARRIVED) {
                samples.add(new Sample(angle, Double.NaN, Double.NaN, t.status()));
                note = t.note();
                return new FanSearch.Shot(angle, new double[] {Double.NaN}, new double[] {Double.NaN});
            }
            double height = place(t.state())[1];
            double slope = slopes(t)[0];
            samples.add(new Sample(angle, height, slope, Status.ARRIVED));
            return new FanSearch.Shot(angle, new double[] {height - chord.toHeight()}, new double[] {slope});
        }

        private boolean isNew(List<Sighting> images, Sighting s) {
            return images.stream()
                    .noneMatch(o -> Math.abs(o.launch() - s.launch())
                            <= 1e-13
                                    + Math.min(
                                            1e-9,
                                            o.errors().launch() + s.errors().launch()));
        }

        /** Launch elevations of the first fan, ascending. */
        private double[] fan() {
            double h1 = chord.fromHeight();
            double h2 = chord.toHeight();
            double distance = chord.distance();
            double c0 = chord.elevation();
            boolean layered = field.ofHeightAlone();
            double ground = lowestGround(distance);
            double top = Math.max(h1, h2) + UP * distance;
            double bottom = Math.min(ground, Math.min(h1, h2));
            TreeSet<Double> angles = new TreeSet<>();
            double most = 0;
            double mostUp = 0;
            double usual = 0;
            int places = layered ? 1 : 5;
            List<double[]> turns = new ArrayList<>();
            for (int p = 0; p < places; p++) {
                double x = distance * p / Math.max(1, places - 1);
                HeightProfile air = new HeightProfile(field, chart.radius(), x);
                double foot = layered ? bottom : Math.min(h1, chart.ground().height(x));
                double[] heights = heights(foot, h1, h2, top);
                double[] lifts = new double[heights.length];
                double[] nu = new double[heights.length];
                double[] steepness = new double[heights.length];
                air.refractivityAndSteepness(heights, nu, steepness);
                double nu1 = air.refractivity(h1);
                for (int i = 0; i < heights.length; i++) {
                    double g = steepness[i];
                    if (Double.isNaN(g)) {
                        lifts[i] = Double.NaN;
                        continue;
                    }
                    most = Math.max(most, g);
                    if (heights[i] >= h1) {
                        mostUp = Math.max(mostUp, g);
                    }
                    lifts[i] = air.lift(heights[i], nu[i], h1, nu1);
                }
                for (double h : new double[] {h1, 0.5 * (h1 + h2)}) {
                    // over rising ground the eye's height may lie under it farther on, where there is no air
                    double g = air.steepness(h);
                    usual = g > usual ? g : usual;
                }
                turns.addAll(turning(air, heights, lifts, h1, p == 0));
            }
            double bend = Math.min(MOST_BEND, 1.05 * distance * most + 1e-9);
            double bendUp = Math.min(bend, 1.05 * distance * mostUp + 1e-9);
            double some = Math.min(bend, 0.5 * distance * usual + 1e-9);
            double low = c0 - bend;
            double high = c0 + bend;
            double highestTurn = Double.NEGATIVE_INFINITY;
            double lowestTurn = Double.POSITIVE_INFINITY;
            boolean above = turns.stream().anyMatch(t -> t[2] > 0);
            boolean below = turns.stream().anyMatch(t -> t[2] < 0);
            for (double[] t : turns) {
                // a ray that turns on one side comes to the other only where it turns back
                boolean back = t[2] > 0 ? below : above;
                for (double e : back ? new double[] {t[0], -t[0]} : new double[] {t[2] * t[0]}) {
                    for (double offset : t[1] > 0 ? BESIDE : ALONE) {
                        double angle = e * (1 + offset);
                        if (angle >= low && angle <= high) {
                            angles.add(angle);
                        }
                    }
                }
                highestTurn = Math.max(highestTurn, back || t[2] > 0 ? t[0] : 0);
                lowestTurn = Math.min(lowestTurn, back || t[2] < 0 ? -t[0] : 0);
            }
            double upper = Math.max(c0 + bendUp, Math.min(high, highestTurn * 1.01 + 1e-9));
            // where even that meets the ground, up to a ray that does not
            double hidden = upper;
            for (int k = 0; k < 14 && !arrives(upper); k++) {
                upper = c0 + Math.max(some, 1e-5) * Math.pow(3, k);
            }
            for (int k = 1; k < 8 && upper > hidden; k++) {
                angles.add(hidden + (upper - hidden) * k / 8);
            }
            double foot = chart.ground().height(distance);
            double toGround = foot < h2 || foot < h1
                    ? new Chord(chart.radius(), h1, distance, Math.min(foot, h2)).elevation()
                    : c0;
            double lower = Math.min(toGround, c0) - 2 * some - 1e-6;
            if (lowestTurn < lower && lowestTurn * 1.01 >= low) {
                lower = lowestTurn * 1.01;
            }
            // down to a ray that meets the ground, so that the lowest height seen is known
            double clear = lower;
            for (int k = 0; k < 14 && lower > -1 && arrives(lower); k++) {
                lower -= Math.max(some, 1e-5) * Math.pow(3, k);
            }
            for (int k = 1; k < 8 && lower < clear; k++) {
                angles.add(clear + (lower - clear) * k / 8);
            }
            for (double k : new double[] {-2, -1, -0.5, -0.2, 0, 0.2, 0.5, 1, 2}) {
                angles.add(c0 + k * some);
            }
            if (!layered || !chart.ground().isLevel()) {
                double wide = Math.min(bend, 8 * some + 0.5 * Math.abs(c0) + 2e-3);
                for (int i = -20; i <= 20; i++) {
                    angles.add(c0 + wide * i / 20);
                }
            }
            if (low <= 0 && high >= 0) {
                angles.add(0.0);
            }
            angles.add(upper);
            angles.add(lower);
            double from = lower;
            double until = Math.max(upper, c0 + some);
            return thinned(angles.stream().filter(a -> a >= from && a <= until).toList(), turns);
        }

        private boolean arrives(double angle) {
            return !Double.isNaN(shot(angle, 1e-7).miss()[0]);
        }

        private double lowestGround(double distance) {
            double lowest = Math.min(chart.ground().height(0), chart.ground().height(distance));
            for (double k : chart.ground().knots().orElse(new double[0])) {
                if (k > 0 && k < distance) {
                    lowest = Math.min(lowest, chart.ground().height(k));
                }
            }
            return lowest;
        }

        /** Heights that are looked at, ascending: crowded at the ground and about the eye. */
        private double[] heights(double bottom, double h1, double h2, double top) {
            TreeSet<Double> list = new TreeSet<>();
            list.add(h1);
            list.add(h2);
            for (int i = 0; i <= 24; i++) {
                list.add(bottom + (top - bottom) * Math.pow(10, -5 + 5.0 * i / 24));
            }
            for (int i = 1; i <= 16; i++) {
                list.add(h1 + (top - h1) * i * i / 256.0);
                list.add(h1 - (h1 - bottom) * i * i / 256.0);
            }
            if (knots.length < 200) {
                for (double k : knots) {
                    list.add(k);
                    list.add(k + 1e-6 * (1 + Math.abs(k)));
                    list.add(k - 1e-6 * (1 + Math.abs(k)));
                }
            }
            return list.stream()
                    .filter(h -> h >= bottom && h <= top)
                    .mapToDouble(Double::doubleValue)
                    .toArray();
        }

        /**
         * Elevations at the eye of rays that turn at the heights; beside each whether n·r has its least value there, so that the
         * ray is only just kept, and whether it turns above or below the eye.
         */
        private List<double[]> turning(HeightProfile air, double[] heights, double[] lifts, double h1, boolean tell) {
            List<double[]> list = new ArrayList<>();
            int eye = Arrays.binarySearch(heights, h1);
            for (int way : new int[] {-1, 1}) {
                double least = 0;
                for (int i = eye + way; i >= 0 && i < heights.length; i += way) {
                    double l = lifts[i];
                    if (!(l < least)) {
                        continue;
                    }
                    least = l;
                    boolean inside = i + way >= 0 && i + way < heights.length;
                    if (inside && lifts[i + way] > l) {
                        double edge = edge(air, heights[i - way], heights[i + way], way);
                        double e = air.turning(h1, edge);
                        if (!Double.isNaN(e)) {
                            list.add(new double[] {e, 1, way});
                            continue;
                        }
                    }
                    list.add(new double[] {air.turning(h1, heights[i]), 0, way});
                }
            }
            if (tell) {
                name(air, heights, h1);
            }
            return list;
        }

        /** Where n·r is least between two heights, going up (way 1) or down. */
        private double edge(HeightProfile air, double before, double after, int way) {
            double a = before;
            double b = after;
            for (int i = 0; i < 60; i++) {
                double middle = 0.5 * (a + b);
                if (way * air.rise(middle) < 0) {
                    a = middle;
                } else {
                    b = middle;
                }
            }
            return 0.5 * (a + b);
        }

        /** Notes the layers that bend level rays more than the earth curves. */
        private void name(HeightProfile air, double[] heights, double h1) {
            if (Double.isInfinite(chart.radius())) {
                return;
            }
            double low = Double.NaN;
            for (int i = 0; i < heights.length; i++) {
                boolean more = air.rise(heights[i]) < 0;
                if (more && Double.isNaN(low)) {
                    low = i == 0 ? heights[0] : edge(air, heights[i], heights[i - 1], -1);
                } else if (!more && !Double.isNaN(low)) {
                    double high = edge(air, heights[i - 1], heights[i], 1);
                    double e = high > h1 ? air.turning(h1, high) : Double.NaN;
                    ducts.add(new Duct(low, high, e));
                    low = Double.NaN;
                }
            }
            if (!Double.isNaN(low)) {
                ducts.add(new Duct(low, Double.POSITIVE_INFINITY, Double.NaN));
            }
        }

        /** Drops elevations that lie closer than the fan needs, but not those beside an edge. */
        private double[] thinned(List<Double> angles, List<double[]> turns) {
            double range = angles.get(angles.size() - 1) - angles.get(0);
            double widest = turns.stream().mapToDouble(t -> t[0]).max().orElse(range);
            double near = Math.min(range / 60, widest / 40);
            List<Double> kept = new ArrayList<>();
            for (int i = 0; i < angles.size(); i++) {
                double a = angles.get(i);
                boolean edge = turns.stream().anyMatch(t -> t[1] > 0 && Math.abs(Math.abs(a) / t[0] - 1) < 0.02);
                boolean last = i == 0 || i == angles.size() - 1;
                if (last || edge || a - kept.get(kept.size() - 1) >= near) {
                    kept.add(a);
                }
            }
            return kept.stream().mapToDouble(Double::doubleValue).distinct().toArray();
        }

        /** Brings a root to the asked accuracy; empty where it was none, or meets the ground. */
        private Optional<Sighting> polish(FanSearch.Root root) {
            double e = root.angle();
            double tolerance = Math.max(1e-15, 0.1 * accuracy);
            double slope = Double.NaN;
            double last = Double.POSITIVE_INFINITY;
            Tracer full = tracer(new Ending.AtVertical(chart, chord.distance()), true, true);
            Optional<Traced> confirmed = Optional.empty();
            for (int i = 0; i < POLISHES && !root.touching(); i++) {
                Traced t = quick.glance(start(chord.fromHeight(), e), tolerance);
                shots++;
                if (t.status() != Status.ARRIVED) {
                    return Optional.empty();
                }
                double miss = place(t.state())[1] - chord.toHeight();
                slope = slopes(t)[0];
                double step = -miss / slope;
                e += step;
                double settled = SETTLED * Math.max(Math.abs(e), 1e-6);
                if (Math.abs(step) <= settled || Math.abs(miss) > 2 * last) {
                    break;
                }
                if (Math.abs(step) <= NEARLY * settled) {
                    // the next step is this one squared: the last ray itself may show that it is settled
                    Traced t2 = full.trace(start(chord.fromHeight(), e));
                    shots += 2;
                    boolean met = t2.status() == Status.ARRIVED
                            && Math.abs((place(t2.state())[1] - chord.toHeight()) / slopes(t2)[0]) <= settled;
                    if (met) {
                        confirmed = Optional.of(t2);
                        break;
                    }
                }
                last = Math.abs(miss);
            }
            shots += confirmed.isPresent() ? 0 : 2;
            double launch = e;
            Traced t = confirmed.orElseGet(() -> full.trace(start(chord.fromHeight(), launch)));
            if (t.status() != Status.ARRIVED) {
                return Optional.empty();
            }
            double miss = place(t.state())[1] - chord.toHeight();
            double[] slopes = slopes(t);
            double fine = Math.abs(slopes[0]) * Math.abs(e) * 1e-15;
            double allowed =
                    Math.max(10 * accuracy * chord.distance(), 20 * t.errors().position()) + fine;
            if (root.touching()) {
                allowed = Math.max(allowed, Math.sqrt(accuracy) * chord.distance());
            }
            if (!(Math.abs(miss) <= allowed)) {
                return Optional.empty();
            }
            return sighting(t, e, miss, slopes, slope);
        }

        private Optional<Sighting> sighting(Traced t, double angle, double miss, double[] slopes, double before) {
            boolean caustic = Math.abs(slopes[0]) < CAUSTIC * chord.slope();
            // what is left of the miss is taken off along the Jacobi field
            double de = caustic ? 0 : -miss / slopes[0];
            double launch = angle + de;
            double[] y = t.state();
            double arrival = elevation(y) + slopes[1] * de;
            double n = t.index();
            double excessLength = t.length() - chord.length();
            double left = caustic ? miss : 0;
            double optical = t.opticalLength() - n * Math.sin(elevation(y)) * (caustic ? 0 : miss);
            double excess = y[State.EXCESS] + excessLength - n * Math.sin(elevation(y)) * (caustic ? 0 : miss);
            double[] points = points(t);
            double[] lowest = lowest(t, angle, points);
            double place = t.errors().position();
            if (lowest[0] < -(TOUCH + 3 * place)) {
                return Optional.empty();
            }
            double second = second(launch, arrival, points);
            double height = height(place, second);
            double launchError = 4e-16 + (caustic ? Math.sqrt(height / chord.slope()) : height / Math.abs(slopes[0]));
            double rounding = 4e-16 * chord.distance();
            Sighting.Errors errors = new Sighting.Errors(
                    launchError,
                    t.errors().direction() + Math.abs(slopes[1]) * launchError,
                    t.errors().opticalLength() + n * Math.abs(Math.sin(arrival)) * Math.abs(left) + rounding,
                    t.errors().length() + Math.abs(Math.sin(arrival)) * (Math.abs(miss) + height) + rounding,
                    lowest[2],
                    lowest[3],
                    Double.isNaN(before) ? 1e-6 : 6 * Math.abs(before / slopes[0] - 1) + 1e-13);
            return Optional.of(new Sighting(
                    launch,
                    arrival,
                    optical,
                    excess,
                    t.length(),
                    lowest[0],
                    lowest[1],
                    slopes[0],
                    t.conjugates().length,
                    caustic,
                    Math.abs(left),
                    points,
                    second,
                    errors));
        }

        /**
         * The error of the height at the target: the ray's own estimate, which is cautious, or ten times what two methods that
         * share nothing differ by, and the rounding of a height over such a distance, where that is less; both together where
         * the methods differ by more than the estimate.
         */
        private double height(double place, double second) {
            double apart = Math.abs(second);
            if (Double.isNaN(second)) {
                return place;
            }
            return apart > place ? place + apart : Math.min(place, 10 * apart + 1e-15 * chord.distance());
        }

        /** The ray's height at the target less Bouguer's for the same launch; NaN where there is none. */
        private double second(double launch, double arrival, double[] points) {
            Optional<Bouguer> bouguer = Bouguer.of(field, chart.radius());
            if (bouguer.isEmpty() || field.uniform()) {
                return Double.NaN;
            }
            List<Double> turns = new ArrayList<>();
            int n = points.length / 2;
            // a turn so near to an end that the noted places step over it shows in the signs of the elevations
            double way = Math.signum(launch);
            for (int i = 1; i < n; i++) {
                double climbed = points[2 * i + 1] - points[2 * i - 1];
                // two places noted at one seam differ by rounding
                boolean still = Math.abs(climbed) <= 1e-12 * (1 + Math.abs(points[2 * i + 1]));
                double rise = still ? 0 : Math.signum(climbed);
                if (rise != 0 && way != 0 && rise != way) {
                    turns.add(points[2 * i - 1]);
                }
                way = rise != 0 ? rise : way;
            }
            if (way * arrival < 0) {
                turns.add(points[2 * n - 1]);
            }
            return bouguer.get()
                    .follow(
                            chord.fromHeight(),
                            launch,
                            turns.stream().mapToDouble(Double::doubleValue).toArray(),
                            chord.toHeight())
                    .map(p -> {
                        double up = Double.isInfinite(chart.radius()) ? 1 : 1 + chord.toHeight() / chart.radius();
                        return Math.tan(arrival) * up * (p.distance() - chord.distance());
                    })
                    .filter(Double::isFinite)
                    .orElse(Double.NaN);
        }

        /** The places passed, with the very end as the last: the interpolant may place a point beside it, or beyond. */
        private double[] trail(Traced ray) {
            double[] all = ray.trail();
            double[] y = ray.state();
            double near = y[0] - 1e-6 * chord.distance();
            int n = all.length / 3;
            while (n > 1 && all[3 * n - 3] >= near) {
                n--;
            }
            double[] out = Arrays.copyOf(all, 3 * n + 3);
            System.arraycopy(y, 0, out, 3 * n, 3);
            return out;
        }

        /** Distance along the datum and height of the places passed, in pairs. */
        private double[] points(Traced ray) {
            double[] trail = trail(ray);
            int n = trail.length / 3;
            double[] x = new double[n];
            double[] y = new double[n];
            double[] z = new double[n];
            for (int i = 0; i < n; i++) {
                x[i] = trail[3 * i];
                y[i] = trail[3 * i + 1];
                z[i] = trail[3 * i + 2];
            }
            Samples d = new Samples(n);
            Samples h = new Samples(n);
            chart.sample(Coordinate.DISTANCE, x, y, z, n, Order.VALUE, d);
            chart.sample(Coordinate.HEIGHT, x, y, z, n, Order.VALUE, h);
            double[] out = new double[2 * n];
            for (int i = 0; i < n; i++) {
                out[2 * i] = d.value[i];
                out[2 * i + 1] = h.value[i];
            }
            return out;
        }

        /** Least clearance of a ray, where along the datum, and the errors of both. */
        private double[] lowest(Traced ray, double angle, double[] points) {
            int n = points.length / 2;
            double[] c = new double[n];
            int least = 0;
            for (int i = 0; i < n; i++) {
                c[i] = points[2 * i + 1] - chart.ground().height(points[2 * i]);
                least = c[i] < c[least] ? i : least;
            }
            double place = ray.errors().position();
            if (least == 0 || least == n - 1) {
                return new double[] {c[least], points[2 * least], place, 0};
            }
            double[] trail = trail(ray);
            double s = 0;
            double[] lengths = new double[n];
            for (int i = 1; i < n; i++) {
                double dx = trail[3 * i] - trail[3 * i - 3];
                double dy = trail[3 * i + 1] - trail[3 * i - 2];
                double dz = trail[3 * i + 2] - trail[3 * i - 1];
                s += Math.sqrt(dx * dx + dy * dy + dz * dz);
                lengths[i] = s;
            }
            double at = vertex(lengths, c, least);
            Traced t = tracer(new Ending.AtLength(at), false, false)
                    .glance(start(chord.fromHeight(), angle), Math.max(1e-15, 0.1 * accuracy));
            shots++;
            double[] y = t.state();
            double[] k = clearance(y, t);
            double step = k[2] > 0 ? -k[3] / k[2] : 0;
            double limit = 0.5 * (lengths[least + 1] - lengths[least - 1]);
            step = Math.max(-limit, Math.min(limit, step));
            double low = k[0] + 0.5 * step * k[3];
            double where = place(y)[0] + step;
            double slopeError = ray.errors().direction() + 1e-3 * Math.abs(k[3]);
            return new double[] {
                low, where, place + Math.abs(step * slopeError), k[2] > 0 ? slopeError / k[2] + place : limit
            };
        }

        private static double vertex(double[] x, double[] c, int i) {
            double a = (c[i + 1] - c[i]) / (x[i + 1] - x[i]);
            double b = (c[i] - c[i - 1]) / (x[i] - x[i - 1]);
            double at = 0.5 * (x[i] + x[i - 1]) + (a == b ? 0 : -b / (a - b)) * 0.5 * (x[i + 1] - x[i - 1]);
            return Math.max(x[i - 1], Math.min(x[i + 1], at));
        }

        /** Intervals of height that some ray reaches at the target's distance. */
        private double[][] seen() {
            List<double[]> pieces = new ArrayList<>();
            for (int i = 1; i < samples.size(); i++) {
                Sample a = samples.get(i - 1);
                Sample b = samples.get(i);
                boolean jump = b.angle - a.angle < 1e-12
                        && Math.abs(b.height - a.height)
                                > 1e-3 + 10 * (b.angle - a.angle) * Math.max(Math.abs(a.slope), Math.abs(b.slope));
                if (a.arrived() && b.arrived() && !jump) {
                    pieces.add(new double[] {Math.min(a.height, b.height), Math.max(a.height, b.height)});
                }
            }
            if (!samples.isEmpty()) {
                Sample top = samples.get(samples.size() - 1);
                if (top.arrived() && top.slope > 0) {
                    pieces.add(new double[] {top.height, Double.POSITIVE_INFINITY});
                }
            }
            pieces.sort(Comparator.comparingDouble(p -> p[0]));
            List<double[]> joined = new ArrayList<>();
            for (double[] p : pieces) {
                double[] last = joined.isEmpty() ? p : joined.get(joined.size() - 1);
                if (!joined.isEmpty() && p[0] <= last[1] + 1e-6) {
                    last[1] = Math.max(last[1], p[1]);
                } else {
                    joined.add(p.clone());
                }
            }
            return joined.toArray(double[][]::new);
        }

        /** The lowest height that is seen at the target's distance. */
        private Optional<Limb> limb() {
            double ground = chart.ground().height(chord.distance());
            List<Limb> candidates = new ArrayList<>();
            for (int i = 1; i < samples.size(); i++) {
                Sample a = samples.get(i - 1);
                Sample b = samples.get(i);
                if (a.arrived() != b.arrived()) {
                    Sample in = a.arrived() ? a : b;
                    Sample out = a.arrived() ? b : a;
                    if (out.status == Status.GROUNDED || out.status == Status.OUTSIDE) {
                        candidates.add(edge(in, ground));
                    }
                } else if (a.arrived() && a.slope < 0 && b.slope > 0) {
                    candidates.add(fold(a, b));
                }
            }
            return candidates.stream().min(Comparator.comparingDouble(Limb::height));
        }

        /** The end of the rays that arrive beside those that meet the ground. */
        private Limb edge(Sample in, double ground) {
            double doubt = 1e-7 * chord.distance() + 2 * SUNK;
            if (in.height - ground < doubt) {
                return new Limb(ground, 0, in.angle, Bound.NONE, Double.NaN, Double.NaN);
            }
            Optional<Tangent> found = horizon.filter(h -> Math.abs(h.dip() + in.angle) < 1e-5)
                    .filter(h -> !Double.isNaN(h.distance()))
                    .map(h -> new Tangent(-h.dip(), h.dipError(), h.distance(), h.distanceError(), 0))
                    .or(() -> tangent(chord.fromHeight(), in.angle, 1e-5, 0.01))
                    .filter(t -> t.contact < chord.distance());
            if (found.isEmpty()) {
                return new Limb(in.height, doubt, in.angle, Bound.GROUND, Double.NaN, Double.NaN);
            }
            Tangent t = found.get();
            Traced ray = quick.glance(start(chord.fromHeight(), t.elevation), Math.max(1e-15, 0.1 * accuracy));
            shots += 4;
            if (ray.status() != Status.ARRIVED) {
                return new Limb(in.height, doubt, in.angle, Bound.GROUND, t.contact, t.contactError);
            }
            double slope = Math.abs(slopes(ray)[0]);
            return new Limb(
                    place(ray.state())[1],
                    t.error * slope + accuracy * chord.distance(),
                    t.elevation,
                    Bound.GROUND,
                    t.contact,
                    t.contactError);
        }

        /** The least height of a fold between two rays. */
        private Limb fold(Sample a, Sample b) {
            double low = a.angle;
            double high = b.angle;
            double lowSlope = a.slope;
            double highSlope = b.slope;
            double best = Math.min(a.height, b.height);
            double at = a.height < b.height ? low : high;
            double error = 1e-7 * chord.distance();
            for (int i = 0; i < 40 && high - low > 1e-12; i++) {
                double share = Math.max(0.02, Math.min(0.98, lowSlope / (lowSlope - highSlope)));
                double m = low + share * (high - low);
                Traced t = quick.glance(start(chord.fromHeight(), m), Math.max(1e-13, 0.1 * accuracy));
                shots++;
                if (t.status() != Status.ARRIVED) {
                    break;
                }
                double h = place(t.state())[1];
                double s = slopes(t)[0];
                best = h;
                at = m;
                error = Math.abs(s) * (high - low) + accuracy * chord.distance();
                if (error < 1e-9 + 2 * accuracy * chord.distance()) {
                    break;
                }
                if (s < 0) {
                    low = m;
                    lowSlope = s;
                    highSlope *= 0.5;
                } else {
                    high = m;
                    highSlope = s;
                    lowSlope *= 0.5;
                }
            }
            return new Limb(best, error, at, Bound.AIR, Double.NaN, Double.NaN);
        }
    }

    private static final double[] ALONE = {0};
    private static final double[] BESIDE = {
        0, 1e-2, -1e-2, 1e-3, -1e-3, 1e-4, -1e-4, 1e-5, -1e-5, 1e-6, -1e-6, 1e-7, -1e-7, 1e-8, -1e-8, 1e-9, -1e-9
    };
}
