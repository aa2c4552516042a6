package org.stillpath.task;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.function.ToDoubleFunction;
import org.stillpath.geometry.Vector;
import org.stillpath.ray.Ending;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.ray.Train;
import org.stillpath.unit.Display;
import org.stillpath.wave.Pupil;
import org.stillpath.wave.Wavefront;
import org.stillpath.wave.Zernike;

/**
 * What real rays over the pupil say of an image: spots, foci, aberrations and wavefronts of each field at each wavelength. All
 * are judged on one plane: the sensor's, or the best focus of the first field at the first wavelength.
 *
 * <p>Errors come from the rays' own estimates and from a second set of rays with one ring and one angle less (at most {@value
 * #CHECK_RINGS} by {@value #CHECK_ANGLES}): what the two differ by is what the sampling may still hide. That is an
 * overestimate where averages converge fast, which is the usual case, and honest where edges cut the pupil. It doubles the
 * cost of a small sampling and adds nothing to that of a large one.
 */
final class Imaging {
    private static final int CHECK_RINGS = 12;
    private static final int CHECK_ANGLES = 25;
    private static final int LINE_POINTS = 21;
    private static final int FAN = 41;

    private final Pupil pupil;
    private final double radius;
    private final double accuracy;
    private final Vector last;
    private final double along;
    private final double scale;
    private final OptionalDouble sensor;
    private final List<FieldPoint> fields;
    private final double[] wavelengths;
    private final List<Train> trains;
    private final List<Axial> axials;
    private final int stop;
    private final int terms;
    private final List<String> warnings = new ArrayList<>();
    private final Map<String, Quantity> quantities = new LinkedHashMap<>();
    private final List<View> views = new ArrayList<>();
    private boolean accurate = true;
    private boolean infinite;
    private double plane = Double.NaN;

    /**
     * One field at one wavelength.
     *
     * @param bundle its rays
     * @param judged on the plane
     * @param check the same of the smaller set of rays
     * @param foci of the narrow bundle about the chief ray
     * @param source where its rays start, for further ones
     */
    record View(
            FieldPoint field,
            int colour,
            Bundle bundle,
            Judged judged,
            Judged check,
            Optional<Foci> foci,
            PupilRays source,
            Tracer tracer) {}

    /**
     * @param spec the pupil
     * @param sensor z of the plane, if it is given
     * @param trains the train at each wavelength; {@code axials} what their axes tell
     */
    Imaging(
            PupilSpec spec,
            OptionalDouble sensor,
            List<FieldPoint> fields,
            double[] wavelengths,
            List<Train> trains,
            List<Axial> axials,
            double accuracy) {
        this.pupil = spec.sampling();
        this.accuracy = accuracy;
        this.sensor = sensor;
        this.fields = List.copyOf(fields);
        this.wavelengths = wavelengths.clone();
        this.axials = List.copyOf(axials);
        this.stop = PupilRays.stopOf(trains.get(0));
        double aperture = stop < 0
                ? Double.POSITIVE_INFINITY
                : trains.get(0).elements().get(stop).surface().aperture();
        this.radius = spec.radius().orElse(aperture);
        // the pupil is the stop: its edge is no accident of rounding
        boolean open = stop >= 0 && radius <= aperture;
        this.trains =
                trains.stream().map(t -> open ? PupilRays.opened(t, stop) : t).toList();
        this.last = axials.get(0).last();
        this.along = axials.get(0).ray().direction().z() < 0 ? -1 : 1;
        this.scale = axials.get(0).scale();
        int order = Math.min(2 * pupil.radial() - 1, (pupil.angular() - 1) / 2);
        this.terms = order >= 7 ? 36 : order >= 4 ? 15 : order >= 2 ? 6 : 1;
    }

    /** Computes all; nothing else is asked for before. */
    void run() {
        Gaussian g = axials.get(0).mean();
        infinite = sensor.isEmpty() && imagesToInfinity(g);
        double near = near(g);
        for (int c = 0; c < wavelengths.length; c++) {
            for (FieldPoint f : fields) {
                view(f, c, near).ifPresent(views::add);
            }
        }
        if (views.isEmpty()) {
            warnings.add("no light comes through the pupil: spots and wavefronts are left out");
            return;
        }
        report();
    }

