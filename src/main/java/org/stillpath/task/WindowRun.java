package org.stillpath.task;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import org.stillpath.geometry.Vector;
import org.stillpath.ray.Plate;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Train;
import org.stillpath.ray.TrainPlan;
import org.stillpath.unit.Display;
import org.stillpath.wave.Pupil;
import org.stillpath.wave.Wavefront;
import org.stillpath.wave.Zernike;
import org.stillpath.wave.ZernikeFit;

/**
 * One computation of the task {@code window}.
 *
 * <p>Path differences are taken ray by ray, by place in the entrance pupil: the optical length to the plane across the mean
 * direction of the beam, less the same of the reference, less the mean weighted by irradiance. Both planes pass where the
 * reference beam meets the plane of the last vertex. Zernike's terms weigh the pupil evenly, all else by irradiance.
 */
final class WindowRun {
    /** Degree of Zernike's polynomials, where the sampling carries it: 28 terms. */
    private static final int DEGREE = 6;

    /** Stress counts where the temperature spans more than this, K. Common practice, no source. */
    private static final double STRESSING = 1;
    /** Heating breaks windows where the temperature spans more than this, K. Common practice, no source. */
    private static final double BREAKING = 5;
    /** What is warmer burns, kelvin: 48 degC for metal at ten minutes of contact (ISO 13732-1, from memory). */
    private static final double BURNING = 273.15 + 48;

    /** A sampling is coarse where it changes the rms by this part of it, and of a wave. */
    private static final double COARSE = 0.01;

    private static final double EPSILON = 0x1p-53;

    private final Scene scene;
    private final WindowBeam beam;
    private final Optional<Double> reference;
    private final List<String> figures;
    private final Pupil sampling;
    private final TrainPlan plan;
    private final Map<String, Quantity> quantities = new LinkedHashMap<>();
    private final List<String> warnings;

    WindowRun(Scene scene, WindowBeam beam, Pupil sampling, Optional<Double> reference, List<String> figures) {
        this.scene = scene;
        this.beam = beam;
        this.sampling = sampling;
        this.reference = reference;
        this.figures = figures;
        this.plan = scene.train().orElseThrow();
        this.warnings = new ArrayList<>(scene.warnings());
    }

    /**
     * What one wavelength tells.
     *
     * @param points places in the pupil, the rim last
     * @param wave path differences weighted by irradiance, mean taken off, metres
     * @param even the same weighted by area
     * @param mean the mean that was taken off, metres
     * @param rays numbers of the rays that came through, in the order of the wave's samples
     * @param passed share of the beam's power that came through
     */
    private record Seen(
            double wavelength,
            List<Pupil.Point> points,
            WindowPass hot,
            WindowPass cold,
            Wavefront wave,
            Wavefront even,
            double mean,
            int[] rays,
            double passed,
            double deviationX,
            double deviationY,
            Vector displacement) {
        double pathError() {
            return hot.errors().opticalLength() + cold.errors().opticalLength();
        }

        double angleError() {
            return hot.errors().direction() + cold.errors().direction() + 4 * EPSILON;
        }

        double power(int section) {
            return hot.focalPower(section) - cold.focalPower(section);
        }

        double powerError() {
            return hot.transferError() + cold.transferError();
        }
    }

    Result result() {
        sense();
        Optional<Seen> first = seen(scene.wavelength(), sampling);
        if (first.isEmpty()) {
            quantities.put("passed-fraction", new Quantity.Amount(0, "1", 0));
            return result("No ray of the beam passes the train", List.of(), List.of(), true);
        }
        Seen s = first.get();
        Seen few = seen(scene.wavelength(), coarser()).orElse(s);
        double passed = s.passed();
        put("passed-fraction", passed, "1", Math.abs(passed - few.passed()) + 4 * EPSILON);
        ZernikeFit fit = ZernikeFit.of(s.even(), terms(sampling));
        String headline = chief(s, few);
        zernike(s, few, fit);
        List<Table> tables = new ArrayList<>();
        tables.add(map(s));
        tables.add(zernikes(fit));
        boolean accurate = s.hot().accurate() && s.cold().accurate();
        if (scene.wavelengths().length > 1) {
            accurate &= chromatic(s, tables);
        }
        if (passed < 1) {
            warnings.add(String.format(
                    Locale.ROOT,
                    "%.3g %% of the beam's power does not come through (%s); all figures are of what does",
                    100 * (1 - passed),
                    why(s)));
        }
        if (!accurate) {
            warnings.add(Words.notReached(scene.accuracy()));
        }
        List<Figure> drawn = new ArrayList<>();
        for (String f : figures) {
            switch (f) {
                case "temperature" ->
                    new WindowFigures(plan, scene, beam, footprint())
                            .temperature()
                            .ifPresent(drawn::add);
                case "wavefront" -> drawn.add(mapped(s));
                default -> drawn.add(WaveFigures.zernike("", fit, s.wavelength()));
            }
        }
        return result(headline, tables, drawn, accurate);
    }

