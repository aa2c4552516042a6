package org.stillpath.medium;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.stillpath.formula.Coordinate;
import org.stillpath.job.Section;
import org.stillpath.job.Sources;
import org.stillpath.job.Table;
import org.stillpath.job.Value;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;
import org.stillpath.unit.Dimension;
import org.stillpath.unit.Kind;
import org.stillpath.unit.Unit;
import org.stillpath.unit.Units;

/**
 * Reads what a quantity is tabulated by in a job file: a {@code profile:}, a table along one coordinate, in the job or in
 * a file, or a {@code grid:}, nodes in a file.
 */
final class TableReader {
    private final Sources sources;
    private final Problems problems;
    private final GridReader grids;

    TableReader(Sources sources, Problems problems) {
        this.sources = sources;
        this.problems = problems;
        this.grids = new GridReader(sources, problems);
    }

    /** Knots in metres with values in SI, and what was told about reading them. */
    private record Knots(double[] at, double[] value, List<String> notes) {}

    /** A tabulated quantity with what was told about reading its file. */
    record Read(ScalarField field, List<String> notes) {}

    /**
     * Reads a section that holds either {@code profile:} or {@code grid:}.
     *
     * @param value the section, such as the value of {@code index:}
     * @param kind what its values are
     * @param less what is taken off each value before it is joined: 1 for an index
     * @param usual how the values of a profile are joined where nothing is said
     * @return empty after a fault
     */
    Optional<Read> tabulated(Value value, Kind kind, double less, Interpolation usual) {
        Section s = value.section();
        Optional<Value> profile = s.find("profile");
        Optional<Value> grid = s.find("grid");
        Optional<Read> read = Optional.empty();
        if (profile.isPresent() == grid.isPresent()) {
            value.fault((profile.isEmpty() ? "" : "only ") + "one of `profile` and `grid` is needed here");
        } else if (profile.isPresent()) {
            read = profile(profile.get().section(), kind, less, usual);
        } else {
            read = grids.grid(s.at("grid").section(), kind, less);
        }
        s.finish();
        return read;
    }

    /**
     * Reads a profile.
     *
     * @param section the value of {@code profile:}
     * @param kind what its values are
     * @param less what is taken off each value before it is joined: 1 for an index
     * @param usual how the values are joined where nothing is said
     * @return empty after a fault
     */
    Optional<Read> profile(Section section, Kind kind, double less, Interpolation usual) {
        Optional<String> along = along(section.need("along", "r"));
        Interpolation how = section.find("interpolate")
                .flatMap(v -> choice(v, Interpolation.values(), Interpolation::word))
                .orElse(usual);
        Beyond beyond = section.find("beyond")
                .flatMap(v -> choice(v, Beyond.values(), Beyond::word))
                .orElse(Beyond.FAULT);
        Optional<Knots> read = section.has("file") ? fromFile(section, kind) : fromLists(section, kind);
        section.finish();
        if (along.isEmpty() || read.isEmpty()) {
            return Optional.empty();
        }
        Knots k = read.get();
        Optional<Along> plain = plain(along.get());
        if (plain.isPresent() && plain.get().isDistance() && k.at()[0] < 0) {
            section.fault(
                    "at",
                    "`" + along.get() + "` is a distance and never negative, but the table starts at "
                            + Told.length(k.at()[0]));
            return Optional.empty();
        }
        double[] value = k.value().clone();
        for (int i = 0; i < value.length; i++) {
            value[i] -= less;
        }
        if (beyond == Beyond.EXPONENTIAL && (value[0] == 0 || value[value.length - 1] == 0)) {
            section.fault(
                    "beyond",
                    "an exponential cannot go on from " + Told.number(less) + " at the edge of the table; "
                            + "`hold` or `linear` can");
            return Optional.empty();
        }
        Spline spline = Spline.of(k.at(), value, how, beyond);
        ScalarField field = plain.isPresent()
                ? Profile.of(plain.get(), spline, less)
                : ChartProfile.of(Coordinate.of(along.get()).orElseThrow(), spline, less);
        return Optional.of(new Read(field, k.notes()));
    }

