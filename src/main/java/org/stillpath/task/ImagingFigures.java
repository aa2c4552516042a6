package org.stillpath.task;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import java.util.stream.IntStream;
import org.stillpath.unit.Display;
import org.stillpath.wave.Wavefront;
import org.stillpath.wave.ZernikeFit;

/** Figures of what real rays over the pupil say: each answers one question about the image. */
final class ImagingFigures {
    private static final int MOST_PANELS = 3;
    private static final int MOST_COLOURS = 3;
    private static final int MOST_SPOTS = 6;
    private static final int PLANES = 81;
    /** Terms that a map is drawn from, and those that bars show. */
    private static final int BARS = 15;
    /** First zero of the Bessel function J₁ over 2π: the first dark ring of a round pupil (Airy 1835). */
    private static final double DARK_RING = 0.6098350;

    private final Imaging imaging;
    private final List<Imaging.View> views;
    private final double[] wavelengths;

    ImagingFigures(Imaging imaging) {
        this.imaging = imaging;
        this.views = imaging.views();
        this.wavelengths = imaging.wavelengths();
    }

    /** The figures that are asked for and can be drawn; says of the others why not. */
    List<Figure> of(List<String> names, List<String> warnings) {
        List<Figure> drawn = new ArrayList<>();
        boolean infinite = imaging.infinite();
        Imaging.View first = views.get(0);
        for (String name : names) {
            switch (name) {
                case "spot" -> drawn.add(spot());
                case "aberration" -> drawn.add(aberration());
                case "focus" -> {
                    if (infinite) {
                        warnings.add("the image is at infinity: there is no figure \"focus\"");
                    } else {
                        drawn.add(focus());
                    }
                }
                case "wavefront" -> first.judged().flat().ifPresent(w -> drawn.add(wavefront(first, w)));
                case "zernike" -> first.judged().flat().ifPresent(w -> drawn.add(zernike(first, w)));
                default -> {}
            }
        }
        return drawn;
    }

    private List<FieldPoint> fields() {
        return views.stream().map(Imaging.View::field).distinct().toList();
    }

    /** Views of one field, the first wavelength first. */
    private List<Imaging.View> of(FieldPoint field) {
        return views.stream().filter(v -> v.field().equals(field)).toList();
    }

    private SpotFigure spot() {
        boolean infinite = imaging.infinite();
        List<SpotFigure.Spot> spots = new ArrayList<>();
        for (FieldPoint f : spread(fields(), MOST_SPOTS)) {
            List<Imaging.View> all = of(f);
            double[] centre = middle(all.get(0));
            List<SpotFigure.Colour> colours = new ArrayList<>();
            for (Imaging.View v : all) {
                double[][] p = infinite ? v.bundle().slopes() : v.bundle().at(imaging.plane());
                int[] inside = IntStream.range(0, v.bundle().size())
                        .filter(i -> v.bundle().weight(i) > 0)
                        .toArray();
                double[] x = Arrays.stream(inside)
                        .mapToDouble(i -> p[0][i] - centre[0])
                        .toArray();
                double[] y = Arrays.stream(inside)
                        .mapToDouble(i -> p[1][i] - centre[1])
                        .toArray();
                colours.add(new SpotFigure.Colour(
                        wavelengths.length > 1 ? Imaging.nanometres(wavelengths[v.colour()]) : "", new Points(x, y)));
            }
            List<SpotFigure.Circle> circles = new ArrayList<>();
            if (!infinite) {
                circles.add(new SpotFigure.Circle(
                        "80 % of the rays", all.get(0).judged().encircled()));
            }
            double sine = all.get(0).bundle().edgeSine();
            if (!infinite && sine > 0) {
                circles.add(
                        new SpotFigure.Circle("first dark ring of a perfect lens", DARK_RING * wavelengths[0] / sine));
            }
            double size = all.get(0).judged().spot();
            spots.add(new SpotFigure.Spot(
                    f.label(), "rms radius " + rounded(size, infinite ? "rad" : "m"), colours, circles));
        }
        double size = views.get(0).judged().spot();
        String answer = infinite
                ? "Rays leave within " + rounded(size, "rad") + " rms of one direction"
                : "The spot" + fieldWords(views.get(0)) + " has an rms radius of " + rounded(size, "m") + ", "
                        + planeWords();
        return new SpotFigure("spot", "How sharp is the image of a point?", answer, infinite, spots);
    }

