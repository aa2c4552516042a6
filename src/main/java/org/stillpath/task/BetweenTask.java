package org.stillpath.task;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Vector;
import org.stillpath.job.Section;
import org.stillpath.job.Value;
import org.stillpath.medium.IndexField;
import org.stillpath.path.PathSearch;
import org.stillpath.path.StationaryPath;
import org.stillpath.ray.Element;
import org.stillpath.ray.Ending;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.ray.Train;
import org.stillpath.unit.Display;
import org.stillpath.unit.Kind;

/** The task {@code between}: the stationary optical paths from one point to another. */
final class BetweenTask implements Task {
    private static final double USUAL_HALF_ANGLE = Math.toRadians(60);
    private static final int MOST_POINTS = 400;

    @Override
    public String name() {
        return "between";
    }

    /** Where to look. */
    private record Search(double halfAngle, Vector around, Vector plane, boolean direct) {}

    @Override
    public Plan read(Section job, Scene scene) {
        Vector from = point(job.need("from", "[0 m, 0 m, 1.5 m]"));
        Value toValue = job.need("to", "[0 m, 900 m, 1.2 m]");
        Vector to = point(toValue);
        if (!toValue.isPlaceholder()
                && to.minus(from).norm() == 0
                && job.problems().isEmpty()) {
            toValue.fault("the two points are the same; a path needs two");
        }
        Search search = job.find("search")
                .map(v -> search(v.section(), scene))
                .orElse(new Search(USUAL_HALF_ANGLE, Vector.ZERO, Vector.ZERO, false));
        boolean fronts = job.find("fronts").map(v -> fronts(v, scene)).orElse(false);
        if (scene.wavelengths().length > 1) {
            job.fault("wavelength", "the task \"between\" takes one wavelength");
        }
        Figures figures = Figures.read(job, scene, List.of("paths", "arrival"), List.of("paths"));
        return options -> new Run(scene, from, to, search, fronts).result(figures.names(), options.figures());
    }

    private static boolean fronts(Value value, Scene scene) {
        boolean wanted = value.flag();
        if (wanted && scene.train().isPresent()) {
            value.fault("wavefronts are followed through one medium alone, and this job has a train of surfaces; leave "
                    + "\"fronts\" out, or give one medium with \"through\" in place of the train");
        }
        return wanted;
    }

    private static Vector point(Value value) {
        double[] p = value.point();
        for (double c : p) {
            if (!Double.isFinite(c)) {
                return Vector.ZERO;
            }
        }
        return new Vector(p[0], p[1], p[2]);
    }

    private static Search search(Section s, Scene scene) {
        double half = s.find("half-angle").map(v -> v.positive(Kind.ANGLE)).orElse(USUAL_HALF_ANGLE);
        if (half > Math.PI * (1 + 1e-15)) {
            s.fault("half-angle", "at most 180 deg, all directions, can be searched");
        }
        Vector around = s.find("around")
                .map(v -> v.direction())
                .filter(d -> Double.isFinite(d[0] + d[1] + d[2]))
                .map(d -> new Vector(d[0], d[1], d[2]))
                .orElse(Vector.ZERO);
        String in = s.find("in").map(v -> v.word("xy", "yz", "xz")).orElse("");
        Vector plane =
                switch (in) {
                    case "xy" -> Vector.Z;
                    case "yz" -> new Vector(1, 0, 0);
                    case "xz" -> new Vector(0, 1, 0);
                    default -> Vector.ZERO;
                };
        Optional<Value> direct = s.find("direct");
        boolean both = direct.map(Value::flag).orElse(false);
        if (both && scene.train().isEmpty()) {
            direct.get().fault("there are no surfaces that a path could go past; leave \"direct\" out");
        }
        s.finish();
        return new Search(half > 0 ? Math.min(half, Math.PI) : USUAL_HALF_ANGLE, around, plane, both);
    }

