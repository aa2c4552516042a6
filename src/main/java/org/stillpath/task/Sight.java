package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import org.stillpath.job.Section;
import org.stillpath.job.Value;
import org.stillpath.problem.Words;
import org.stillpath.unit.Kind;

/**
 * One sight as a job asks for it: where the eye is, what it looks at, what was measured.
 *
 * @param mark height of the mark below the eye above the datum, metres; the eye's own where no instrument height is given
 * @param instrument height of the eye above the mark, metres
 * @param to what it looks at
 * @param observed what was measured
 * @param meter the instrument that measured the distance
 */
record Sight(double mark, double instrument, To to, Optional<Observed> observed, Optional<Meter> meter) {
    /** Height of the eye above the datum, metres. */
    double eye() {
        return mark + instrument;
    }

    /** What is looked at. */
    sealed interface To {}

    /**
     * A point that stands on an earth radius.
     *
     * @param distance along the datum, metres; empty where it is to be found
     * @param mark height of the mark below it, metres; empty where it is to be found
     * @param target height of the sighted point above the mark, metres
     * @param span heights between which an upright object stands there, above the datum, metres; empty for a point
     */
    record Point(OptionalDouble distance, OptionalDouble mark, double target, Optional<double[]> span) implements To {
        /** Height of the sighted point above the datum. */
        OptionalDouble height() {
            return mark.isPresent() ? OptionalDouble.of(mark.getAsDouble() + target) : OptionalDouble.empty();
        }
    }

    /**
     * Stars.
     *
     * @param zeniths apparent zenith distances, rad
     */
    record Stars(double[] zeniths) implements To {}

    /**
     * A staff read with a level line of sight.
     *
     * @param distance along the datum, metres
     */
    record Staff(double distance) implements To {}

    /**
     * What was measured.
     *
     * @param zenith zenith angle from the eye to the point, rad
     * @param slope slope distance as displayed, metres
     * @param back zenith angle from the point to the eye, rad
     * @param packed the zenith angle if its digits were degrees, minutes and seconds; empty where they cannot be
     */
    record Observed(OptionalDouble zenith, OptionalDouble slope, OptionalDouble back, OptionalDouble packed) {}

    /**
     * A distance meter.
     *
     * @param wavelength of its carrier, metres
     * @param reference refractivity for which it shows true distances
     * @param set correction that had been set in it, a fraction
     * @param constant what it adds to every distance, metres
     * @param setGiven whether the job says what had been set
     */
    record Meter(double wavelength, double reference, double set, double constant, boolean setGiven) {}

    private static final int MOST_STARS = 10_000;

    /** Reads {@code from}, {@code to}, {@code observed} and {@code distance-meter}; empty after a fault. */
    static Optional<Sight> read(Section job, Earth earth) {
        Section from = job.need("from", "{height: 1.62 m}").section();
        double mark = from.need("height", "1.62 m").quantity(Kind.LENGTH);
        double instrument = offset(from, "instrument");
        from.finish();
        Optional<Observed> observed = job.find("observed").map(v -> observed(v.section()));
        Optional<Meter> meter = job.find("distance-meter").flatMap(v -> meter(v.section()));
        if (job.has("distance-meter")
                && (observed.isEmpty() || observed.get().slope.isEmpty())) {
            job.fault(
                    "distance-meter",
                    "a distance meter needs a distance to reduce: add `observed: {slope-distance: 5000.123 m}`");
        }
        Optional<To> to = to(job.need("to", "{distance: 5 km, height: 3.10 m}").section(), earth, observed);
        if (to.isPresent() && observed.isPresent() && !(to.get() instanceof Point)) {
            job.fault("observed", "`observed` goes with a target that has a distance and a height");
        }
        if (to.isEmpty() || Double.isNaN(mark + instrument)) {
            return Optional.empty();
        }
        return Optional.of(new Sight(mark, instrument, to.get(), observed, meter));
    }

