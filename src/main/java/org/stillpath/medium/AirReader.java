package org.stillpath.medium;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Order;
import org.stillpath.job.Section;
import org.stillpath.job.Sources;
import org.stillpath.job.Value;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;
import org.stillpath.unit.Kind;

/**
 * Reads the {@code air:} of a medium: its law, its temperature, pressure and humidity, each a quantity, a formula, a
 * profile or a grid, and its carbon dioxide.
 */
final class AirReader {
    private static final double WARMEST_LIKELY = 400;
    private static final double COLDEST_LIKELY = 150;
    /** A pressure off the standard atmosphere's by more than this is not weather; the largest departures are 5 %. */
    private static final double WEATHER = 0.06;

    /** Part of the pressure that rounded heights and the mean of two temperatures leave open over a whole ascent. */
    private static final double LIKELY_DEPARTURE = 0.01;

    private final FieldReader fields;
    private final Sources sources;
    private final Problems problems;
    private final List<String> notes = new ArrayList<>();

    AirReader(FieldReader fields, Sources sources, Problems problems) {
        this.fields = fields;
        this.sources = sources;
        this.problems = problems;
    }

    /** The medium; empty after a fault. */
    Optional<Medium> medium(Declaration declaration, Section s) {
        double co2 = s.find("co2").map(this::fraction).orElse(AirLaw.USUAL_CO2);
        Optional<Value> lawValue = s.find("law");
        String word = lawValue.map(v -> v.word(AirLaw.words().toArray(String[]::new)))
                .orElse(AirLaw.words().get(0));
        Optional<AirLaw> law = AirLaw.of(word, Double.isNaN(co2) ? AirLaw.USUAL_CO2 : co2);
        AirLaw known = law.orElseGet(() -> Ciddor.of(AirLaw.USUAL_CO2));
        if (s.has("co2") && known.fixedCo2().isPresent() && known.fixedCo2().get() != co2) {
            notes.add(known.title() + " is for " + Told.number(known.fixedCo2().get() * 1e6)
                    + " ppm of carbon dioxide whatever `co2` says; ciddor-1996 takes it into account");
        }
        boolean sounded = !s.has("atmosphere") && isSounding(s);
        Optional<SoundingReader.Column> sounding = sounded
                ? SoundingReader.read(s.at("temperature"), sources, problems, known.saturation())
                : Optional.empty();
        Humidity usual = sounding.flatMap(SoundingReader.Column::humidity)
                .map(f -> new Humidity(Humidity.Kind.RELATIVE, f, known.saturation()))
                .orElse(Humidity.none(known.saturation()));
        Optional<Humidity> humidity =
                s.find("humidity").map(v -> humidity(v, known)).orElse(Optional.of(usual));
        Optional<State> state = s.has("atmosphere")
                ? standard(s)
                : sounded && !s.has("pressure")
                        ? sounding.flatMap(c -> through(c, humidity, s))
                        : own(s, sounded, sounding.map(SoundingReader.Column::temperature), humidity);
        sounding.ifPresent(c -> notes.addAll(c.notes()));
        s.finish();
        if (law.isEmpty() || humidity.isEmpty() || state.isEmpty() || Double.isNaN(co2)) {
            return Optional.empty();
        }
        State st = state.get();
        List<String> told = new ArrayList<>(notes);
        told.addAll(sense(known, st, humidity.get()));
        return Optional.of(new AtmosphereMedium(
                declaration.withSource(known.source()).withWarnings(told),
                known,
                st.temperature(),
                st.pressure(),
                humidity.get()));
    }

    /** Temperature and pressure, and the height where they are best known. */
    private record State(ScalarField temperature, Pressure pressure, double height) {}

    private double fraction(Value v) {
        double f = v.nonNegative(Kind.NUMBER);
        if (f > 1) {
            v.fault(Words.quoted(v.text()) + " is more than all of the air; carbon dioxide is given as 420 ppm");
            return Double.NaN;
        }
        return f;
    }

    private static Optional<State> standard(Section s) {
        String word = s.at("atmosphere").word("us-1976");
        boolean alone = true;
        for (String key : new String[] {"temperature", "pressure"}) {
            if (s.find(key).isPresent()) {
                s.fault(key, "`atmosphere` gives the " + key + " already; leave one of them out");
                alone = false;
            }
        }
        return word.isEmpty() || !alone
                ? Optional.empty()
                : Optional.of(new State(Us1976.temperature(), Us1976.pressure(), 0));
    }

