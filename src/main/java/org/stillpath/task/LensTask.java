package org.stillpath.task;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalDouble;
import org.stillpath.job.Section;
import org.stillpath.job.Value;
import org.stillpath.problem.Place;
import org.stillpath.ray.Train;
import org.stillpath.unit.Display;
import org.stillpath.unit.Kind;

/**
 * The task {@code lens}: Gaussian constants, conjugates and magnification of a train, from the exact ray-transfer about its
 * axis, which is z; with a pupil, what real rays say of spots, aberrations and wavefronts; with fibres, their coupling.
 */
final class LensTask implements Task {
    private static final List<String> CONSTRUCTED = List.of("rays", "construction");
    private static final List<String> JUDGED =
            List.of("spot", "wavefront", "aberration", "focus", "zernike", "chromatic");

    @Override
    public String name() {
        return "lens";
    }

    /**
     * The object of a job.
     *
     * @param distance before the first vertex, metres; infinite for a collimated beam
     * @param height of the highest point, metres
     * @param points its points, one or more
     */
    record Thing(double distance, double height, List<FieldPoint> points) {
        Thing {
            points = List.copyOf(points);
        }
    }

    /**
     * What a job asks for besides its train.
     *
     * @param object absent: a collimated beam along the axis, of which no image is told
     * @param pupil absent: nothing is said of real rays
     * @param sensor z of the plane on which spots are judged and at which a receiving fibre stands
     * @param fibres whose coupling is asked for
     * @param place of the train in the job
     */
    private record Asked(
            Optional<Thing> object,
            Optional<PupilSpec> pupil,
            OptionalDouble sensor,
            Optional<Fibres> fibres,
            Place place) {}

    @Override
    public Plan read(Section job, Scene scene) {
        Optional<Thing> object = job.find("object").flatMap(v -> object(v.section()));
        Optional<PupilSpec> pupil = job.find("pupil").map(PupilSpec::read);
        OptionalDouble sensor = job.find("sensor")
                .map(v -> {
                    Section s = v.section();
                    double z = s.need("at", "12 mm").quantity(Kind.LENGTH);
                    s.finish();
                    return Double.isNaN(z) ? OptionalDouble.empty() : OptionalDouble.of(z);
                })
                .orElse(OptionalDouble.empty());
        Optional<Fibres> fibres = job.find("fibres").flatMap(Fibres::read);
        if (scene.train().isEmpty() && scene.through().isPresent()) {
            job.fault("through", "a lens needs surfaces; give a \"train\" instead");
        }
        pupil.ifPresent(p -> checkPupil(job, scene, p, object));
        if (fibres.isPresent()
                && (object.isEmpty() || Double.isInfinite(object.get().distance()))) {
            job.fault("fibres", "a fibre sends light from an object; add \"object: {distance: 50 mm}\"");
        }
        boolean drawable = object.isPresent() && Double.isFinite(object.get().distance());
        List<String> usual = new ArrayList<>(drawable ? CONSTRUCTED : List.of("rays"));
        if (pupil.isPresent()) {
            usual.addAll(JUDGED.subList(0, 5));
        }
        if (scene.wavelengths().length > 1) {
            usual.add("chromatic");
        }
        List<String> known = new ArrayList<>(CONSTRUCTED);
        known.addAll(JUDGED);
        Figures figures = Figures.read(job, scene, known, usual);
        if (figures.names().contains("construction") && !drawable) {
            job.fault(
                    "figures",
                    "the construction of an image needs an object; add \"object: {distance: 50 mm, height: 1 mm}\"");
        }
        if (figures.names().contains("chromatic") && scene.wavelengths().length < 2) {
            job.fault(
                    "figures",
                    "the figure \"chromatic\" needs two wavelengths or more; write \"wavelength: [486 nm, 656 nm]\"");
        }
        if (pupil.isEmpty() && figures.names().stream().anyMatch(JUDGED.subList(0, 5)::contains)) {
            job.fault("figures", "spots and wavefronts need a pupil; add \"pupil: {radius: 0.4 mm}\"");
        }
        Place place = job.find("train").map(Value::place).orElse(job.place());
        Asked asked = new Asked(object, pupil, sensor, fibres, place);
        return options -> new Run(scene, asked).result(options.figures() ? figures.names() : List.of());
    }