    private static double offset(Section s, String key) {
        double v = s.find(key).map(o -> o.quantity(Kind.LENGTH)).orElse(0.0);
        if (Math.abs(v) > 200) {
            s.fault(key, "`" + key + "` is the height above the mark, such as 1.55 m");
        }
        return v;
    }

    private static Optional<To> to(Section s, Earth earth, Optional<Observed> observed) {
        boolean stars = s.has("stars");
        boolean staff = s.has("staff");
        if (stars || staff) {
            for (String other : new String[] {"distance", "height", "target", "span"}) {
                if (s.has(other)) {
                    s.fault(other, "`" + other + "` does not go with `" + (stars ? "stars" : "staff") + "`");
                }
            }
            if (stars && staff) {
                s.fault("staff", "only one of `stars` and `staff` can be looked at");
            }
            Optional<To> to =
                    stars ? stars(s.at("stars"), earth) : staff(s.at("staff").section(), earth);
            s.finish();
            return to;
        }
        Optional<Value> height = s.find("height");
        double h = height.map(v -> v.quantity(Kind.LENGTH)).orElse(Double.NaN);
        double target = offset(s, "target");
        Optional<double[]> span = s.find("span").flatMap(Sight::span);
        boolean measured = observed.isPresent()
                && observed.get().zenith.isPresent()
                && observed.get().slope.isPresent();
        boolean found = height.isEmpty() && measured && span.isEmpty();
        Optional<Value> distanceValue = found ? s.find("distance") : Optional.of(s.need("distance", "5 km"));
        double distance = distanceValue.map(v -> v.positive(Kind.LENGTH)).orElse(Double.NaN);
        if (distance > 0.2 * earth.radius()) {
            s.fault(
                    "distance",
                    "a sight over more than a fifth of the earth's radius is not meant; give a shorter one");
        }
        if (height.isEmpty() && span.isEmpty() && !measured && !s.isPlaceholder()) {
            s.fault("`height` is missing; add it, such as \"height: 3.10 m\", or let it be found from `observed: "
                    + "{zenith-angle: .., slope-distance: ..}`");
            return Optional.empty();
        }
        s.finish();
        boolean unknownDistance = distanceValue.isEmpty();
        if ((Double.isNaN(distance) && !unknownDistance) || (height.isPresent() && Double.isNaN(h))) {
            return Optional.empty();
        }
        double point = height.isPresent() ? h : span.map(p -> p[1] - target).orElse(Double.NaN);
        return Optional.of(new Point(
                unknownDistance ? OptionalDouble.empty() : OptionalDouble.of(distance),
                Double.isNaN(point) ? OptionalDouble.empty() : OptionalDouble.of(point),
                target,
                span));
    }

    private static Optional<double[]> span(Value v) {
        List<Value> items = v.items();
        if (items.size() != 2) {
            if (v.isList()) {
                v.fault("two heights are needed, foot and top, such as [0 m, 25 m]");
            }
            return Optional.empty();
        }
        double low = items.get(0).quantity(Kind.LENGTH);
        double high = items.get(1).quantity(Kind.LENGTH);
        if (high <= low) {
            v.fault("the foot comes first and the top lies above it, such as [0 m, 25 m]");
            return Optional.empty();
        }
        return Double.isNaN(low + high) ? Optional.empty() : Optional.of(new double[] {low, high});
    }

    private static Optional<To> stars(Value v, Earth earth) {
        List<Value> items = v.isList() ? v.items() : List.of(v);
        if (earth.flat()) {
            v.fault("stars need a round earth: over a flat one the air has no end; give `earth: {radius: 6371 km}`");
        }
        if (items.isEmpty() || items.size() > MOST_STARS) {
            v.fault(items.size() + " zenith distances stand here; 1 to " + MOST_STARS + " are needed");
            return Optional.empty();
        }
        List<Double> list = new ArrayList<>();
        for (Value i : items) {
            double z = i.quantity(Kind.ANGLE);
            if (z < 0 || z > Math.toRadians(120)) {
                i.fault(Words.quoted(i.text()) + " is no zenith distance of a star; 0 is overhead, 90 deg the horizon");
                z = Double.NaN;
            }
            list.add(z);
        }
        return list.stream().anyMatch(z -> Double.isNaN(z))
                ? Optional.empty()
                : Optional.of(
                        new Stars(list.stream().mapToDouble(Double::doubleValue).toArray()));
    }

