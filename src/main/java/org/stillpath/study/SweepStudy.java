package org.stillpath.study;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.job.Section;
import org.stillpath.job.Value;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.task.Figure;
import org.stillpath.unit.Display;

/** The study {@code sweep}: one or two inputs go through their ranges; the first varies slowest. */
final class SweepStudy implements Study {
    private static final int MOST_VALUES = 100_000;
    private static final int MOST_RUNS = 500_000;

    @Override
    public String key() {
        return "sweep";
    }

    /** An input and its values, SI. */
    private record Range(Input input, double[] values) {}

    @Override
    public Plan read(Value value, Desk desk) {
        Section s = value.section();
        List<String> paths = s.names();
        List<Range> ranges = new ArrayList<>();
        if (!s.isPlaceholder() && (paths.isEmpty() || paths.size() > 2)) {
            s.fault(paths.size() + " inputs stand here; a sweep varies one or two, such as "
                    + "{media.rod.with.g: {from: 0.28 1/mm, to: 0.32 1/mm, count: 41}}");
            return new Sweep(ranges);
        }
        for (String path : paths) {
            range(path, s, desk).ifPresent(ranges::add);
        }
        if (ranges.size() == 2
                && ranges.get(0).input().key().equals(ranges.get(1).input().key())) {
            desk.problems().add(s.keyPlace(paths.get(1)), s.path(), "this is the same input as " + paths.get(0));
        }
        long runs = ranges.stream().mapToLong(r -> r.values().length).reduce(1, (a, b) -> a * b);
        if (runs > MOST_RUNS) {
            s.fault("the limit of runs in a sweep, " + MOST_RUNS + ", is exceeded: " + runs);
        }
        return new Sweep(ranges);
    }

    private static Optional<Range> range(String path, Section s, Desk desk) {
        Section r = s.at(path).section();
        if (r.isPlaceholder()) {
            return Optional.empty();
        }
        if (r.has("values")) {
            List<Value> items = r.at("values").items();
            r.finish();
            if (items.isEmpty() || items.size() > MOST_VALUES) {
                r.fault("values", items.size() + " values stand here; 1 to " + MOST_VALUES + " are needed");
                return Optional.empty();
            }
            Optional<Input> input = Input.find(desk.job(), path, s.keyPlace(path), items.get(0), desk.problems());
            return input.map(i -> new Range(
                    i, items.stream().mapToDouble(v -> v.quantity(i.kind())).toArray()));
        }
        Value from = r.need("from", "0.28 1/mm");
        Value to = r.need("to", "0.32 1/mm");
        int count = r.need("count", "41").count(2, MOST_VALUES);
        r.finish();
        if (from.isPlaceholder() || to.isPlaceholder()) {
            return Optional.empty();
        }
        Optional<Input> input = Input.find(desk.job(), path, s.keyPlace(path), from, desk.problems());
        return input.map(i -> new Range(i, spread(from.quantity(i.kind()), to.quantity(i.kind()), count)));
    }

    /** Evenly from one end to the other, both exactly. */
    private static double[] spread(double from, double to, int count) {
        double[] values = new double[count];
        for (int i = 0; i < count; i++) {
            values[i] = i == count - 1 ? to : from + (to - from) * i / (count - 1);
        }
        return values;
    }

    /** A sweep of sound ranges. */
    private record Sweep(List<Range> ranges) implements Plan {
        @Override
        public void bind(Bench bench, Problems problems) {}

        @Override
        public long runs() {
            return ranges.stream().mapToLong(r -> r.values().length).reduce(1, (a, b) -> a * b);
        }