    private boolean imagesToInfinity(Gaussian g) {
        double distance = fields.get(0).distance();
        return Double.isInfinite(distance) ? g.afocal(scale) : g.imagesToInfinity(distance, scale);
    }

    /** z of the paraxial image, or of the last vertex where it lies at infinity. */
    private double near(Gaussian g) {
        if (imagesToInfinity(g)) {
            return last.z();
        }
        double distance = fields.get(0).distance();
        return last.z() + along * (Double.isInfinite(distance) ? g.backFocalDistance() : g.imageDistance(distance));
    }

    private Optional<View> view(FieldPoint f, int colour, double near) {
        Train train = trains.get(colour);
        PupilRays source = new PupilRays(train, stop, f, radius, accuracy);
        Tracer tracer = new Tracer(train, new Ending.BehindLastSurface(), new Tracer.Settings(accuracy, false, false));
        Bundle bundle = Bundle.of(source, tracer, pupil, accuracy);
        if (bundle.lostShare() > 1e-12) {
            warnings.add(String.format(
                    Locale.ROOT,
                    "%s of the pupil's area is cut off%s: %s",
                    percent(bundle.lostShare()),
                    where(f, colour),
                    String.join(", ", bundle.reasons())));
        }
        if (!bundle.hasLight()) {
            return Optional.empty();
        }
        accurate &= bundle.accurate();
        Pupil smaller = new Pupil(
                Math.min(CHECK_RINGS, Math.max(1, pupil.radial() - 1)),
                Math.min(CHECK_ANGLES, Math.max(1, pupil.angular() - 1)));
        Bundle check = Bundle.of(source, tracer, smaller, accuracy);
        if (Double.isNaN(plane) && !infinite) {
            plane = sensor.isPresent() ? sensor.getAsDouble() : bundle.bestPlane(near);
        }
        Judged judged = judge(bundle, near, terms);
        Judged second = check.hasLight() ? judge(check, near, terms) : judged;
        Optional<Foci> foci = source.start(0, 0)
                .map(s -> new Tracer(train, new Ending.BehindLastSurface(), new Tracer.Settings(accuracy, true, false))
                        .trace(s))
                .filter(Traced::hasTransfer)
                .filter(t -> t.status() == Status.ARRIVED)
                .map(t -> Foci.of(t, f.atInfinity()));
        if (judged.wave().isEmpty()) {
            warnings.add("the chief ray does not come through" + where(f, colour)
                    + ": there is no wavefront and no distortion of it");
        }
        return Optional.of(new View(f, colour, bundle, judged, second, foci, source, tracer));
    }

    private Judged judge(Bundle bundle, double near, int count) {
        return infinite
                ? Judged.atInfinity(bundle, last, count)
                : Judged.on(bundle, plane, near, last, scale, along, count);
    }

    private String where(FieldPoint f, int colour) {
        String field = fields.size() > 1 || !f.onAxis() ? " for the field " + f.label() : "";
        return wavelengths.length > 1 ? field + " at " + nanometres(wavelengths[colour]) : field;
    }

    static String nanometres(double wavelength) {
        return Display.in(wavelength, wavelength < 2e-6 ? "nm" : "µm", 0).toString();
    }

    private static String percent(double share) {
        return String.format(Locale.ROOT, "%.3g %%", 100 * share);
    }

    private void report() {
        View chief = views.get(0);
        Judged j = chief.judged();
        double sampled = Math.abs(j.spot() - chief.check().spot());
        if (infinite) {
            put("angular-radius-rms", j.spot(), "rad", 2 * chief.bundle().directionError() + sampled);
        } else {
            double place = chief.bundle().placeError(plane);
            put("spot-radius-rms", j.spot(), "m", place + sampled);
            put(
                    "encircled-radius",
                    j.encircled(),
                    "m",
                    place + Math.abs(j.encircled() - chief.check().encircled()));
            put("best-focus", fromLast(j.focus()), "m", focusError(chief));
            if (wavelengths.length > 1) {
                allColours(place + sampled);
            }
        }
        waves(chief);
        edge();
        lists("tangential-focus", "sagittal-focus");
        distortion();
        if (fields.size() > 1) {
            byField();
        }
        double lost = chief.bundle().lostShare();
        put("vignetting", lost, "1", 1e-15);
        if (stop < 0
                && !infinite
                && chief.judged().wave().isPresent()
                && !Judged.isFar(Math.abs(plane - last.z()), j.spot(), scale)) {
            warnings.add("the image stands so near to the last vertex that a reference sphere through it says nothing: "
                    + Display.of(scale, "m", 0.01 * scale) + " is taken as its radius");
        }
    }

