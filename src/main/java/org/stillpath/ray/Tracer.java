package org.stillpath.ray;

import java.util.ArrayDeque;
import java.util.ArrayList;
import java.util.Deque;
import java.util.HashMap;
import java.util.Iterator;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Objects;
import java.util.function.Consumer;
import java.util.stream.IntStream;
import org.jspecify.annotations.Nullable;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.GroundLevel;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Level;
import org.stillpath.medium.Seam;

/**
 * Traces rays through a train to an ending.
 *
 * <p>Each ray is computed twice where an equation had to be integrated, the second time with a tenth of the tolerance: the
 * second run is the result, and what lies between the two, with the rounding along the way, is its error estimate. That
 * doubles the cost, and buys an estimate that comes from the computation. A ray whose estimate exceeds the asked accuracy is
 * computed again, twice at most, with tolerances a hundred times smaller.
 */
public final class Tracer {
    private static final double EPSILON = 0x1p-53;
    private static final int TIGHTENINGS = 2;
    /** How much smaller the tolerance of the second run is. */
    private static final double TIGHTER = 0.1;
    /** How much shorter the longest steps of the second run are. */
    private static final double STRIDE = 0.85;
    /** The estimate over the difference of two runs: it still holds where the second run is not much better than the first. */
    private static final double SAFETY = 3;
    /** The share of the local errors that is added, since most of them cancel or are overestimates. */
    private static final double LOCAL = 0.3;
    /** Rounding along an integrated path, as a fraction of places and lengths. */
    private static final double INTEGRATED = 16 * EPSILON;

    private static final int PIECES = 1_000_000;
    /** Fewer rays than this are traced one by one: making a field ready for bundles takes about as long. */
    private static final int FEWEST_IN_BUNDLES = 256;
    /** Rays that share batches; fixed, so that results do not depend on the number of threads. */
    private static final int CHUNK = 1024;
    /** Rays held at once where they come and go: work for several cores. */
    private static final int AT_ONCE = 16 * CHUNK;
    /** How far a ray that has passed a point is followed for the next passage, in lengths of the scene. */
    private static final double BACK = 2;

    private final Train train;
    private final Ending ending;
    private final Settings settings;
    private final Propagator.Maker engine;
    private final boolean ownEngine;

    /**
     * What is asked for besides the end of a ray.
     *
     * @param accuracy of positions against the distance from first to last point, of optical lengths against themselves, of
     *     directions in radians
     * @param transfer whether Jacobi columns are carried along
     * @param trail whether the places passed are kept, for drawing
     * @param columns how the columns start
     * @param reach how far a ray is followed at most, in lengths of the scene
     */
    public record Settings(double accuracy, boolean transfer, boolean trail, Columns columns, double reach) {
        private static final double REACH = 100;

        /** Columns on planes of constant z, if any: those of the 4×4 ray-transfer matrix. */
        public Settings(double accuracy, boolean transfer, boolean trail) {
            this(accuracy, transfer, trail, Columns.PLANES, REACH);
        }

        public Settings {
            if (!(accuracy >= 1e-13 && accuracy < 1)) {
                throw new IllegalArgumentException("accuracy must be from 1e-13 to below 1: " + accuracy);
            }
            if (!(reach > 0)) {
                throw new IllegalArgumentException("reach must be positive: " + reach);
            }
        }
    }

    /** A tracer for one train and ending with the production engine. */
    public Tracer(Train train, Ending ending, Settings settings) {
        this(train, ending, settings, NystromPropagator::new, true);
    }

    /** The same with an engine of one's own choice. */
    public Tracer(Train train, Ending ending, Settings settings, Propagator.Maker engine) {
        this(train, ending, settings, engine, false);
    }

    private Tracer(Train train, Ending ending, Settings settings, Propagator.Maker engine, boolean ownEngine) {
        this.ownEngine = ownEngine;
        this.train = train;
        this.ending = ending;
        this.settings = settings;
        this.engine = engine;
        boolean last = ending instanceof Ending.AtLastSurface || ending instanceof Ending.BehindLastSurface;
        if (last && train.elements().isEmpty()) {
            throw new IllegalArgumentException("an ending at the last surface needs a surface");
        }
    }

    /**
     * Traces rays, in the order given. Many of them go in bundles, on all cores; the digits do not depend on how many these are,
     * but may differ in the last from those of {@link #trace(RayStart)}.
     */
    public List<Traced> trace(List<RayStart> starts) {
        if (starts.size() < FEWEST_IN_BUNDLES || !bundled()) {
            return starts.stream().map(this::trace).toList();
        }
        int chunks = (starts.size() + CHUNK - 1) / CHUNK;
        Map<IndexField, IndexField> ready = new HashMap<>();
        ready.put(train.from(), train.from().forBundles());
        train.elements().forEach(e -> ready.computeIfAbsent(e.into(), IndexField::forBundles));
        return IntStream.range(0, chunks)
                .parallel()
                .mapToObj(i -> bundle(starts.subList(i * CHUNK, Math.min(starts.size(), (i + 1) * CHUNK)), ready))
                .flatMap(List::stream)
                .toList();
    }

