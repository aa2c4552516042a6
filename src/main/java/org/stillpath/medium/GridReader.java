package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.stillpath.job.Lattice;
import org.stillpath.job.Section;
import org.stillpath.job.Sources;
import org.stillpath.job.Value;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;
import org.stillpath.unit.Kind;
import org.stillpath.unit.Unit;
import org.stillpath.unit.Units;

/**
 * Reads the {@code grid:} of a job file: nodes of a rectilinear grid in a CSV or VTK file.
 *
 * <p>Units are never guessed: a CSV file names them in its header or the job names them, a VTK file has no place for
 * them, so that the job must. What would still be plausible if millimetres had been read as metres is told.
 */
final class GridReader {
    /** An index from here on is that of a liquid or a solid, not of a gas. */
    private static final double DENSE = 1.2;
    /** Metres; blocks of dense matter are seldom longer, and seldom shorter than the other. */
    private static final double LONG_BLOCK = 1;

    private static final double SHORT_BLOCK = 1e-6;
    /** Planes nearer than this part of their axis make the spline's equations useless. */
    private static final double NEAR = 1e-9;

    private final Sources sources;
    private final Problems problems;

    GridReader(Sources sources, Problems problems) {
        this.sources = sources;
        this.problems = problems;
    }

    /**
     * Reads a grid.
     *
     * @param section the value of {@code grid:}
     * @param kind what its values are
     * @param less what is taken off each value before they are joined: 1 for an index
     * @return empty after a fault
     */
    Optional<TableReader.Read> grid(Section section, Kind kind, double less) {
        Value file = section.need("file", "block.csv");
        Optional<List<String>> columns = columns(section);
        Optional<String> array = section.find("array").map(Value::text).filter(t -> !t.isEmpty());
        Optional<Unit> unit = unit(section, "unit", Kind.LENGTH);
        Optional<Unit> valueUnit = unit(section, "value-unit", kind);
        boolean unitsRead =
                section.has("unit") == unit.isPresent() && section.has("value-unit") == valueUnit.isPresent();
        section.find("interpolate").ifPresent(v -> v.word(Interpolation.SPLINE.word()));
        Optional<Beyond> beyond = section.has("beyond")
                ? TableReader.choice(section.at("beyond"), new Beyond[] {Beyond.FAULT, Beyond.HOLD}, Beyond::word)
                : Optional.of(Beyond.FAULT);
        section.finish();
        String name = file.text();
        if (name.isEmpty() || columns.isEmpty() || beyond.isEmpty() || !unitsRead) {
            return Optional.empty();
        }
        Lattice lattice;
        try {
            lattice = sources.lattice(name, new Lattice.Wanted(columns.get(), array), file.place());
        } catch (ProblemException e) {
            e.problems().forEach(p -> problems.add(new Problem(p.kind(), p.place(), file.path(), p.message())));
            return Optional.empty();
        }
        Optional<double[]> x = converted(lattice, lattice.x(), Kind.LENGTH, unit, "unit", section);
        Optional<double[]> y = converted(lattice, lattice.y(), Kind.LENGTH, unit, "unit", section);
        Optional<double[]> z = converted(lattice, lattice.z(), Kind.LENGTH, unit, "unit", section);
        Optional<double[]> value = converted(lattice, lattice.value(), kind, valueUnit, "value-unit", section);
        if (x.isEmpty() || y.isEmpty() || z.isEmpty() || value.isEmpty()) {
            return Optional.empty();
        }
        boolean apart = apart(lattice.x(), x.get(), section);
        apart &= apart(lattice.y(), y.get(), section);
        apart &= apart(lattice.z(), z.get(), section);
        if (!apart) {
            return Optional.empty();
        }
        List<String> notes = new ArrayList<>();
        for (String n : lattice.notes()) {
            notes.add(lattice.source() + ": " + n);
        }
        if (kind.equals(Kind.NUMBER) && less == 1) {
            sense(lattice.source(), new double[][] {x.get(), y.get(), z.get()}, value.get(), notes);
        }
        double[] joined = value.get();
        for (int i = 0; i < joined.length; i++) {
            joined[i] -= less;
        }
        return Optional.of(
                new TableReader.Read(Grid.of(x.get(), y.get(), z.get(), joined, beyond.get()), List.copyOf(notes)));
    }

    /** The headers to take, none where nothing is said; empty after a fault. */
    private static Optional<List<String>> columns(Section section) {
        Optional<Value> said = section.find("columns");
        if (said.isEmpty()) {
            return Optional.of(List.of());
        }
        List<Value> items = said.get().items();
        if (items.size() != 4) {
            if (said.get().isList()) {
                said.get().fault("four names are needed, of x, y, z and of the value, not " + items.size());
            }
            return Optional.empty();
        }
        List<String> names = items.stream().map(Value::text).toList();
        return names.contains("") ? Optional.empty() : Optional.of(names);
    }