    private double fromLast(double z) {
        return along * (z - last.z());
    }

    private double focusError(View v) {
        return v.bundle().placeError(v.judged().focus()) / v.bundle().spread()
                + Math.abs(v.judged().focus() - v.check().focus());
    }

    /** The spot of all wavelengths together, each weighing the same, about their common centroid. */
    private void allColours(double error) {
        FieldPoint first = views.get(0).field();
        List<View> all = views.stream().filter(v -> v.field().equals(first)).toList();
        double[] centre = new double[2];
        for (View v : all) {
            double[] c = v.bundle().centroid(plane);
            centre[0] += c[0] / all.size();
            centre[1] += c[1] / all.size();
        }
        double square = 0;
        for (View v : all) {
            double r = v.bundle().about(plane, centre);
            square += r * r / all.size();
        }
        put("spot-radius-rms-all-wavelengths", Math.sqrt(square), "m", error);
    }

    private void waves(View v) {
        if (v.judged().flat().isEmpty()) {
            return;
        }
        Wavefront flat = v.judged().flat().get();
        Optional<Wavefront> other = v.check().flat();
        double wavelength = wavelengths[v.colour()];
        double wave = v.bundle().waveError(infinite ? last.z() : plane);
        put(
                "wavefront-rms",
                flat.rms(),
                "m",
                wave + other.map(w -> Math.abs(w.rms() - flat.rms())).orElse(0.0));
        put(
                "wavefront-peak-to-valley",
                flat.peakToValley(),
                "m",
                2 * wave
                        + other.map(w -> Math.abs(w.peakToValley() - flat.peakToValley()))
                                .orElse(0.0));
        double strehl = flat.strehl(wavelength);
        double phase = 2 * Math.PI / wavelength;
        put(
                "strehl",
                strehl,
                "1",
                2 * phase * wave
                        + 1e-15
                        + other.map(w -> Math.abs(w.strehl(wavelength) - strehl))
                                .orElse(0.0));
        put(
                "strehl-estimate",
                flat.marechal(wavelength),
                "1",
                2 * phase * wave
                        + 1e-15
                        + other.map(w -> Math.abs(w.marechal(wavelength) - flat.marechal(wavelength)))
                                .orElse(0.0));
        v.judged().fit().ifPresent(fit -> {
            double[] c = fit.coefficients();
            double[] d = v.check().fit().map(f -> f.coefficients()).orElse(c);
            double differ = 0;
            for (int i = 0; i < c.length; i++) {
                differ = Math.max(differ, Math.abs(c[i] - d[i]));
            }
            quantities.put("zernike", new Quantity.Amounts(c, "m", wave + differ));
            put(
                    "zernike-residual",
                    fit.residual(),
                    "m",
                    wave
                            + v.check()
                                    .fit()
                                    .map(f -> Math.abs(f.residual() - fit.residual()))
                                    .orElse(0.0));
        });
    }

