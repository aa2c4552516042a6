package org.stillpath.study;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.stillpath.job.Cells;
import org.stillpath.job.Node;
import org.stillpath.job.Paths;
import org.stillpath.job.Section;
import org.stillpath.job.Value;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;
import org.stillpath.unit.Decimal;
import org.stillpath.unit.Quantity;
import org.stillpath.unit.UnitException;
import org.stillpath.unit.Units;

/**
 * The study {@code batch}: one run a row of a CSV file. A column whose header is the path of an input gives its values, in
 * the header's unit; the others are carried along. Cells go into the job's tree as they stand, with their place in the
 * file, so that no digit is lost and a fault is told by row and column; the other rows are computed all the same.
 *
 * <p>Angles are in the unit of the header: {@code deg}, {@code gon}, {@code rad}.., or {@code DMS} for degrees, minutes and
 * seconds: {@code 89 45 12.3}, {@code 89-45-12.3}, {@code 89:45:12.3}, {@code 89°45'12.3"}, or packed, {@code 89.45123}.
 * Nothing is guessed: without one of these headers an angle is a fault.
 */
final class BatchStudy implements Study {
    private static final int MOST_ROWS = 500_000;
    private static final Pattern DMS =
            Pattern.compile("([-+\u2212]?)\\s*(\\d+)(?:[\\s:-]+(\\d+))?(?:[\\s:-]+(\\d+(?:\\.\\d*)?))?");
    private static final Pattern PACKED = Pattern.compile("([-+\u2212]?)(\\d+)\\.(\\d{2})(\\d{2})(\\d*)");

    @Override
    public String key() {
        return "batch";
    }

    /**
     * A column that sets an input.
     *
     * @param index place among the cells
     * @param path the input's path
     * @param unit unit of the header; empty where there is none
     * @param sexagesimal whether cells are degrees, minutes and seconds
     */
    private record Column(int index, String path, String unit, boolean sexagesimal) {}

    @Override
    public Plan read(Value value, Desk desk) {
        Section s = value.section();
        Value file = s.need("file", "sights.csv");
        s.finish();
        Optional<Cells> cells = Optional.empty();
        if (!file.isPlaceholder() && !file.text().isEmpty()) {
            try {
                cells = Optional.of(desk.sources().cells(file.text(), file.place()));
            } catch (ProblemException e) {
                for (Problem p : e.problems()) {
                    boolean here = p.place().equals(file.place());
                    desk.problems().add(here ? new Problem(p.kind(), p.place(), file.path(), p.message()) : p);
                }
            }
        }
        if (cells.isEmpty()) {
            return new Batch(
                    desk.job(),
                    new Cells("", List.of(), List.of(), List.of()),
                    List.of(),
                    List.of(),
                    List.of(),
                    file.place());
        }
        return columns(cells.get(), file, desk);
    }

    private static Batch columns(Cells cells, Value file, Desk desk) {
        List<Column> columns = new ArrayList<>();
        List<Integer> carried = new ArrayList<>();
        List<String> notes = new ArrayList<>();
        cells.notes().forEach(n -> notes.add(cells.source() + ": " + n));
        List<String> paths = new ArrayList<>();
        for (int i = 0; i < cells.headers().size(); i++) {
            Cells.Header h = cells.headers().get(i);
            if (!isInput(h.name(), desk.job())) {
                carried.add(i);
                if (h.name().indexOf('.') > 0 && !h.unit().isEmpty()) {
                    notes.add(cells.source() + ": the column " + Words.quoted(h.text())
                            + " names no input of this job and is carried along");
                }
                continue;
            }
            boolean sexagesimal = h.unit().equalsIgnoreCase("dms");
            if (!h.unit().isEmpty() && !sexagesimal && Units.parse(h.unit()).isEmpty()) {
                desk.problems()
                        .add(
                                h.place(),
                                "",
                                "column " + Words.quoted(h.name()) + ": " + Words.quoted(h.unit())
                                        + " is not a unit known here"
                                        + Words.nearest(h.unit(), Units.symbols())
                                                .map(n -> "; did you mean " + n + "?")
                                                .orElse("; angles may be in deg, gon or DMS"));
                continue;
            }
            String key = h.name().replace("]", "").replace('[', '.');
            if (paths.contains(key)) {
                desk.problems().add(h.place(), "", "the input " + Words.quoted(h.name()) + " has two columns");
            }
            paths.add(key);
            columns.add(new Column(i, h.name(), h.unit(), sexagesimal));
        }
        if (columns.isEmpty() && desk.problems().isEmpty()) {
            desk.problems()
                    .add(
                            file.place(),
                            file.path(),
                            cells.source()
                                    + " has no column whose header is an input of this job, such as \"to.distance [m]\" or "
                                    + "\"media.rod.with.g [1/mm]\"; it has "
                                    + String.join(
                                            ", ",
                                            cells.headers().stream()
                                                    .map(Cells.Header::text)
                                                    .limit(20)
                                                    .toList()));
        }
        if (cells.rows().size() > MOST_ROWS) {
            desk.problems()
                    .add(file.place(), file.path(), "the limit of rows in a batch, " + MOST_ROWS + ", is exceeded");
        }
        return new Batch(desk.job(), cells, columns, carried, notes, file.place());
    }

