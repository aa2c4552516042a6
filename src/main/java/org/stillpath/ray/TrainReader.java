package org.stillpath.ray;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.TreeMap;
import org.stillpath.geometry.Asphere;
import org.stillpath.geometry.Form;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Quadric;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.job.Section;
import org.stillpath.job.Value;
import org.stillpath.medium.Media;
import org.stillpath.medium.Medium;
import org.stillpath.unit.Dimension;
import org.stillpath.unit.Kind;

/** Reads the {@code train} section of a job. Faults are collected; what is returned then stands in for what was meant. */
public final class TrainReader {
    private static final int MOST_SURFACES = 10_000;
    private static final int HIGHEST_POWER = 40;
    /** Points between axis and rim at which neighbouring surfaces are compared. */
    private static final int RIM_POINTS = 64;

    private TrainReader() {}

    /**
     * Reads a train.
     *
     * @param section the {@code train} section
     * @param media the job's media
     */
    public static TrainPlan read(Section section, Media media) {
        Medium from = media.need(section.need("from", "air"));
        List<TrainPlan.Step> steps = new ArrayList<>();
        Value list = section.need("surfaces");
        List<Value> items = list.items();
        if (items.isEmpty()) {
            list.fault("a train needs one surface or more; for one medium everywhere write \"through: NAME\" instead");
        }
        if (items.size() > MOST_SURFACES) {
            list.fault(items.size() + " surfaces are more than the " + MOST_SURFACES + " that a train may have");
            items = List.of();
        }
        double z = Double.NaN;
        List<Section> sections = new ArrayList<>();
        for (Value item : items) {
            Section s = item.section();
            z = place(s, z, steps.isEmpty());
            surface(s, Double.isNaN(z) ? 0 : z, media).ifPresent(step -> {
                steps.add(step);
                sections.add(s);
            });
            s.finish();
        }
        section.finish();
        if (section.problems().isEmpty()) {
            checkOrder(steps, sections);
        }
        TrainPlan plan = TrainPlan.of(from, steps);
        if (section.problems().isEmpty()) {
            for (Plate p : plan.plates()) {
                p.refusal().ifPresent(why -> sections.get(p.front()).fault("into", why));
            }
        }
        return plan;
    }

    /** z of the vertex, from {@code at} or {@code gap}. */
    private static double place(Section s, double previous, boolean first) {
        boolean at = s.has("at");
        Optional<Value> gap = s.find("gap");
        if (at && gap.isPresent()) {
            gap.get().fault("both \"at\" and \"gap\" place this surface; leave one of them out");
            return s.need("at").quantity(Kind.LENGTH);
        }
        if (gap.isPresent()) {
            if (first) {
                gap.get()
                        .fault("the first surface has no vertex before it; place it with \"at\", such as \"at: 0 mm\"");
                return Double.NaN;
            }
            return previous + gap.get().quantity(Kind.LENGTH);
        }
        return s.need("at", "0 mm").quantity(Kind.LENGTH);
    }