    /** The ray at the pupil's edge from the object's point on the axis: aberrations along and across, and its angle. */
    private void edge() {
        PupilRays source = new PupilRays(trains.get(0), stop, fields.get(0).axis(), radius, accuracy);
        Tracer tracer = views.get(0).tracer();
        Optional<Traced> found = source.start(0, 1).map(tracer::trace).filter(t -> t.status() == Status.ARRIVED);
        if (found.isEmpty()) {
            warnings.add("the ray at the pupil's edge does not come through: longitudinal aberration and numerical "
                    + "aperture are left out");
            return;
        }
        Traced t = found.get();
        Vector d = t.direction();
        Gaussian g = axials.get(0).y();
        double sine = Math.hypot(d.x(), d.y());
        put("numerical-aperture", t.index() * sine, "1", t.index() * t.errors().direction() + 2e-16);
        if (!fields.get(0).atInfinity()) {
            Vector start = source.start(0, 1).map(RayStart::direction).orElse(Vector.Z);
            put("numerical-aperture-object", g.before() * Math.hypot(start.x(), start.y()), "1", 4e-16);
        }
        double slope = d.y() / d.z();
        if (imagesToInfinity(axials.get(0).mean()) || slope == 0) {
            return;
        }
        double image = near(axials.get(0).mean());
        double miss = Judged.height(t, image);
        double error = t.errors().position()
                + t.errors().direction() * Math.abs(image - t.position().z());
        double paraxial = axials.get(0).backFocalError() + Axial.ROUNDING * Math.abs(image);
        put("transverse-aberration", miss, "m", error + paraxial * Math.abs(slope));
        put("longitudinal-aberration", -along * miss / slope, "m", error / Math.abs(slope) + paraxial);
    }

    private void lists(String tangential, String sagittal) {
        View v = views.get(0);
        if (v.foci().isEmpty() || v.bundle().chief().isEmpty()) {
            return;
        }
        double zero = along * (v.bundle().chief().get().position().z() - last.z());
        double error = focusLineError(v);
        double t = zero + along * v.foci().get().tangential();
        double s = zero + along * v.foci().get().sagittal();
        if (Math.abs(t) < scale / Gaussian.MARGIN) {
            put(tangential, t, "m", error * (1 + t * t / (scale * scale)));
        }
        if (Math.abs(s) < scale / Gaussian.MARGIN) {
            put(sagittal, s, "m", error * (1 + s * s / (scale * scale)));
        }
    }

    /** What the axis' transfer is uncertain by, as a length at the focus. */
    private double focusLineError(View v) {
        return axials.get(v.colour()).error() * scale + 4 * Axial.ROUNDING * scale;
    }

    /** Image height of the chief ray in the paraxial image plane over that of a perfect lens, less 1; of the outermost field. */
    private void distortion() {
        View outer = views.get(0);
        for (View v : views) {
            if (v.colour() == 0
                    && Math.abs(v.field().y()) > Math.abs(outer.field().y())) {
                outer = v;
            }
        }
        OptionalDouble value = distortion(outer);
        if (value.isPresent()) {
            double perfect = Math.abs(perfectHeight(outer));
            double error = outer.bundle().placeError(near(axials.get(0).mean()));
            double relative = axials.get(0).error() * 4;
            put("distortion", value.getAsDouble(), "1", error / perfect + relative);
            line(outer);
        }
    }

    private double perfectHeight(View v) {
        Gaussian g = axials.get(v.colour()).y();
        FieldPoint f = v.field();
        return f.atInfinity() ? g.before() * f.y() / g.power() : g.magnification(f.distance()) * f.y();
    }

    private OptionalDouble distortion(View v) {
        if (v.bundle().chief().isEmpty()
                || v.field().y() == 0
                || imagesToInfinity(axials.get(v.colour()).mean())) {
            return OptionalDouble.empty();
        }
        double perfect = perfectHeight(v);
        double real = Judged.height(
                v.bundle().chief().get(), near(axials.get(v.colour()).mean()));
        return OptionalDouble.of((real - perfect) / perfect);
    }

    /**
     * How far the image of a straight line departs from a straight line: the line runs along x through the outermost field, as
     * long to either side as that field is high; the largest distance of its chief rays' places from the line that fits best.
     */
    private void line(View outer) {
        if (infinite) {
            return;
        }
        double half = Math.abs(outer.field().y());
        List<double[]> places = new ArrayList<>();
        double error = 0;
        for (int i = 0; i < LINE_POINTS; i++) {
            FieldPoint f = outer.field().at(half * (2.0 * i / (LINE_POINTS - 1) - 1));
            Optional<Traced> t = new PupilRays(trains.get(0), stop, f, radius, accuracy)
                    .start(0, 0)
                    .map(outer.tracer()::trace)
                    .filter(r -> r.status() == Status.ARRIVED);
            if (t.isEmpty()) {
                return;
            }
            Vector q = t.get().position();
            Vector d = t.get().direction();
            double s = (plane - q.z()) / d.z();
            places.add(new double[] {q.x() + s * d.x(), q.y() + s * d.y()});
            error = Math.max(
                    error,
                    t.get().errors().position() + Math.abs(s) * t.get().errors().direction());
        }
        put("line-departure", departure(places), "m", 2 * error);
    }

