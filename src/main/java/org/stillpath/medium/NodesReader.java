package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.stillpath.job.Section;
import org.stillpath.job.Sources;
import org.stillpath.job.Table;
import org.stillpath.job.Value;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;
import org.stillpath.unit.Kind;
import org.stillpath.unit.Unit;
import org.stillpath.unit.Units;

/** Reads the {@code nodes:} of a job file: scattered places with a value each, in a CSV file. */
final class NodesReader {
    /** Most nodes; resampling them takes some seconds. */
    private static final int MOST = 200_000;
    /** Fewer do not carry a quadratic polynomial. */
    private static final int LEAST = 10;
    /** A residual of this part of the values' span makes the resampled field doubtful. */
    private static final double DOUBTFUL = 0.02;

    private final Sources sources;
    private final Problems problems;

    NodesReader(Sources sources, Problems problems) {
        this.sources = sources;
        this.problems = problems;
    }

    /**
     * Reads nodes and resamples them.
     *
     * @param section the value of {@code nodes:}
     * @param kind what the values are
     * @return empty after a fault
     */
    Optional<TableReader.Read> nodes(Section section, Kind kind) {
        Value file = section.need("file", "fea.csv");
        Optional<Value> said = section.find("columns");
        List<String> names = said.map(Value::items).orElse(List.of()).stream()
                .map(Value::text)
                .toList();
        section.finish();
        if (file.text().isEmpty()) {
            return Optional.empty();
        }
        if (said.isPresent() && names.size() != 4) {
            said.get().fault("four names are needed, of x, y, z and of the value, not " + names.size());
            return Optional.empty();
        }
        Table table;
        try {
            table = sources.table(file.text(), file.place());
        } catch (ProblemException e) {
            e.problems().forEach(p -> problems.add(new Problem(p.kind(), p.place(), file.path(), p.message())));
            return Optional.empty();
        }
        List<String> headers = table.headers();
        if (names.isEmpty()) {
            names = usual(headers);
        }
        double[][] columns = new double[4][];
        for (int i = 0; i < 4; i++) {
            int at = names.isEmpty() ? -1 : headers.indexOf(names.get(i));
            if (at < 0) {
                file.fault(table.source() + " has the columns " + String.join(", ", headers)
                        + "; x, y, z and a value are needed, and `columns: [x, y, z, T]` says which they are"
                        + (names.isEmpty() ? "" : Words.remedy(names.get(i), headers)));
                return Optional.empty();
            }
            Optional<double[]> si = converted(table, at, i < 3 ? Kind.LENGTH : kind, file);
            if (si.isEmpty()) {
                return Optional.empty();
            }
            columns[i] = si.get();
        }
        int count = columns[0].length;
        if (count < LEAST || count > MOST) {
            file.fault(table.source() + ": there are " + count + " nodes; from " + LEAST + " to " + MOST
                    + " can be resampled");
            return Optional.empty();
        }
        Optional<String> flat = ScatteredNodes.refusal(columns);
        if (flat.isPresent()) {
            file.fault(table.source() + ": " + flat.get());
            return Optional.empty();
        }
        ScatteredNodes nodes = ScatteredNodes.resample(columns[0], columns[1], columns[2], columns[3]);
        List<String> notes = new ArrayList<>();
        for (String n : table.notes()) {
            notes.add(table.source() + ": " + n);
        }
        notes.add(told(table.source(), count, nodes, kind));
        return Optional.of(new TableReader.Read(nodes.grid(), List.copyOf(notes)));
    }

    private static String told(String source, int count, ScatteredNodes nodes, Kind kind) {
        String unit = kind.equals(Kind.TEMPERATURE) ? " K" : "";
        if (nodes.exact()) {
            return source + ": its " + count + " nodes form a grid and are joined as one";
        }
        String text = String.format(
                Locale.ROOT,
                "%s: %d scattered nodes were resampled on %d x %d x %d planes (quadratic moving least squares); what is "
                        + "left at the nodes is %.2g%s rms, %.2g%s at most, of a span of %.3g%s",
                source,
                count,
                nodes.planes()[0],
                nodes.planes()[1],
                nodes.planes()[2],
                nodes.rms(),
                unit,
                nodes.most(),
                unit,
                nodes.span(),
                unit);
        return nodes.most() > DOUBTFUL * nodes.span()
                ? text + "; that is much: the nodes are too few for how the values change, or noisy"
                : text;
    }

    /** The headers x, y, z and the one that is left. */
    private static List<String> usual(List<String> headers) {
        List<String> names = new ArrayList<>();
        List<String> rest = new ArrayList<>(headers);
        for (String axis : List.of("x", "y", "z")) {
            Optional<String> found =
                    rest.stream().filter(h -> h.equalsIgnoreCase(axis)).findFirst();
            if (found.isEmpty()) {
                return List.of();
            }
            names.add(found.get());
            rest.remove(found.get());
        }
        Optional<String> value = rest.size() == 1
                ? Optional.of(rest.get(0))
                : rest.stream()
                        .filter(h -> h.equals("T") || h.equalsIgnoreCase("temperature"))
                        .findFirst();
        if (value.isEmpty()) {
            return List.of();
        }
        names.add(value.get());
        return names;
    }

    private static Optional<double[]> converted(Table table, int column, Kind kind, Value file) {
        String symbol = table.units().get(column);
        String header = table.headers().get(column);
        Optional<Unit> unit = Units.parse(symbol).filter(u -> u.dimension().equals(kind.dimension()));
        if (symbol.isEmpty() || unit.isEmpty()) {
            file.fault(table.source() + ": column " + Words.quoted(header) + " "
                    + (symbol.isEmpty() ? "has no unit" : "is in " + Words.quoted(symbol)) + "; " + kind.describe()
                    + " is needed, with a header such as " + header + " [" + kind.unit() + "]");
            return Optional.empty();
        }
        double[] si = table.columns().get(column).clone();
        for (int i = 0; i < si.length; i++) {
            si[i] = unit.get().toSi(si[i]);
        }
        return Optional.of(si);
    }
}
