package org.stillpath.task;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalDouble;
import org.stillpath.geometry.Vector;
import org.stillpath.job.Section;
import org.stillpath.medium.EarthChart;
import org.stillpath.medium.Ground;
import org.stillpath.medium.GroundReader;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Medium;
import org.stillpath.path.Bouguer;
import org.stillpath.path.Chord;
import org.stillpath.path.Sighting;
import org.stillpath.path.Sightings;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.task.survey.Classical;
import org.stillpath.task.survey.Reduced;
import org.stillpath.task.survey.Reduction;
import org.stillpath.unit.Display;

/** The task {@code sightline}: what is seen through air over an earth, and how observations are reduced. */
final class SightlineTask implements Task {
    /** What can hurt, and what the digits do not say. Common practice, no source. */
    private static final List<String> CAUTIONS = List.of(
            "The real temperature field of the air is the uncertainty: refraction near the ground changes within minutes, and "
                    + "no digit here says how well the given profile holds.",
            "Never sight the sun, nor anything near it, through optics without a filter made for it in front of the lens.",
            "Heights and clearances on which safety rests are for licensed practice and local rules.");

    /** Height to which rays are followed where the air does not end, metres. */
    private static final double SPACE = 100e3;

    @Override
    public String name() {
        return "sightline";
    }

    /** What stays the same from one sight to the next: the air and the ground. */
    record Setting(Earth earth, EarthChart chart, IndexField field, Sightings sightings, double accuracy) {}

    @Override
    public Plan read(Section job, Scene scene) {
        Optional<Earth> earth = job.has("earth") ? Earth.read(job.at("earth")) : Optional.of(Earth.mean());
        Optional<Ground> ground = job.has("ground")
                ? GroundReader.read(job.at("ground").section(), scene.sources())
                : Optional.of(Ground.level(0));
        Earth known = earth.orElse(Earth.mean());
        Optional<Sight> sight = Sight.read(job, known);
        if (scene.train().isPresent()) {
            job.fault("train", "a sight has no train of surfaces; name its air with \"through: MEDIUM\"");
        }
        if (scene.wavelengths().length > 1) {
            job.fault("wavelength", "the task \"sightline\" takes one wavelength");
        }
        SightFigures.Wanted figures = SightFigures.Wanted.read(job, scene);
        if (sight.isPresent() && ground.isPresent()) {
            check(job, sight.get(), ground.get());
        }
        boolean earthGiven = job.has("earth");
        return options -> run(
                scene,
                air(scene, known, ground.orElse(Ground.level(0))),
                sight.orElseThrow(() -> new IllegalStateException("a job without a sight has faults")),
                figures,
                options.figures(),
                earthGiven);
    }

    /** What a setting depends on; the medium by identity, since a memory gives back the same where nothing changed. */
    private record Over(double radius, Ground ground, Medium medium, double wavelength, double accuracy) {
        // equal media would have to be compared to their tables
        @SuppressWarnings("ReferenceEquality")
        @Override
        public boolean equals(Object o) {
            return o instanceof Over other
                    && radius == other.radius
                    && ground.equals(other.ground)
                    && medium == other.medium
                    && wavelength == other.wavelength
                    && accuracy == other.accuracy;
        }

        @Override
        public int hashCode() {
            return 31 * Double.hashCode(radius) + System.identityHashCode(medium);
        }
    }

    /** The air as it is, and with its tables joined otherwise, where it has some. */
    private record Air(Setting setting, Optional<Other> other) {
        record Other(Medium medium, Setting setting) {}
    }

    private static Air air(Scene scene, Earth earth, Ground ground) {
        Medium m = scene.through().orElseThrow();
        Over over = new Over(earth.radius(), ground, m, scene.wavelength(), scene.accuracy());
        return scene.memory()
                .once(
                        over,
                        Air.class,
                        () -> new Air(
                                setting(scene, m, earth, ground),
                                m.joinedOtherwise().map(o -> new Air.Other(o, setting(scene, o, earth, ground)))));
    }

    private static Setting setting(Scene scene, Medium m, Earth earth, Ground ground) {
        EarthChart chart = earth.flat() ? EarthChart.flat(ground) : EarthChart.sphere(earth.radius(), ground);
        IndexField field = m.field(scene.wavelength(), m.frame(Vector.ZERO), chart);
        return new Setting(earth, chart, field, Sightings.through(field, chart, scene.accuracy()), scene.accuracy());
    }