    private static boolean isSounding(Section s) {
        return s.has("temperature")
                && s.at("temperature").isSection()
                && s.at("temperature").section().has("sounding");
    }

    /** The state of a sounding's air, its pressure from the lowest level that has one. */
    private Optional<State> through(SoundingReader.Column c, Optional<Humidity> humidity, Section s) {
        int at = c.ground();
        if (at < 0) {
            s.fault("temperature", "no level of the sounding has a pressure; give `pressure` beside it");
            return Optional.empty();
        }
        if (humidity.isPresent() && !humidity.get().quantity().ofHeightAlone()) {
            s.fault("humidity", "the pressure follows from the sounding, and needs a humidity of `height` alone");
            return Optional.empty();
        }
        return humidity.map(w -> {
            double height = c.heights()[at];
            Hydrostatic air = Hydrostatic.of(c.temperature(), w, c.pressures()[at], height, true);
            double[] off = SoundingReader.departure(c, air);
            if (off[0] > LIKELY_DEPARTURE) {
                notes.add("the pressure of the sounding at height " + Told.length(Math.rint(off[1])) + " is "
                        + Told.number(Math.rint(1e3 * off[0]) / 10)
                        + " % off the one that follows from its temperatures: a height, a pressure or a temperature of it "
                        + "is wrong");
            }
            return new State(c.temperature(), air, height);
        });
    }

    private Optional<State> own(
            Section s, boolean sounded, Optional<ScalarField> sounding, Optional<Humidity> humidity) {
        Optional<ScalarField> temperature =
                sounded ? sounding : field(s.need("temperature", "288.15 K - 6.5 K/km * height"), Kind.TEMPERATURE);
        Value p = s.need("pressure", "{value: 1013.25 hPa, at-height: 0 m}");
        boolean hydrostatic =
                p.isSection() && !p.section().has("profile") && !p.section().has("grid");
        if (!hydrostatic) {
            Optional<ScalarField> given = field(p, Kind.PRESSURE);
            return temperature.isEmpty() || given.isEmpty()
                    ? Optional.empty()
                    : Optional.of(new State(temperature.get(), new Pressure.Given(given.get()), 0));
        }
        Section h = p.section();
        double value = h.need("value", "1013.25 hPa").positive(Kind.PRESSURE);
        double height = h.need("at-height", "0 m").quantity(Kind.LENGTH);
        String mode = h.find("hydrostatic").map(v -> v.word("full", "standard")).orElse("full");
        h.finish();
        if (height <= HydrostaticTable.LOWEST || height >= HydrostaticTable.HIGHEST) {
            h.fault(
                    "at-height",
                    "a height between " + Told.length(HydrostaticTable.LOWEST) + " and "
                            + Told.length(HydrostaticTable.HIGHEST) + " is needed");
            return Optional.empty();
        }
        if (temperature.isEmpty() || humidity.isEmpty() || mode.isEmpty() || Double.isNaN(value + height)) {
            return Optional.empty();
        }
        boolean full = mode.equals("full");
        if (!temperature.get().ofHeightAlone()) {
            p.fault("a hydrostatic pressure needs a temperature of `height` alone, and this one depends on more; "
                    + "give the pressure as a formula or a profile");
            return Optional.empty();
        }
        if (full && !humidity.get().quantity().ofHeightAlone()) {
            p.fault("a hydrostatic pressure needs a humidity of `height` alone, and this one depends on more; "
                    + "`hydrostatic: standard` takes dry air, or give the pressure as a formula or a profile");
            return Optional.empty();
        }
        Hydrostatic solved = Hydrostatic.of(temperature.get(), humidity.get(), value, height, full);
        if (solved.table().isEmpty()) {
            h.fault(
                    "at-height",
                    "the temperature at height " + Told.length(height) + " is "
                            + Told.number(at(temperature.get(), height))
                            + " K, so that no pressure follows from it there");
            return Optional.empty();
        }
        reduced(value, height);
        return Optional.of(new State(temperature.get(), solved, height));
    }

    /** Tells of a pressure that looks as if it had been reduced to sea level. */
    private void reduced(double value, double height) {
        double usual = Us1976.pressureAt(Us1976.geopotential(Math.min(height, 80e3)));
        boolean likeSea = Math.abs(value / Us1976.pressureAt(0) - 1) < WEATHER;
        if (Math.abs(value / usual - 1) > WEATHER) {
            notes.add("the pressure " + Told.pressure(value) + " at height " + Told.length(height) + " is far from the "
                    + "standard atmosphere's " + Told.pressure(usual) + " there"
                    + (likeSea ? "; it looks reduced to sea level, and the pressure at the station is needed" : ""));
        }
    }