    private static void checkPupil(Section job, Scene scene, PupilSpec pupil, Optional<Thing> object) {
        if (scene.train().isEmpty()) {
            return;
        }
        Train train = scene.trainAt(scene.wavelength());
        int stop = train.elements().isEmpty() ? -1 : PupilRays.stopOf(train);
        boolean bare = stop < 0
                || Double.isInfinite(train.elements().get(stop).surface().aperture());
        if (pupil.radius().isEmpty() && bare) {
            job.fault(
                    "pupil",
                    "a pupil needs a radius, unless the train has a stop with an aperture; add \"radius: 0.4 mm\"");
        }
        if (stop < 0 && object.isPresent() && object.get().distance() == 0) {
            job.fault(
                    "pupil",
                    "an object at the first vertex lights no pupil there; add a stop to the train, or move the object");
        }
    }

    private static Optional<Thing> object(Section s) {
        boolean infinity = s.find("infinity").map(Value::flag).orElse(false);
        if (infinity) {
            List<FieldPoint> points = new ArrayList<>();
            s.find("field-angles")
                    .ifPresent(v -> list(v).forEach(item -> {
                        double angle = item.quantity(Kind.ANGLE);
                        if (Math.abs(angle) >= Math.PI / 2) {
                            item.fault("a field angle of 90 deg or more does not enter the train");
                        } else if (!Double.isNaN(angle)) {
                            points.add(new FieldPoint(Double.POSITIVE_INFINITY, 0, Math.tan(angle)));
                        }
                    }));
            s.finish();
            return Optional.of(
                    new Thing(Double.POSITIVE_INFINITY, 0, points.isEmpty() ? List.of(FieldPoint.INFINITY) : points));
        }
        double distance = s.need("distance", "50 mm").nonNegative(Kind.LENGTH);
        List<FieldPoint> points = new ArrayList<>();
        double[] highest = new double[1];
        s.find("height")
                .ifPresent(v -> list(v).forEach(item -> {
                    double h = item.quantity(Kind.LENGTH);
                    if (!Double.isNaN(h)) {
                        points.add(new FieldPoint(distance, 0, h));
                        highest[0] = Math.abs(h) > Math.abs(highest[0]) ? h : highest[0];
                    }
                }));
        s.finish();
        if (Double.isNaN(distance)) {
            return Optional.empty();
        }
        return Optional.of(
                new Thing(distance, highest[0], points.isEmpty() ? List.of(new FieldPoint(distance, 0, 0)) : points));
    }

    private static List<Value> list(Value v) {
        return v.isList() ? v.items() : List.of(v);
    }

    /** One computation. */
    private static final class Run {
        private static final double ROUNDING = Axial.ROUNDING;
        private static final String TURNED =
                "the train turns its meridians into each other (crossed cylinders or tilts): figures are of the xz and yz "
                        + "sections alone";

        private final Scene scene;
        private final Asked asked;
        private final Train train;
        private final Map<String, Quantity> quantities = new LinkedHashMap<>();
        private final List<String> warnings;
        private boolean accurate = true;

        Run(Scene scene, Asked asked) {
            this.scene = scene;
            this.asked = asked;
            this.train = scene.trainAt(scene.wavelength());
            this.warnings = new ArrayList<>(scene.warnings());
        }

        Result result(List<String> figures) {
            Axial axial = axial(train);
            Gaussian g = axial.mean();
            double scale = axial.scale();
            boolean afocal = g.afocal(scale);
            String headline = constants(axial, afocal);
            if (asked.object().isPresent()) {
                headline = conjugates(axial, asked.object().get(), afocal).orElse(headline);
            }
            List<Train> trains = new ArrayList<>(List.of(train));
            List<Axial> axials = new ArrayList<>(List.of(axial));
            double[] wavelengths = scene.wavelengths();
            for (int i = 1; i < wavelengths.length; i++) {
                trains.add(scene.trainAt(wavelengths[i]));
                axials.add(axial(trains.get(i)));
            }
            chromatic(axials, afocal);
            quantities.putAll(Gradient.quantities(train));
            Optional<Imaging> imaging = asked.pupil().map(p -> imaging(p, trains, axials));
            String sentence = imaging.map(Imaging::sentence).orElse("");
            if (!sentence.isEmpty()) {
                headline += "; " + sentence;
            }
            headline += asked.fibres().flatMap(f -> coupling(f, axial)).orElse("");
            if (!train.from().uniform()
                    || !train.behind(train.elements().size() - 1).uniform()) {
                warnings.add(
                        "the medium before the first or behind the last surface is not uniform: distances outside the "
                                + "train are counted as if its index at the vertex went on");
            }
            List<Figure> drawn = new ArrayList<>();
            LensFigures pictures = new LensFigures(train, scene, g, axial.last(), scale, afocal, asked.object());
            if (figures.contains("rays")) {
                drawn.add(pictures.rays(headline));
            }
            if (figures.contains("construction")) {
                drawn.add(pictures.construction(headline));
            }
            imaging.filter(i -> !i.views().isEmpty())
                    .ifPresent(i -> drawn.addAll(new ImagingFigures(i)
                            .of(figures, scene.figures().isPresent() ? warnings : new ArrayList<>())));
            if (figures.contains("chromatic") && !afocal) {
                drawn.add(ChromaticFigure.of(scene, axials, asked.place()));
            }
            if (!accurate) {
                warnings.add(Words.notReached(scene.accuracy()));
            }
            return new Result(
                    "lens",
                    scene.title(),
                    headline,
                    quantities,
                    List.of(),
                    imaging.map(Imaging::tables).orElse(List.of()),
                    drawn,
                    warnings,
                    Words.LENS_CAUTIONS,
                    accurate);
        }