    /**
     * The heights of a ground against the distance, from a file; monotone between its rows where nothing is said, so that it has
     * no corners and no dips of its own.
     *
     * @param section has {@code file} and may have {@code columns} and {@code interpolate}
     * @return empty after a fault
     */
    Optional<Spline> ground(Section section) {
        Interpolation how = section.find("interpolate")
                .flatMap(v -> choice(v, Interpolation.values(), Interpolation::word))
                .orElse(Interpolation.MONOTONE);
        return fromFile(section, Kind.LENGTH).map(k -> Spline.of(k.at(), k.value(), how, Beyond.HOLD));
    }

    /** The word of a coordinate: one of a place, or one that a chart gives. */
    private static Optional<String> along(Value value) {
        List<String> words = new ArrayList<>();
        for (Along a : Along.values()) {
            words.add(a.word());
        }
        for (Coordinate c : Coordinate.values()) {
            if (c.charted()) {
                words.add(c.word());
            }
        }
        return Optional.of(value.word(words.toArray(String[]::new))).filter(w -> !w.isEmpty());
    }

    private static Optional<Along> plain(String word) {
        return Arrays.stream(Along.values()).filter(a -> a.word().equals(word)).findFirst();
    }

    static <T> Optional<T> choice(Value value, T[] all, java.util.function.Function<T, String> word) {
        String[] words = new String[all.length];
        for (int i = 0; i < all.length; i++) {
            words[i] = word.apply(all[i]);
        }
        String said = value.word(words);
        for (T t : all) {
            if (word.apply(t).equals(said)) {
                return Optional.of(t);
            }
        }
        return Optional.empty();
    }

    private Optional<Knots> fromLists(Section section, Kind kind) {
        if (section.has("columns")) {
            section.fault("columns", "`columns` belongs beside `file`");
        }
        List<Value> at = section.need("at", "[0 mm, 0.2 mm, 0.4 mm]").items();
        List<Value> value = section.need("value", "[1.60, 1.59, 1.56]").items();
        double[] u = new double[at.size()];
        double[] v = new double[value.size()];
        for (int i = 0; i < u.length; i++) {
            u[i] = at.get(i).quantity(Kind.LENGTH);
        }
        for (int i = 0; i < v.length; i++) {
            v[i] = value.get(i).quantity(kind);
        }
        if (!section.has("at") || !section.has("value") || u.length + v.length == 0) {
            if (section.has("at") && section.has("value") && section.at("at").isList()) {
                section.fault("at", "a table needs at least 2 knots; here there are none");
            }
            return Optional.empty();
        }
        boolean sound = true;
        if (u.length != v.length) {
            section.fault(
                    "value",
                    "there are " + u.length + " places in `at` and " + v.length + " values; one each is needed");
            sound = false;
        }
        if (u.length < 2) {
            section.fault("at", "a table needs at least 2 knots; here there is " + u.length);
            sound = false;
        }
        for (int i = 0; i < u.length; i++) {
            sound &= !Double.isNaN(u[i]);
            if (i > 0 && u[i] <= u[i - 1]) {
                at.get(i).fault(order(u[i - 1], u[i]));
                sound = false;
            }
        }
        for (double d : v) {
            sound &= !Double.isNaN(d);
        }
        return sound ? Optional.of(new Knots(u, v, List.of())) : Optional.empty();
    }

    private static String order(double before, double here) {
        return here == before
                ? "there are two values at " + Told.length(here) + "; each place is needed once"
                : Told.length(here) + " comes after " + Told.length(before) + "; places must ascend";
    }