    /** Faults of heights and distances against the ground. */
    private static void check(Section job, Sight sight, Ground ground) {
        double[] knots = ground.knots().orElse(new double[0]);
        double until = sight.to() instanceof Sight.Point p
                ? p.distance().orElse(0)
                : sight.to() instanceof Sight.Staff s ? s.distance() : 0;
        if (knots.length > 0 && (knots[0] > 0 || knots[knots.length - 1] < until)) {
            job.fault(
                    "ground",
                    "the cross-section goes from " + length(knots[0]) + " to " + length(knots[knots.length - 1])
                            + "; it must cover the sight, from 0 m to " + length(until));
            return;
        }
        double below = ground.height(0) - sight.eye();
        if (below > 0) {
            job.fault(
                    "from",
                    "the eye at " + length(sight.eye()) + " lies " + length(below) + " below the ground; give a height "
                            + "of at least " + length(ground.height(0))
                            + ", or the height of the instrument above it with `instrument`");
        }
        if (sight.to() instanceof Sight.Point p
                && p.distance().isPresent()
                && p.height().isPresent()) {
            double there = ground.height(p.distance().getAsDouble());
            double deep = there - p.height().getAsDouble();
            if (deep > 0) {
                job.fault(
                        "to",
                        "the target at " + length(p.height().getAsDouble()) + " lies " + length(deep)
                                + " below the ground, which is at " + length(there) + " there");
            }
        }
    }

    private static String length(double metres) {
        return Display.of(metres, "m", Math.max(1e-3, 1e-9 * Math.abs(metres))).toString();
    }

    private static Result run(
            Scene scene, Air air, Sight sight, SightFigures.Wanted wanted, boolean drawn, boolean earthGiven) {
        Result result = run(scene, air.setting, sight, wanted, drawn, earthGiven);
        return air.other
                .map(o -> OtherJoining.held(
                        result, run(scene.in(o.medium), o.setting, sight, wanted, false, earthGiven), scene.accuracy()))
                .orElse(result);
    }

    private static Result run(
            Scene scene, Setting setting, Sight sight, SightFigures.Wanted wanted, boolean drawn, boolean earthGiven) {
        List<String> warnings = new ArrayList<>(scene.warnings());
        if (!earthGiven) {
            warnings.add("no earth is given; a sphere of 6371 km is taken");
        }
        warnings.addAll(Sense.of(scene, sight));
        SightFigures figures = new SightFigures(wanted, drawn, scene, setting, sight.eye());
        if (sight.to() instanceof Sight.Stars stars) {
            return stars(scene, setting, sight, stars, figures, warnings);
        }
        if (sight.to() instanceof Sight.Staff staff) {
            return staff(scene, setting, sight, staff, figures, warnings);
        }
        return target(scene, setting, sight, (Sight.Point) sight.to(), figures, warnings);
    }