    private static Optional<To> staff(Section s, Earth earth) {
        double d = s.need("distance", "30 m").positive(Kind.LENGTH);
        s.finish();
        if (d > 0.1 * earth.radius()) {
            s.fault("distance", "a staff is read over tens of metres, such as 30 m");
        }
        return Double.isNaN(d) ? Optional.empty() : Optional.of(new Staff(d));
    }

    private static Observed observed(Section s) {
        Optional<Value> zenith = s.find("zenith-angle");
        OptionalDouble z = angle(zenith);
        OptionalDouble back = angle(s.find("back-zenith-angle"));
        Optional<Value> slopeValue = s.find("slope-distance");
        double d = slopeValue.map(v -> v.positive(Kind.LENGTH)).orElse(Double.NaN);
        if (zenith.isEmpty() && slopeValue.isEmpty() && !s.has("back-zenith-angle") && !s.isPlaceholder()) {
            s.fault("nothing was observed; `zenith-angle`, `slope-distance` and `back-zenith-angle` can be reduced");
        }
        s.finish();
        return new Observed(
                z,
                Double.isNaN(d) ? OptionalDouble.empty() : OptionalDouble.of(d),
                back,
                zenith.map(v -> packed(v)).orElse(OptionalDouble.empty()));
    }

    private static OptionalDouble angle(Optional<Value> value) {
        if (value.isEmpty()) {
            return OptionalDouble.empty();
        }
        double a = value.get().quantity(Kind.ANGLE);
        if (a <= 0 || a >= Math.PI) {
            value.get()
                    .fault(Words.quoted(value.get().text())
                            + " is no zenith angle; 0 is overhead, 90 deg (100 gon) level");
            return OptionalDouble.empty();
        }
        return Double.isNaN(a) ? OptionalDouble.empty() : OptionalDouble.of(a);
    }

    /** What 89.4512 deg would be if it were meant as 89°45'12". */
    private static OptionalDouble packed(Value v) {
        if (!v.isText()) {
            return OptionalDouble.empty();
        }
        String text = v.text().strip();
        if (!text.matches("\\d+\\.\\d{4,} *(deg|°)")) {
            return OptionalDouble.empty();
        }
        int point = text.indexOf('.');
        String digits = text.substring(point + 1).replaceAll("[^0-9]", "");
        int minutes = Integer.parseInt(digits.substring(0, 2));
        double seconds = Double.parseDouble(digits.substring(2, 4) + "." + digits.substring(4) + "0");
        if (minutes >= 60 || seconds >= 60) {
            return OptionalDouble.empty();
        }
        return OptionalDouble.of(
                Math.toRadians(Integer.parseInt(text.substring(0, point)) + minutes / 60.0 + seconds / 3600));
    }

    private static Optional<Meter> meter(Section s) {
        double w = s.need("wavelength", "850 nm").positive(Kind.LENGTH);
        double reference = s.need("reference-refractivity", "281.8 ppm").quantity(Kind.NUMBER);
        boolean given = s.has("set");
        double set = s.find("set").map(v -> v.quantity(Kind.NUMBER)).orElse(0.0);
        double constant = s.find("constant").map(v -> v.quantity(Kind.LENGTH)).orElse(0.0);
        s.finish();
        if (reference > 1e-2 || reference < 0) {
            s.fault("reference-refractivity", "a refractivity is wanted, such as 281.8 ppm, not an index");
            return Optional.empty();
        }
        if (Math.abs(set) > 1e-2) {
            s.fault("set", "a correction of some ppm is wanted, such as 12 ppm");
            return Optional.empty();
        }
        return Double.isNaN(w + reference + set + constant)
                ? Optional.empty()
                : Optional.of(new Meter(w, reference, set, constant, given));
    }
}