    /**
     * Traces rays as they come and hands on their ends in the same order, as {@link #trace(List)} does, without ever holding more
     * than some thousands of them.
     */
    public void trace(Iterator<RayStart> starts, Consumer<? super Traced> ends) {
        List<RayStart> some = new ArrayList<>(AT_ONCE);
        while (starts.hasNext()) {
            some.clear();
            while (starts.hasNext() && some.size() < AT_ONCE) {
                some.add(starts.next());
            }
            trace(some).forEach(ends);
        }
    }

    /** Whether rays may go in bundles: places on the way and conjugate points are noted by the ray alone. */
    private boolean bundled() {
        return ownEngine && !settings.trail && !settings.columns.conjugates();
    }

    /** As {@link #trace(RayStart)} for several rays, whose two runs each go in a bundle. */
    private List<Traced> bundle(List<RayStart> starts, Map<IndexField, IndexField> ready) {
        double tolerance = 0.1 * settings.accuracy;
        List<Run> loose = runs(starts, tolerance, 1, ready);
        List<Run> tight = runs(
                IntStream.range(0, starts.size())
                        .filter(i -> loose.get(i).integrated)
                        .mapToObj(starts::get)
                        .toList(),
                TIGHTER * tolerance,
                STRIDE,
                ready);
        List<Traced> ends = new ArrayList<>(starts.size());
        int next = 0;
        for (int i = 0; i < starts.size(); i++) {
            Run first = loose.get(i);
            if (!first.integrated) {
                ends.add(first.traced(first.errors(first), 0));
                continue;
            }
            Run second = tight.get(next++);
            Traced t = second.traced(second.errors(first), first.evaluations + second.evaluations);
            ends.add(t.accurate() ? t : trace(starts.get(i)));
        }
        return ends;
    }

    /** One run of each ray. */
    private List<Run> runs(List<RayStart> starts, double tolerance, double stride, Map<IndexField, IndexField> ready) {
        List<Run> runs = new ArrayList<>(starts.size());
        // rays of about one scale share a batch engine, and rays in one medium a batch
        Map<Double, BatchPropagator> engines = new LinkedHashMap<>();
        Map<BatchPropagator, Map<IndexField, Deque<Run>>> waiting = new LinkedHashMap<>();
        Deque<Run> moved = new ArrayDeque<>();
        for (RayStart start : starts) {
            Run run = new Run(start, tolerance, stride);
            runs.add(run);
            if (run.begin()) {
                moved.add(run);
            }
        }
        while (true) {
            for (Run run = moved.poll(); run != null; run = moved.poll()) {
                IndexField field = run.shared();
                if (!ready.containsKey(field)) {
                    run.finishAlone();
                    continue;
                }
                int columns = State.columns(run.y);
                // by the next power of two below, since the rays of a beam all have scales of their own
                double scale = Math.scalb(1.0, Math.getExponent(run.scale));
                BatchPropagator engine =
                        engines.computeIfAbsent(scale, s -> new BatchPropagator(columns, tolerance, s, stride));
                Map<IndexField, Deque<Run>> groups = waiting.computeIfAbsent(engine, e -> new HashMap<>());
                groups.computeIfAbsent(field, f -> new ArrayDeque<>()).add(run);
            }
            if (waiting.isEmpty()) {
                return runs;
            }
            Map.Entry<BatchPropagator, Map<IndexField, Deque<Run>>> group =
                    waiting.entrySet().iterator().next();
            waiting.remove(group.getKey());
            group.getValue().forEach((field, legs) -> {
                IndexField bundled = ready.getOrDefault(field, field);
                group.getKey().advance(legs, field, bundled, (run, met) -> {
                    if (run.resume(met)) {
                        moved.add(run);
                    }
                });
            });
        }
    }

    /** Traces one ray. */
    public Traced trace(RayStart start) {
        double tolerance = 0.1 * settings.accuracy;
        double stride = 1;
        Run loose = new Run(start, tolerance, stride);
        loose.go();
        if (!loose.integrated) {
            return loose.traced(loose.errors(loose), 0);
        }
        long evaluations = loose.evaluations;
        @Nullable Traced result = null;
        for (int i = 0; i <= TIGHTENINGS; i++) {
            tolerance *= TIGHTER;
            stride *= STRIDE;
            Run tight = new Run(start, tolerance, stride);
            tight.go();
            evaluations += tight.evaluations;
            result = tight.traced(tight.errors(loose), evaluations);
            if (result.accurate()) {
                return result;
            }
            loose = tight;
            tolerance *= 0.1;
        }
        return Objects.requireNonNull(result);
    }