    /** A unit that the job gives; empty if it does not, or after a fault. */
    private static Optional<Unit> unit(Section section, String key, Kind kind) {
        Optional<Value> said = section.find(key);
        if (said.isEmpty() || said.get().text().isEmpty()) {
            return Optional.empty();
        }
        String symbol = said.get().text();
        Optional<Unit> unit = Units.parse(symbol).filter(u -> u.dimension().equals(kind.dimension()));
        if (unit.isEmpty()) {
            said.get()
                    .fault(Words.quoted(symbol) + (Units.parse(symbol).isEmpty() ? " is not a unit" : " does not fit")
                            + "; the unit of " + kind.describe() + " is needed"
                            + (kind.unit().isEmpty()
                                    ? ", which is 1; leave `" + key + "` out"
                                    : ", such as `" + key + ": " + kind.unit() + "`"));
        }
        return unit;
    }

    /** Numbers in SI; a unit that is missing, doubled or does not fit is a fault. */
    private Optional<double[]> converted(
            Lattice lattice, Lattice.Column column, Kind kind, Optional<Unit> said, String key, Section section) {
        String symbol = column.unit();
        Optional<Unit> own = symbol.isEmpty() ? Optional.empty() : Units.parse(symbol);
        if (!symbol.isEmpty() && said.isPresent()) {
            section.fault(
                    key,
                    lattice.source() + " names its units itself, " + column.name() + " [" + symbol + "]; leave `" + key
                            + "` out");
            return Optional.empty();
        }
        if (!symbol.isEmpty()
                && own.filter(u -> u.dimension().equals(kind.dimension())).isEmpty()) {
            problems.add(
                    column.place(),
                    section.path(),
                    "column " + Words.quoted(column.name()) + " is in " + Words.quoted(symbol)
                            + (own.isEmpty() ? ", which is not a unit" : "") + "; " + kind.describe() + " is needed"
                            + (kind.unit().isEmpty()
                                    ? ""
                                    : ", with a header such as " + column.name() + " [" + kind.unit() + "]"));
            return Optional.empty();
        }
        if (own.isEmpty() && said.isEmpty() && !kind.unit().isEmpty()) {
            String remedy = "`" + key + ": " + kind.unit() + "` beside `file`";
            if (lattice.namesUnits()) {
                problems.add(
                        column.place(),
                        section.path(),
                        "column " + Words.quoted(column.name()) + " has no unit; " + kind.describe()
                                + " is needed, with a header such as " + column.name() + " [" + kind.unit() + "], or "
                                + remedy);
            } else {
                section.fault(
                        "file",
                        lattice.source() + " is a VTK file, which names no units; " + remedy + " says in which "
                                + (key.equals("unit") ? "its coordinates are" : "its values are"));
            }
            return Optional.empty();
        }
        double[] raw = column.numbers();
        double[] si = new double[raw.length];
        Optional<Unit> unit = own.or(() -> said);
        for (int i = 0; i < si.length; i++) {
            si[i] = unit.isPresent() ? unit.get().toSi(raw[i]) : raw[i];
            if (!Double.isFinite(si[i])) {
                problems.add(
                        column.place(),
                        section.path(),
                        Words.quoted(column.name()) + " has the value " + raw[i] + ", which is out of range");
                return Optional.empty();
            }
        }
        return Optional.of(si);
    }

    private boolean apart(Lattice.Column column, double[] at, Section section) {
        double least = NEAR * (at[at.length - 1] - at[0]);
        for (int i = 1; i < at.length; i++) {
            if (!(at[i] - at[i - 1] > least)) {
                problems.add(
                        column.place(),
                        section.path(),
                        "two planes along " + column.name() + " are too near to each other, at "
                                + Told.length(at[i - 1]) + " and " + Told.length(at[i]) + "; leave one out");
                return false;
            }
        }
        return true;
    }

    /** Tells of a block whose size does not go with its index. */
    private static void sense(String source, double[][] axes, double[] index, List<String> notes) {
        double largest = Double.NEGATIVE_INFINITY;
        for (double n : index) {
            largest = Math.max(largest, n);
        }
        double most = 0;
        for (double[] at : axes) {
            most = Math.max(most, at[at.length - 1] - at[0]);
        }
        if (largest < DENSE || (most < LONG_BLOCK && most > SHORT_BLOCK)) {
            return;
        }
        notes.add(String.format(
                Locale.ROOT,
                "%s: the grid is %s long and its index goes up to %s; if that is not meant, its unit of length is wrong,"
                        + " such as %s for %s",
                source,
                Told.length(most),
                Told.number(largest),
                most < LONG_BLOCK ? "mm" : "m",
                most < LONG_BLOCK ? "m" : "mm"));
    }
}