    private static Result target(
            Scene scene, Setting setting, Sight sight, Sight.Point asked, SightFigures figures, List<String> warnings) {
        double eye = sight.eye();
        Observations observed = Observations.of(scene, setting, sight, asked);
        warnings.addAll(observed.warnings());
        if (observed.point().isEmpty()) {
            return nowhere(scene, warnings);
        }
        Sight.Point point = observed.point().get();
        double distance = point.distance().orElseThrow();
        double height = point.height().orElseThrow();
        Chord chord = new Chord(setting.chart().radius(), eye, distance, height);
        // before the search, which needs the ray that touches the ground too
        Optional<Sightings.Horizon> horizon = setting.sightings().horizon(eye);
        Sightings.Outcome seen = setting.sightings().find(eye, distance, height, horizon);
        List<ImageRow> rows = new ArrayList<>();
        for (Sighting s : seen.images()) {
            rows.add(row(s, chord, setting, seen.images().size()));
        }
        Map<String, Quantity> q = new LinkedHashMap<>();
        q.put("image-count", new Quantity.Amount(rows.size(), "1", 0));
        visible(q, seen, point, rows.size());
        seen.limb().ifPresent(l -> {
            q.put("hidden-height", new Quantity.Amount(l.height(), "m", l.error()));
            if (l.bound() != Sightings.Bound.NONE) {
                q.put("vanishing-elevation", new Quantity.Amount(l.elevation(), "rad", l.error() / chord.slope()));
                q.put("hidden-by", new Quantity.Word(l.bound() == Sightings.Bound.AIR ? "refraction" : "ground"));
            }
            if (!Double.isNaN(l.contact())) {
                q.put("hidden-from", new Quantity.Amount(l.contact(), "m", l.contactError()));
            }
        });
        horizon.ifPresent(h -> {
            q.put("horizon-dip", new Quantity.Amount(h.dip(), "rad", h.dipError()));
            if (!Double.isNaN(h.distance())) {
                q.put("horizon-distance", new Quantity.Amount(h.distance(), "m", h.distanceError()));
            }
        });
        q.put("chord-length", new Quantity.Amount(chord.length(), "m", 4e-16 * chord.length()));
        q.put("chord-elevation", new Quantity.Amount(chord.elevation(), "rad", 4e-16));
        double ground = setting.chart().ground().height(0);
        if (!setting.earth().flat() && setting.chart().ground().isLevel() && eye > ground) {
            q.put(
                    "horizon-dip-classical",
                    new Quantity.Amount(
                            Classical.dip(
                                    eye - ground,
                                    Classical.USUAL_K,
                                    setting.earth().radius()),
                            "rad",
                            0));
            q.put(
                    "horizon-distance-classical",
                    new Quantity.Amount(
                            Classical.horizon(
                                    eye - ground,
                                    Classical.USUAL_K,
                                    setting.earth().radius()),
                            "m",
                            0));
            q.put("refraction-coefficient-gradient", gradient(setting, eye, height, distance));
        }
        for (Reduced r : observed.reduced()) {
            q.put(r.key(), new Quantity.Amount(r.exact(), r.unit(), r.error()));
            if (!Double.isNaN(r.classical()) && r.classical() != r.exact()) {
                q.put(r.key() + "-classical", new Quantity.Amount(r.classical(), r.unit(), 0));
                q.put(r.key() + "-difference", new Quantity.Amount(r.difference(), r.unit(), r.error()));
            }
        }
        q.put("searched-lowest", new Quantity.Amount(seen.lowest(), "rad", 0));
        q.put("searched-highest", new Quantity.Amount(seen.highest(), "rad", 0));
        tell(warnings, seen, rows.size());
        boolean accurate = seen.images().stream().allMatch(s -> accurate(s, setting, chord));
        if (!accurate) {
            warnings.add(Words.notReached(scene.accuracy()));
        }
        String headline = headline(rows, seen, height);
        return new Result(
                "sightline",
                scene.title(),
                headline,
                q,
                List.of(),
                List.of(),
                rows,
                List.of(),
                tables(rows, seen, observed.reduced(), figures.drawn()),
                figures.of(new SightFigures.Found(distance, height, point.span(), seen, rows, headline), warnings),
                warnings,
                CAUTIONS,
                accurate);
    }

    /** k from the gradient of the index half-way between the two heights, at the eye and at the target. */
    private static Quantity gradient(Setting setting, double eye, double height, double distance) {
        double r = setting.earth().radius();
        double k = setting.sightings().coefficient(0.5 * distance, 0.5 * (eye + height));
        return new Quantity.Amount(Double.isNaN(k) ? 0 : k, "1", 1e-12 * r / Earth.MEAN);
    }

    private static Result nowhere(Scene scene, List<String> warnings) {
        return new Result(
                "sightline",
                scene.title(),
                "The observed ray does not reach the observed distance",
                Map.of("visible", new Quantity.Word("no")),
                List.of(),
                List.of(),
                List.of(),
                List.of(),
                List.of(),
                List.of(),
                warnings,
                CAUTIONS,
                true);
    }