    private Result result(String headline, List<Table> tables, List<Figure> drawn, boolean accurate) {
        return new Result(
                "window",
                scene.title(),
                headline,
                quantities,
                List.of(),
                tables,
                drawn,
                warnings,
                cautions(),
                accurate);
    }

    // ---- light

    private Optional<Seen> seen(double wavelength, Pupil pupil) {
        List<Pupil.Point> points = pupil.pointsWithRim();
        double accuracy = scene.accuracy();
        Train hotTrain = plan.at(wavelength);
        Train coldTrain = reference
                .map(t -> plan.atTemperature(t).at(wavelength))
                .orElseGet(() -> Train.through(hotTrain.from()));
        double back = coldTrain.elements().isEmpty() ? 0 : beam.clear(coldTrain, points);
        List<RayStart> starts = beam.starts(hotTrain, points, back);
        double[] weights = new double[points.size()];
        for (int i = 0; i < weights.length; i++) {
            Pupil.Point p = points.get(i);
            weights[i] = p.weight() * beam.irradiance(p.x(), p.y());
        }
        int last = hotTrain.elements().size() - 1;
        double plane = hotTrain.elements().get(last).surface().vertex().z();
        WindowPass hot = WindowPass.of(hotTrain, starts, weights, plane, accuracy);
        WindowPass cold = WindowPass.of(coldTrain, starts, weights, plane, accuracy);
        if (!hot.passes() || !cold.passes()) {
            return Optional.empty();
        }
        Vector through = cold.place();
        int[] rays = java.util.stream.IntStream.range(0, weights.length)
                .filter(i -> hot.arrived(i) && cold.arrived(i))
                .toArray();
        double[] x = new double[rays.length];
        double[] y = new double[rays.length];
        double[] irradiance = new double[rays.length];
        double[] area = new double[rays.length];
        double[] path = new double[rays.length];
        for (int k = 0; k < rays.length; k++) {
            Pupil.Point p = points.get(rays[k]);
            x[k] = p.x();
            y[k] = p.y();
            area[k] = p.weight();
            irradiance[k] = weights[rays[k]];
            path[k] = hot.path(rays[k], through) - cold.path(rays[k], through);
        }
        if (Arrays.stream(area).sum() == 0) {
            return Optional.empty();
        }
        double mean = new Wavefront(x, y, irradiance, path).mean();
        for (int k = 0; k < path.length; k++) {
            path[k] -= mean;
        }
        Vector d = hot.direction();
        Vector r = cold.direction();
        double all = Arrays.stream(weights).sum();
        double passed = Arrays.stream(irradiance).sum();
        return Optional.of(new Seen(
                wavelength,
                points,
                hot,
                cold,
                new Wavefront(x, y, irradiance, path),
                new Wavefront(x, y, area, path),
                mean,
                rays,
                rays.length == points.size() ? 1 : passed / all,
                Math.atan2(d.x(), d.z()) - Math.atan2(r.x(), r.z()),
                Math.atan2(d.y(), d.z()) - Math.atan2(r.y(), r.z()),
                hot.place().minus(through)));
    }

    private String why(Seen s) {
        Map<String, Integer> counts = new LinkedHashMap<>();
        String note = "";
        for (int i = 0; i < s.points().size(); i++) {
            if (!s.hot().arrived(i)) {
                counts.merge(s.hot().ray(i).status().word(), 1, Integer::sum);
                note = note.isEmpty() ? s.hot().ray(i).note() : note;
            }
        }
        List<String> words = new ArrayList<>();
        counts.forEach((word, n) -> words.add(n + " rays " + word));
        return String.join(", ", words) + (note.isEmpty() ? "" : ": " + note);
    }

    // ---- numbers

    private double pathErrorOf(Seen s) {
        double longest = Math.abs(s.hot().path(s.rays()[0], s.cold().place()));
        return s.pathError() + 4 * EPSILON * longest;
    }