    private double[] middle(Imaging.View v) {
        return imaging.infinite() ? v.bundle().meanSlope() : v.bundle().centroid(imaging.plane());
    }

    private String planeWords() {
        double at = imaging.along() * (imaging.plane() - imaging.lastVertex());
        return rounded(Math.abs(at), "m") + (at < 0 ? " before" : " behind") + " the last vertex";
    }

    private static String fieldWords(Imaging.View v) {
        return v.field().onAxis() ? "" : " for " + v.field().label();
    }

    private static String rounded(double value, String unit) {
        return Display.of(value, unit, 5e-4 * Math.abs(value)).toString();
    }

    /** So many of a list, its first and last among them. */
    private static <T> List<T> spread(List<T> all, int most) {
        if (all.size() <= most) {
            return all;
        }
        List<T> some = new ArrayList<>();
        for (int i = 0; i < most; i++) {
            some.add(all.get(i * (all.size() - 1) / (most - 1)));
        }
        return some;
    }

    private PanelFigure aberration() {
        boolean infinite = imaging.infinite();
        List<FieldPoint> fields = spread(fields(), MOST_PANELS);
        boolean colours = wavelengths.length > 1;
        List<List<PanelFigure.Curve>> curves = new ArrayList<>();
        double most = 0;
        PanelFigure.Style[] styles = {PanelFigure.Style.PLAIN, PanelFigure.Style.SECOND, PanelFigure.Style.THIRD};
        double r = imaging.radius();
        for (FieldPoint f : fields) {
            List<PanelFigure.Curve> list = new ArrayList<>();
            if (colours) {
                List<Imaging.View> some = spread(of(f), MOST_COLOURS);
                for (int i = 0; i < some.size(); i++) {
                    list.add(curve(
                            styles[i],
                            Imaging.nanometres(wavelengths[some.get(i).colour()]),
                            imaging.fan(some.get(i), true),
                            r));
                }
            } else {
                list.add(curve(styles[0], "fan along y", imaging.fan(of(f).get(0), true), r));
                list.add(curve(styles[1], "fan along x", imaging.fan(of(f).get(0), false), r));
            }
            for (PanelFigure.Curve c : list) {
                for (double v : c.y()) {
                    most = Double.isFinite(v) ? Math.max(most, Math.abs(v)) : most;
                }
            }
            curves.add(list);
        }
        double limit = most > 0 ? 1.08 * most : 1e-9;
        PanelFigure.Axis across =
                new PanelFigure.Axis("place in the pupil", PanelFigure.Measure.LENGTH, -1.05 * r, 1.05 * r);
        List<PanelFigure.Panel> panels = new ArrayList<>();
        for (int i = 0; i < fields.size(); i++) {
            panels.add(new PanelFigure.Panel(
                    fields.get(i).label(),
                    across,
                    List.of(),
                    curves.get(i),
                    List.of(new PanelFigure.Level("", 0)),
                    List.of()));
        }
        String unit = infinite ? "rad" : "m";
        String answer =
                "Rays miss the chief ray by up to " + rounded(most, unit) + (infinite ? "" : ", " + planeWords());
        return new PanelFigure(
                "aberration",
                colours ? "Which rays go astray, by field and colour? (fan along y)" : "Which rays go astray?",
                answer,
                new PanelFigure.Axis(
                        "miss beside the chief ray",
                        infinite ? PanelFigure.Measure.ANGLE : PanelFigure.Measure.LENGTH,
                        -limit,
                        limit),
                panels,
                false);
    }

    private static PanelFigure.Curve curve(PanelFigure.Style style, String label, Imaging.Fan fan, double radius) {
        double[] x = Arrays.stream(fan.at()).map(p -> p * radius).toArray();
        return new PanelFigure.Curve(style, label, x, fan.miss());
    }