    /**
     * Traces one ray once, at a given tolerance and without an estimate of its errors: for searches that trace what they find
     * again.
     */
    public Traced glance(RayStart start, double tolerance) {
        Run run = new Run(start, tolerance, 1);
        run.go();
        return run.traced(run.errors(run), run.evaluations);
    }

    /**
     * A ray that may pass a point several times.
     *
     * @param passages the ray at each minimum of its distance from the point, in order
     * @param end the ray as it ended: at the last passage that was asked for, or early
     */
    public record Passing(List<Traced> passages, Traced end) {
        public Passing {
            passages = List.copyOf(passages);
        }
    }

    /**
     * Traces one ray once, as {@link #glance} does, to an ending {@link Ending.Nearest}, and tells of every passage on the way.
     *
     * @throws IllegalStateException if the ending is another
     */
    public Passing passages(RayStart start, double tolerance) {
        if (!(ending instanceof Ending.Nearest)) {
            throw new IllegalStateException("passages need an ending nearest to a point");
        }
        Run run = new Run(start, tolerance, 1);
        List<Traced> passed = new ArrayList<>();
        run.passed = passed;
        run.go();
        return new Passing(passed, run.traced(run.errors(run), run.evaluations));
    }

    /** Length of the scene that a ray from this start sees, metres: what positions and steps are judged against. */
    double scale(RayStart start) {
        double scale = 0;
        Vector from = start.position();
        for (Element e : train.elements()) {
            scale = Math.max(scale, e.surface().vertex().minus(from).norm());
            if (e.surface().whole()) {
                scale = Math.max(scale, 2 / e.surface().form().curvature());
            }
        }
        if (ending instanceof Ending.AtZ at) {
            scale = Math.max(scale, Math.abs(at.z() - from.z()));
        } else if (ending instanceof Ending.AtLength at) {
            scale = Math.max(scale, at.length());
        } else if (ending instanceof Ending.AtOpticalLength at) {
            scale = Math.max(scale, at.opticalLength());
        } else if (ending instanceof Ending.Nearest at) {
            scale = Math.max(scale, at.to().minus(from).norm());
        } else if (ending instanceof Ending.AtVertical at) {
            scale = Math.max(scale, at.distance());
        } else if (ending instanceof Ending.AtLowest at) {
            scale = Math.max(scale, at.scale());
        }
        if (scale == 0) {
            for (Element e : train.elements()) {
                double c = e.surface().form().curvature();
                scale = Math.max(scale, c > 0 ? 1 / c : 0);
                scale = Math.max(scale, e.action() instanceof Action.ThinLens lens ? Math.abs(lens.focalLength()) : 0);
            }
        }
        return scale > 0 ? scale : 1;
    }

    /** How an attempt to reach a target went. */
    private enum Move {
        REACHED,
        ENDED,
        /** An equation has to be integrated first. */
        WAITS
    }

    /**
     * One pass of one ray at one tolerance. It goes as far as it can by itself, and stops where an equation has to be integrated:
     * it then says through what ({@link #piece}) and to which targets, and is resumed with what was met, so that one engine may
     * serve it alone or with many others.
     */
    private final class Run implements BatchPropagator.Leg {
        private final RayStart start;
        private final double scale;
        private final double tolerance;
        private final double stride;
        private double limit;
        private final Crossing crossing = new Crossing();
        private final Flow flow = new Flow();
        private final Trail trail;
        private final double[] y;
        private final double[] rate;
        private double[] first = new double[0];
        private IndexField field;
        private Status status = Status.LOST;
        private int element = -1;
        private String note = "";
        private boolean integrated;
        private double drift;
        private double placeError;
        private double angleError;
        private double localErrors;
        private long evaluations;
        /** The surface that is looked for, by its number; that of all surfaces when the ending is. */
        private int stage;

        private Target goal = new Target.AtLength(0);
        private Target[] targets = {};
        private IndexField piece;
        private @Nullable Seams seams;
        private int pieces;
        private double legStart;
        private double pieceStart;
        private int nearest;
        /** The ray at the passages met so far, where they are asked for. */
        private @Nullable List<Traced> passed;

        Run(RayStart start, double tolerance, double stride) {
            this.start = start;
            this.scale = scale(start);
            this.limit = settings.reach * scale;
            this.tolerance = tolerance;
            this.stride = stride;
            this.trail = Trail.of(settings.trail, settings.columns);
            boolean lens = train.elements().stream().anyMatch(e -> e.action() instanceof Action.ThinLens);
            int count = lens ? State.TRANSFER_COLUMNS : settings.transfer ? settings.columns.count() : 0;
            this.y = new double[State.size(count)];
            this.rate = new double[y.length];
            this.field = train.from();
            this.piece = field;
        }