    private String chief(Seen s, Seen few) {
        double angle = s.angleError();
        Quantity.Amount dx = put("deviation-x", s.deviationX(), "rad", angle + apart(s.deviationX(), few.deviationX()));
        Quantity.Amount dy = put("deviation-y", s.deviationY(), "rad", angle + apart(s.deviationY(), few.deviationY()));
        double place = s.hot().errors().position() + s.cold().errors().position();
        Vector moved = s.displacement();
        put(
                "displacement-x",
                moved.x(),
                "m",
                place + apart(moved.x(), few.displacement().x()));
        put(
                "displacement-y",
                moved.y(),
                "m",
                place + apart(moved.y(), few.displacement().y()));
        powers(s, few);
        double path = pathErrorOf(s);
        Wavefront flat = s.wave().withoutTilt();
        Wavefront fewFlat = few.wave().withoutTilt();
        double rms = flat.rms();
        put("wavefront-rms", rms, "m", path + apart(rms, fewFlat.rms()));
        double sampled = apart(rms, fewFlat.rms());
        if (sampled > COARSE * rms && sampled > COARSE * s.wavelength()) {
            warnings.add("the sampling of " + sampling.radial() + " rings and " + sampling.angular()
                    + " angles is coarse for this wavefront: a coarser one changes its rms by "
                    + Display.of(sampled, "m", 0.1 * sampled) + "; take more of both");
        }
        double refocused = s.wave().withoutTiltAndFocus().rms();
        put(
                "wavefront-rms-refocused",
                refocused,
                "m",
                path + apart(refocused, few.wave().withoutTiltAndFocus().rms()));
        double valley = flat.peakToValley();
        put("wavefront-peak-to-valley", valley, "m", 2 * path + apart(valley, fewFlat.peakToValley()));
        double wavelength = s.wavelength();
        double strehl = flat.strehl(wavelength);
        double phase = 2 * Math.PI / wavelength;
        put(
                "strehl",
                strehl,
                "1",
                2 * phase * phase * (rms + path) * path + 8 * EPSILON + apart(strehl, fewFlat.strehl(wavelength)));
        put("optical-path-difference", s.mean(), "m", path + apart(s.mean(), few.mean()));
        String beginning = s.passed() < 1 ? "What comes through has " : "The beam leaves with ";
        return beginning + waves(rms / wavelength) + " waves rms of wavefront error, Strehl ratio " + ratio(strehl)
                + ", deviated by " + said(dx) + " toward x and " + said(dy) + " toward y";
    }

    /** What the sampling may have changed: how far a coarser one is. */
    private static double apart(double value, double coarser) {
        return Math.abs(value - coarser);
    }

    private void powers(Seen s, Seen few) {
        double px = s.power(0);
        double py = s.power(1);
        double mean = 0.5 * (px + py);
        double e = s.powerError();
        if (!Double.isNaN(mean)) {
            put("focal-power", mean, "1/m", e);
            put("focal-power-x", px, "1/m", e);
            put("focal-power-y", py, "1/m", e);
        } else {
            warnings.add("the ray on the beam's axis does not come through, so that there is no focal power about it");
        }
        double fitted = fittedPower(s);
        double radius = beam.pupilRadius();
        put("focal-power-fit", fitted, "1/m", 8 * pathErrorOf(s) / (radius * radius) + apart(fitted, fittedPower(few)));
        if (Math.abs(mean) > 3 * e) {
            put("focal-length", 1 / mean, "m", e / (mean * mean));
        } else if (!Double.isNaN(mean)) {
            quantities.put("focal-length", new Quantity.Word("infinite"));
        }
    }

    private double fittedPower(Seen s) {
        double radius = beam.pupilRadius();
        return -2 * s.wave().sphere()[3] / (radius * radius);
    }

    private void zernike(Seen s, Seen few, ZernikeFit fit) {
        double[] c = fit.coefficients();
        double[] other = ZernikeFit.of(few.even(), terms(coarser())).coefficients();
        double error = pathErrorOf(s);
        for (int j = 0; j < c.length && j < other.length; j++) {
            error = Math.max(error, apart(c[j], other[j]));
        }
        if (other.length < c.length) {
            error = Math.max(error, fit.residual());
        }
        quantities.put("zernike", new Quantity.Amounts(c, "m", error));
    }

