package org.stillpath.study;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.stillpath.job.Node;
import org.stillpath.job.Section;
import org.stillpath.job.Value;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;
import org.stillpath.task.BarFigure;
import org.stillpath.task.ChartFigure;
import org.stillpath.task.Figure;
import org.stillpath.task.Result;
import org.stillpath.task.ResultPath;
import org.stillpath.unit.Display;
import org.stillpath.unit.Kind;

/**
 * The study {@code fit}: unknowns from measured or wanted results, over one set-up or several, by bounded least squares
 * ({@link LeastSquares}) from several starts.
 */
final class FitStudy implements Study {
    private static final int MOST_UNKNOWNS = 50;
    private static final int MOST_MATCHES = 100_000;
    private static final int USUAL_STARTS = 5;
    private static final int MOST_STARTS = 200;
    /** From this condition number on unknowns are hardly told apart: four digits of the values are gone. */
    private static final double POOR = 1e4;
    /** Chi-square that is exceeded, or fallen below, by chance once in a thousand times is told. */
    private static final double UNLIKELY = 1e-3;

    private static final int[] PRIMES = {2, 3, 5, 7, 11, 13, 17, 19, 23, 29, 31, 37, 41, 43, 47};

    @Override
    public String key() {
        return "fit";
    }

    /** An unknown. */
    private record Unknown(Input input, double start, double low, double high) {
        boolean isBounded() {
            return Double.isFinite(low) && Double.isFinite(high);
        }
    }

    /** A result that is to match: its value and uncertainty are read once its unit is known. */
    private record Match(String variant, ResultPath path, Value at, Value value, Optional<Value> standard) {}

    @Override
    public Plan read(Value value, Desk desk) {
        Section s = value.section();
        Section given = s.need("unknowns", "{media.rod.with.g: {start: 0.3 1/mm, low: 0.1 1/mm, high: 0.5 1/mm}}")
                .section();
        List<Unknown> unknowns = new ArrayList<>();
        List<String> names = given.names();
        if (!given.isPlaceholder() && (names.isEmpty() || names.size() > MOST_UNKNOWNS)) {
            given.fault(names.size() + " unknowns stand here; 1 to " + MOST_UNKNOWNS + " are needed");
        }
        for (String path : names) {
            unknown(path, given, desk).ifPresent(unknowns::add);
        }
        for (int i = 0; i < unknowns.size(); i++) {
            for (int j = 0; j < i; j++) {
                if (unknowns.get(i).input().key().equals(unknowns.get(j).input().key())) {
                    desk.problems()
                            .add(
                                    unknowns.get(i).input().place(),
                                    given.path(),
                                    "this is the same input as " + names.get(j));
                }
            }
        }
        Value wanted = s.need("match", "{quantities.back-focal-distance: {value: 1.85 mm, standard: 0.01 mm}}");
        List<Match> matches = new ArrayList<>();
        if (wanted.isList()) {
            for (Value item : wanted.items()) {
                Section m = item.section();
                Value path = m.need("result", "quantities.back-focal-distance");
                String variant = m.find("variant").map(v -> variant(v, desk)).orElse("");
                match(variant, path, path.isPlaceholder() ? Optional.empty() : Studies.readPath(path), m)
                        .ifPresent(matches::add);
            }
        } else if (!wanted.isPlaceholder()) {
            Section all = wanted.section();
            for (String path : all.names()) {
                Value at = all.at(path);
                Value named = Value.of(new Node.Scalar(all.keyPlace(path), path, false), all.path(), desk.problems());
                match("", at, Studies.readPath(named), at.section()).ifPresent(matches::add);
            }
        }
        if (matches.size() > MOST_MATCHES) {
            wanted.fault("the limit of values to match, " + MOST_MATCHES + ", is exceeded");
        }
        boolean sound = desk.problems().isEmpty();
        if (sound && matches.size() < unknowns.size()) {
            wanted.fault(unknowns.size() + " unknowns need at least as many values to match; " + matches.size()
                    + (matches.size() == 1 ? " is" : " are") + " given");
        }
        long certain = matches.stream().filter(m -> m.standard().isPresent()).count();
        if (certain > 0 && certain < matches.size()) {
            matches.stream()
                    .filter(m -> m.standard().isEmpty())
                    .forEach(m -> m.at().fault(
                                    "`standard`, the standard uncertainty, is missing here and given elsewhere; "
                                            + "give it for all values or for none"));
        }
        boolean bounded = unknowns.stream().allMatch(Unknown::isBounded);
        int starts = s.find("starts").map(v -> v.count(1, MOST_STARTS)).orElse(bounded ? USUAL_STARTS : 1);
        s.finish();
        return new Fit(unknowns, matches, starts, desk.variants());
    }

