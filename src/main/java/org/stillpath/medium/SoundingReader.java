package org.stillpath.medium;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import java.util.OptionalInt;
import org.stillpath.formula.Coordinate;
import org.stillpath.job.Section;
import org.stillpath.job.Sounding;
import org.stillpath.job.Sources;
import org.stillpath.job.Value;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;

/**
 * Reads the {@code sounding:} of a temperature: an ascent of a radiosonde, with its temperature and humidity over the height.
 *
 * <p>Geopotential heights become heights by h = r₀H/(r₀ − H), r₀ = 6356.766 km (US Standard Atmosphere 1976). A level without
 * a height gets one from its pressure by the hypsometric equation through the virtual temperature, fitted between the heights
 * that are given. The relative humidity is taken as reported, over water; where only the dew-point depression is reported, from
 * the saturation pressures of the law of the air. Above the last level with a humidity the air is taken as dry from the next
 * level on. The levels' own pressures serve for the heights alone: the pressure of the air follows from one of them through the
 * temperature, since pressures read at rounded heights would put the gradient of the index off.
 */
final class SoundingReader {
    /** R/g₀ of dry air, metres per kelvin. */
    private static final double SCALE = Hydrostatic.GAS / Hydrostatic.GRAVITY;

    private static final double LIGHTER = 0.378;

    private SoundingReader() {}

    /**
     * A sounding as a column of air.
     *
     * @param temperature kelvin, of the height
     * @param humidity relative, of the height; empty where none was reported
     * @param heights of the levels, metres, ascending
     * @param pressures there, pascal; NaN where none was reported
     * @param notes what was told about reading it
     */
    record Column(
            ScalarField temperature,
            Optional<ScalarField> humidity,
            double[] heights,
            double[] pressures,
            List<String> notes) {
        /** The lowest level with a pressure; −1 where none has one. */
        int ground() {
            for (int i = 0; i < pressures.length; i++) {
                if (pressures[i] > 0) {
                    return i;
                }
            }
            return -1;
        }
    }

    /**
     * Reads a section with {@code sounding:}.
     *
     * @param value the section
     * @param saturation to which a dew point refers
     * @return empty after a fault
     */
    static Optional<Column> read(Value value, Sources sources, Problems problems, Saturation saturation) {
        Section outer = value.section();
        Value v = outer.at("sounding");
        outer.finish();
        if (v.isText()) {
            return read(
                    v,
                    v.text(),
                    new Sounding.Wanted(Optional.empty(), Optional.empty(), OptionalInt.empty()),
                    Interpolation.MONOTONE,
                    Beyond.FAULT,
                    sources,
                    problems,
                    saturation);
        }
        Section s = v.section();
        Value file = s.need("file", "ascent.txt");
        Optional<String> station = s.find("station").map(Value::text).filter(t -> !t.isEmpty());
        Optional<Value> date = s.find("date");
        boolean dated = date.isEmpty() || date.get().text().matches("\\d{4}-\\d{2}-\\d{2}");
        if (!dated) {
            date.get().fault(Words.quoted(date.get().text()) + " is no date; write one such as 2026-07-01");
        }
        Optional<Value> hour = s.find("hour");
        OptionalInt h = hour.isPresent() ? OptionalInt.of(hour.get().count(0, 23)) : OptionalInt.empty();
        Interpolation how = s.find("interpolate")
                .flatMap(w -> TableReader.choice(w, Interpolation.values(), Interpolation::word))
                .orElse(Interpolation.MONOTONE);
        Beyond beyond = s.find("beyond")
                .flatMap(w -> TableReader.choice(w, Beyond.values(), Beyond::word))
                .orElse(Beyond.FAULT);
        s.finish();
        if (!dated || file.text().isEmpty()) {
            return Optional.empty();
        }
        Sounding.Wanted wanted = new Sounding.Wanted(station, date.map(Value::text), h);
        return read(file, file.text(), wanted, how, beyond, sources, problems, saturation);
    }