    private Optional<Humidity> humidity(Value v, AirLaw law) {
        if (v.isSection()) {
            Section s = v.section();
            boolean vapour = s.has("vapour-pressure");
            boolean dew = s.has("dew-point");
            if (vapour || dew) {
                if (vapour && dew) {
                    s.fault("dew-point", "`vapour-pressure` and `dew-point` cannot stand together; one is enough");
                }
                Optional<Humidity> read = vapour
                        ? field(s.at("vapour-pressure"), Kind.PRESSURE)
                                .map(f -> new Humidity(Humidity.Kind.VAPOUR_PRESSURE, f, law.saturation()))
                        : field(s.at("dew-point"), Kind.TEMPERATURE)
                                .map(f -> new Humidity(Humidity.Kind.DEW_POINT, f, law.saturation()));
                s.find("dew-point");
                s.finish();
                return vapour && dew ? Optional.empty() : read;
            }
            if (!s.has("profile") && !s.has("grid")) {
                v.fault("a humidity is relative, such as 50 %, or {vapour-pressure: 12 hPa}, {dew-point: 9 degC}, or "
                        + "{profile: ..}");
                return Optional.empty();
            }
        }
        Optional<ScalarField> relative = field(v, Kind.NUMBER);
        if (relative.isPresent() && relative.get() instanceof Constant c && !(c.value() >= 0 && c.value() <= 1)) {
            v.fault(Words.quoted(v.text()) + " is not between 0 % and 100 %"
                    + (c.value() > 1 && c.value() <= 100 ? "; write " + Told.number(c.value()) + " %" : ""));
            return Optional.empty();
        }
        return relative.map(f -> new Humidity(Humidity.Kind.RELATIVE, f, law.saturation()));
    }

    private Optional<ScalarField> field(Value v, Kind kind) {
        return fields.field(v, kind, Interpolation.MONOTONE, notes);
    }

    /** Says what of the state is not likely, or outside the range of the law: the first of each sort. */
    private static List<String> sense(AirLaw law, State state, Humidity humidity) {
        ScalarField t = state.temperature().on(Chart.FLAT);
        ScalarField w = humidity.quantity().on(Chart.FLAT);
        Pressure p = state.pressure().on(Chart.FLAT);
        Set<Double> heights = new LinkedHashSet<>();
        heights.add(state.height());
        for (ScalarField f : List.of(t, w)) {
            for (Seam s : f.seams(Double.NaN)) {
                if (f.ofHeightAlone() && s.coordinate() instanceof ChartLevel) {
                    Arrays.stream(s.knots()).forEach(heights::add);
                }
            }
        }
        List<String> told = new ArrayList<>();
        Set<String> sorts = new LinkedHashSet<>();
        Scratch s = new Scratch();
        org.stillpath.formula.Samples ts = new org.stillpath.formula.Samples(1);
        org.stillpath.formula.Samples ws = new org.stillpath.formula.Samples(1);
        for (double h : heights) {
            s.point(0, 0, h);
            t.sample(s.x, s.y, s.z, 1, Double.NaN, Order.VALUE, ts);
            w.sample(s.x, s.y, s.z, 1, Double.NaN, Order.VALUE, ws);
            p.sample(s.x, s.y, s.z, 1, ts, ws, Order.VALUE, s.samples);
            double kelvin = ts.value[0];
            double pascal = s.samples.value[0];
            if (!(kelvin > 0 && pascal > 0)) {
                continue;
            }
            if ((kelvin < COLDEST_LIKELY || kelvin > WARMEST_LIKELY) && sorts.add("likely")) {
                told.add("the temperature at height " + Told.length(h) + " is " + Told.number(kelvin)
                        + " K, which is no weather; a temperature in degC needs that unit");
                continue;
            }
            double vapour = humidity.vapourPressure(kelvin, pascal, ws.value[0]);
            String where = t.isConstant() && heights.size() == 1 ? "" : " at height " + Told.length(h);
            for (String warning : law.warnings(kelvin, pascal, vapour, where)) {
                if (sorts.add(warning.substring(0, warning.indexOf(' ', 4)))) {
                    told.add(warning);
                }
            }
        }
        return told;
    }

    private static double at(ScalarField t, double height) {
        Scratch s = new Scratch().point(0, 0, height);
        t.on(Chart.FLAT).sample(s.x, s.y, s.z, 1, Double.NaN, Order.VALUE, s.samples);
        return s.samples.value[0];
    }
}