    private static Optional<Unknown> unknown(String path, Section given, Desk desk) {
        Section s = given.at(path).section();
        if (s.isPlaceholder()) {
            return Optional.empty();
        }
        Optional<Value> start = s.find("start");
        Optional<Value> low = s.find("low");
        Optional<Value> high = s.find("high");
        s.finish();
        Optional<Value> sample = start.or(() -> low).or(() -> high);
        Value any = sample.orElseGet(() -> given.at(path));
        if (sample.isEmpty() && org.stillpath.job.Paths.find(desk.job(), path).isEmpty()) {
            s.need("start", "0.3 1/mm");
            return Optional.empty();
        }
        Optional<Input> found = Input.find(desk.job(), path, given.keyPlace(path), any, desk.problems());
        if (found.isEmpty()) {
            return Optional.empty();
        }
        Input input = found.get();
        double from = start.map(v -> v.quantity(input.kind())).orElse(input.nominal());
        double least = low.map(v -> v.quantity(input.kind())).orElse(Double.NEGATIVE_INFINITY);
        double most = high.map(v -> v.quantity(input.kind())).orElse(Double.POSITIVE_INFINITY);
        if (Double.isNaN(from)) {
            if (start.isEmpty()) {
                s.need("start", "0.3 1/mm");
            }
            return Optional.empty();
        }
        if (Double.isNaN(least) || Double.isNaN(most)) {
            return Optional.empty();
        }
        if (!(least < most)) {
            s.fault("low", "the low bound must lie below the high one");
            return Optional.empty();
        }
        if (from < least || from > most) {
            s.fault(start.isPresent() ? "start" : "low", "the start, " + input.say(from) + ", lies outside the bounds");
            return Optional.empty();
        }
        return Optional.of(new Unknown(input, from, least, most));
    }

    private static String variant(Value v, Desk desk) {
        String name = v.text();
        if (!name.isEmpty() && !desk.variants().containsKey(name)) {
            v.fault("there is no variant " + Words.quoted(name)
                    + Words.remedy(name, desk.variants().keySet()));
        }
        return name;
    }

    private static Optional<Match> match(String variant, Value at, Optional<ResultPath> path, Section s) {
        Value value = s.need("value", "1.85 mm");
        Optional<Value> standard = s.find("standard");
        s.finish();
        return value.isPlaceholder() ? Optional.empty() : path.map(p -> new Match(variant, p, at, value, standard));
    }