        /** The Gaussian constants; returns the sentence that says the chief of them. */
        private String constants(Axial axial, boolean afocal) {
            String sentence = "";
            Gaussian g = axial.mean();
            double e = axial.error();
            double scale = axial.scale();
            if (!afocal) {
                double power = g.power();
                double relative = e / (scale * Math.abs(power));
                put("power", power, "1/m", e / scale);
                sentence = "Effective focal length "
                        + said(put("effective-focal-length", 1 / power, "m", relative / Math.abs(power)));
                put("front-focal-length", g.before() / power, "m", g.before() * relative / Math.abs(power));
                put("rear-focal-length", g.behind() / power, "m", g.behind() * relative / Math.abs(power));
                double focalError = e / Math.abs(power);
                put("back-focal-distance", g.backFocalDistance(), "m", axial.backFocalError());
                put(
                        "front-focal-distance",
                        g.frontFocalDistance(),
                        "m",
                        g.before() * focalError + Math.abs(g.frontFocalDistance()) * relative);
                put(
                        "front-principal-plane",
                        g.frontPrincipalPlane(),
                        "m",
                        g.before() * focalError + Math.abs(g.frontPrincipalPlane()) * relative);
                put(
                        "rear-principal-plane",
                        g.rearPrincipalPlane(),
                        "m",
                        g.behind() * focalError + Math.abs(g.rearPrincipalPlane()) * relative);
                if (axial.astigmatic()) {
                    put("power-x", axial.x().power(), "1/m", e / scale);
                    put("power-y", axial.y().power(), "1/m", e / scale);
                    warnings.add("the train is astigmatic about its axis: all other figures are of the mean of its two "
                            + "meridians");
                }
            }
            quantities.put("afocal", new Quantity.Word(afocal ? "yes" : "no"));
            if (afocal) {
                double magnification = g.angularMagnification();
                double error = e * Math.max(1, g.before() / g.behind());
                sentence = "The train is afocal: angular magnification "
                        + said(put("angular-magnification", magnification, "1", error));
            }
            return sentence;
        }

        /** Image of the object; returns the sentence that answers the job, if there is a better one than the focal length. */
        private Optional<String> conjugates(Axial axial, Thing thing, boolean afocal) {
            Gaussian g = axial.mean();
            double scale = axial.scale();
            double e = axial.error();
            if (Double.isInfinite(thing.distance())) {
                if (afocal) {
                    quantities.put("image-kind", new Quantity.Word("at-infinity"));
                    return Optional.empty();
                }
                double back = g.backFocalDistance();
                put("image-distance", back, "m", axial.backFocalError());
                quantities.put("image-kind", new Quantity.Word(kind(back, scale)));
                return Optional.empty();
            }
            double s = thing.distance() / g.before();
            if (g.imagesToInfinity(thing.distance(), scale)) {
                quantities.put("image-kind", new Quantity.Word("at-infinity"));
                return Optional.of("The object stands in the front focal plane: its image is at infinity");
            }
            double below = Math.abs(g.c() * s + g.d());
            double above = Math.abs(g.a() * s + g.b());
            double reach = s + scale;
            double image = g.imageDistance(thing.distance());
            double magnification = g.magnification(thing.distance());
            double slope = e * (reach / scale) / below;
            Quantity.Amount at = put(
                    "image-distance",
                    image,
                    "m",
                    g.behind() * e * reach / below + g.behind() * above / below * slope + ROUNDING * Math.abs(image));
            Quantity.Amount ratio =
                    put("magnification", magnification, "1", Math.abs(magnification) * slope + ROUNDING);
            String kind = kind(image, scale);
            String orientation = magnification > 0 ? "erect" : "inverted";
            quantities.put("image-kind", new Quantity.Word(kind));
            quantities.put("image-orientation", new Quantity.Word(orientation));
            boolean real = kind.equals("real");
            String distance = Display.brief(Math.abs(image), "m", at.error()).toString();
            return Optional.of((real ? "Real, " : "Virtual, ") + orientation + " image " + distance
                    + (real ? " behind" : " before") + " the last vertex, magnification " + said(ratio));
        }