    /** Whether a header is the path of an input: one that the job has, or one into a section that it has. */
    private static boolean isInput(String header, Node.Mapping job) {
        Optional<Node> there = Paths.find(job, header);
        if (there.isPresent()) {
            return there.get() instanceof Node.Scalar && !header.equals("title") && !header.equals("task");
        }
        int end = 0;
        while (end < header.length() && header.charAt(end) != '.' && header.charAt(end) != '[') {
            end++;
        }
        return end < header.length() && job.find(header.substring(0, end)).isPresent();
    }

    /** Degrees, minutes and seconds as the job file writes them; empty where the text is none. */
    static Optional<String> sexagesimal(String text) {
        if (text.indexOf('°') >= 0) {
            return Optional.of(text);
        }
        Matcher packed = PACKED.matcher(text);
        if (packed.matches()) {
            String rest = packed.group(5).isEmpty() ? "" : "." + packed.group(5);
            return Optional.of(
                    packed.group(1) + packed.group(2) + "°" + packed.group(3) + "'" + packed.group(4) + rest + "\"");
        }
        Matcher m = DMS.matcher(text);
        if (!m.matches()) {
            return Optional.empty();
        }
        return Optional.of(m.group(1) + m.group(2) + "°" + (m.group(3) == null ? "" : m.group(3) + "'")
                + (m.group(4) == null ? "" : m.group(4) + "\""));
    }

