package org.stillpath.task;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.stillpath.geometry.Vector;
import org.stillpath.job.Section;
import org.stillpath.job.Value;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.ray.Action;
import org.stillpath.ray.Element;
import org.stillpath.ray.Ending;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.ray.Train;
import org.stillpath.unit.Display;
import org.stillpath.unit.Kind;

/**
 * The task {@code lens}: Gaussian constants, conjugates and magnification of a train, from the exact ray-transfer about its
 * axis, which is z.
 */
final class LensTask implements Task {
    private static final List<String> LATER = List.of("pupil", "sensor", "fibres");

    @Override
    public String name() {
        return "lens";
    }

    /**
     * The object of a job.
     *
     * @param distance before the first vertex, metres; infinite for a collimated beam
     * @param height metres
     */
    record Thing(double distance, double height) {}

    @Override
    public Plan read(Section job, Scene scene) {
        Optional<Thing> object = job.find("object").flatMap(v -> object(v.section()));
        List<String> later = new ArrayList<>();
        for (String key : LATER) {
            if (job.has(key)) {
                later.add(key);
            }
        }
        if (scene.train().isEmpty() && scene.through().isPresent()) {
            job.fault("through", "a lens needs surfaces; give a \"train\" instead");
        }
        boolean drawable = object.isPresent() && Double.isFinite(object.get().distance());
        Figures figures = Figures.read(
                job,
                scene,
                List.of("rays", "construction"),
                drawable ? List.of("rays", "construction") : List.of("rays"));
        if (figures.names().contains("construction") && !drawable) {
            job.fault(
                    "figures",
                    "the construction of an image needs an object; add \"object: {distance: 50 mm, height: 1 mm}\"");
        }
        Place place = job.find("train").map(Value::place).orElse(job.place());
        return options -> new Run(scene, object, later, place).result(options.figures() ? figures.names() : List.of());
    }

    private static Optional<Thing> object(Section s) {
        boolean infinity = s.find("infinity").map(Value::flag).orElse(false);
        if (infinity) {
            Optional<Value> angles = s.find("field-angles");
            angles.ifPresent(v -> v.items().forEach(a -> a.quantity(Kind.ANGLE)));
            s.finish();
            return Optional.of(new Thing(Double.POSITIVE_INFINITY, 0));
        }
        double distance = s.need("distance", "50 mm").nonNegative(Kind.LENGTH);
        double height = s.find("height").map(v -> v.quantity(Kind.LENGTH)).orElse(0.0);
        s.finish();
        return Double.isNaN(distance + height) ? Optional.empty() : Optional.of(new Thing(distance, height));
    }

    /** One computation. */
    private static final class Run {
        private static final double ROUNDING = 4e-16;
        /** Tolerance of the pass that the ray-transfer is compared with, over the accuracy: ten times that of the ray's own. */
        private static final double ROUGHER = 0.1;

        private final Scene scene;
        private final Optional<Thing> object;
        private final Train train;
        private final Place place;
        private final Map<String, Quantity> quantities = new LinkedHashMap<>();
        private final List<String> warnings;
        private boolean accurate;

        Run(Scene scene, Optional<Thing> object, List<String> later, Place place) {
            this.scene = scene;
            this.object = object;
            this.place = place;
            this.train = scene.trainAt(scene.wavelength());
            this.warnings = new ArrayList<>(scene.warnings());
            if (!later.isEmpty()) {
                warnings.add("not computed in this version, and left aside: " + String.join(", ", later)
                        + " (aberrations, spots and coupling)");
            }
        }