    private static List<Table> tables(
            List<ImageRow> rows, Sightings.Outcome seen, List<Reduced> reduced, boolean drawn) {
        List<Table> tables = new ArrayList<>(List.of(table(rows)));
        if (drawn) {
            // a hundred numbers as text cost a tenth of a sight
            tables.add(transfer(seen));
        }
        if (!reduced.isEmpty()) {
            List<List<String>> cells = new ArrayList<>();
            for (Reduced r : reduced) {
                cells.add(List.of(
                        r.key(),
                        Double.toString(r.exact()),
                        Double.isNaN(r.classical()) ? "" : Double.toString(r.classical()),
                        Double.isNaN(r.classical()) ? "" : Double.toString(r.difference()),
                        r.unit(),
                        r.formula()));
            }
            tables.add(new Table(
                    "reductions",
                    List.of("quantity", "through-the-air", "classical", "difference", "unit", "formula"),
                    cells));
        }
        return tables;
    }

    private static boolean accurate(Sighting s, Setting setting, Chord chord) {
        double a = setting.accuracy();
        return s.errors().launch() * Math.abs(s.slope()) <= a * chord.distance() * 1.01 + 1e-15 * chord.distance()
                && s.errors().opticalLength() <= a * s.opticalLength();
    }

    private static void visible(Map<String, Quantity> q, Sightings.Outcome seen, Sight.Point point, int images) {
        if (point.span().isEmpty()) {
            q.put("visible", new Quantity.Word(images > 0 ? "yes" : "no"));
            return;
        }
        double low = point.span().get()[0];
        double high = point.span().get()[1];
        double part = 0;
        double from = Double.NaN;
        double until = Double.NaN;
        double hidden = seen.limb().map(Sightings.Limb::height).orElse(Double.NEGATIVE_INFINITY);
        for (double[] s : seen.seen()) {
            // the lowest edge is known better than by the shots that found it
            double start = Math.abs(s[0] - hidden) < 1 ? hidden : s[0];
            double a = Math.max(low, start);
            double b = Math.min(high, s[1]);
            if (b > a) {
                part += b - a;
                from = Double.isNaN(from) ? a : from;
                until = b;
            }
        }
        double share = part / (high - low);
        q.put("visible", new Quantity.Word(share >= 1 - 1e-9 ? "yes" : share <= 1e-9 ? "no" : "partly"));
        double error = seen.limb().map(Sightings.Limb::error).orElse(0.0);
        q.put("visible-part", new Quantity.Amount(Math.min(1, share), "1", error / (high - low)));
        if (part > 0) {
            q.put("visible-from", new Quantity.Amount(from, "m", error));
            q.put("visible-to", new Quantity.Amount(until, "m", error));
        }
    }

    private static void tell(List<String> warnings, Sightings.Outcome seen, int images) {
        if (!seen.note().isEmpty() && images == 0) {
            warnings.add("no ray got to the target's distance: " + seen.note());
        }
        for (Sightings.Duct d : seen.ducts()) {
            boolean open = Double.isInfinite(d.high());
            warnings.add((open
                            ? "from " + length(d.low()) + " on, as far up as was looked,"
                            : "between " + length(d.low()) + " and " + length(d.high()))
                    + " the air bends level rays more than the earth curves: a duct"
                    + (Double.isNaN(d.kept())
                            ? ""
                            : "; rays that leave the eye within " + angle(d.kept())
                                    + " of the horizontal are trapped below it"));
        }
        warnings.add("images nearer to each other than the search resolves may be missed; `searched-lowest` and "
                + "`searched-highest` bound the launch elevations looked at");
    }

    private static String angle(double rad) {
        return Display.of(rad, "rad", 1e-3 * Math.abs(rad)).toString();
    }