        @Override
        public Finding run(Bench bench) {
            List<Input> inputs = ranges.stream().map(Range::input).toList();
            int inner = ranges.size() == 2 ? ranges.get(1).values().length : 1;
            int runs = ranges.get(0).values().length * inner;
            int width = bench.watch().size();
            Crew.Runs done = bench.crew()
                    .run(
                            bench.stage("sweep"),
                            "sweep",
                            runs,
                            width,
                            new long[] {0, runs},
                            i -> bench.run(inputs, values(i, inner), bench.watch()));
            RunTable table = new RunTable("sweep", bench, done);
            double[][] columns = new double[inputs.size()][runs];
            for (int i = 0; i < runs; i++) {
                double[] v = values(i, inner);
                for (int k = 0; k < v.length; k++) {
                    columns[k][i] = v[k];
                }
            }
            table.requireSome();
            for (int k = 0; k < inputs.size(); k++) {
                Input input = inputs.get(k);
                table.input(new Listing.Numbers(input.path(), input.unit(), input.shown(), columns[k], 0));
            }
            List<Watched> watch = table.watched(i -> bench.with(inputs, values(i, inner)));
            List<Doc> rows = Doc.list();
            for (int i = 0; i < runs; i++) {
                Doc.Builder row = new Doc.Builder().put("inputs", Doc.Items.numbers(values(i, inner)));
                table.finishRow(row, i);
                rows.add(row.build());
            }
            Doc doc = new Doc.Builder()
                    .put(
                            "inputs",
                            Doc.Items.texts(inputs.stream().map(Input::path).toList()))
                    .put(
                            "watch",
                            Doc.Items.texts(
                                    watch.stream().map(w -> w.path().text()).toList()))
                    .put("rows", new Doc.Items(rows))
                    .build();
            List<Figure> figures = bench.figures().contains("sweep")
                    ? SweepFigures.of(bench, inputs, columns, inner, watch, done)
                    : List.of();
            return new Finding(
                    "sweep",
                    headline(bench, inputs, watch, done),
                    doc,
                    List.of(table.listing(watch)),
                    figures,
                    table.warnings(i -> said(inputs, values(i, inner)), i -> bench.with(inputs, values(i, inner))),
                    done.having(Crew.Runs.INACCURATE) == 0);
        }

        private double[] values(int number, int inner) {
            double first = ranges.get(0).values()[number / inner];
            return ranges.size() == 1
                    ? new double[] {first}
                    : new double[] {first, ranges.get(1).values()[number % inner]};
        }

        private static String said(List<Input> inputs, double[] values) {
            List<String> parts = new ArrayList<>();
            for (int i = 0; i < values.length; i++) {
                parts.add(inputs.get(i).path() + " = " + inputs.get(i).say(values[i]));
            }
            return String.join(", ", parts);
        }

        private String headline(Bench bench, List<Input> inputs, List<Watched> watch, Crew.Runs done) {
            String where = bench.variant().isEmpty() ? "" : " (variant " + bench.variant() + ")";
            List<String> over = new ArrayList<>();
            for (Range r : ranges) {
                Input input = r.input();
                double[] v = r.values();
                over.add(input.path() + " from " + input.say(v[0]) + " to " + input.say(v[v.length - 1]));
            }
            String range = String.join(" and ", over) + ", " + done.count() + " runs" + where;
            Span span = Span.of(done.column(0));
            if (span.count() == 0) {
                return "No run gave " + watch.get(0).path().label() + " over " + range;
            }
            double error = span.said(watch.get(0).error(), 1e-4);
            String unit = watch.get(0).unitOrOne();
            String label = capital(watch.get(0).path().label());
            if (inputs.size() == 1 && span.isFirst() && span.isLast()) {
                return label + " goes from " + Display.of(span.first(), unit, error) + " to "
                        + Display.of(span.last(), unit, error) + " over " + range;
            }
            return label + " lies between " + Display.of(span.low(), unit, error) + " and "
                    + Display.of(span.high(), unit, error) + " over " + range;
        }
    }

    static String capital(String text) {
        return text.isEmpty() ? text : Character.toUpperCase(text.charAt(0)) + text.substring(1);
    }

    /** First, last, least and greatest of numbers, those that are there, and whether all are whole. */
    record Span(int count, double first, double last, double low, double high, boolean whole) {
        static Span of(double[] values) {
            int n = 0;
            double low = Double.POSITIVE_INFINITY;
            double high = Double.NEGATIVE_INFINITY;
            boolean whole = true;
            for (double v : values) {
                if (!Double.isNaN(v)) {
                    n++;
                    whole &= v == Math.rint(v);
                    low = Math.min(low, v);
                    high = Math.max(high, v);
                }
            }
            return new Span(n, values[0], values[values.length - 1], low, high, whole);
        }

        /** To what a number of them is said: a part of their spread, unless they are counts. */
        double said(double error, double part) {
            return whole ? error : Math.max(error, part * (high - low));
        }

        boolean isFirst() {
            return !Double.isNaN(first);
        }

        boolean isLast() {
            return !Double.isNaN(last);
        }
    }

    /** Says that nothing could be run at all. */
    static ProblemException nothing(Bench bench, String key, String fault) {
        return new ProblemException(
                Problem.input(bench.tree().place(), "study." + key, "no run gave a result; the first said: " + fault));
    }
}