    private static Optional<Column> read(
            Value file,
            String name,
            Sounding.Wanted wanted,
            Interpolation how,
            Beyond beyond,
            Sources sources,
            Problems problems,
            Saturation saturation) {
        try {
            return column(sources.sounding(name, wanted, file.place()), how, beyond, saturation, file);
        } catch (ProblemException e) {
            for (Problem p : e.problems()) {
                boolean here = p.place().equals(file.place());
                problems.add(here ? new Problem(p.kind(), p.place(), file.path(), p.message()) : p);
            }
            return Optional.empty();
        }
    }

    private static Optional<Column> column(
            Sounding sounding, Interpolation how, Beyond beyond, Saturation saturation, Value file) {
        List<Sounding.Level> warm = sounding.levels().stream()
                .filter(l -> !Double.isNaN(l.temperature()))
                .toList();
        double[] moist = new double[warm.size()];
        for (int i = 0; i < moist.length; i++) {
            moist[i] = humidity(warm.get(i), saturation);
        }
        double[] geopotential = geopotential(warm, moist, saturation);
        int filled = 0;
        int dropped = sounding.levels().size() - warm.size();
        List<Integer> kept = new ArrayList<>();
        for (int i = 0; i < geopotential.length; i++) {
            boolean rises = !Double.isNaN(geopotential[i])
                    && (kept.isEmpty() || geopotential[i] > geopotential[kept.get(kept.size() - 1)]);
            if (!rises) {
                dropped++;
                continue;
            }
            kept.add(i);
            filled += Double.isNaN(warm.get(i).geopotential()) ? 1 : 0;
        }
        if (kept.size() < 2) {
            file.fault("the sounding of " + sounding.station() + ", " + sounding.time() + ", has "
                    + (kept.isEmpty() ? "no level" : "1 level")
                    + " with both a temperature and a height; at least 2 are needed");
            return Optional.empty();
        }
        int n = kept.size();
        double[] height = new double[n];
        double[] kelvin = new double[n];
        double[] pressure = new double[n];
        double[] relative = new double[n];
        for (int i = 0; i < n; i++) {
            int k = kept.get(i);
            height[i] = Us1976.geometric(geopotential[k]);
            kelvin[i] = warm.get(k).temperature();
            pressure[i] = warm.get(k).pressure();
            relative[i] = moist[k];
        }
        List<String> notes = new ArrayList<>();
        notes.add("the air is that of the sounding of " + sounding.station() + ", " + sounding.time() + ": " + n
                + " levels from " + whole(height[0]) + " to " + whole(height[n - 1])
                + " above mean sea level; what it passed within its first tens of metres, where sights near the ground are "
                + "bent most, it cannot tell");
        if (filled > 0) {
            notes.add(filled + " of its levels had no height; it follows from their pressures");
        }
        if (dropped > 0) {
            notes.add(dropped + " of its levels are left out, without a temperature, or not above the one before");
        }
        Optional<ScalarField> humidity = humidity(height, relative, how, notes);
        return Optional.of(new Column(
                ChartProfile.of(Coordinate.HEIGHT, Spline.of(height, kelvin, how, beyond), 0),
                humidity,
                height,
                pressure,
                notes));
    }

    private static String whole(double metres) {
        return Told.length(Math.rint(metres));
    }

    /** Relative humidity of a level, a fraction; NaN where nothing is reported. */
    private static double humidity(Sounding.Level l, Saturation saturation) {
        if (!Double.isNaN(l.humidity()) || Double.isNaN(l.depression())) {
            return l.humidity();
        }
        double p = Double.isNaN(l.pressure()) ? 1e5 : l.pressure();
        return saturation.pressure(l.temperature() - l.depression(), p) / saturation.pressure(l.temperature(), p);
    }