    private static ImageRow row(Sighting s, Chord chord, Setting setting, int images) {
        double atFrom = s.launch() - chord.elevation();
        double atTo = chord.arrivalElevation() - s.arrival();
        double radius = setting.chart().radius();
        double straight = chord.slope();
        Map<String, Double> errors = new LinkedHashMap<>();
        double launch = s.errors().launch();
        errors.put("launch-elevation", launch);
        errors.put("arrival-elevation", s.errors().arrival());
        errors.put("back-elevation", s.errors().arrival());
        errors.put("refraction-at-from", launch + 4e-16);
        errors.put("refraction-at-to", s.errors().arrival() + 4e-16);
        errors.put("apparent-displacement", (launch + 4e-16) * straight);
        errors.put("optical-length", s.errors().opticalLength());
        errors.put("optical-excess", s.errors().opticalLength());
        errors.put("length", s.errors().length());
        errors.put("lowest-clearance", s.errors().lowest());
        errors.put("lowest-clearance-at", s.errors().lowestAt());
        double magnification = straight / s.slope();
        errors.put(
                "vertical-magnification", Math.abs(magnification) * s.errors().slope());
        OptionalDouble k = OptionalDouble.empty();
        String remark = "";
        if (!setting.earth().flat()) {
            double per = 2 * radius / chord.distance();
            k = OptionalDouble.of(per * atFrom);
            errors.put("refraction-coefficient", per * (launch + 4e-16));
            remark = remark(per * atFrom, per * atTo, images);
        }
        double[] p = s.points();
        double[][] points = new double[p.length / 2][];
        for (int i = 0; i < points.length; i++) {
            points[i] = new double[] {p[2 * i], p[2 * i + 1]};
        }
        return new ImageRow(
                s.launch(),
                s.arrival(),
                atFrom,
                atTo,
                chord.displacement(atFrom),
                k,
                remark,
                s.opticalLength(),
                s.excess(),
                s.length(),
                s.lowest(),
                s.lowestAt(),
                s.slope() > 0 ? "erect" : "inverted",
                magnification,
                s.kind().word(),
                points,
                errors);
    }

    /** Why the coefficient is no figure to go by. Limits from common practice, no source. */
    private static String remark(double k, double back, int images) {
        if (images > 1) {
            return "one of several images: a coefficient describes a single even bend, which this is not";
        }
        if (Math.abs(k) > 1) {
            return "far from even bending: this coefficient holds for this sight alone";
        }
        if (Math.abs(k - back) > 0.2 * Math.max(0.1, Math.abs(k))) {
            return "the two ends differ (" + String.format(Locale.ROOT, "%.3f", back)
                    + " at the target): it does not hold along the whole sight";
        }
        return "";
    }

    private static String headline(List<ImageRow> rows, Sightings.Outcome seen, double height) {
        if (rows.isEmpty()) {
            Optional<Sightings.Limb> l = seen.limb();
            return l.isPresent() && l.get().height() > height
                    ? "The target is hidden: nothing below "
                            + Display.in(
                                    l.get().height(),
                                    "m",
                                    Math.max(1e-3, l.get().error()))
                            + " is seen where it stands"
                    : "No ray from the eye meets the target";
        }
        ImageRow first = rows.get(0);
        if (rows.size() == 1) {
            return once(first);
        }
        return rows.size() + " images of the target: "
                + String.join(", ", rows.stream().map(ImageRow::orientation).toList()) + " from above";
    }

    /** The answer where there is one image, with the digits that its error leaves. */
    static String once(ImageRow image) {
        double error = image.errors().getOrDefault("refraction-at-from", 0.0);
        String k = image.coefficient().isPresent()
                ? ", k = "
                        + Display.of(
                                image.coefficient().getAsDouble(),
                                "1",
                                Math.max(1e-3, image.errors().getOrDefault("refraction-coefficient", 0.0)))
                : "";
        return "The target is seen once, " + image.orientation() + ", "
                + Display.in(Math.abs(image.refractionAtFrom()), "arcsec", Math.max(5e-8, error))
                + (image.refractionAtFrom() < 0 ? " lower" : " higher") + " than it is" + k;
    }

