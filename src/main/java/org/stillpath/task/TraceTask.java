package org.stillpath.task;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import org.stillpath.job.Section;
import org.stillpath.job.Value;
import org.stillpath.ray.Ending;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.ray.Train;
import org.stillpath.unit.Kind;

/** The task {@code trace}: given rays through the train, to where they end. */
final class TraceTask implements Task {
    /** Speed of light in vacuum, m/s (exact, SI). */
    static final double LIGHT = 299_792_458;

    @Override
    public String name() {
        return "trace";
    }

    @Override
    public Plan read(Section job, Scene scene) {
        List<RayStart> starts =
                RaySources.read(job.need("rays", "[{from: [0 mm, 0.2 mm, -5 mm], direction: [0, 0, 1]}]"));
        Ending ending = ending(job, scene);
        boolean transfer = job.find("transfer").map(Value::flag).orElse(false);
        if (scene.wavelengths().length > 1) {
            job.fault("wavelength", "the task \"trace\" takes one wavelength");
        }
        Figures figures = Figures.read(job, scene, List.of("rays"), List.of("rays"));
        return options -> run(scene, starts, ending, transfer, options.figures() ? figures.names() : List.of());
    }

    private static Ending ending(Section job, Scene scene) {
        Section s = job.need("stop-at", "{z: 20 mm}").section();
        Optional<Value> z = s.find("z");
        Optional<Value> length = s.find("length");
        Optional<Value> optical = s.find("optical-length");
        Optional<Value> surface = s.find("surface");
        int given = (z.isPresent() ? 1 : 0)
                + (length.isPresent() ? 1 : 0)
                + (optical.isPresent() ? 1 : 0)
                + (surface.isPresent() ? 1 : 0);
        s.finish();
        if (given != 1 && !s.isPlaceholder() && s.problems().isEmpty()) {
            s.fault(
                    "one place to stop at is needed: {z: 20 mm}, {length: 3 m}, {optical-length: 3 m} or {surface: last}");
        }
        if (surface.isPresent()) {
            surface.get().word("last");
            if (scene.train().isEmpty()) {
                surface.get().fault("there is no surface to stop at without a train; give {z: 20 mm} or {length: 3 m}");
            }
            return new Ending.AtLastSurface();
        }
        if (z.isPresent()) {
            return new Ending.AtZ(finite(z.get().quantity(Kind.LENGTH)));
        }
        if (length.isPresent()) {
            return new Ending.AtLength(finite(length.get().positive(Kind.LENGTH)));
        }
        return new Ending.AtOpticalLength(
                optical.map(v -> finite(v.positive(Kind.LENGTH))).orElse(1.0));
    }

    private static double finite(double v) {
        return Double.isNaN(v) ? 1 : v;
    }

    private static Result run(
            Scene scene, List<RayStart> starts, Ending ending, boolean transfer, List<String> figures) {
        Train train = scene.trainAt(scene.wavelength());
        Tracer.Settings settings = new Tracer.Settings(scene.accuracy(), transfer, !figures.isEmpty());
        List<Traced> traced = new Tracer(train, ending, settings).trace(starts);
        List<RayRow> rows = new ArrayList<>(traced.size());
        for (Traced t : traced) {
            rows.add(row(t));
        }
        boolean accurate = traced.stream().allMatch(Traced::accurate);
        List<String> warnings = new ArrayList<>(scene.warnings());
        if (!accurate) {
            warnings.add(Words.notReached(scene.accuracy()));
        }
        long arrived = traced.stream().filter(t -> t.status() == Status.ARRIVED).count();
        String headline = headline(traced, arrived);
        List<Figure> drawn = new ArrayList<>();
        if (figures.contains("rays")) {
            drawn.add(RayFigure.of(train, traced, headline));
        }
        return new Result(
                "trace",
                scene.title(),
                headline,
                Map.of(),
                rows,
                List.of(table(rows)),
                drawn,
                warnings,
                Words.CAUTIONS,
                accurate);
    }

    private static String headline(List<Traced> traced, long arrived) {
        int count = traced.size();
        if (arrived == count) {
            return count == 1 ? "The ray arrived" : "All " + count + " rays arrived";
        }
        if (count == 1) {
            return "The ray did not arrive: " + traced.get(0).status().word();
        }
        return arrived + " of " + count + " rays arrived";
    }

    static RayRow row(Traced t) {
        Map<String, Double> errors = new LinkedHashMap<>();
        errors.put("position", t.errors().position());
        errors.put("direction", t.errors().direction());
        errors.put("optical-length", t.errors().opticalLength());
        errors.put("length", t.errors().length());
        errors.put("travel-time", t.errors().opticalLength() / LIGHT);
        errors.put("hamiltonian-drift", t.errors().drift());
        boolean transfer = t.status() == Status.ARRIVED && t.hasTransfer();
        return new RayRow(
                t.status().word(),
                t.position(),
                t.direction(),
                t.opticalLength(),
                t.length(),
                t.opticalLength() / LIGHT,
                t.index(),
                transfer ? t.transfer() : new double[0][],
                t.note(),
                errors);
    }

    private static Table table(List<RayRow> rows) {
        List<String> columns = List.of(
                "ray",
                "status",
                "position-x [m]",
                "position-y [m]",
                "position-z [m]",
                "direction-x",
                "direction-y",
                "direction-z",
                "optical-length [m]",
                "length [m]",
                "travel-time [s]",
                "index",
                "position-error [m]",
                "direction-error [rad]",
                "optical-length-error [m]");
        List<List<String>> cells = new ArrayList<>();
        for (int i = 0; i < rows.size(); i++) {
            RayRow r = rows.get(i);
            cells.add(List.of(
                    Integer.toString(i),
                    r.status(),
                    Double.toString(r.position().x()),
                    Double.toString(r.position().y()),
                    Double.toString(r.position().z()),
                    Double.toString(r.direction().x()),
                    Double.toString(r.direction().y()),
                    Double.toString(r.direction().z()),
                    Double.toString(r.opticalLength()),
                    Double.toString(r.length()),
                    Double.toString(r.travelTime()),
                    Double.toString(r.index()),
                    String.format(Locale.ROOT, "%.3g", r.errors().get("position")),
                    String.format(Locale.ROOT, "%.3g", r.errors().get("direction")),
                    String.format(Locale.ROOT, "%.3g", r.errors().get("optical-length"))));
        }
        return new Table("rays", columns, cells);
    }
}