    private static Optional<ScalarField> humidity(
            double[] height, double[] relative, Interpolation how, List<String> notes) {
        int n = height.length;
        List<double[]> rows = new ArrayList<>();
        int last = -1;
        for (int i = 0; i < n; i++) {
            if (!Double.isNaN(relative[i])) {
                rows.add(new double[] {height[i], relative[i]});
                last = i;
            }
        }
        if (rows.isEmpty()) {
            notes.add("it reports no humidity; dry air is taken");
            return Optional.empty();
        }
        if (last < n - 1) {
            rows.add(new double[] {height[last + 1], 0});
            notes.add("it reports no humidity above " + whole(height[last]) + "; dry air is taken there");
        }
        if (rows.size() == 1) {
            return Optional.of(new Constant(rows.get(0)[1]));
        }
        double[] at = rows.stream().mapToDouble(r -> r[0]).toArray();
        double[] value = rows.stream().mapToDouble(r -> r[1]).toArray();
        // a cubic that swings below 0 % is no air
        Interpolation sound = how == Interpolation.LINEAR ? how : Interpolation.MONOTONE;
        return Optional.of(ChartProfile.of(Coordinate.HEIGHT, Spline.of(at, value, sound, Beyond.HOLD), 0));
    }

    /** Geopotential heights, those that are missing from the pressures; NaN where there is none either. */
    private static double[] geopotential(List<Sounding.Level> levels, double[] moist, Saturation saturation) {
        int n = levels.size();
        double[] h = levels.stream().mapToDouble(Sounding.Level::geopotential).toArray();
        int[] pressed = java.util.stream.IntStream.range(0, n)
                .filter(i -> levels.get(i).pressure() > 0)
                .toArray();
        // thicknesses from one level with a pressure to the next, metres of geopotential
        double[] up = new double[pressed.length];
        for (int j = 1; j < pressed.length; j++) {
            int a = pressed[j - 1];
            int b = pressed[j];
            double mean =
                    0.5 * (virtual(levels.get(a), moist[a], saturation) + virtual(levels.get(b), moist[b], saturation));
            up[j] = SCALE
                    * mean
                    * Math.log(levels.get(a).pressure() / levels.get(b).pressure());
        }
        int known = -1;
        for (int j = 0; j <= pressed.length; j++) {
            boolean here = j < pressed.length && !Double.isNaN(h[pressed[j]]);
            if (here && known >= 0) {
                between(h, pressed, up, known, j);
            } else if (here) {
                for (int i = j - 1; i >= 0; i--) {
                    h[pressed[i]] = h[pressed[i + 1]] - up[i + 1];
                }
            } else if (j == pressed.length && known >= 0) {
                for (int i = known + 1; i < j; i++) {
                    h[pressed[i]] = h[pressed[i - 1]] + up[i];
                }
            }
            known = here ? j : known;
        }
        return h;
    }

    /** Fills heights between two known ones in proportion to the thicknesses. */
    private static void between(double[] h, int[] pressed, double[] up, int from, int to) {
        double sum = Arrays.stream(up, from + 1, to + 1).sum();
        double scale = (h[pressed[to]] - h[pressed[from]]) / sum;
        for (int i = from + 1; i < to; i++) {
            h[pressed[i]] = h[pressed[i - 1]] + scale * up[i];
        }
    }

    private static double virtual(Sounding.Level l, double moist, Saturation saturation) {
        double e = Double.isNaN(moist) ? 0 : moist * saturation.pressure(l.temperature(), l.pressure());
        return l.temperature() / (1 - LIGHTER * e / l.pressure());
    }

    /** By how much the pressures of the levels depart from a pressure of the air, as a fraction, and at which level most. */
    static double[] departure(Column column, Hydrostatic air) {
        double worst = 0;
        double at = Double.NaN;
        for (int i = 0; i < column.heights().length; i++) {
            double p = air.table().pressure(column.heights()[i]);
            double off = Math.abs(column.pressures()[i] / p - 1);
            if (off > worst) {
                worst = off;
                at = column.heights()[i];
            }
        }
        return new double[] {worst, at};
    }
}