    /** The spot's size on planes about the focus. */
    private ChartFigure focus() {
        Imaging.View v = views.get(0);
        double best = v.judged().focus();
        double spread = v.bundle().spread();
        double depth = Math.max(4 * v.bundle().rms(best) / spread, 2 * wavelengths[0] / (spread * spread));
        depth = Math.max(depth, 1.3 * Math.abs(imaging.plane() - best));
        double[] marks = foci(v);
        for (double m : marks) {
            double off = Math.abs(m - imaging.along() * (best - imaging.lastVertex()));
            depth = off < 6 * depth ? Math.max(depth, 1.2 * off) : depth;
        }
        double[] x = new double[PLANES];
        double[] rms = new double[PLANES];
        double[] share = new double[PLANES];
        for (int i = 0; i < PLANES; i++) {
            double z = best + depth * (2.0 * i / (PLANES - 1) - 1);
            x[i] = imaging.along() * (z - imaging.lastVertex());
            rms[i] = v.bundle().rms(z);
            share[i] = v.bundle().encircled(z, Judged.SHARE);
        }
        double from = imaging.along() * (best - imaging.lastVertex());
        List<ChartFigure.Series> series = new ArrayList<>();
        String[] names = {"tangential focus", "sagittal focus"};
        boolean apart = marks.length == 2 && Math.abs(marks[0] - marks[1]) > 0.02 * depth;
        if (apart) {
            for (int i = 0; i < 2; i++) {
                mark(series, names[i], marks[i], from, depth);
            }
        } else if (marks.length > 0) {
            mark(series, v.field().onAxis() ? "paraxial focus" : "focus about the chief ray", marks[0], from, depth);
        }
        double plane = imaging.along() * (imaging.plane() - imaging.lastVertex());
        if (Math.abs(plane - from) > 1e-6 * depth) {
            mark(series, "sensor", plane, from, depth);
        }
        series.add(new ChartFigure.Series(ChartFigure.Style.CURVE, "rms radius", x, rms));
        series.add(new ChartFigure.Series(ChartFigure.Style.MODEL, "80 % of the rays", x, share));
        return new ChartFigure(
                "focus",
                "Where is the image sharpest?",
                "Sharpest " + Display.of(Math.abs(from), "m", 0.01 * depth)
                        + (from < 0 ? " before" : " behind") + " the last vertex: rms radius "
                        + rounded(v.bundle().rms(best), "m"),
                new ChartFigure.Axis("distance from the last vertex", "m", ""),
                new ChartFigure.Axis("radius of the spot" + fieldWords(v), "m", ""),
                series);
    }

    private static void mark(List<ChartFigure.Series> series, String label, double at, double from, double depth) {
        if (Math.abs(at - from) <= depth) {
            series.add(new ChartFigure.Series(ChartFigure.Style.MARKS, label, new double[] {at}, new double[1]));
        }
    }

    /** Tangential and sagittal focus from the last vertex, along the light. */
    private double[] foci(Imaging.View v) {
        if (v.foci().isEmpty() || v.bundle().chief().isEmpty()) {
            return new double[0];
        }
        double zero = v.bundle().chief().get().position().z() - imaging.lastVertex();
        return new double[] {
            imaging.along() * (zero + v.foci().get().tangential()),
            imaging.along() * (zero + v.foci().get().sagittal())
        };
    }

    private Figure wavefront(Imaging.View v, Wavefront flat) {
        Optional<ZernikeFit> fit = v.judged().fit();
        int terms = fit.map(f -> f.coefficients().length).orElse(1);
        double wavelength = wavelengths[v.colour()];
        String answer = "The wave" + fieldWords(v) + " is " + WaveFigures.waves(flat.rms(), wavelength) + " rms and "
                + WaveFigures.waves(flat.peakToValley(), wavelength) + " from peak to valley: Strehl ratio "
                + Display.of(flat.strehl(wavelength), "1", 5e-4);
        return WaveFigures.map(
                answer, flat, ZernikeFit.of(flat, terms), v.bundle().lost(), imaging.radius(), wavelength);
    }

    private Figure zernike(Imaging.View v, Wavefront flat) {
        ZernikeFit fit = ZernikeFit.of(
                flat,
                Math.min(
                        BARS, v.judged().fit().map(f -> f.coefficients().length).orElse(BARS)));
        return WaveFigures.zernike(fieldWords(v), fit, wavelengths[v.colour()]);
    }
}