        /** The whole way, by an engine of its own. */
        void go() {
            if (begin()) {
                finishAlone();
            }
        }

        /** What is left of the way, by an engine of its own. */
        void finishAlone() {
            Propagator propagator = engine.make(tolerance, scale, stride);
            double errorsBefore = localErrors;
            long samplesBefore = evaluations;
            boolean more = true;
            while (more) {
                int met = propagator.advance(y, piece, targets, trail);
                localErrors = errorsBefore + propagator.localErrors();
                evaluations = samplesBefore + propagator.evaluations();
                more = resume(met);
            }
        }

        @Override
        public double[] state() {
            return y;
        }

        @Override
        public Target[] targets() {
            return targets;
        }

        @Override
        public void spent(long samples, double errors) {
            evaluations += samples;
            localErrors += errors;
        }

        /** What it may share with other rays: where nothing jumps at the seams, the whole field in place of the piece. */
        private IndexField shared() {
            return field.runsThroughSeams() ? field : piece;
        }

        /** Sets out; whether an equation has to be integrated. */
        boolean begin() {
            return launch() && seek();
        }

        /** Goes on from a target that was met; whether an equation has to be integrated again. */
        boolean resume(int met) {
            return switch (met(met)) {
                case ENDED -> false;
                case WAITS -> true;
                case REACHED -> reached() && seek();
            };
        }

        /** Goes from surface to surface as long as no equation has to be integrated; whether one has to be. */
        private boolean seek() {
            while (true) {
                if (!aim()) {
                    return false;
                }
                switch (reach(goal, surface())) {
                    case ENDED -> {
                        return false;
                    }
                    case WAITS -> {
                        return true;
                    }
                    case REACHED -> {
                        if (!reached()) {
                            return false;
                        }
                    }
                }
            }
        }

        private @Nullable Surface surface() {
            return stage < train.elements().size() ? train.elements().get(stage).surface() : null;
        }

        /** Chooses what is to be met next; false if the ray has ended. */
        private boolean aim() {
            Surface surface = surface();
            if (surface != null) {
                element = stage;
                goal = new Target.OnSurface(surface);
                return true;
            }
            element = -1;
            return aimAtEnding();
        }

        /** Deals with what was met; whether the ray goes on. */
        private boolean reached() {
            List<Element> elements = train.elements();
            if (stage < elements.size()) {
                if (stage == elements.size() - 1 && ending instanceof Ending.AtLastSurface) {
                    arrive();
                    return false;
                }
                return act(elements.get(stage), stage++);
            }
            return !ends();
        }

        private boolean launch() {
            Vector q = start.position();
            y[0] = q.x();
            y[1] = q.y();
            y[2] = q.z();
            trail.add(y[0], y[1], y[2]);
            double[] g = new double[3];
            for (Level l : field.limits()) {
                if (l.value(y[0], y[1], y[2], g) < 0) {
                    end(
                            l instanceof GroundLevel ? Status.GROUNDED : Status.OUTSIDE,
                            "the ray starts outside " + l.describe());
                    y[3] = start.direction().x();
                    y[4] = start.direction().y();
                    y[5] = start.direction().z();
                    first = y.clone();
                    return false;
                }
            }
            boolean defined = flow.sample(field, y[0], y[1], y[2], Order.GRADIENT);
            double n = defined ? flow.index() : 1;
            y[3] = n * start.direction().x();
            y[4] = n * start.direction().y();
            y[5] = n * start.direction().z();
            placeError = 2 * EPSILON * q.norm();
            angleError = 2 * EPSILON;
            if (!defined) {
                first = y.clone();
                end(Status.OUTSIDE, undefined());
                return false;
            }
            columns();
            first = y.clone();
            return true;
        }

        /** δx, δy, δpx, δpy on the start plane of constant z, with p·δp = ½∇n²·δq; columns of a level ray are across it. */
        private void columns() {
            if (State.columns(y) == 0) {
                return;
            }
            if (settings.columns.acrossRay()) {
                columnsAcross();
                return;
            }
            double pz = y[5];
            double[] force = {flow.samples().gx[0], flow.samples().gy[0]};
            for (int c = 0; c < State.TRANSFER_COLUMNS; c++) {
                int at = State.COLUMNS + State.COLUMN * c;
                if (c < 2) {
                    y[at + c] = 1;
                    y[at + 5] = pz == 0 ? 0 : force[c] / pz;
                } else {
                    y[at + 3 + c - 2] = 1;
                    y[at + 5] = pz == 0 ? 0 : -y[3 + c - 2] / pz;
                }
            }
        }