    private static Result stars(
            Scene scene, Setting setting, Sight sight, Sight.Stars stars, SightFigures figures, List<String> warnings) {
        double eye = sight.eye();
        double radius = setting.chart().radius();
        Optional<Bouguer> second = Bouguer.of(setting.field(), radius);
        List<StarRow> rows = new ArrayList<>();
        boolean accurate = true;
        for (double z : stars.zeniths()) {
            StarRow row = star(setting, eye, z, second);
            rows.add(row);
            accurate &= row.refraction().isEmpty()
                    || row.errors().getOrDefault("refraction", 0.0) <= 1.01 * scene.accuracy() + 1e-15;
        }
        if (!accurate) {
            warnings.add(Words.notReached(scene.accuracy()));
        }
        double top = rows.stream().mapToDouble(StarRow::top).max().orElse(0);
        warnings.add("the rays end at a height of " + Display.in(top, "km", 10)
                + "; refraction above it, and at its edge, is not counted");
        List<List<String>> cells = new ArrayList<>();
        for (StarRow r : rows) {
            cells.add(List.of(
                    Double.toString(r.apparentZenith()),
                    r.refraction().isPresent() ? Double.toString(r.refraction().getAsDouble()) : "",
                    r.note()));
        }
        Map<String, Quantity> q = new LinkedHashMap<>();
        Optional<StarRow> last = rows.stream()
                .filter(r -> r.refraction().isPresent())
                .max(java.util.Comparator.comparingDouble(StarRow::apparentZenith));
        String headline = last.map(r -> "A star at the apparent zenith distance "
                        + Display.in(r.apparentZenith(), "deg", 1e-6) + " looks "
                        + Display.in(r.refraction().getAsDouble(), "arcsec", 5e-8) + " higher than it is")
                .orElse("No star is seen in the directions given");
        return new Result(
                "sightline",
                scene.title(),
                headline,
                q,
                List.of(),
                List.of(),
                List.of(),
                rows,
                List.of(new Table("stars", List.of("apparent-zenith [rad]", "refraction [rad]", "note"), cells)),
                figures.without("a sight to the stars", eye, top, 0, warnings),
                warnings,
                CAUTIONS,
                accurate);
    }

    private static StarRow star(Setting setting, double eye, double zenith, Optional<Bouguer> second) {
        double e = 0.5 * Math.PI - zenith;
        double r = setting.chart().radius() + eye;
        double up = Math.max(SPACE, 2 * Math.abs(eye)) - eye;
        double s = r * Math.sin(e);
        // the longer root: a ray below the horizontal comes up again
        double length = Math.sqrt(s * s + up * (2 * r + up)) - s;
        Traced t = setting.sightings().away(eye, e, length * 1.02);
        Vector d = t.direction();
        double[] place = setting.sightings().place(t);
        double top = place[1];
        boolean rises = setting.sightings().elevationAt(t) > 0;
        if (t.status() == Status.GROUNDED || !rises) {
            return new StarRow(
                    zenith,
                    OptionalDouble.empty(),
                    top,
                    t.status() == Status.GROUNDED
                            ? "the ground is seen there, not the sky"
                            : "the ray does not leave the air: " + t.note(),
                    Map.of());
        }
        double sin = Math.sin(e) * d.x() - Math.cos(e) * d.z();
        double cos = Math.cos(e) * d.x() + Math.sin(e) * d.z();
        double refraction = Math.atan2(sin, cos);
        double error = t.errors().direction() + 4e-16;
        if (second.isPresent() && e >= 0) {
            Optional<Double> other = second.get().refraction(eye, e, top);
            if (other.isPresent()) {
                error += Math.abs(other.get() - refraction);
            }
        }
        String note = t.status() == Status.OUTSIDE && top < 60e3 ? "the air ends low: " + t.note() : "";
        return new StarRow(zenith, OptionalDouble.of(refraction), top, note, Map.of("refraction", error));
    }

    private static Result staff(
            Scene scene, Setting setting, Sight sight, Sight.Staff staff, SightFigures figures, List<String> warnings) {
        double eye = sight.eye();
        double radius = setting.chart().radius();
        Sightings.Reached r = setting.sightings().reach(eye, 0, staff.distance());
        double angle = staff.distance() / radius;
        double half = Math.sin(0.5 * angle);
        double straight = setting.earth().flat() ? 0 : 2 * (radius + eye) * half * half / Math.cos(angle);
        Map<String, Quantity> q = new LinkedHashMap<>();
        String headline;
        boolean accurate = true;
        if (r.status() == Status.ARRIVED) {
            double displacement = (r.height() - eye) - straight;
            double error = r.heightError() + 4e-16 * (1 + Math.abs(eye));
            q.put("staff-displacement", new Quantity.Amount(displacement, "m", error));
            q.put(
                    "staff-reading",
                    new Quantity.Amount(r.height() - setting.chart().ground().height(staff.distance()), "m", error));
            accurate = error <= scene.accuracy() * staff.distance() + 1e-14;
            kukkamaki(setting, eye, staff.distance(), straight, displacement, error, q);
            headline =
                    "The level sight meets the staff " + Display.of(Math.abs(displacement), "m", Math.max(error, 1e-8))
                            + (displacement < 0 ? " too low" : " too high");
        } else {
            headline = "The level sight does not reach the staff: " + r.status().word();
            warnings.add(r.note());
        }
        if (!accurate) {
            warnings.add(Words.notReached(scene.accuracy()));
        }
        return new Result(
                "sightline",
                scene.title(),
                headline,
                q,
                List.of(),
                List.of(),
                List.of(),
                figures.without(
                        "a level sight to a staff",
                        Math.min(ground(setting, staff), eye),
                        eye + Math.max(0.5, 0.5 * Math.abs(eye - ground(setting, staff))),
                        staff.distance(),
                        warnings),
                warnings,
                CAUTIONS,
                accurate);
    }