    /** Largest distance of points from the line that fits best in the sense of least squares across it. */
    static double departure(List<double[]> points) {
        double mx = points.stream().mapToDouble(p -> p[0]).average().orElse(0);
        double my = points.stream().mapToDouble(p -> p[1]).average().orElse(0);
        double xx = 0;
        double xy = 0;
        double yy = 0;
        for (double[] p : points) {
            xx += (p[0] - mx) * (p[0] - mx);
            xy += (p[0] - mx) * (p[1] - my);
            yy += (p[1] - my) * (p[1] - my);
        }
        double angle = 0.5 * Math.atan2(2 * xy, xx - yy);
        double largest = 0;
        for (double[] p : points) {
            largest = Math.max(largest, Math.abs((p[1] - my) * Math.cos(angle) - (p[0] - mx) * Math.sin(angle)));
        }
        return largest;
    }

    /** The chief figures of each field at the first wavelength, in the job's order. */
    private void byField() {
        List<View> first = views.stream().filter(v -> v.colour() == 0).toList();
        if (first.size() < fields.size()) {
            return;
        }
        double place = infinite
                ? 2 * views.get(0).bundle().directionError()
                : first.stream()
                        .mapToDouble(v -> v.bundle().placeError(plane))
                        .max()
                        .orElse(0);
        double sampled = first.stream()
                .mapToDouble(v -> Math.abs(v.judged().spot() - v.check().spot()))
                .max()
                .orElse(0);
        amounts(
                infinite ? "angular-radius-rms-by-field" : "spot-radius-rms-by-field",
                infinite ? "rad" : "m",
                place + sampled,
                first,
                v -> v.judged().spot());
        double wave = first.stream()
                .mapToDouble(v -> v.bundle().waveError(infinite ? last.z() : plane))
                .max()
                .orElse(0);
        if (first.stream().allMatch(v -> v.judged().flat().isPresent())) {
            double differ = first.stream()
                    .mapToDouble(v -> Math.abs(flat(v.judged()).rms()
                            - v.check().flat().map(Wavefront::rms).orElse(0.0)))
                    .max()
                    .orElse(0);
            amounts(
                    "wavefront-rms-by-field",
                    "m",
                    wave + differ,
                    first,
                    v -> flat(v.judged()).rms());
            double strehl = first.stream()
                    .mapToDouble(v -> Math.abs(flat(v.judged()).strehl(wavelengths[0])
                            - v.check()
                                    .flat()
                                    .map(w -> w.strehl(wavelengths[0]))
                                    .orElse(0.0)))
                    .max()
                    .orElse(0);
            amounts(
                    "strehl-by-field",
                    "1",
                    4 * Math.PI / wavelengths[0] * wave + strehl + 1e-15,
                    first,
                    v -> flat(v.judged()).strehl(wavelengths[0]));
        }
        if (first.stream()
                .allMatch(v -> v.foci().isPresent() && v.bundle().chief().isPresent())) {
            double error = focusLineError(first.get(0));
            foci("tangential-focus-by-field", error, first, true);
            foci("sagittal-focus-by-field", error, first, false);
        }
        amounts("vignetting-by-field", "1", 1e-15, first, v -> v.bundle().lostShare());
    }

    private void foci(String name, double error, List<View> first, boolean tangential) {
        double[] values = first.stream().mapToDouble(v -> focus(v, tangential)).toArray();
        if (Arrays.stream(values).allMatch(f -> Math.abs(f) < scale / Gaussian.MARGIN)) {
            double far = Arrays.stream(values).map(Math::abs).max().orElse(0) / scale;
            quantities.put(name, new Quantity.Amounts(values, "m", error * (1 + far * far)));
        }
    }