        /** δq and δp across the ray; what a δq needs of δp along the ray to keep p·δp = ½∇n²·δq is added. */
        private void columnsAcross() {
            double[][] axes = settings.columns.axes(y[3], y[4], y[5]);
            double n2 = y[3] * y[3] + y[4] * y[4] + y[5] * y[5];
            Samples s = flow.samples();
            int momenta = State.columns(y) - 2;
            for (int c = 0; c < 2; c++) {
                double push = (axes[c][0] * s.gx[0] + axes[c][1] * s.gy[0] + axes[c][2] * s.gz[0]) / n2;
                for (int i = 0; i < 3; i++) {
                    if (momenta > 0) {
                        y[State.COLUMNS + State.COLUMN * c + i] = axes[c][i];
                        y[State.COLUMNS + State.COLUMN * c + 3 + i] = push * y[3 + i];
                    }
                    y[State.COLUMNS + State.COLUMN * (momenta + c) + 3 + i] = axes[c][i];
                }
            }
        }

        /** Brings the ray to a target, or asks for the integration that it takes. */
        private Move reach(Target target, @Nullable Surface surface) {
            if (surface != null && !leaves(stage) && standsOn(target)) {
                return Move.REACHED;
            }
            if (field.uniform() && field.limits().isEmpty()) {
                return straight(target, surface) ? Move.REACHED : Move.ENDED;
            }
            integrated = true;
            seams = new Seams(field, y, rate, flow, scale);
            legStart = y[State.LENGTH];
            pieces = 0;
            return piece(seams);
        }

        /**
         * Whether the ray stands on the surface that it looks for and must leave it first: it has just passed the same closed
         * surface or mirror, or starts on a closed surface inside it.
         */
        private boolean leaves(int i) {
            List<Element> elements = train.elements();
            Surface surface = elements.get(i).surface();
            if (i > 0) {
                Element before = elements.get(i - 1);
                boolean same = before.surface().frame().equals(surface.frame())
                        && before.surface().form().equals(surface.form());
                return same && (surface.whole() || before.action() instanceof Action.Reflect);
            }
            if (!surface.whole()) {
                return false;
            }
            int passes = 0;
            for (Element e : elements) {
                boolean same = e.surface().frame().equals(surface.frame())
                        && e.surface().form().equals(surface.form());
                passes += same && !(e.action() instanceof Action.Reflect) ? 1 : 0;
            }
            return passes % 2 == 1;
        }

        private boolean straight(Target target, @Nullable Surface surface) {
            double n = Math.sqrt(y[3] * y[3] + y[4] * y[4] + y[5] * y[5]);
            Vector d = new Vector(y[3] / n, y[4] / n, y[5] / n);
            double s;
            if (surface != null) {
                boolean standing = Math.abs(target.value(y)) <= Departure.ON * scale * target.steepness(y, 1);
                double least = standing ? 10 * Departure.ON * scale : 0;
                s = surface.firstCrossing(new Vector(y[0], y[1], y[2]), d, least, limit);
            } else {
                s = -target.value(y) / (target.rate(y, n) / n);
                boolean again = target instanceof Target.AtZ
                        || target instanceof Target.Nearest
                        || target instanceof Target.AtVertical
                        || target instanceof Target.AtLowest;
                if (again && !(s > Departure.ON * scale)) {
                    s = Double.NaN;
                }
            }
            flow.rate(field, y, rate);
            if (!(s <= limit)) {
                flow.shift(y, rate, scale / n);
                trail.add(y[0], y[1], y[2]);
                lostOn(surface);
                return false;
            }
            if (s < 0) {
                end(Status.LOST, "the length at which the ray was to end was passed before its last surface");
                return false;
            }
            double[] begin = trail.conjugates().isPresent() ? y.clone() : y;
            double tau = s / n;
            trail.conjugates().ifPresent(c -> c.span(field, (t, out) -> drift(begin, t, out), 0, tau, y.length));
            flow.shift(y, rate, s / n);
            flow.polish(y, field, target, rate);
            trail.add(y[0], y[1], y[2]);
            travelled(s);
            return true;
        }

        /** A state a while later in a uniform medium. */
        private static void drift(double[] begin, double t, double[] out) {
            System.arraycopy(begin, 0, out, 0, begin.length);
            double n = Math.sqrt(begin[3] * begin[3] + begin[4] * begin[4] + begin[5] * begin[5]);
            out[State.LENGTH] += n * t;
            for (int i = 0; i < 3; i++) {
                out[i] += t * begin[3 + i];
                for (int at = State.COLUMNS; at < out.length; at += State.COLUMN) {
                    out[at + i] += t * begin[at + 3 + i];
                }
            }
        }

        /** Asks for the way through one smooth piece of the field. */
        private Move piece(Seams cells) {
            targets = cells.targets(goal, y[State.LENGTH] + limit);
            piece = field.piece(cells.cells());
            pieceStart = y[State.LENGTH];
            return Move.WAITS;
        }