    private static Optional<TrainPlan.Step> surface(Section s, double z, Media media) {
        Optional<Value> lens = s.find("lens");
        Optional<Value> into = s.find("into");
        Optional<Value> action = s.find("action");
        Form form = form(s, lens.isPresent());
        double aperture = s.find("aperture").map(v -> v.positive(Kind.LENGTH)).orElse(Double.POSITIVE_INFINITY);
        boolean whole = s.find("whole").map(Value::flag).orElse(false);
        if (whole && !form.closed()) {
            s.fault(
                    "whole",
                    "only a sphere, an ellipsoid or a cylinder can be meant as a whole; "
                            + (form.curvature() == 0 ? "a plane has no other side" : "this form does not close"));
            whole = false;
        }
        Frame frame = frame(s, z);
        Surface surface = new Surface(frame, form, whole, aperture > 0 ? aperture : 1);
        String word = action.map(v -> v.word("refract", "reflect", "stop")).orElse("");
        Optional<Value> total = s.find("total-reflection");
        boolean follow =
                total.map(v -> v.word("follow", "end").equals("follow")).orElse(false);
        if (lens.isPresent()) {
            action.ifPresent(v -> v.fault("an ideal lens takes no \"action\"; leave it out"));
            into.ifPresent(v -> v.fault("an ideal lens stands in one medium; leave \"into\" out"));
            double f = lens.get().quantity(Kind.LENGTH);
            if (f == 0) {
                lens.get()
                        .fault(
                                "a focal length of 0 is no lens; write one such as 50 mm, or -50 mm for a diverging lens");
            }
            return Double.isNaN(f) || f == 0
                    ? Optional.empty()
                    : Optional.of(new TrainPlan.Step(surface, new Action.ThinLens(f), Optional.empty()));
        }
        if (word.equals("reflect") || word.equals("stop")) {
            into.ifPresent(v -> v.fault("after \"action: " + word + "\" the medium stays; leave \"into\" out"));
            total.ifPresent(v -> v.fault("\"total-reflection\" belongs to a refracting surface; leave it out"));
            return Optional.of(new TrainPlan.Step(
                    surface, word.equals("stop") ? new Action.Stop() : new Action.Reflect(), Optional.empty()));
        }
        if (into.isEmpty()) {
            if (action.isEmpty() || word.equals("refract")) {
                s.fault("this surface says nothing of what it does; add \"into: MEDIUM\", \"lens: 50 mm\", "
                        + "\"action: reflect\" or \"action: stop\"");
            }
            return Optional.empty();
        }
        return Optional.of(
                new TrainPlan.Step(surface, new Action.Refract(follow), Optional.of(media.need(into.get()))));
    }

    private static Frame frame(Section s, double z) {
        double[] tilt = pair(s.find("tilt"), Kind.ANGLE, "two angles such as [1 deg, 0]");
        double[] shift = pair(s.find("shift"), Kind.LENGTH, "two lengths such as [0.1 mm, 0]");
        boolean sound = Double.isFinite(tilt[0] + tilt[1] + shift[0] + shift[1]);
        Vector vertex = sound ? new Vector(shift[0], shift[1], z) : new Vector(0, 0, z);
        return (tilt[0] == 0 && tilt[1] == 0) || !sound ? Frame.at(vertex) : Frame.tilted(vertex, tilt[0], tilt[1]);
    }

    private static double[] pair(Optional<Value> value, Kind kind, String wanted) {
        double[] two = {0, 0};
        if (value.isPresent()) {
            List<Value> items = value.get().items();
            if (value.get().isList() && items.size() != 2) {
                value.get().fault(items.size() + " values stand here; " + wanted + " are needed");
            }
            for (int i = 0; i < Math.min(2, items.size()); i++) {
                two[i] = items.get(i).quantity(kind);
            }
        }
        return two;
    }

    private static Form form(Section s, boolean lens) {
        Optional<Value> radius = s.find("radius");
        Optional<Value> conic = s.find("conic");
        Optional<Value> powers = s.find("powers");
        if (lens) {
            for (Optional<Value> v : Arrays.asList(radius, conic, powers)) {
                v.ifPresent(there -> there.fault("an ideal lens is a plane; leave this out"));
            }
            return Quadric.PLANE;
        }
        double[] c = radius.map(TrainReader::curvatures).orElse(new double[] {0, 0});
        double[] k = conic.map(TrainReader::conics).orElse(new double[] {0, 0});
        if (conic.isPresent() && radius.isEmpty()) {
            conic.get().fault("a conic constant without a radius shapes nothing; add \"radius\", or leave it out");
        }
        Map<Integer, Double> terms = powers.map(TrainReader::powers).orElse(new TreeMap<>());
        double gx = (1 + k[0]) * c[0];
        double gy = (1 + k[1]) * c[1];
        double g = c[0] != 0 ? gx : gy;
        boolean quadric = terms.isEmpty() && (c[0] == 0 || gx == g) && (c[1] == 0 || gy == g);
        if (quadric) {
            return new Quadric(c[0], c[1], g);
        }
        return new Asphere(
                c[0],
                c[1],
                k[0],
                k[1],
                terms.keySet().stream().mapToInt(Integer::intValue).toArray(),
                terms.values().stream().mapToDouble(Double::doubleValue).toArray());
    }