    /** What a run needs to know. */
    private record Run(Scene scene, Vector from, Vector to, Search search, boolean fronts) {
        Result result(List<String> figures, boolean drawn) {
            Train train = scene.trainAt(scene.wavelength());
            PathSearch.Outcome through = PathSearch.run(query(train, from, to, search, scene.accuracy()));
            List<StationaryPath> found = new ArrayList<>(through.paths());
            String around = search.around.norm() > 0 ? "the given direction" : "the chord";
            List<String> warnings = new ArrayList<>(scene.warnings());
            String what = search.direct ? "through the train" : "";
            warnings.addAll(SearchNotes.of(
                    through, search.halfAngle, what, train.elements().isEmpty(), around));
            Optional<PathSearch.Outcome> past = Optional.empty();
            if (search.direct) {
                PathSearch.Outcome all =
                        PathSearch.run(query(Train.through(train.from()), from, to, search, scene.accuracy()));
                PathSearch.Outcome free = all.withPaths(
                        all.paths().stream().filter(p -> isFree(train, from, p)).toList());
                warnings.addAll(SearchNotes.of(free, search.halfAngle, "past the train", false, around));
                found.addAll(free.paths());
                past = Optional.of(free);
            }
            found.sort(Comparator.comparingDouble(StationaryPath::opticalLength));
            List<PathRow> rows = new ArrayList<>();
            for (StationaryPath p : found) {
                rows.add(row(p, found.get(0).opticalLength()));
            }
            boolean accurate = found.stream().allMatch(p -> p.errors()[0] <= scene.accuracy() * p.opticalLength());
            if (!accurate) {
                warnings.add(Words.notReached(scene.accuracy()));
            }
            Map<String, Quantity> quantities = quantities(rows, train, from, to);
            Optional<FirstArrival> grid =
                    fronts ? Optional.of(FirstArrival.of(train.from(), from, to, through)) : Optional.empty();
            grid.flatMap(FirstArrival::quantity).ifPresent(q -> quantities.put("first-arrival-grid", q));
            grid.ifPresent(g -> warnings.addAll(g.warnings(found)));
            String headline = headline(rows);
            List<Figure> pictures = new ArrayList<>();
            if (figures.contains("paths") && drawn) {
                pictures.add(new PathSection(from, to, found)
                        .figure(train, through.normal(), grid.flatMap(FirstArrival::fronts), headline));
            }
            if (figures.contains("arrival")) {
                Optional<CurveFigure> arrival = arrival(through, past, warnings);
                arrival.filter(f -> drawn).ifPresent(pictures::add);
            }
            return new Result(
                    "between",
                    scene.title(),
                    headline,
                    quantities,
                    List.of(),
                    rows,
                    List.of(table(rows)),
                    pictures,
                    warnings,
                    Words.CAUTIONS,
                    accurate);
        }

        /** The figure {@code arrival}, or a warning why there is none. */
        private Optional<CurveFigure> arrival(
                PathSearch.Outcome through, Optional<PathSearch.Outcome> past, List<String> warnings) {
            if (through.normal().isEmpty()) {
                warnings.add(
                        "the figure \"arrival\" exists only for searches in a plane, and this one went over a cone of "
                                + "directions; `search: {in: ..}` keeps to a plane where medium and train are symmetric about it");
                return Optional.empty();
            }
            Vector axis = search.around.norm() > 0
                    ? search.around.unit()
                    : to.minus(from).unit();
            String axisName = search.around.norm() > 0 ? "the given direction" : "the chord";
            Vector normal = through.normal().get();
            ArrivalCurves curves = new ArrivalCurves(search.halfAngle, axis, axisName, normal);
            curves.add(past.isPresent() ? "through the train" : "", through.samples(), through.paths(), normal);
            past.filter(p -> p.normal().isPresent()).ifPresent(p -> {
                boolean same = Math.abs(p.normal().get().dot(normal)) > 1 - 1e-9;
                curves.add(
                        same ? "past the train" : "past the train, in another plane",
                        p.samples(),
                        p.paths(),
                        p.normal().get());
            });
            Optional<CurveFigure> figure = curves.figure();
            if (figure.isEmpty()) {
                warnings.add(
                        "no ray of the search came to where it is nearest to the target, so that there is nothing to "
                                + "draw as the figure \"arrival\"");
            }
            return figure;
        }
    }

    private static PathSearch.Query query(Train train, Vector from, Vector to, Search s, double accuracy) {
        return new PathSearch.Query(train, from, to, s.around, s.halfAngle, s.plane, accuracy);
    }

    /** Whether a path that was found without the surfaces meets none of them on its way. */
    private static boolean isFree(Train train, Vector from, StationaryPath path) {
        for (Element e : train.elements()) {
            Train one = new Train(train.from(), List.of(e));
            Traced t = new Tracer(one, new Ending.AtLastSurface(), new Tracer.Settings(1e-9, false, false))
                    .trace(RayStart.of(from, path.launch()));
            if (t.status() == Status.ARRIVED && t.length() < path.length()) {
                return false;
            }
        }
        return true;
    }

    private static PathRow row(StationaryPath p, double least) {
        Map<String, Double> errors = new LinkedHashMap<>();
        errors.put("optical-length", p.errors()[0]);
        errors.put("length", p.errors()[1]);
        errors.put("travel-time", p.errors()[0] / TraceTask.LIGHT);
        errors.put("arrival-direction", p.errors()[2]);
        double[] trail = p.points();
        int n = trail.length / 3;
        int every = Math.max(1, (n + MOST_POINTS - 1) / MOST_POINTS);
        List<double[]> points = new ArrayList<>();
        for (int i = 0; i < n; i += every) {
            points.add(new double[] {trail[3 * i], trail[3 * i + 1], trail[3 * i + 2]});
        }
        if (n > 0 && (n - 1) % every != 0) {
            points.add(new double[] {trail[3 * n - 3], trail[3 * n - 2], trail[3 * n - 1]});
        }
        return new PathRow(
                p.opticalLength(),
                p.opticalLength() - least,
                p.length(),
                p.opticalLength() / TraceTask.LIGHT,
                p.launch(),
                p.arrival(),
                p.kind().word(),
                p.morseIndex(),
                p.nullDirections(),
                p.conjugates(),
                p.overInterfaces() == StationaryPath.Kind.NONE
                        ? ""
                        : p.overInterfaces().word(),
                p.residual(),
                points.toArray(double[][]::new),
                errors);
    }