    /** A fit of sound unknowns. */
    private record Fit(List<Unknown> unknowns, List<Match> matches, int starts, Map<String, Node.Mapping> variants)
            implements Plan {
        @Override
        public boolean isForEachVariant() {
            return false;
        }

        /** What is to be matched, in SI. */
        private record Target(String[] units, double[] values, double[] standards, boolean weighted, double noise) {}

        /** It goes on until it has found the least. */
        @Override
        public long runs() {
            return 0;
        }

        @Override
        public void bind(Bench bench, Problems problems) {
            target(bench, problems);
        }

        private List<Input> inputs() {
            return unknowns.stream().map(Unknown::input).toList();
        }

        private Node.Mapping tree(Bench bench, String variant) {
            return variant.isEmpty() ? bench.tree() : variants.getOrDefault(variant, bench.tree());
        }

        /** Values and uncertainties in SI, their units told by the results at the start. */
        private Target target(Bench bench, Problems problems) {
            double[] start = unknowns.stream().mapToDouble(Unknown::start).toArray();
            Map<String, Result> results = new LinkedHashMap<>();
            int m = matches.size();
            Target t = new Target(new String[m], new double[m], new double[m], true, 0);
            double noise = 1e-15;
            boolean weighted = true;
            for (int i = 0; i < m; i++) {
                Match match = matches.get(i);
                Result r;
                try {
                    r = results.computeIfAbsent(
                            match.variant(),
                            v -> bench.result(at(bench, tree(bench, v)).with(inputs(), start)));
                } catch (ProblemException e) {
                    e.problems().forEach(problems::add);
                    return t;
                }
                Optional<ResultPath.Found> found = match.path().find(r);
                if (found.isEmpty()) {
                    problems.add(
                            match.at().place(),
                            match.at().path(),
                            "at the start there is no result "
                                    + Words.quoted(match.path().text())
                                    + Studies.near(match.path(), r).orElse("; begin where there is one"));
                    continue;
                }
                Kind kind = BudgetStudy.kind(found.get().unit());
                t.units()[i] = found.get().unit();
                t.values()[i] = again(match.value(), problems).quantity(kind);
                Optional<Value> standard = match.standard();
                if (standard.isPresent()) {
                    t.standards()[i] = again(standard.get(), problems).positive(kind);
                } else {
                    // wanted values without uncertainties count by their size
                    double size = Math.max(
                            Math.abs(t.values()[i]), Math.abs(found.get().value()));
                    t.standards()[i] = size > 0 ? size : 1;
                    weighted = false;
                }
                double value = Math.abs(found.get().value());
                noise = Math.max(noise, value > 0 ? Math.min(found.get().error() / value, 1e-3) : noise);
            }
            return new Target(t.units(), t.values(), t.standards(), weighted, noise);
        }

        private static Value again(Value v, Problems problems) {
            return Value.of(v.node(), v.path(), problems);
        }

        private static Bench at(Bench bench, Node.Mapping tree) {
            return new Bench(
                    bench.variant(),
                    tree,
                    bench.sources(),
                    bench.memory(),
                    bench.crew(),
                    bench.nominal(),
                    bench.watch(),
                    bench.figures());
        }

        @Override
        public Finding run(Bench bench) {
            Target t = target(bench, new Problems());
            int n = unknowns.size();
            LeastSquares.Unknown[] bounds = unknowns.stream()
                    .map(u -> new LeastSquares.Unknown(u.low(), u.high()))
                    .toArray(LeastSquares.Unknown[]::new);
            double[] weight = Arrays.stream(t.standards()).map(s -> 1 / s).toArray();
            List<LeastSquares.Solution> solutions = new ArrayList<>();
            for (int k = 0; k < starts; k++) {
                Evaluations model = new Evaluations(bench, "fit " + k, "fit from start " + (k + 1) + " of " + starts);
                LeastSquares problem = new LeastSquares(bounds, t.values(), weight, t.noise(), model);
                solutions.add(problem.solve(start(k)));
            }
            LeastSquares.Solution best = solutions.get(0);
            for (LeastSquares.Solution s : solutions) {
                // a later start must be better by more than rounding
                if (s.chiSquare() < best.chiSquare() * (1 - 1e-9) - 1e-18 * t.values().length) {
                    best = s;
                }
            }
            if (Double.isInfinite(best.chiSquare())) {
                throw new ProblemException(Problem.input(
                        unknowns.get(0).input().place(), "study.fit", "nowhere did the job give all values to match"));
            }
            return finding(bench, t, n, best, solutions);
        }

        /** The job's own start, then points spread over the bounds (Halton 1960). */
        private double[] start(int number) {
            double[] x = new double[unknowns.size()];
            for (int j = 0; j < x.length; j++) {
                Unknown u = unknowns.get(j);
                x[j] = u.start();
                if (number > 0 && u.isBounded()) {
                    x[j] = u.low() + (u.high() - u.low()) * halton(number, PRIMES[j % PRIMES.length]);
                }
            }
            return x;
        }

        private static double halton(int number, int base) {
            double value = 0;
            double part = 1.0 / base;
            for (int i = number; i > 0; i /= base) {
                value += part * (i % base);
                part /= base;
            }
            return value;
        }

        /** Runs points of a fit over all variants that are matched; the same fit asks for the same ones in the same order. */
        private final class Evaluations implements LeastSquares.Model {
            private final Bench bench;
            private final String stage;
            private final String said;
            private final List<String> names;
            private final List<List<Integer>> of = new ArrayList<>();
            private int calls;
            private long done;

            Evaluations(Bench bench, String stage, String said) {
                this.bench = bench;
                this.stage = stage;
                this.said = said;
                names = matches.stream().map(Match::variant).distinct().toList();
                for (String name : names) {
                    List<Integer> mine = new ArrayList<>();
                    for (int i = 0; i < matches.size(); i++) {
                        if (matches.get(i).variant().equals(name)) {
                            mine.add(i);
                        }
                    }
                    of.add(mine);
                }
            }

            @Override
            public double[][] at(double[][] points) {
                int width = of.stream().mapToInt(List::size).max().orElse(1);
                int count = points.length * names.size();
                List<Input> inputs = inputs();
                Crew.Runs runs = bench.crew()
                        .run(stage + " " + calls++, said, count, width, new long[] {done, 0}, number -> {
                            int v = number % names.size();
                            List<Watched> wanted = new ArrayList<>();
                            for (int k = 0; k < width; k++) {
                                int i = of.get(v).get(Math.min(k, of.get(v).size() - 1));
                                wanted.add(new Watched(matches.get(i).path(), "", 0, 0));
                            }
                            return Fit.at(bench, tree(bench, names.get(v)))
                                    .run(inputs, points[number / names.size()], wanted);
                        });
                done += count;
                double[][] values = new double[points.length][matches.size()];
                for (int number = 0; number < count; number++) {
                    List<Integer> mine = of.get(number % names.size());
                    for (int k = 0; k < mine.size(); k++) {
                        values[number / names.size()][mine.get(k)] = runs.result(number, k);
                    }
                }
                return values;
            }
        }

        private Finding finding(
                Bench bench, Target t, int n, LeastSquares.Solution best, List<LeastSquares.Solution> solutions) {
            int m = matches.size();
            List<Integer> free = new ArrayList<>();
            for (int j = 0; j < n; j++) {
                if (!best.fixed()[j]) {
                    free.add(j);
                }
            }
            int freedom = m - free.size();
            double scale = t.weighted() ? 1 : freedom > 0 ? Math.sqrt(best.chiSquare() / freedom) : Double.NaN;
            double[] standard = new double[n];
            double[][] correlation = new double[n][n];
            Arrays.fill(standard, Double.NaN);
            for (int j = 0; j < n; j++) {
                correlation[j][j] = 1;
            }
            List<String> warnings = new ArrayList<>();
            if (!free.isEmpty()) {
                double[][] j = new double[m][free.size()];
                for (int i = 0; i < m; i++) {
                    for (int k = 0; k < free.size(); k++) {
                        double d = best.jacobian()[i][free.get(k)] / t.standards()[i];
                        j[i][k] = Double.isNaN(d) ? 0 : d;
                    }
                }
                Covariance c = Covariance.of(j, scale);
                for (int a = 0; a < free.size(); a++) {
                    standard[free.get(a)] = c.standard()[a];
                    for (int b = 0; b < free.size(); b++) {
                        correlation[free.get(a)][free.get(b)] = c.correlation()[a][b];
                    }
                }
                apart(c, free, warnings);
            }
            judge(t, best, freedom, solutions, warnings);
            double[] residuals = new double[m];
            for (int i = 0; i < m; i++) {
                residuals[i] = t.values()[i] - best.fitted()[i];
            }
            return new Finding(
                    "fit",
                    headline(best, standard),
                    doc(t, best, freedom, standard, correlation, residuals),
                    List.of(unknownsTable(best, standard), residualsTable(t, best, residuals)),
                    bench.figures().contains("fit")
                            ? figures(t, best, residuals, correlation, headline(best, standard))
                            : List.of(),
                    warnings,
                    best.converged());
        }

        private void apart(Covariance c, List<Integer> free, List<String> warnings) {
            if (c.condition() < POOR) {
                return;
            }
            List<String> weak = new ArrayList<>();
            for (int k = 0; k < free.size(); k++) {
                if (c.isWeak(k)) {
                    weak.add(unknowns.get(free.get(k)).input().path());
                }
            }
            String who = String.join(" and ", weak);
            if (weak.size() == 1) {
                warnings.add("none of the values depends on " + who + " enough to determine it");
            } else if (Double.isInfinite(c.condition())) {
                warnings.add(
                        who + " cannot be told apart by these values: only a combination of them is determined; add a "
                                + "set-up in which they act differently, or fix one of them");
            } else {
                warnings.add(who + " can hardly be told apart by these values (condition number "
                        + Display.of(c.condition(), "1", 0.1 * c.condition())
                        + "): small errors of the values make large ones in them");
            }
        }

        private void judge(
                Target t,
                LeastSquares.Solution best,
                int freedom,
                List<LeastSquares.Solution> solutions,
                List<String> warnings) {
            for (int j = 0; j < unknowns.size(); j++) {
                if (best.fixed()[j]) {
                    Unknown u = unknowns.get(j);
                    warnings.add(u.input().path() + " ended on its bound, "
                            + u.input().say(best.x()[j])
                            + ": the best fit lies beyond it, and no uncertainty can be given");
                }
            }
            if (!best.converged()) {
                warnings.add("the fit did not come to an end; its last values are given");
            }
            if (t.weighted() && freedom > 0) {
                double beyond = Quantiles.chiSquareBeyond(best.chiSquare(), freedom);
                String figure = "chi-square is " + Display.of(best.chiSquare(), "1", 0.01 * best.chiSquare()) + " for "
                        + freedom + (freedom == 1 ? " degree" : " degrees") + " of freedom: ";
                if (beyond < UNLIKELY) {
                    warnings.add(
                            figure + "the values do not fit within their uncertainties; those are too small, or the "
                                    + "model is not that of the thing measured");
                } else if (beyond > 1 - UNLIKELY && best.chiSquare() > 0 && freedom > 2) {
                    warnings.add(figure + "the values fit better than their uncertainties make likely");
                }
            }
            List<String> told = new ArrayList<>();
            for (int k = 0; k < solutions.size(); k++) {
                LeastSquares.Solution s = solutions.get(k);
                if (Double.isInfinite(s.chiSquare()) || near(s, best)) {
                    continue;
                }
                boolean equal = Math.abs(s.chiSquare() - best.chiSquare()) <= 1e-6 * best.chiSquare() + 1e-9;
                if (equal || (s.converged() && s.chiSquare() < 1e3 * best.chiSquare() + 1)) {
                    String text = (equal ? "an equally good solution lies at " : "another minimum lies at ")
                            + said(s)
                            + (equal
                                    ? ""
                                    : ", with chi-square " + Display.of(s.chiSquare(), "1", 0.01 * s.chiSquare()));
                    if (!told.contains(text)) {
                        told.add(text);
                    }
                }
            }
            warnings.addAll(told.subList(0, Math.min(3, told.size())));
        }

        /** Whether two solutions are one. */
        private boolean near(LeastSquares.Solution a, LeastSquares.Solution b) {
            for (int j = 0; j < unknowns.size(); j++) {
                double size = Math.max(Math.abs(a.x()[j]), Math.abs(b.x()[j]));
                if (Math.abs(a.x()[j] - b.x()[j]) > 1e-4 * size) {
                    return false;
                }
            }
            return true;
        }

        private String said(LeastSquares.Solution s) {
            List<String> parts = new ArrayList<>();
            for (int j = 0; j < unknowns.size(); j++) {
                Input input = unknowns.get(j).input();
                parts.add(input.path() + " = " + shown(input, s.x()[j], 1e-4 * Math.abs(s.x()[j])));
            }
            return String.join(", ", parts);
        }

        private static String shown(Input input, double si, double error) {
            return input.shown().isEmpty()
                    ? Display.of(si, input.unit(), error).toString()
                    : Display.in(si, input.shown(), error).toString();
        }

        private String headline(LeastSquares.Solution best, double[] standard) {
            List<String> parts = new ArrayList<>();
            for (int j = 0; j < Math.min(4, unknowns.size()); j++) {
                Input input = unknowns.get(j).input();
                double u = standard[j];
                double digits = u > 0 ? 0.1 * u : 1e-6 * Math.abs(best.x()[j]);
                parts.add(input.path() + " = " + shown(input, best.x()[j], digits)
                        + (u > 0 ? " ± " + difference(input, u) : ""));
            }
            int more = unknowns.size() - parts.size();
            return String.join(", ", parts) + (more > 0 ? " and " + more + " more" : "");
        }

        private static String difference(Input input, double u) {
            String shown = input.shownDifference();
            return shown.isEmpty()
                    ? Display.of(u, input.unit(), 0.1 * u).toString()
                    : Display.in(u, shown, 0.1 * u).toString();
        }

        private Doc doc(
                Target t,
                LeastSquares.Solution best,
                int freedom,
                double[] standard,
                double[][] correlation,
                double[] residuals) {
            Doc.Builder values = new Doc.Builder();
            for (int j = 0; j < unknowns.size(); j++) {
                Unknown u = unknowns.get(j);
                Doc.Builder one = new Doc.Builder().put("value", best.x()[j]).put("standard-uncertainty", standard[j]);
                if (best.fixed()[j]) {
                    one.put("at-bound", best.x()[j] <= u.low() ? "low" : "high");
                }
                values.put(u.input().path(), one.build());
            }
            List<Doc> rows = Doc.list();
            for (double[] row : correlation) {
                rows.add(Doc.Items.numbers(row));
            }
            List<Doc> compared = Doc.list();
            for (int i = 0; i < matches.size(); i++) {
                Match match = matches.get(i);
                Doc.Builder one = new Doc.Builder();
                if (!match.variant().isEmpty()) {
                    one.put("variant", match.variant());
                }
                compared.add(one.put("result", match.path().text())
                        .put("value", t.values()[i])
                        .put("fitted", best.fitted()[i])
                        .put("residual", residuals[i])
                        .build());
            }
            return new Doc.Builder()
                    .put("unknowns", values.build())
                    .put("chi-square", best.chiSquare())
                    .put("degrees-of-freedom", new Doc.Count(freedom))
                    .put("correlation", new Doc.Items(rows))
                    .put("residuals", Doc.Items.numbers(residuals))
                    .put("matches", new Doc.Items(compared))
                    .put("converged", new Doc.Flag(best.converged()))
                    .build();
        }

        private Listing unknownsTable(LeastSquares.Solution best, double[] standard) {
            int n = unknowns.size();
            double[] errors = new double[n];
            for (int j = 0; j < n; j++) {
                errors[j] = standard[j] > 0 ? 0.1 * standard[j] : 1e-6 * Math.abs(best.x()[j]);
            }
            List<String> units = unknowns.stream().map(u -> u.input().unit()).toList();
            List<String> shown = unknowns.stream().map(u -> u.input().shown()).toList();
            List<String> differences =
                    unknowns.stream().map(u -> u.input().shownDifference()).toList();
            return new Listing(
                    "fit",
                    "Unknowns",
                    List.of(
                            new Listing.Texts(
                                    "unknown",
                                    inputs().stream().map(Input::path).toList()),
                            new Listing.Mixed("value", best.x(), units, shown, errors),
                            new Listing.Mixed("standard uncertainty", standard, units, differences, errors)));
        }

        private Listing residualsTable(Target t, LeastSquares.Solution best, double[] residuals) {
            int m = matches.size();
            double[] fine = new double[m];
            double[] parts = new double[m];
            for (int i = 0; i < m; i++) {
                fine[i] = t.weighted() ? 0.1 * t.standards()[i] : 1e-6 * t.standards()[i];
                parts[i] = residuals[i] / t.standards()[i];
            }
            List<String> units = List.of(t.units());
            List<Listing.Column> columns = new ArrayList<>();
            if (matches.stream().anyMatch(x -> !x.variant().isEmpty())) {
                columns.add(new Listing.Texts(
                        "variant", matches.stream().map(Match::variant).toList()));
            }
            columns.add(new Listing.Texts(
                    "result", matches.stream().map(x -> x.path().text()).toList()));
            columns.add(new Listing.Mixed("wanted", t.values(), units, fine));
            columns.add(new Listing.Mixed("fitted", best.fitted(), units, fine));
            columns.add(new Listing.Mixed("residual", residuals, units, fine));
            columns.add(
                    new Listing.Numbers(t.weighted() ? "over its uncertainty" : "over its size", "1", "", parts, 0.01));
            return new Listing(
                    "fit-residuals",
                    "Values: wanted, fitted, and wanted less fitted",
                    columns,
                    List.of("over its uncertainty", "over its size"));
        }

        private List<Figure> figures(
                Target t, LeastSquares.Solution best, double[] residuals, double[][] correlation, String answer) {
            List<Figure> list = new ArrayList<>();
            List<BarFigure.Bar> bars = new ArrayList<>();
            for (int i = 0; i < Math.min(40, matches.size()); i++) {
                Match match = matches.get(i);
                String label = match.path().label() + (match.variant().isEmpty() ? "" : ", " + match.variant());
                double r = residuals[i] / t.standards()[i];
                boolean none = Math.abs(r) < 1e-6;
                bars.add(new BarFigure.Bar(
                        label,
                        r,
                        Display.of(none ? 0 : residuals[i], t.units()[i], Math.abs(0.1 * residuals[i]))
                                .toString()));
            }
            list.add(new BarFigure(
                    "fit-residuals",
                    "How well the fitted values meet those wanted; chi-square "
                            + Display.of(best.chiSquare() < 1e-6 ? 0 : best.chiSquare(), "1", 0.01 * best.chiSquare()),
                    answer,
                    new ChartFigure.Axis(
                            t.weighted()
                                    ? "residual over standard uncertainty (wanted less fitted)"
                                    : "residual over value (wanted less fitted)",
                            "1",
                            ""),
                    bars,
                    t.weighted() ? 2 : 0));
            if (unknowns.size() > 1) {
                List<BarFigure.Bar> pairs = new ArrayList<>();
                double largest = 0;
                for (int i = 0; i < unknowns.size() && pairs.size() < 40; i++) {
                    for (int j = 0; j < i; j++) {
                        largest = Math.max(largest, Math.abs(correlation[i][j]));
                        pairs.add(new BarFigure.Bar(
                                unknowns.get(j).input().path() + ", "
                                        + unknowns.get(i).input().path(),
                                correlation[i][j],
                                Display.of(correlation[i][j], "1", 1e-3).toString()));
                    }
                }
                list.add(new BarFigure(
                        "fit-correlation",
                        "How far errors of the unknowns go together",
                        largest > 0.95
                                ? "Some unknowns are hard to tell apart: a correlation of "
                                        + Display.of(largest, "1", 1e-3)
                                : "The unknowns are told apart: the largest correlation is "
                                        + Display.of(largest, "1", 1e-3),
                        new ChartFigure.Axis("coefficient of correlation", "1", ""),
                        pairs,
                        0.95));
            }
            return list;
        }
    }
}