    /** A focal line's distance from the last vertex, along the light; infinite where there is none. */
    private double focus(View v, boolean tangential) {
        double from = v.bundle().chief().orElseThrow().position().z();
        Foci foci = v.foci().orElseThrow();
        return along * (from - last.z() + (tangential ? foci.tangential() : foci.sagittal()));
    }

    private static Wavefront flat(Judged j) {
        return j.flat().orElseThrow();
    }

    private void amounts(String name, String unit, double error, List<View> of, ToDoubleFunction<View> value) {
        quantities.put(name, new Quantity.Amounts(of.stream().mapToDouble(value).toArray(), unit, error));
    }

    private void put(String name, double value, String unit, double error) {
        if (Double.isFinite(value)) {
            quantities.put(name, new Quantity.Amount(value == 0 ? 0 : value, unit, Double.isFinite(error) ? error : 0));
        }
    }

    /** What was found, by name. */
    Map<String, Quantity> quantities() {
        return quantities;
    }

    List<String> warnings() {
        return List.copyOf(warnings);
    }

    boolean accurate() {
        return accurate;
    }

    /** Each field at each wavelength that light comes from, the first wavelength first. */
    List<View> views() {
        return List.copyOf(views);
    }

    /** Whether the image lies at infinity, and there is no sensor. */
    boolean infinite() {
        return infinite;
    }

    /** z of the plane on which spots are judged, metres. */
    double plane() {
        return plane;
    }

    /** z of the last vertex, metres. */
    double lastVertex() {
        return last.z();
    }

    double along() {
        return along;
    }

    double radius() {
        return radius;
    }

    double[] wavelengths() {
        return wavelengths.clone();
    }

    /** The sentence on the image's quality, to follow another; empty where nothing was found. */
    String sentence() {
        if (views.isEmpty()) {
            return "";
        }
        Quantity.Amount spot = amount(infinite ? "angular-radius-rms" : "spot-radius-rms");
        String text = (infinite ? "rays spread by " : "spot radius ")
                + Display.of(
                        spot.value() <= spot.error() ? 0 : spot.value(),
                        spot.unit(),
                        Math.max(spot.error(), 1e-3 * spot.value()))
                + " rms";
        if (quantities.containsKey("strehl")) {
            Quantity.Amount rms = amount("wavefront-rms");
            Quantity.Amount strehl = amount("strehl");
            text += ", wavefront " + WaveFigures.waves(rms.value(), wavelengths[0]) + " rms, Strehl ratio "
                    + Display.of(strehl.value(), "1", Math.max(strehl.error(), 5e-4 * strehl.value()));
        }
        return text;
    }

    private Quantity.Amount amount(String name) {
        if (quantities.get(name) instanceof Quantity.Amount a) {
            return a;
        }
        return new Quantity.Amount(0, "1", 0);
    }