        /** Deals with what an engine has met. */
        private Move met(int target) {
            Seams cells = Objects.requireNonNull(seams);
            int met = target;
            if (met > 1 && y[State.LENGTH] - pieceStart > Departure.ON * scale && standsOn(goal)) {
                // a surface on the very edge or knot of a table: rounding decides which is met first
                flow.polish(y, field, goal, rate);
                met = 0;
            }
            if (met == 0) {
                double s = y[State.LENGTH] - legStart;
                travelled(s);
                placeError += INTEGRATED * (Math.abs(y[0]) + Math.abs(y[1]) + Math.abs(y[2]) + s);
                angleError += INTEGRATED;
                drifted();
                return Move.REACHED;
            }
            if (met == 1) {
                lostOn(surface());
                return Move.ENDED;
            }
            if (met < 0) {
                // steps shrink before the end of a root's domain too, where slopes have no bound
                String why = met == Propagator.UNDEFINED ? undefined() : ahead(1e-9 * scale);
                end(
                        why.isEmpty() ? Status.LOST : Status.OUTSIDE,
                        why.isEmpty() ? "the step became too small " + where() : why);
                return Move.ENDED;
            }
            if (met < 2 + cells.limits()) {
                if (field.limits().get(met - 2) instanceof GroundLevel) {
                    end(Status.GROUNDED, "it meets the ground " + where());
                } else {
                    end(Status.OUTSIDE, "it left " + ((Target.OnLevel) targets[met]).describe() + " " + where());
                }
                return Move.ENDED;
            }
            if (++pieces == PIECES) {
                end(Status.LOST, "it crossed more than " + PIECES + " seams of its medium");
                return Move.ENDED;
            }
            cells.enter(y, rate);
            return piece(cells);
        }

        private void lostOn(@Nullable Surface surface) {
            end(surface != null ? Status.MISSED : Status.LOST, surface != null ? missed() : lost());
        }

        private boolean standsOn(Target target) {
            return Math.abs(target.value(y)) <= Departure.ON * scale * target.steepness(y, 1) && target.accepts(y);
        }

        private boolean act(Element e, int i) {
            Surface surface = e.surface();
            double r = surface.distanceFromAxis(y[0], y[1], y[2]);
            if (r > surface.aperture() * (1 + 4 * EPSILON)) {
                end(
                        Status.CLIPPED,
                        String.format(
                                Locale.ROOT,
                                "surfaces[%d] is met %.6g mm from its axis, its aperture is %.6g mm",
                                i,
                                1e3 * r,
                                1e3 * surface.aperture()));
                return false;
            }
            double n1 = Math.sqrt(y[3] * y[3] + y[4] * y[4] + y[5] * y[5]);
            double c1 = Math.abs(new Target.OnSurface(surface).rate(y, n1))
                    / (n1 * new Target.OnSurface(surface).steepness(y, n1));
            Crossing.Outcome outcome;
            IndexField into = e.into();
            if (e.action() instanceof Action.Refract refract) {
                outcome = crossing.refract(y, surface, field, into, refract.followTotalReflection());
            } else if (e.action() instanceof Action.Reflect) {
                outcome = crossing.reflect(y, surface, field);
            } else if (e.action() instanceof Action.ThinLens lens) {
                outcome = crossing.thinLens(y, surface, lens.focalLength(), field, start.parallel());
            } else {
                outcome = Crossing.Outcome.PASSED;
            }
            switch (outcome) {
                case TOTAL -> {
                    end(Status.TOTALLY_REFLECTED, "beyond the critical angle at surfaces[" + i + "]");
                    return false;
                }
                case UNDEFINED -> {
                    String why = into.explain(y[0], y[1], y[2]);
                    end(Status.OUTSIDE, why.isEmpty() ? undefined() : why + " " + where());
                    return false;
                }
                case PASSED -> field = into;
                case REFLECTED -> {}
            }
            if (!(e.action() instanceof Action.Stop)) {
                double n2 = Math.sqrt(y[3] * y[3] + y[4] * y[4] + y[5] * y[5]);
                double c2 = Math.abs(new Target.OnSurface(surface).rate(y, n2))
                        / (n2 * new Target.OnSurface(surface).steepness(y, n2));
                double curvature = surface.form().curvature();
                placeError /= Math.max(c1, 1e-8);
                angleError = angleError * Math.max(1, n1 * c1 / (n2 * Math.max(c2, 1e-8)))
                        + (placeError * curvature * Math.abs(n2 * c2 - n1 * c1) + 2 * EPSILON * n1)
                                / (n2 * Math.max(c2, 1e-8));
            }
            return true;
        }