        private static String kind(double distance, double scale) {
            return distance >= -Gaussian.MARGIN * scale ? "real" : "virtual";
        }

        /** Back focal distance at each wavelength less that at the first. */
        private void chromatic(List<Axial> axials, boolean afocal) {
            if (axials.size() < 2 || afocal) {
                return;
            }
            double first = axials.get(0).mean().backFocalDistance();
            double error = 0;
            double[] shifts = new double[axials.size()];
            for (int i = 1; i < shifts.length; i++) {
                Axial other = axials.get(i);
                double c = Math.abs(other.mean().c());
                shifts[i] = other.mean().backFocalDistance() - first;
                error = Math.max(
                        error,
                        2
                                * other.error()
                                * (1 / c
                                        + Math.abs(other.mean().a())
                                                / (c * c * axials.get(0).scale())));
            }
            quantities.put("chromatic-focal-shift", new Quantity.Amounts(shifts, "m", error));
        }

        private Imaging imaging(PupilSpec pupil, List<Train> trains, List<Axial> axials) {
            List<FieldPoint> fields = asked.object().map(Thing::points).orElse(List.of(FieldPoint.INFINITY));
            Imaging imaging =
                    new Imaging(pupil, asked.sensor(), fields, scene.wavelengths(), trains, axials, scene.accuracy());
            imaging.run();
            quantities.putAll(imaging.quantities());
            warnings.addAll(imaging.warnings());
            accurate &= imaging.accurate();
            return imaging;
        }

        /** Coupling of two fibres; the words for the end of the headline. */
        private Optional<String> coupling(Fibres fibres, Axial axial) {
            Thing thing = asked.object().orElseThrow();
            Gaussian g = axial.mean();
            double along = axial.ray().direction().z() < 0 ? -1 : 1;
            double behind;
            if (asked.sensor().isPresent()) {
                behind = along * (asked.sensor().getAsDouble() - axial.last().z());
            } else if (g.imagesToInfinity(thing.distance(), axial.scale())) {
                warnings.add("the source fibre's image is at infinity: say where the receiver stands with \"sensor\"");
                return Optional.empty();
            } else {
                behind = g.imageDistance(thing.distance());
            }
            if (behind < 0) {
                warnings.add("the source fibre's image is virtual: say where the receiver stands with \"sensor\"");
                return Optional.empty();
            }
            double[][] m =
                    Fibres.between(thing.distance() / g.before(), axial.ray().transfer(), behind / g.behind());
            double height = thing.points().get(0).y();
            double efficiency = fibres.efficiency(scene.wavelength(), m, height, g.behind());
            double error = fibres.error(scene.wavelength(), axial, thing.distance() / g.before(), behind / g.behind());
            double[] radii = fibres.arriving(scene.wavelength(), m, height).radii();
            quantities.put("arriving-mode-radius", new Quantity.Amounts(radii, "m", radii[0] * error));
            put("coupling-efficiency", efficiency, "1", efficiency * error);
            String said = "; coupling " + Display.in(efficiency, "%", Math.max(error, 1e-4) * efficiency);
            if (efficiency > 0) {
                double loss = -10 * Math.log10(efficiency);
                put("coupling-loss", loss, "dB", 10 / Math.log(10) * error);
                said += ", a loss of " + Display.of(loss, "dB", Math.max(1e-3, 4.4 * error));
            }
            warnings.add(
                    "coupling is of Gaussian modes through the ray-transfer matrix: reflections at faces, edges and "
                            + "aberrations are not in it");
            return Optional.of(said);
        }

        /** What the axis of a train tells; warns where that is not all. */
        private Axial axial(Train of) {
            Axial axial = Axial.of(of, scene.accuracy(), asked.place());
            if (axial.turned() && !warnings.contains(TURNED)) {
                warnings.add(TURNED);
            }
            accurate &= axial.accurate();
            return axial;
        }

        private Quantity.Amount put(String name, double value, String unit, double error) {
            // an exact zero with a sign is no finding
            Quantity.Amount amount = new Quantity.Amount(value == 0 ? 0 : value, unit, error);
            quantities.put(name, amount);
            return amount;
        }

        private static String said(Quantity.Amount q) {
            return Display.brief(q.value(), q.unit(), q.error()).toString();
        }
    }
}