    private static Map<String, Quantity> quantities(List<PathRow> rows, Train train, Vector from, Vector to) {
        Map<String, Quantity> q = new LinkedHashMap<>();
        q.put("path-count", new Quantity.Amount(rows.size(), "1", 0));
        if (!rows.isEmpty()) {
            PathRow first = rows.get(0);
            q.put(
                    "first-arrival",
                    new Quantity.Amount(
                            first.opticalLength(), "m", first.errors().getOrDefault("optical-length", 0.0)));
        }
        straight(train.from(), from, to)
                .ifPresent(s -> q.put("straight-optical-length", new Quantity.Amount(s[0], "m", s[1])));
        return q;
    }

    /** ∫ n ds along the chord in the first medium, by Gauss' rule on 64 and on 128 parts; empty where it is undefined. */
    private static Optional<double[]> straight(IndexField field, Vector from, Vector to) {
        double coarse = chord(field, from, to, 64);
        double fine = chord(field, from, to, 128);
        return Double.isNaN(fine)
                ? Optional.empty()
                : Optional.of(new double[] {fine, Math.abs(fine - coarse) + 1e-15 * Math.abs(fine)});
    }

    private static double chord(IndexField field, Vector from, Vector to, int parts) {
        double[] nodes = {-Math.sqrt(0.6), 0, Math.sqrt(0.6)};
        double[] weights = {5 / 18.0, 8 / 18.0, 5 / 18.0};
        double[] x = new double[3 * parts];
        double[] y = new double[3 * parts];
        double[] z = new double[3 * parts];
        Vector chord = to.minus(from);
        for (int i = 0; i < parts; i++) {
            for (int k = 0; k < 3; k++) {
                Vector q = from.plus((i + 0.5 + 0.5 * nodes[k]) / parts, chord);
                x[3 * i + k] = q.x();
                y[3 * i + k] = q.y();
                z[3 * i + k] = q.z();
            }
        }
        Samples s = new Samples(3 * parts);
        field.sample(x, y, z, 3 * parts, Order.VALUE, s);
        double sum = 0;
        for (int i = 0; i < 3 * parts; i++) {
            sum += weights[i % 3] * Math.sqrt(1 + s.value[i]);
        }
        return sum / parts * chord.norm();
    }

    private static String headline(List<PathRow> rows) {
        if (rows.isEmpty()) {
            return "No stationary path was found in the searched cone";
        }
        PathRow first = rows.get(0);
        String length = Display.brief(first.opticalLength(), "m", first.errors().getOrDefault("optical-length", 0.0))
                .toString();
        String what = first.kind().equals("minimum")
                ? "a minimum"
                : first.kind().equals("saddle")
                        ? "a saddle"
                        : "degenerate with " + first.nullDirections() + " null direction"
                                + (first.nullDirections() == 1 ? "" : "s");
        return rows.size() == 1
                ? "One stationary path, optical length " + length + ", " + what
                : rows.size() + " stationary paths; the first, " + what + ", has the optical length " + length;
    }

    private static Table table(List<PathRow> rows) {
        List<String> columns = List.of(
                "path",
                "kind",
                "morse-index",
                "optical-length [m]",
                "excess [m]",
                "length [m]",
                "launch-x",
                "launch-y",
                "launch-z",
                "arrival-x",
                "arrival-y",
                "arrival-z",
                "residual [m]",
                "optical-length-error [m]");
        List<List<String>> cells = new ArrayList<>();
        for (int i = 0; i < rows.size(); i++) {
            PathRow r = rows.get(i);
            cells.add(List.of(
                    Integer.toString(i),
                    r.kind(),
                    Integer.toString(r.morseIndex()),
                    Double.toString(r.opticalLength()),
                    Double.toString(r.excess()),
                    Double.toString(r.length()),
                    Double.toString(r.launch().x()),
                    Double.toString(r.launch().y()),
                    Double.toString(r.launch().z()),
                    Double.toString(r.arrival().x()),
                    Double.toString(r.arrival().y()),
                    Double.toString(r.arrival().z()),
                    String.format(Locale.ROOT, "%.3g", r.residual()),
                    String.format(Locale.ROOT, "%.3g", r.errors().get("optical-length"))));
        }
        return new Table("paths", columns, cells);
    }
}