        /** Chooses the target that stands for the ending; false if the ray has ended already. */
        private boolean aimAtEnding() {
            if (ending instanceof Ending.BehindLastSurface) {
                arrive();
                return false;
            }
            if (ending instanceof Ending.Nearest at) {
                goal = goal instanceof Target.Nearest ? goal : new Target.Nearest(at.to());
            } else if (ending instanceof Ending.AtLowest at) {
                goal = goal instanceof Target.AtLowest ? goal : new Target.AtLowest(at.chart());
            } else if (ending instanceof Ending.AtZ at) {
                goal = new Target.AtZ(at.z());
            } else if (ending instanceof Ending.AtVertical at) {
                goal = new Target.AtVertical(at.chart(), at.distance());
            } else if (ending instanceof Ending.AtLength at) {
                goal = new Target.AtLength(at.length());
            } else if (ending instanceof Ending.AtOpticalLength at) {
                goal = new Target.AtOpticalLength(at.opticalLength());
            } else {
                throw new IllegalStateException("an ending at the last surface needs a surface");
            }
            boolean ofLength = goal instanceof Target.AtLength || goal instanceof Target.AtOpticalLength;
            if (ofLength && goal.value(y) > 0) {
                end(Status.LOST, "the length at which the ray was to end was passed before its last surface");
                return false;
            }
            return true;
        }

        /** Whether the ray ends where it has met the target of its ending, or goes on to the next such place. */
        private boolean ends() {
            if (goal instanceof Target.Nearest target) {
                return endsNearest(target);
            }
            if (goal instanceof Target.AtLowest target) {
                boolean defined = flow.sample(field, y[0], y[1], y[2], Order.GRADIENT);
                if (!defined || !target.isLowest(y, flow.samples())) {
                    return false;
                }
            }
            arrive();
            return true;
        }

        /** Counts the places where the distance does not change and is least. */
        private boolean endsNearest(Target.Nearest target) {
            boolean defined = flow.sample(field, y[0], y[1], y[2], Order.GRADIENT);
            if (!defined || !target.isNearest(y, flow.samples())) {
                return false;
            }
            if (passed != null) {
                status = Status.ARRIVED;
                passed.add(traced(errors(this), evaluations));
                status = Status.LOST;
            }
            if (++nearest == ((Ending.Nearest) ending).which()) {
                arrive();
                return true;
            }
            limit = Math.min(limit, BACK * scale);
            return false;
        }

        private void arrive() {
            status = Status.ARRIVED;
            element = -1;
        }

        private void end(Status how, String why) {
            status = how;
            note = why;
        }

        private String missed() {
            return "the ray does not meet surfaces[" + element + "]";
        }

        private String lost() {
            return String.format(Locale.ROOT, "the ray had not ended after %.6g m", y[State.LENGTH]);
        }

        private String undefined() {
            String why = ahead(1e-2 * scale);
            return why.isEmpty() ? "the index is undefined " + where() : why;
        }

        /** Why the index is undefined not farther ahead than this; empty if it is not. */
        private String ahead(double farthest) {
            // the state is the last sound one: what is wrong lies just ahead of it
            for (double ahead = 0; ahead <= farthest; ahead = ahead == 0 ? 1e-15 * scale : 4 * ahead) {
                double n = Math.sqrt(y[3] * y[3] + y[4] * y[4] + y[5] * y[5]);
                String why = field.explain(y[0] + ahead * y[3] / n, y[1] + ahead * y[4] / n, y[2] + ahead * y[5] / n);
                if (!why.isEmpty()) {
                    return why + " " + where();
                }
            }
            return "";
        }

        private String where() {
            return String.format(Locale.ROOT, "at (%.6g, %.6g, %.6g) mm", 1e3 * y[0], 1e3 * y[1], 1e3 * y[2]);
        }

        private void travelled(double s) {
            double size = Math.abs(y[0]) + Math.abs(y[1]) + Math.abs(y[2]);
            placeError += angleError * s + 2 * EPSILON * (size + s);
        }

        /** Takes note of how far |p| has drifted from n since it was last set. */
        private void drifted() {
            if (flow.sample(field, y[0], y[1], y[2], Order.VALUE)) {
                double pp = y[3] * y[3] + y[4] * y[4] + y[5] * y[5];
                drift = Math.max(drift, Math.abs(pp / (1 + flow.samples().value[0]) - 1));
            }
        }

        Traced.Errors errors(Run other) {
            double place = 0;
            double angle = 0;
            double optical = 0;
            double length = 0;
            if (other.status != status) {
                place = scale;
                angle = 1;
                optical = scale;
                length = scale;
            } else if (other != this) {
                place = SAFETY * distance(y, other.y, 0, 1);
                double n = Math.sqrt(y[3] * y[3] + y[4] * y[4] + y[5] * y[5]);
                angle = SAFETY * distance(y, other.y, 3, n);
                optical = SAFETY * Math.abs(State.opticalLength(y) - State.opticalLength(other.y));
                length = SAFETY * Math.abs(y[State.LENGTH] - other.y[State.LENGTH]);
                // two runs may agree by accident; their steps' own estimates do not
                double local = LOCAL * localErrors;
                place += local * scale;
                angle += local;
                optical += local * scale;
                length += local * scale;
            }
            double n = Math.sqrt(y[3] * y[3] + y[4] * y[4] + y[5] * y[5]);
            return new Traced.Errors(
                    place + placeError,
                    angle + angleError + drift,
                    optical + n * placeError + 4 * EPSILON * Math.abs(State.opticalLength(y)),
                    length + placeError + 4 * EPSILON * y[State.LENGTH],
                    drift);
        }