    /** The textbook's answer, from the air's index 0.5 m and 2.5 m above the ground at the instrument. */
    private static void kukkamaki(
            Setting setting,
            double eye,
            double distance,
            double straight,
            double displacement,
            double error,
            Map<String, Quantity> q) {
        Ground ground = setting.chart().ground();
        double c = Classical.USUAL_EXPONENT;
        double low = Reduction.refractivity(setting.field(), 0, ground.height(0) + 0.5);
        double high = Reduction.refractivity(setting.field(), 0, ground.height(0) + 2.5);
        double above = eye - ground.height(0);
        double staff = eye + straight - ground.height(distance);
        if (!(above > 0.05 && staff > 0.05) || Double.isNaN(low + high)) {
            return;
        }
        double index = (low - high) / (Math.pow(0.5, c) - Math.pow(2.5, c));
        double classical = Classical.kukkamaki(index, c, distance, above, staff);
        q.put("staff-displacement-classical", new Quantity.Amount(classical, "m", 0));
        q.put("staff-displacement-difference", new Quantity.Amount(displacement - classical, "m", error));
    }

    private static double ground(Setting setting, Sight.Staff staff) {
        Ground ground = setting.chart().ground();
        return Math.min(ground.height(0), ground.height(staff.distance()));
    }

    /** The images as a table. */
    static Table table(List<ImageRow> rows) {
        List<String> columns = List.of(
                "image",
                "orientation",
                "kind",
                "launch-elevation [rad]",
                "arrival-elevation [rad]",
                "refraction-at-from [rad]",
                "refraction-at-to [rad]",
                "apparent-displacement [m]",
                "refraction-coefficient",
                "vertical-magnification",
                "optical-length [m]",
                "optical-excess [m]",
                "length [m]",
                "lowest-clearance [m]",
                "lowest-clearance-at [m]",
                "launch-elevation-error [rad]",
                "optical-length-error [m]");
        List<List<String>> cells = new ArrayList<>();
        for (int i = 0; i < rows.size(); i++) {
            ImageRow r = rows.get(i);
            cells.add(List.of(
                    Integer.toString(i),
                    r.orientation(),
                    r.kind(),
                    Double.toString(r.launch()),
                    Double.toString(r.arrival()),
                    Double.toString(r.refractionAtFrom()),
                    Double.toString(r.refractionAtTo()),
                    Double.toString(r.displacement()),
                    r.coefficient().isPresent()
                            ? Double.toString(r.coefficient().getAsDouble())
                            : "",
                    Double.toString(r.magnification()),
                    Double.toString(r.opticalLength()),
                    Double.toString(r.excess()),
                    Double.toString(r.length()),
                    Double.toString(r.lowest()),
                    Double.toString(r.lowestAt()),
                    String.format(Locale.ROOT, "%.3g", r.errors().get("launch-elevation")),
                    String.format(Locale.ROOT, "%.3g", r.errors().get("optical-length"))));
        }
        return new Table("images", columns, cells);
    }

    private static Table transfer(Sightings.Outcome seen) {
        List<List<String>> cells = new ArrayList<>();
        for (double[] t : seen.transfer()) {
            cells.add(List.of(Double.toString(t[0]), Double.toString(t[1])));
        }
        return new Table("transfer", List.of("launch-elevation [rad]", "height-at-distance [m]"), cells);
    }
}