    /** Tables {@code fields}, {@code aberration} and {@code zernike}. */
    List<Table> tables() {
        List<List<String>> rows = new ArrayList<>();
        List<List<String>> fans = new ArrayList<>();
        for (View v : views) {
            double wavelength = wavelengths[v.colour()];
            String field = Double.toString(
                    v.field().atInfinity()
                            ? Math.atan(v.field().y())
                            : v.field().y());
            Judged j = v.judged();
            rows.add(List.of(
                    field,
                    Double.toString(wavelength),
                    cell(j.spot()),
                    cell(j.encircled()),
                    cell(infinite ? Double.NaN : fromLast(j.focus())),
                    cell(j.flat().map(Wavefront::rms).orElse(Double.NaN)),
                    cell(j.flat().map(Wavefront::peakToValley).orElse(Double.NaN)),
                    cell(j.flat().map(w -> w.strehl(wavelength)).orElse(Double.NaN)),
                    cell(v.foci().isPresent() && v.bundle().chief().isPresent() ? focus(v, true) : Double.NaN),
                    cell(v.foci().isPresent() && v.bundle().chief().isPresent() ? focus(v, false) : Double.NaN),
                    cell(
                            infinite
                                    ? Double.NaN
                                    : v.bundle()
                                            .chief()
                                            .map(c -> Judged.height(c, plane))
                                            .orElse(Double.NaN)),
                    cell(distortion(v).orElse(Double.NaN)),
                    cell(v.bundle().lostShare())));
            for (Fan f : List.of(fan(v, true), fan(v, false))) {
                for (int i = 0; i < f.at().length; i++) {
                    fans.add(List.of(
                            field,
                            Double.toString(wavelength),
                            f.upright() ? "y" : "x",
                            Double.toString(f.at()[i]),
                            cell(f.miss()[i])));
                }
            }
        }
        String field = fields.get(0).atInfinity() ? "field-angle [rad]" : "object-height [m]";
        String spot = infinite ? "angular-radius-rms [rad]" : "spot-radius-rms [m]";
        List<Table> tables = new ArrayList<>();
        tables.add(new Table(
                "fields",
                List.of(
                        field,
                        "wavelength [m]",
                        spot,
                        "encircled-radius [m]",
                        "best-focus [m]",
                        "wavefront-rms [m]",
                        "wavefront-peak-to-valley [m]",
                        "strehl",
                        "tangential-focus [m]",
                        "sagittal-focus [m]",
                        "image-height [m]",
                        "distortion",
                        "vignetting"),
                rows));
        tables.add(new Table(
                "aberration",
                List.of(
                        field,
                        "wavelength [m]",
                        "fan",
                        "pupil-place",
                        infinite ? "transverse-aberration [rad]" : "transverse-aberration [m]"),
                fans));
        zernikeTable(tables);
        return tables;
    }

    private void zernikeTable(List<Table> tables) {
        List<View> first = views.stream()
                .filter(v -> v.colour() == 0 && v.judged().fit().isPresent())
                .toList();
        if (first.isEmpty()) {
            return;
        }
        List<String> columns = new ArrayList<>(List.of("noll", "degree", "order", "name"));
        first.forEach(v -> columns.add("field " + v.field().label() + " [m]"));
        List<List<String>> rows = new ArrayList<>();
        for (int n = 1; n <= terms; n++) {
            Zernike.Mode mode = Zernike.mode(n);
            List<String> row = new ArrayList<>(List.of(
                    Integer.toString(n), Integer.toString(mode.degree()), Integer.toString(mode.order()), mode.name()));
            for (View v : first) {
                row.add(Double.toString(v.judged().fit().orElseThrow().coefficients()[n - 1]));
            }
            rows.add(row);
        }
        tables.add(new Table("zernike", columns, rows));
    }

    private static String cell(double value) {
        return Double.isFinite(value) ? Double.toString(value) : "";
    }

    /**
     * A line of rays across the pupil.
     *
     * @param upright whether it runs along y, else along x
     * @param at places over the pupil's radius
     * @param miss along the same axis on the plane, less the chief ray's, metres; of an image at infinity radians; NaN where no
     *     light comes through
     */
    record Fan(boolean upright, double[] at, double[] miss) {}

    /** The transverse aberration across the pupil. */
    Fan fan(View v, boolean upright) {
        double[] at = new double[FAN];
        double[] miss = new double[FAN];
        Optional<Traced> chief = v.bundle().chief();
        for (int i = 0; i < FAN; i++) {
            at[i] = 2.0 * i / (FAN - 1) - 1;
            double p = at[i];
            miss[i] = v.source()
                    .start(upright ? 0 : p, upright ? p : 0)
                    .map(s -> v.tracer().glance(s, accuracy))
                    .filter(t -> t.status() == Status.ARRIVED && chief.isPresent())
                    .map(t -> across(t, upright) - across(chief.get(), upright))
                    .orElse(Double.NaN);
        }
        return new Fan(upright, at, miss);
    }

    private double across(Traced t, boolean upright) {
        Vector q = t.position();
        Vector d = t.direction();
        double slope = (upright ? d.y() : d.x()) / d.z();
        return infinite ? slope : (upright ? q.y() : q.x()) + (plane - q.z()) * slope;
    }
}