        Traced traced(Traced.Errors errors, long evaluations) {
            boolean defined = flow.sample(field, y[0], y[1], y[2], Order.GRADIENT);
            Samples at = flow.samples();
            double[] force = defined ? new double[] {at.gx[0], at.gy[0], at.gz[0]} : new double[3];
            double n = defined ? flow.index() : Math.sqrt(y[3] * y[3] + y[4] * y[4] + y[5] * y[5]);
            double across = new Vector(y[0], y[1], y[2]).minus(start.position()).norm();
            double accuracy = settings.accuracy;
            boolean accurate = status != Status.ARRIVED
                    || (errors.position() <= accuracy * Math.max(across, y[State.LENGTH] * 1e-3)
                            && errors.direction() <= accuracy
                            && errors.opticalLength() <= accuracy * Math.abs(State.opticalLength(y)));
            return new Traced(
                    status,
                    element,
                    y,
                    first,
                    n,
                    force,
                    errors,
                    accurate,
                    note,
                    trail.points(),
                    trail.conjugates().map(ConjugatePoints::lengths).orElse(new double[0]),
                    evaluations);
        }
    }

    private static double distance(double[] a, double[] b, int at, double unit) {
        double dx = a[at] - b[at];
        double dy = a[at + 1] - b[at + 1];
        double dz = a[at + 2] - b[at + 2];
        return Math.sqrt(dx * dx + dy * dy + dz * dz) / unit;
    }

    /** The cells of a field's seams that a ray is in, and the targets that bound them. */
    private static final class Seams {
        private final List<Seam> seams;
        private final List<Level> limits;
        private final int[] cells;
        private final Flow flow;
        private final IndexField field;
        private final double scale;
        private final double[] gradient = new double[3];

        Seams(IndexField field, double[] y, double[] rate, Flow flow, double scale) {
            this.field = field;
            this.flow = flow;
            this.seams = field.seams();
            this.limits = field.limits();
            this.scale = scale;
            this.cells = new int[seams.size()];
            enter(y, rate);
        }

        int limits() {
            return limits.size();
        }

        int[] cells() {
            return cells;
        }

        /** Finds the cells that the ray is in or, standing on a knot, is about to enter. */
        void enter(double[] y, double[] rate) {
            for (int i = 0; i < cells.length; i++) {
                Seam seam = seams.get(i);
                double u = seam.coordinate().value(y[0], y[1], y[2], gradient);
                double steep =
                        Math.sqrt(gradient[0] * gradient[0] + gradient[1] * gradient[1] + gradient[2] * gradient[2]);
                double trifle = Departure.ON * scale * steep;
                int cell = seam.cell(u);
                boolean onLower = cell > 0 && u - seam.knot(cell - 1) <= trifle;
                boolean onUpper = cell < seam.count() && seam.knot(cell) - u <= trifle;
                if (onLower || onUpper) {
                    double slope = gradient[0] * y[3] + gradient[1] * y[4] + gradient[2] * y[5];
                    if (slope == 0 && flow.rate(field, y, rate)) {
                        double[] ahead = y.clone();
                        flow.shift(ahead, rate, 1e-4 * scale);
                        slope = seam.coordinate().value(ahead[0], ahead[1], ahead[2], gradient) - u;
                    }
                    int knot = onLower ? cell - 1 : cell;
                    cell = slope > 0 ? knot + 1 : knot;
                }
                cells[i] = cell;
            }
        }

        /** The goal first, then the length limit, the limits of the field, and the knots around the cells. */
        Target[] targets(Target goal, double limit) {
            List<Target> targets = new ArrayList<>();
            targets.add(goal);
            targets.add(new Target.AtLength(limit));
            for (Level l : limits) {
                targets.add(new Target.OnLevel(l, 0));
            }
            for (int i = 0; i < cells.length; i++) {
                Seam seam = seams.get(i);
                if (cells[i] > 0) {
                    targets.add(new Target.OnLevel(seam.coordinate(), seam.knot(cells[i] - 1)));
                }
                if (cells[i] < seam.count()) {
                    targets.add(new Target.OnLevel(seam.coordinate(), seam.knot(cells[i])));
                }
            }
            return targets.toArray(Target[]::new);
        }
    }
}