    private static double[] curvatures(Value radius) {
        if (!radius.isList()) {
            double c = curvature(radius);
            return new double[] {c, c};
        }
        List<Value> two = radius.items();
        if (two.size() != 2) {
            radius.fault(two.size() + " radii stand here; one, or two for the xz and the yz section, are needed");
            return new double[] {0, 0};
        }
        return new double[] {curvature(two.get(0)), curvature(two.get(1))};
    }

    private static double curvature(Value radius) {
        if (radius.isText() && radius.text().equals("flat")) {
            return 0;
        }
        double r = radius.quantity(Kind.LENGTH);
        if (r == 0) {
            radius.fault("a radius of 0 is no surface; for a plane leave \"radius\" out");
        }
        return Double.isNaN(r) || r == 0 ? 0 : 1 / r;
    }

    private static double[] conics(Value conic) {
        if (!conic.isList()) {
            double k = finite(conic.number());
            return new double[] {k, k};
        }
        List<Value> two = conic.items();
        if (two.size() != 2) {
            conic.fault(
                    two.size() + " conic constants stand here; one, or two for the xz and the yz section, are needed");
            return new double[] {0, 0};
        }
        return new double[] {finite(two.get(0).number()), finite(two.get(1).number())};
    }

    private static double finite(double v) {
        return Double.isNaN(v) ? 0 : v;
    }

    private static Map<Integer, Double> powers(Value powers) {
        Map<Integer, Double> terms = new TreeMap<>();
        Section s = powers.section();
        for (String key : s.names()) {
            Value v = s.at(key);
            int k = key.matches("[0-9]{1,2}") ? Integer.parseInt(key) : 0;
            if (k < 2 || k % 2 != 0 || k > HIGHEST_POWER) {
                v.fault("\"" + key + "\" is no even power from 2 to " + HIGHEST_POWER);
                continue;
            }
            double a = v.quantity(Kind.of(Dimension.LENGTH.power(1 - k, 1)));
            if (!Double.isNaN(a)) {
                terms.put(k, a);
            }
        }
        return terms;
    }

    /**
     * Light going along +z must meet the surfaces in their order: two neighbouring caps of an untilted train before its first
     * mirror may not cross inside their apertures.
     */
    private static void checkOrder(List<TrainPlan.Step> steps, List<Section> sections) {
        for (int i = 0; i + 1 < steps.size(); i++) {
            Surface a = steps.get(i).surface();
            Surface b = steps.get(i + 1).surface();
            boolean mirror = steps.get(i).action() instanceof Action.Reflect
                    || steps.get(i + 1).action() instanceof Action.Reflect;
            if (mirror) {
                return;
            }
            boolean plain = !a.whole()
                    && !b.whole()
                    && a.frame().isShiftOnly()
                    && b.frame().isShiftOnly();
            if (!plain) {
                continue;
            }
            double rim = Math.min(a.aperture(), b.aperture());
            int points = Double.isInfinite(rim) ? 0 : RIM_POINTS;
            for (int j = 0; j <= points; j++) {
                double r = points == 0 ? 0 : rim * j / points;
                double gap = gap(a, b, r, 0);
                double other = gap(a, b, 0, r);
                double least = Double.isNaN(gap) || other < gap ? other : gap;
                if (least < -1e-12 * (1 + Math.abs(b.vertex().z() - a.vertex().z()))) {
                    Section s = sections.get(i + 1);
                    String which = sections.get(i).path();
                    s.fault(
                            j == 0
                                    ? String.format(
                                            Locale.ROOT,
                                            "this surface lies %.6g mm before %s, but light meets it later; put them in order",
                                            -1e3 * least,
                                            which)
                                    : String.format(
                                            Locale.ROOT,
                                            "this surface crosses %s: %.6g mm from the axis it lies %.6g mm before it; make the "
                                                    + "aperture smaller or the distance larger",
                                            which,
                                            1e3 * r,
                                            -1e3 * least));
                    break;
                }
            }
        }
    }

    private static double gap(Surface a, Surface b, double x, double y) {
        return b.vertex().z() + b.form().sag(x, y) - a.vertex().z() - a.form().sag(x, y);
    }
}