    /** A batch of a file with sound headers. */
    private record Batch(
            Node.Mapping job, Cells cells, List<Column> columns, List<Integer> carried, List<String> notes, Place place)
            implements Plan {
        @Override
        public void bind(Bench bench, Problems problems) {}

        @Override
        public long runs() {
            return cells.rows().size();
        }

        @Override
        public boolean isForEachVariant() {
            return false;
        }

        @Override
        public Optional<Node.Mapping> substitute() {
            for (int i = 0; i < cells.rows().size(); i++) {
                try {
                    return Optional.of(tree(i));
                } catch (ProblemException e) {
                    // a row at fault cannot stand for the job
                }
            }
            return Optional.empty();
        }

        /** The job with the values of a row. */
        private Node.Mapping tree(int number) {
            Cells.Row row = cells.rows().get(number);
            int given = row.cells().size();
            if (given != cells.headers().size()) {
                throw new ProblemException(Problem.input(
                        new Place(cells.source(), row.line(), 1),
                        "",
                        "the row has " + given + (given == 1 ? " cell" : " cells") + ", the header "
                                + cells.headers().size()));
            }
            Node.Mapping tree = job;
            Problems problems = new Problems();
            for (Column c : columns) {
                Place at = new Place(cells.source(), row.line(), row.columns().get(c.index()));
                Optional<String> text = text(c, row.cells().get(c.index()));
                if (text.isEmpty()) {
                    String cell = row.cells().get(c.index());
                    problems.add(
                            at,
                            c.path(),
                            cell.isEmpty()
                                    ? "the cell is empty"
                                    : Words.quoted(cell)
                                            + (c.sexagesimal()
                                                    ? " does not read as degrees, minutes and seconds, such as 89 45 12.3"
                                                    : " is not a number in " + c.unit()));
                    continue;
                }
                tree = Paths.with(tree, c.path(), new Node.Scalar(at, text.get(), false), at, problems);
            }
            problems.throwIfAny();
            return tree;
        }

        private static Optional<String> text(Column c, String cell) {
            if (cell.isEmpty()) {
                return Optional.empty();
            }
            if (c.sexagesimal()) {
                return BatchStudy.sexagesimal(cell);
            }
            if (c.unit().isEmpty()) {
                return Optional.of(cell);
            }
            return Decimal.parse(cell).isPresent()
                    ? Optional.of(c.unit().equals("1") ? cell : cell + " " + c.unit())
                    : Optional.empty();
        }

        @Override
        public Finding run(Bench bench) {
            int runs = cells.rows().size();
            Crew.Runs done = bench.crew()
                    .run(
                            "batch",
                            "batch",
                            runs,
                            bench.watch().size(),
                            new long[] {0, runs},
                            i -> bench.run(() -> tree(i), bench.watch()));
            RunTable table = new RunTable("batch", bench, done);
            table.requireSome();
            List<Watched> watch = table.watched(this::tree);
            for (int i : carried) {
                table.input(new Listing.Texts(cells.headers().get(i).text(), column(i)));
            }
            for (Column c : columns) {
                table.input(new Listing.Texts(cells.headers().get(c.index()).text(), column(c.index())));
            }
            List<Doc> rows = Doc.list();
            for (int i = 0; i < runs; i++) {
                Doc.Builder row = new Doc.Builder().put("inputs", inputs(i));
                if (!carried.isEmpty()) {
                    List<String> texts = new ArrayList<>();
                    for (int k : carried) {
                        texts.add(cell(i, k));
                    }
                    row.put("carried", Doc.Items.texts(texts));
                }
                table.finishRow(row, i);
                rows.add(row.build());
            }
            Doc.Builder doc = new Doc.Builder()
                    .put(
                            "inputs",
                            Doc.Items.texts(columns.stream().map(Column::path).toList()));
            if (!carried.isEmpty()) {
                doc.put(
                        "carried",
                        Doc.Items.texts(carried.stream()
                                .map(k -> cells.headers().get(k).text())
                                .toList()));
            }
            doc.put(
                            "watch",
                            Doc.Items.texts(
                                    watch.stream().map(w -> w.path().text()).toList()))
                    .put("rows", new Doc.Items(rows));
            int failed = done.having(Crew.Runs.FAILED);
            String headline = failed == 0
                    ? "All " + runs + " rows of " + cells.source() + " were computed"
                    : (runs - failed) + " of " + runs + " rows of " + cells.source() + " were computed";
            List<String> warnings = new ArrayList<>(notes);
            warnings.addAll(table.warnings(i -> "row " + (i + 1), this::tree));
            return new Finding(
                    "batch",
                    headline,
                    doc.build(),
                    List.of(table.listing(watch)),
                    List.of(),
                    warnings,
                    done.having(Crew.Runs.INACCURATE) == 0);
        }

        private List<String> column(int index) {
            List<String> texts = new ArrayList<>(cells.rows().size());
            for (int i = 0; i < cells.rows().size(); i++) {
                texts.add(cell(i, index));
            }
            return texts;
        }

        private String cell(int row, int index) {
            List<String> there = cells.rows().get(row).cells();
            return index < there.size() ? there.get(index) : "";
        }

        /** A row's inputs in SI; words as words, null where there is nothing sound. */
        private Doc inputs(int number) {
            List<Doc> list = Doc.list();
            for (Column c : columns) {
                String cell = cell(number, c.index());
                Optional<String> text = text(c, cell);
                try {
                    list.add(new Doc.Amount(Quantity.parse(text.orElse("")).value()));
                } catch (UnitException e) {
                    list.add(text.isPresent() && c.unit().isEmpty() ? new Doc.Text(cell) : new Doc.Amount(Double.NaN));
                }
            }
            return new Doc.Items(list);
        }
    }
}