    private Optional<Knots> fromFile(Section section, Kind kind) {
        Value file = section.need("file");
        for (String key : new String[] {"at", "value"}) {
            if (section.has(key)) {
                section.fault(key, "`" + key + "` and `file` cannot stand together; one of them gives the table");
            }
        }
        Optional<Value> columns = section.find("columns");
        List<Value> names = columns.map(Value::items).orElse(List.of());
        if (columns.isPresent() && columns.get().isList() && names.size() != 2) {
            columns.get().fault("two names are needed, of the coordinate and of the value, not " + names.size());
            return Optional.empty();
        }
        String name = file.text();
        if (name.isEmpty()) {
            return Optional.empty();
        }
        Table table;
        try {
            table = sources.table(name, file.place());
        } catch (ProblemException e) {
            e.problems().forEach(p -> problems.add(new Problem(p.kind(), p.place(), file.path(), p.message())));
            return Optional.empty();
        }
        int first;
        int second;
        if (columns.isEmpty()) {
            if (table.headers().size() != 2) {
                file.fault(table.source() + " has " + table.headers().size() + " columns ("
                        + String.join(", ", table.headers()) + "); `columns: [place, value]` says which to take");
                return Optional.empty();
            }
            first = 0;
            second = 1;
        } else {
            first = column(table, names.get(0));
            second = column(table, names.get(1));
        }
        if (first < 0 || second < 0) {
            return Optional.empty();
        }
        Optional<double[]> u = converted(table, first, Kind.LENGTH, file);
        Optional<double[]> v = converted(table, second, kind, file);
        if (u.isEmpty() || v.isEmpty()) {
            return Optional.empty();
        }
        double[] at = u.get();
        if (at.length < 2) {
            file.fault(table.source() + ": a table needs at least 2 rows; here there are " + at.length);
            return Optional.empty();
        }
        for (int i = 1; i < at.length; i++) {
            if (at[i] <= at[i - 1]) {
                file.fault(String.format(
                        Locale.ROOT, "%s, row %d of the values: %s", table.source(), i + 1, order(at[i - 1], at[i])));
                return Optional.empty();
            }
        }
        List<String> notes = new ArrayList<>();
        for (String n : table.notes()) {
            notes.add(table.source() + ": " + n);
        }
        return Optional.of(new Knots(at, v.get(), notes));
    }

    private static int column(Table table, Value name) {
        int i = table.headers().indexOf(name.text());
        if (i < 0 && !name.text().isEmpty()) {
            name.fault(table.source() + " has no column " + Words.quoted(name.text())
                    + Words.remedy(name.text(), table.headers()));
        }
        return i;
    }

    /** A column in SI; a unit that does not fit is a fault of the file. */
    private static Optional<double[]> converted(Table table, int column, Kind kind, Value file) {
        String symbol = table.units().get(column);
        String header = table.headers().get(column);
        Optional<Unit> unit = symbol.isEmpty() ? Units.parse("1") : Units.parse(symbol);
        if (unit.isEmpty()
                || !unit.get().dimension().equals(kind.dimension())
                || (symbol.isEmpty() && !kind.dimension().equals(Dimension.NONE))) {
            String shown = symbol.isEmpty() ? "has no unit" : "is in " + Words.quoted(symbol);
            file.fault(table.source() + ": column " + Words.quoted(header) + " " + shown + "; " + kind.describe()
                    + " is needed"
                    + (kind.unit().isEmpty() ? "" : ", with a header such as " + header + " [" + kind.unit() + "]"));
            return Optional.empty();
        }
        double[] raw = table.columns().get(column);
        double[] si = new double[raw.length];
        for (int i = 0; i < raw.length; i++) {
            si[i] = unit.get().toSi(raw[i]);
            if (!Double.isFinite(si[i])) {
                file.fault(table.source() + ": column " + Words.quoted(header) + " has no number in row " + (i + 1)
                        + " of the values");
                return Optional.empty();
            }
        }
        return Optional.of(si);
    }
}