        Result result(List<String> figures) {
            Axial axial = axial(train);
            Gaussian g = axial.mean();
            double scale = axial.scale();
            boolean afocal = g.afocal(scale);
            String headline = constants(axial, afocal);
            if (object.isPresent()) {
                headline = conjugates(axial, object.get(), afocal).orElse(headline);
            }
            chromatic(axial, afocal);
            if (!train.from().uniform()
                    || !train.behind(train.elements().size() - 1).uniform()) {
                warnings.add(
                        "the medium before the first or behind the last surface is not uniform: distances outside the "
                                + "train are counted as if its index at the vertex went on");
            }
            List<Figure> drawn = new ArrayList<>();
            LensFigures pictures = new LensFigures(train, scene, g, axial.last(), scale, afocal, object);
            if (figures.contains("rays")) {
                drawn.add(pictures.rays(headline));
            }
            if (figures.contains("construction")) {
                drawn.add(pictures.construction(headline));
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
                    List.of(),
                    drawn,
                    warnings,
                    Words.CAUTIONS,
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
                put("back-focal-distance", g.backFocalDistance(), "m", backFocalError(axial));
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

        private static double backFocalError(Axial axial) {
            Gaussian g = axial.mean();
            double power = Math.abs(g.power());
            return axial.error() / power * (g.behind() + Math.abs(g.backFocalDistance()) / axial.scale());
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
                put("image-distance", back, "m", backFocalError(axial));
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
        private void chromatic(Axial axial, boolean afocal) {
            double[] wavelengths = scene.wavelengths();
            if (wavelengths.length < 2 || afocal) {
                return;
            }
            double first = axial.mean().backFocalDistance();
            double error = 0;
            double[] shifts = new double[wavelengths.length];
            for (int i = 1; i < wavelengths.length; i++) {
                Axial other = axial(scene.trainAt(wavelengths[i]));
                double c = Math.abs(other.mean().c());
                shifts[i] = other.mean().backFocalDistance() - first;
                error = Math.max(
                        error,
                        2 * other.error() * (1 / c + Math.abs(other.mean().a()) / (c * c * axial.scale())));
            }
            quantities.put("chromatic-focal-shift", new Quantity.Amounts(shifts, "m", error));
        }

        /** Both meridians of a train about its axis, and how far they can be trusted. */
        private Axial axial(Train of) {
            double asked = scene.accuracy();
            Tracer tracer = new Tracer(of, new Ending.BehindLastSurface(), new Tracer.Settings(asked, true, false));
            Vector first = of.elements().get(0).surface().vertex();
            RayStart start = RayStart.of(new Vector(0, 0, first.z()), Vector.Z);
            Traced fine = through(tracer.trace(start));
            // one pass is enough to compare with: its steps are others than those of the fine ray
            Traced rough = through(tracer.glance(start, ROUGHER * asked));
            double[][] m = fine.transfer();
            double[][] r = rough.transfer();
            double before = norm(fine.start());
            double behind = norm(fine.state());
            Gaussian x = meridian(m, 0, before, behind);
            Gaussian y = meridian(m, 1, before, behind);
            double scale = scale(of, fine);
            double error = Math.max(
                            x.difference(meridian(r, 0, before, behind), scale),
                            y.difference(meridian(r, 1, before, behind), scale))
                    + ROUNDING * (4 + of.elements().size()) * (1 + Math.abs(x.a()) + Math.abs(x.d()));
            double skew = Math.max(Math.abs(m[0][1]), Math.abs(m[2][1]) * scale)
                    + Math.max(Math.abs(m[0][3]) / scale, Math.abs(m[2][3]));
            boolean astigmatic = x.difference(y, scale) > 1e-9;
            if (skew > 1e-9) {
                warnings.add(
                        "the train turns its meridians into each other (crossed cylinders or tilts): figures are of the "
                                + "xz and yz sections alone");
            }
            accurate = fine.accurate() && error <= Math.max(100 * asked, 1e-11);
            return new Axial(x, y, Gaussian.mean(x, y), astigmatic, error, scale, fine.position());
        }

        private static double norm(double[] y) {
            return Math.sqrt(y[3] * y[3] + y[4] * y[4] + y[5] * y[5]);
        }

        private static Gaussian meridian(double[][] m, int i, double before, double behind) {
            return new Gaussian(m[i][i], m[i][i + 2], m[i + 2][i], m[i + 2][i + 2], before, behind);
        }

        private Traced through(Traced t) {
            if (t.status() != Status.ARRIVED) {
                throw new ProblemException(Problem.input(
                        place,
                        "train",
                        "light along the axis does not come through, so the train has no Gaussian constants: "
                                + t.status().word() + ", " + t.note()));
            }
            return t;
        }

        /** Length that "far" is judged against: the train's own, or where it has none, of its curvatures or focal lengths. */
        private static double scale(Train of, Traced axial) {
            double track = axial.length();
            if (track > 0) {
                return track;
            }
            double least = Double.POSITIVE_INFINITY;
            for (Element e : of.elements()) {
                double c = e.surface().form().curvature();
                least = Math.min(least, c > 0 ? 1 / c : Double.POSITIVE_INFINITY);
                if (e.action() instanceof Action.ThinLens lens) {
                    least = Math.min(least, Math.abs(lens.focalLength()));
                }
            }
            return Double.isFinite(least) ? least : 1;
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

    /** What the axial ray tells. */
    private record Axial(
            Gaussian x, Gaussian y, Gaussian mean, boolean astigmatic, double error, double scale, Vector last) {}
}