    /** A sampling that is coarser, to judge the other by: a little, or of many points a third of the rings and angles. */
    private Pupil coarser() {
        int radial = sampling.radial() <= 12 ? Math.max(1, sampling.radial() - 2) : Math.max(10, sampling.radial() / 3);
        int angular =
                sampling.angular() <= 24 ? Math.max(1, sampling.angular() - 4) : Math.max(20, sampling.angular() / 3);
        return new Pupil(radial, angular);
    }

    /** As many of Zernike's polynomials, whole degrees, as the sampling can tell apart. */
    private static int terms(Pupil sampling) {
        int degree = 0;
        while (degree < DEGREE && degree + 1 <= 2 * sampling.radial() - 1 && 2 * (degree + 1) < sampling.angular()) {
            degree++;
        }
        return (degree + 1) * (degree + 2) / 2;
    }

    /** What each wavelength gives, against the first. */
    private boolean chromatic(Seen first, List<Table> tables) {
        double[] wavelengths = scene.wavelengths();
        double[][] shift = new double[3][wavelengths.length];
        double[] errors = {2 * first.angleError(), 2 * first.angleError(), 2 * first.powerError()};
        boolean accurate = true;
        List<List<String>> rows = new ArrayList<>();
        for (int i = 0; i < wavelengths.length; i++) {
            Optional<Seen> seen = i == 0 ? Optional.of(first) : seen(wavelengths[i], sampling);
            if (seen.isEmpty()) {
                warnings.add("no light of " + Display.in(wavelengths[i], "nm", 0.01) + " comes through");
                return accurate;
            }
            Seen s = seen.get();
            accurate &= s.hot().accurate() && s.cold().accurate();
            shift[0][i] = s.deviationX() - first.deviationX();
            shift[1][i] = s.deviationY() - first.deviationY();
            double power = 0.5 * (s.power(0) + s.power(1));
            shift[2][i] = power - 0.5 * (first.power(0) + first.power(1));
            Wavefront flat = s.wave().withoutTilt();
            rows.add(List.of(
                    Double.toString(s.wavelength()),
                    Double.toString(s.deviationX()),
                    Double.toString(s.deviationY()),
                    Double.toString(power),
                    Double.toString(s.mean()),
                    Double.toString(flat.rms()),
                    Double.toString(flat.strehl(s.wavelength()))));
        }
        String[] names = {"chromatic-deviation-x", "chromatic-deviation-y", "chromatic-focal-power"};
        String[] units = {"rad", "rad", "1/m"};
        for (int q = 0; q < 3; q++) {
            if (Arrays.stream(shift[q]).allMatch(Double::isFinite)) {
                quantities.put(names[q], new Quantity.Amounts(shift[q], units[q], errors[q]));
            }
        }
        tables.add(new Table(
                "wavelengths",
                List.of(
                        "wavelength [m]",
                        "deviation-x [rad]",
                        "deviation-y [rad]",
                        "focal-power [1/m]",
                        "optical-path-difference [m]",
                        "wavefront-rms [m]",
                        "strehl"),
                rows));
        return accurate;
    }

    private Quantity.Amount put(String name, double value, String unit, double error) {
        Quantity.Amount amount = new Quantity.Amount(value, unit, error);
        quantities.put(name, amount);
        return amount;
    }

    private static String said(Quantity.Amount q) {
        return Display.of(q.value(), q.unit(), Math.max(q.error(), 1e-3 * Math.abs(q.value())))
                .toString();
    }

    private static String waves(double value) {
        return value < 1e-6 ? "less than 0.000001" : String.format(Locale.ROOT, "%.3g", value);
    }

    private static String ratio(double value) {
        return String.format(Locale.ROOT, value > 0.999 ? "%.6f" : "%.4f", value);
    }

    // ---- figures

    private Figure mapped(Seen s) {
        Wavefront flat = s.even().withoutTilt();
        List<Pupil.Point> lost = new ArrayList<>();
        int k = 0;
        for (int i = 0; i < s.points().size(); i++) {
            if (k < s.rays().length && s.rays()[k] == i) {
                k++;
            } else {
                lost.add(s.points().get(i));
            }
        }
        Wavefront weighted = s.wave().withoutTilt();
        String answer = "Wavefront error " + WaveFigures.waves(weighted.rms(), s.wavelength()) + " rms, "
                + WaveFigures.waves(weighted.peakToValley(), s.wavelength()) + " from peak to valley, tilt removed";
        return WaveFigures.map(
                "How far is the wave from a plane?",
                answer,
                flat,
                ZernikeFit.of(flat, terms(sampling)),
                lost,
                beam.pupilRadius(),
                s.wavelength());
    }

    // ---- tables

    private Table map(Seen s) {
        List<List<String>> rows = new ArrayList<>();
        int k = 0;
        for (int i = 0; i < s.points().size(); i++) {
            Pupil.Point p = s.points().get(i);
            boolean there = k < s.rays().length && s.rays()[k] == i;
            rows.add(List.of(
                    Double.toString(beam.pupilRadius() * p.x()),
                    Double.toString(beam.pupilRadius() * p.y()),
                    Double.toString(p.weight() * beam.irradiance(p.x(), p.y())),
                    there ? Double.toString(s.wave().path(k)) : "",
                    s.hot().ray(i).status().word()));
            k += there ? 1 : 0;
        }
        return new Table(
                "wavefront",
                List.of("pupil-x [m]", "pupil-y [m]", "weight", "optical-path-difference [m]", "status"),
                rows);
    }

    private static Table zernikes(ZernikeFit fit) {
        List<List<String>> rows = new ArrayList<>();
        double[] c = fit.coefficients();
        for (int j = 1; j <= c.length; j++) {
            Zernike.Mode mode = Zernike.mode(j);
            rows.add(List.of(
                    Integer.toString(j),
                    Integer.toString(mode.degree()),
                    Integer.toString(mode.order()),
                    mode.name(),
                    Double.toString(c[j - 1])));
        }
        return new Table("zernike", List.of("noll", "degree", "order", "name", "coefficient [m]"), rows);
    }

    // ---- sense and cautions

    private double footprint() {
        double reach = beam.pupilRadius() / Math.cos(beam.incidence());
        return Math.hypot(beam.centreX(), beam.centreY()) + reach;
    }

    private void sense() {
        if (beam.gaussian()) {
            warnings.add(
                    "the beam's diameter " + Display.of(2 * beam.radius(), "m", 0)
                            + " is taken at 1/e^2 of its irradiance; a full width at half maximum would be a beam 1.70 times as wide");
        }
        for (Plate p : plan.plates()) {
            if (p.medium().diameter() < 2 * footprint()) {
                warnings.add("the beam reaches " + Display.of(footprint(), "m", 1e-6)
                        + " from the axis, beyond the plate `" + p.medium().name() + "`, whose diameter is "
                        + Display.of(p.medium().diameter(), "m", 0));
            }
            double radius = p.radius() > 0 ? p.radius() : footprint();
            Plate.Span met = p.span(radius);
            p.medium().warningsBetween(met.coldest(), met.hottest()).stream()
                    .filter(w -> !warnings.contains(w))
                    .forEach(warnings::add);
        }
        if (!plan.at(scene.wavelength()).from().uniform()) {
            warnings.add("the medium before the first surface is not uniform: its own effect counts from just before "
                    + "the train; put it between two surfaces instead");
        }
    }

    private List<String> cautions() {
        List<String> list = new ArrayList<>();
        list.add("The result says where light goes, not whether it is safe to be there: laser classes and eyewear are "
                + "chosen by the standards that apply (IEC 60825-1; EN 207 or ANSI Z136.1), and every face reflects a "
                + "part of the beam: never look into it or a reflection of it.");
        double hottest = Double.NEGATIVE_INFINITY;
        double span = 0;
        boolean solid = false;
        for (Plate p : plan.plates()) {
            Plate.Span met = p.span(p.radius() > 0 ? p.radius() : footprint());
            if (!Double.isNaN(met.hottest())) {
                hottest = Math.max(hottest, met.hottest());
                span = Math.max(span, met.width());
                solid |= p.medium().material().elastic().expansion() != 0;
            }
        }
        if (solid && span > STRESSING) {
            list.add(String.format(
                    Locale.ROOT,
                    "Stress birefringence and the change of the index with stress are not computed; with a temperature "
                            + "span of %.3g K they may count.",
                    span));
        }
        if (solid && span > BREAKING) {
            list.add(
                    "Heated and cooled windows break, suddenly and under load: stress, cracks at the edge and pressure "
                            + "are for a qualified engineer to judge, with a margin.");
        }
        if (hottest > BURNING) {
            list.add("Parts at this temperature burn skin.");
        }
        return list;
    }
}
