package org.stillpath.study;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.stillpath.job.Section;
import org.stillpath.job.Value;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;
import org.stillpath.task.Figure;
import org.stillpath.unit.Dimension;
import org.stillpath.unit.Display;
import org.stillpath.unit.Kind;
import org.stillpath.unit.Unit;
import org.stillpath.unit.Units;

/**
 * The study {@code budget}: the uncertainty of each watched result, by the law of propagation of uncertainty ({@link
 * LinearBudget}) and by Monte Carlo ({@link MonteCarlo}), the one held against the other.
 */
final class BudgetStudy implements Study {
    private static final int LEAST_SAMPLES = 100;
    private static final int MOST_SAMPLES = 10_000_000;
    private static final int USUAL_SAMPLES = 1_000_000;
    private static final int MOST_INPUTS = 200;
    private static final double USUAL_COVERAGE = 0.95;
    /** A gap of so many standard uncertainties within the samples is a jump of the result. */
    private static final double GAP = 1;
    /** From this part of a sensitivity on its error is told. */
    private static final double DOUBTFUL = 0.01;
    /** Room for a sample's number while it is sorted and summed, bytes. */
    private static final long BYTES_A_NUMBER = 32;

    private static final List<String> GIVERS =
            List.of("standard", "half-width", "triangular", "trapezoidal", "arcsine");

    @Override
    public String key() {
        return "budget";
    }

    /** What of a result is wanted: low and high limits, read once its unit is known. */
    private record Limit(Place place, String path, Optional<Value> low, Optional<Value> high) {}

    /** Everything read. */
    private record Order(
            List<Input> inputs,
            Distribution[] distributions,
            Correlation correlation,
            MonteCarlo.Wanted wanted,
            long seed,
            Map<String, Limit> limits) {}

    @Override
    public Plan read(Value value, Desk desk) {
        Section s = value.section();
        Section given =
                s.need("inputs", "{media.rod.with.g: {standard: 0.002 1/mm}}").section();
        List<Input> inputs = new ArrayList<>();
        List<Distribution> distributions = new ArrayList<>();
        List<String> names = given.names();
        if (!given.isPlaceholder() && (names.isEmpty() || names.size() > MOST_INPUTS)) {
            given.fault(names.size() + " inputs stand here; 1 to " + MOST_INPUTS + " are needed");
        }
        for (String path : names) {
            input(path, given, desk, inputs, distributions);
        }
        for (int i = 0; i < inputs.size(); i++) {
            for (int j = 0; j < i; j++) {
                if (inputs.get(i).key().equals(inputs.get(j).key())) {
                    desk.problems()
                            .add(
                                    inputs.get(i).place(),
                                    given.path(),
                                    "this is the same input as " + inputs.get(j).path());
                }
            }
        }
        double coverage = s.find("coverage").map(BudgetStudy::coverage).orElse(USUAL_COVERAGE);
        int samples =
                s.find("samples").map(v -> v.count(LEAST_SAMPLES, MOST_SAMPLES)).orElse(USUAL_SAMPLES);
        int digits = s.find("digits").map(v -> v.count(1, 3)).orElse(1);
        long seed = s.find("seed").map(v -> v.count(0, Integer.MAX_VALUE)).orElse(1);
        Distribution[] all = distributions.toArray(Distribution[]::new);
        Correlation correlation = s.find("correlation")
                .map(v -> correlation(v, inputs, all))
                .orElseGet(() -> Correlation.none(all.length));
        Map<String, Limit> limits =
                s.find("limits").map(v -> limits(v.section())).orElse(Map.of());
        s.finish();
        return new Budget(
                new Order(inputs, all, correlation, new MonteCarlo.Wanted(coverage, digits, samples), seed, limits));
    }

    private static double coverage(Value v) {
        double p = v.number();
        if (p <= 0 || p > 0.9999) {
            v.fault("a coverage above 0 and up to 99.99 % is needed, such as 95 %");
            return USUAL_COVERAGE;
        }
        return Double.isNaN(p) ? USUAL_COVERAGE : p;
    }

    private static void input(
            String path, Section given, Desk desk, List<Input> inputs, List<Distribution> distributions) {
        Section s = given.at(path).section();
        if (s.isPlaceholder()) {
            return;
        }
        List<String> there = GIVERS.stream().filter(s::has).toList();
        Optional<Value> freedom = s.find("degrees-of-freedom");
        s.finish();
        if (there.size() != 1) {
            s.fault((there.isEmpty()
                            ? "what is known of this input is missing"
                            : "only one is needed of " + String.join(" and ", there))
                    + "; one of " + String.join(", ", GIVERS)
                    + " says it, such as {standard: 0.002 1/mm}");
            return;
        }
        String giver = there.get(0);
        Value width = s.at(giver);
        List<Value> widths = giver.equals("trapezoidal") ? width.items() : List.of(width);
        if (giver.equals("trapezoidal") && widths.size() != 2) {
            if (width.isList()) {
                width.fault("two half-widths are needed, of the base and of the top");
            }
            return;
        }
        Optional<Input> found = Input.find(desk.job(), path, given.keyPlace(path), widths.get(0), desk.problems());
        if (found.isEmpty()) {
            return;
        }
        Input input = found.get();
        if (!input.isGiven()) {
            desk.problems()
                    .add(
                            input.place(),
                            given.path(),
                            "the job has no value at " + Words.quoted(path) + "; write the best estimate there");
            return;
        }
        double outer = widths.get(0).positive(input.difference());
        double inner = widths.size() > 1 ? widths.get(1).nonNegative(input.difference()) : 0;
        if (freedom.isPresent() && !giver.equals("standard")) {
            freedom.get().fault("degrees of freedom belong to `standard`");
            return;
        }
        double nu = freedom.map(v -> v.positive(Kind.NUMBER)).orElse(Double.POSITIVE_INFINITY);
        if (Double.isNaN(outer) || Double.isNaN(inner) || Double.isNaN(nu)) {
            return;
        }
        if (inner > outer) {
            width.fault("the top of a trapezoid is no wider than its base; the base comes first");
            return;
        }
        inputs.add(input);
        distributions.add(
                switch (giver) {
                    case "standard" ->
                        Double.isInfinite(nu) ? new Distribution.Normal(outer) : new Distribution.Student(outer, nu);
                    case "half-width" -> new Distribution.Uniform(outer);
                    case "arcsine" -> new Distribution.Arcsine(outer);
                    default -> new Distribution.Trapezoidal(outer, inner);
                });
    }

    private static Correlation correlation(Value value, List<Input> inputs, Distribution[] distributions) {
        int n = distributions.length;
        double[][] r = Correlation.none(n).coefficients();
        for (Value row : value.items()) {
            List<Value> parts = row.items();
            if (parts.size() != 3) {
                if (row.isList()) {
                    row.fault("two inputs and their coefficient are needed, such as [media.rod.with.g, "
                            + "media.rod.with.n0, 0.8]");
                }
                continue;
            }
            int i = place(parts.get(0), inputs, distributions);
            int j = place(parts.get(1), inputs, distributions);
            double c = parts.get(2).number();
            if (c < -1 || c > 1) {
                parts.get(2).fault("a coefficient of correlation lies from -1 to 1");
            } else if (i >= 0 && i == j) {
                parts.get(1).fault("an input is not correlated with itself");
            } else if (i >= 0 && j >= 0 && !Double.isNaN(c)) {
                r[i][j] = c;
                r[j][i] = c;
            }
        }
        Correlation correlation = new Correlation(r);
        if (!correlation.isSound()) {
            value.fault("no quantities can have these coefficients together: the matrix has a negative eigenvalue");
        }
        return correlation;
    }

    private static int place(Value v, List<Input> inputs, Distribution[] distributions) {
        String text = v.text();
        String key = text.replace("]", "").replace('[', '.');
        for (int i = 0; i < inputs.size(); i++) {
            if (inputs.get(i).key().equals(key)) {
                if (!(distributions[i] instanceof Distribution.Normal)) {
                    v.fault(
                            "correlated inputs are drawn from a joint normal distribution (JCGM 101, 6.4.8); give this one "
                                    + "by `standard` alone");
                    return -1;
                }
                return i;
            }
        }
        if (!text.isEmpty()) {
            v.fault(Words.quoted(text) + " is not among the inputs of this budget"
                    + Words.remedy(text, inputs.stream().map(Input::path).toList()));
        }
        return -1;
    }

    private static Map<String, Limit> limits(Section s) {
        Map<String, Limit> limits = new LinkedHashMap<>();
        for (String path : s.names()) {
            Section ends = s.at(path).section();
            Optional<Value> low = ends.find("low");
            Optional<Value> high = ends.find("high");
            ends.finish();
            if (low.isEmpty() && high.isEmpty() && !ends.isPlaceholder()) {
                ends.fault("a limit is needed: low, high or both");
            }
            limits.put(
                    path.replace("]", "").replace('[', '.'),
                    new Limit(s.keyPlace(path), s.path() + "." + path, low, high));
        }
        return limits;
    }

    /** Limits of a result in SI. */
    private record Ends(double low, double high) {
        static final Ends NONE = new Ends(Double.NEGATIVE_INFINITY, Double.POSITIVE_INFINITY);

        boolean isAny() {
            return Double.isFinite(low) || Double.isFinite(high);
        }
    }

    /** Kind of a result by its SI unit. */
    static Kind kind(String unit) {
        if (unit.equals("rad")) {
            return Kind.ANGLE;
        }
        return Units.parse(unit).map(u -> Kind.of(u.dimension())).orElse(Kind.NUMBER);
    }

    /** A budget of sound inputs. */
    private record Budget(Order order) implements Plan {
        @Override
        public void bind(Bench bench, Problems problems) {
            for (Watched w : bench.watch()) {
                if (Double.isNaN(w.value())) {
                    problems.add(
                            order.inputs().get(0).place(),
                            "study.watch",
                            "at the job's own values there is no result "
                                    + Words.quoted(w.path().text())
                                    + ", so it has no uncertainty either"
                                    + Studies.near(w.path(), bench.nominal()).orElse(""));
                }
            }
            List<String> watched =
                    bench.watch().stream().map(w -> w.path().text()).toList();
            order.limits().forEach((path, limit) -> {
                Optional<Watched> w = find(bench, path);
                if (w.isEmpty()) {
                    problems.add(
                            limit.place(), limit.path(), "this result is not watched" + Words.remedy(path, watched));
                } else {
                    ends(limit, w.get(), problems);
                }
            });
            long bytes = (long) order.wanted().most() * bench.watch().size() * BYTES_A_NUMBER;
            long room = Runtime.getRuntime().maxMemory();
            if (bytes > room) {
                problems.add(
                        order.inputs().get(0).place(),
                        "study.budget.samples",
                        "memory: " + order.wanted().most() + " samples of "
                                + bench.watch().size()
                                + " results need about " + (bytes >> 20) + " MB, and Java may use " + (room >> 20)
                                + " MB; lower `samples` or watch fewer results");
            }
        }

        @Override
        public long runs() {
            return (long) order.inputs().size() * Slopes.RUNS + order.wanted().most();
        }

        private static Optional<Watched> find(Bench bench, String key) {
            return bench.watch().stream()
                    .filter(w ->
                            w.path().text().replace("]", "").replace('[', '.').equals(key))
                    .findFirst();
        }

        private static Ends ends(Limit limit, Watched w, Problems problems) {
            Kind kind = kind(w.unitOrOne());
            double low = limit.low()
                    .map(v -> Value.of(v.node(), v.path(), problems).quantity(kind))
                    .orElse(Double.NEGATIVE_INFINITY);
            double high = limit.high()
                    .map(v -> Value.of(v.node(), v.path(), problems).quantity(kind))
                    .orElse(Double.POSITIVE_INFINITY);
            if (low > high) {
                problems.add(limit.place(), limit.path(), "the low limit lies above the high one");
            }
            return new Ends(low, high);
        }

        @Override
        public Finding run(Bench bench) {
            List<Input> inputs = order.inputs();
            Distribution[] distributions = order.distributions();
            double[] nominal = inputs.stream().mapToDouble(Input::nominal).toArray();
            int width = bench.watch().size();
            int n = inputs.size();
            Crew.Runs differences = bench.crew()
                    .run(
                            bench.stage("sensitivities"),
                            "sensitivities",
                            n * Slopes.RUNS,
                            width,
                            new long[] {0, (long) n * Slopes.RUNS},
                            i -> bench.run(inputs, shifted(nominal, i), bench.watch()));
            long most = order.wanted().most();
            MonteCarlo.Outcome samples = MonteCarlo.run(
                    order.wanted(),
                    width,
                    (block, from, count) -> bench.crew()
                            .run(
                                    bench.stage("monte-carlo " + block),
                                    "samples",
                                    count,
                                    width,
                                    new long[] {from, most},
                                    i -> bench.run(inputs, drawn(nominal, from + i), bench.watch())));
            List<String> warnings = new ArrayList<>();
            Doc.Builder doc = new Doc.Builder();
            List<Listing> listings = new ArrayList<>();
            List<Figure> figures = new ArrayList<>();
            List<Line> lines = new ArrayList<>();
            double[][] correlation = order.correlation().coefficients();
            for (int k = 0; k < width; k++) {
                Watched w = bench.watch().get(k);
                Slopes.Slope[] slopes = slopes(differences, k, w);
                LinearBudget linear = LinearBudget.of(
                        w.value(),
                        slopes,
                        distributions,
                        correlation,
                        order.wanted().coverage());
                MonteCarlo.Summary mc = samples.summaries().get(k);
                Ends ends = find(order.limits(), w)
                        .map(l -> ends(l, w, new Problems()))
                        .orElse(Ends.NONE);
                doc.put(w.path().text(), doc(linear, mc, ends));
                lines.add(new Line(w, linear, mc, ends));
                listings.add(contributions(bench, w, linear));
                tell(w, linear, mc, warnings);
                if (bench.figures().contains("budget")) {
                    figures.addAll(BudgetFigures.of(
                            bench, w, linear, mc, inputs, order.wanted().coverage(), width > 1));
                }
            }
            runs(samples.blocks(), warnings);
            listings.add(0, summary(bench, lines));
            return new Finding(
                    "budget",
                    headline(bench, lines.get(0)),
                    doc.build(),
                    listings,
                    figures,
                    warnings,
                    differences.having(Crew.Runs.INACCURATE) == 0);
        }

        private static Optional<Limit> find(Map<String, Limit> limits, Watched w) {
            return Optional.ofNullable(
                    limits.get(w.path().text().replace("]", "").replace('[', '.')));
        }

        private double[] shifted(double[] nominal, int number) {
            double[] values = nominal.clone();
            int input = number / Slopes.RUNS;
            double step = order.distributions()[input].standardUncertainty();
            values[input] += Slopes.offset(number % Slopes.RUNS, step);
            return values;
        }

        private double[] drawn(double[] nominal, int sample) {
            double[] values = nominal.clone();
            double[] x = order.correlation().draw(order.distributions(), new Draws(order.seed(), sample));
            for (int i = 0; i < values.length; i++) {
                values[i] += x[i];
            }
            return values;
        }

        private Slopes.Slope[] slopes(Crew.Runs differences, int which, Watched w) {
            Slopes.Slope[] slopes = new Slopes.Slope[order.inputs().size()];
            for (int i = 0; i < slopes.length; i++) {
                double[] results = new double[Slopes.RUNS];
                for (int j = 0; j < results.length; j++) {
                    results[j] = differences.result(i * Slopes.RUNS + j, which);
                }
                slopes[i] = Slopes.of(results, order.distributions()[i].standardUncertainty(), w.error());
            }
            return slopes;
        }

        private Doc doc(LinearBudget linear, MonteCarlo.Summary mc, Ends ends) {
            List<Doc> contributions = Doc.list();
            for (int i = 0; i < order.inputs().size(); i++) {
                contributions.add(new Doc.Builder()
                        .put("input", order.inputs().get(i).path())
                        .put("distribution", order.distributions()[i].word())
                        .put("sensitivity", linear.slopes()[i].value())
                        .put("sensitivity-error", linear.slopes()[i].error())
                        .put("standard-uncertainty", order.distributions()[i].standardUncertainty())
                        .put("degrees-of-freedom", order.distributions()[i].degreesOfFreedom())
                        .put("contribution", linear.contributions()[i])
                        .put("share", share(linear, i))
                        .build());
            }
            Doc.Builder samples = new Doc.Builder()
                    .put("samples", new Doc.Count((long) mc.samples() + mc.missing()))
                    .put("mean", mc.mean())
                    .put("standard-uncertainty", mc.standardUncertainty())
                    .put("interval", Doc.Items.numbers(mc.shortest()))
                    .put("symmetric-interval", Doc.Items.numbers(mc.symmetric()))
                    .put("agrees", new Doc.Flag(mc.agrees(linear)))
                    .put("tolerance", mc.tolerance())
                    .put("stable", new Doc.Flag(mc.stable()))
                    .put("missing", new Doc.Count(mc.missing()))
                    .put("seed", new Doc.Count(order.seed()));
            if (ends.isAny()) {
                double yield = mc.within(ends.low(), ends.high());
                samples.put("yield", yield)
                        .put(
                                "yield-standard-uncertainty",
                                Math.sqrt(yield * (1 - yield) / ((double) mc.samples() + mc.missing())));
            }
            return new Doc.Builder()
                    .put("value", linear.value())
                    .put("standard-uncertainty", linear.standardUncertainty())
                    .put("coverage", order.wanted().coverage())
                    .put("coverage-factor", linear.coverageFactor())
                    .put("expanded-uncertainty", linear.expandedUncertainty())
                    .put("degrees-of-freedom", linear.degreesOfFreedom())
                    .put("contributions", new Doc.Items(contributions))
                    .put("monte-carlo", samples.build())
                    .build();
        }

        /** Part of the variance, correlations left aside. */
        static double share(LinearBudget linear, int input) {
            double sum = 0;
            for (double c : linear.contributions()) {
                sum += c * c;
            }
            return sum > 0 ? linear.contributions()[input] * linear.contributions()[input] / sum : 0;
        }

        private Listing contributions(Bench bench, Watched w, LinearBudget linear) {
            int n = order.inputs().size();
            List<String> names = new ArrayList<>();
            List<String> words = new ArrayList<>();
            List<String> inputUnits = new ArrayList<>();
            List<String> inputShown = new ArrayList<>();
            List<String> slopeUnits = new ArrayList<>();
            List<String> units = new ArrayList<>();
            double[] u = new double[n];
            double[] slopes = new double[n];
            double[] slopeErrors = new double[n];
            double[] shares = new double[n];
            for (int i = 0; i < n; i++) {
                Input input = order.inputs().get(i);
                names.add(input.path());
                words.add(order.distributions()[i].word());
                inputUnits.add(input.unit());
                inputShown.add(input.shownDifference());
                slopeUnits.add(over(w.unitOrOne(), input.unit()));
                units.add(w.unitOrOne());
                u[i] = order.distributions()[i].standardUncertainty();
                slopes[i] = linear.slopes()[i].value();
                slopeErrors[i] = Math.max(linear.slopes()[i].error(), 1e-4 * Math.abs(slopes[i]));
                shares[i] = share(linear, i);
            }
            String several = bench.watch().size() > 1 ? "-" + w.path().stem() : "";
            String heading = "What each input contributes to the standard uncertainty of the "
                    + w.path().label() + (bench.variant().isEmpty() ? "" : ", variant " + bench.variant());
            return new Listing(
                    bench.stem("budget" + several),
                    heading,
                    List.of(
                            new Listing.Texts("input", names),
                            new Listing.Texts("distribution", words),
                            new Listing.Mixed("standard uncertainty", u, inputUnits, inputShown, scaled(u, 0.01)),
                            new Listing.Mixed("sensitivity", slopes, slopeUnits, slopeErrors),
                            new Listing.Mixed(
                                    "contribution",
                                    linear.contributions(),
                                    units,
                                    scaled(linear.contributions(), 0.01)),
                            new Listing.Numbers("share", "1", "%", shares, 1e-3)),
                    List.of("distribution", "sensitivity"));
        }

        private static double[] scaled(double[] values, double factor) {
            double[] list = values.clone();
            for (int i = 0; i < list.length; i++) {
                list[i] = Math.abs(list[i]) * factor;
            }
            return list;
        }

        /** Unit of a result over that of an input; angles stay angles. */
        private static String over(String result, String input) {
            if (input.equals("1")) {
                return result;
            }
            if (result.equals(input)) {
                return "1";
            }
            if (result.equals("rad") || input.equals("rad")) {
                return (result.equals("1") ? "1" : result) + "/"
                        + (input.matches("[A-Za-z]+") ? input : "(" + input + ")");
            }
            Dimension top = Units.parse(result).map(Unit::dimension).orElse(Dimension.NONE);
            Dimension below = Units.parse(input).map(Unit::dimension).orElse(Dimension.NONE);
            return top.over(below).symbol();
        }

        /** One result's figures. */
        private record Line(Watched w, LinearBudget linear, MonteCarlo.Summary mc, Ends ends) {}

        private static Listing summary(Bench bench, List<Line> lines) {
            int n = lines.size();
            List<String> names = new ArrayList<>();
            List<String> units = new ArrayList<>();
            List<String> agrees = new ArrayList<>();
            double[][] v = new double[8][n];
            double[] fine = new double[n];
            double[] none = new double[n];
            double[] factors = new double[n];
            double[] yields = new double[n];
            boolean limited = false;
            for (int i = 0; i < n; i++) {
                Line l = lines.get(i);
                names.add(l.w().path().text());
                units.add(l.w().unitOrOne());
                agrees.add(l.mc().agrees(l.linear()) ? "yes" : "no");
                double[] figures = {
                    l.linear().value(),
                    l.linear().standardUncertainty(),
                    l.linear().expandedUncertainty(),
                    l.linear().degreesOfFreedom(),
                    l.mc().mean(),
                    l.mc().standardUncertainty(),
                    l.mc().shortest()[0],
                    l.mc().shortest()[1]
                };
                for (int k = 0; k < 8; k++) {
                    v[k][i] = figures[k];
                }
                fine[i] = 0.1 * l.linear().standardUncertainty();
                factors[i] = l.linear().coverageFactor();
                limited |= l.ends().isAny();
                yields[i] = l.ends().isAny()
                        ? l.mc().within(l.ends().low(), l.ends().high())
                        : Double.NaN;
            }
            List<Listing.Column> columns = new ArrayList<>(List.of(
                    new Listing.Texts("result", names),
                    new Listing.Mixed("value", v[0], units, fine),
                    new Listing.Mixed("standard uncertainty", v[1], units, fine),
                    new Listing.Numbers("coverage factor", "1", "", factors, 0.01),
                    new Listing.Mixed("expanded uncertainty", v[2], units, fine),
                    new Listing.Mixed("degrees of freedom", v[3], java.util.Collections.nCopies(n, "1"), none),
                    new Listing.Mixed("sampled mean", v[4], units, fine),
                    new Listing.Mixed("sampled uncertainty", v[5], units, fine),
                    new Listing.Mixed("shortest interval from", v[6], units, fine),
                    new Listing.Mixed("to", v[7], units, fine),
                    new Listing.Texts("agree", agrees)));
            if (limited) {
                columns.add(new Listing.Numbers("yield", "1", "%", yields, 1e-4));
            }
            return new Listing(
                    bench.stem("budget-summary"),
                    "Uncertainties" + (bench.variant().isEmpty() ? "" : ", variant " + bench.variant()),
                    columns,
                    List.of(
                            "standard uncertainty",
                            "coverage factor",
                            "degrees of freedom",
                            "sampled mean",
                            "sampled uncertainty",
                            "shortest interval from",
                            "to"));
        }

        private String headline(Bench bench, Line l) {
            double u = l.linear().isComplete() ? l.linear().expandedUncertainty() : Double.NaN;
            String label = SweepStudy.capital(l.w().path().label());
            String coverage = Display.in(order.wanted().coverage(), "%", 0).toString();
            String variant = bench.variant().isEmpty() ? "" : ", variant " + bench.variant();
            if (Double.isNaN(u)) {
                return label + ": no linear budget, since the result is not there around the job's own values"
                        + variant;
            }
            String text = BudgetText.said(l.w(), l.linear().value(), u) + " (" + coverage + ", k = "
                    + Display.of(l.linear().coverageFactor(), "1", 0.01) + ")" + variant;
            String judged = l.mc().agrees(l.linear())
                    ? "; Monte Carlo agrees"
                    : "; Monte Carlo disagrees: " + BudgetText.interval(l.w(), l.mc().shortest(), u);
            String yield = l.ends().isAny()
                    ? "; yield "
                            + Display.in(l.mc().within(l.ends().low(), l.ends().high()), "%", 1e-3)
                    : "";
            return label + " " + text + judged + yield;
        }

        private void tell(Watched w, LinearBudget linear, MonteCarlo.Summary mc, List<String> warnings) {
            String label = w.path().label();
            int all = mc.samples() + mc.missing();
            for (int i = 0; i < order.inputs().size(); i++) {
                Slopes.Slope s = linear.slopes()[i];
                String path = order.inputs().get(i).path();
                if (Double.isNaN(s.value())) {
                    warnings.add("there is no " + label + " on one side of the estimate of " + path
                            + ", so its sensitivity is unknown");
                } else if (s.error() * order.distributions()[i].standardUncertainty()
                        > DOUBTFUL * linear.standardUncertainty()) {
                    warnings.add("the sensitivity of the " + label + " to " + path + " is known to "
                            + Display.in(s.error() / Math.abs(s.value()), "%", s.error() / Math.abs(s.value()))
                            + " only: the result is not smooth there");
                }
            }
            if (mc.missing() > 0) {
                warnings.add("in " + mc.missing() + " of " + all + " samples ("
                        + Display.in((double) mc.missing() / all, "%", 0.1 * mc.missing() / all) + ") there is no "
                        + label + "; mean, uncertainty and interval are those of the others");
            }
            if (mc.samples() > 1 && mc.gap() > GAP) {
                warnings.add(
                        "the samples of the " + label + " fall into groups with nothing between: the result jumps, and "
                                + "one uncertainty does not describe it; see the histogram");
            }
            if (!mc.stable()) {
                warnings.add("the samples of the budget were used up (" + all + ") before its figures were stable to "
                        + order.wanted().digits() + " digit" + (order.wanted().digits() == 1 ? "" : "s")
                        + " (JCGM 101, 7.9); raise `samples`");
            }
            if (linear.isComplete() && !mc.agrees(linear)) {
                double u = linear.expandedUncertainty();
                warnings.add("the linear budget of the " + label + " is not valid here (JCGM 101, 8.1): it says "
                        + BudgetText.interval(w, new double[] {linear.value() - u, linear.value() + u}, u)
                        + ", Monte Carlo "
                        + BudgetText.interval(w, mc.symmetric(), u) + ", and "
                        + Display.of(mc.tolerance(), w.unitOrOne(), mc.tolerance())
                        + " is the tolerance; take the Monte Carlo interval");
            }
            if (Double.isFinite(linear.degreesOfFreedom()) && isCorrelated()) {
                warnings.add("degrees of freedom after Welch and Satterthwaite hold for independent inputs (JCGM 100, "
                        + "G.4.1), and these are correlated");
            }
        }

        private boolean isCorrelated() {
            for (int i = 0; i < order.inputs().size(); i++) {
                if (order.correlation().touches(i)) {
                    return true;
                }
            }
            return false;
        }

        /** What went wrong in samples. */
        private static void runs(List<Crew.Runs> blocks, List<String> warnings) {
            int failed = 0;
            int inaccurate = 0;
            int warned = 0;
            int all = 0;
            String fault = "";
            for (Crew.Runs b : blocks) {
                failed += b.having(Crew.Runs.FAILED);
                inaccurate += b.having(Crew.Runs.INACCURATE);
                warned += b.having(Crew.Runs.WARNED);
                int first = b.first(Crew.Runs.FAILED);
                fault = fault.isEmpty() && first >= 0 ? b.fault(first) : fault;
                all += b.count();
            }
            if (failed > 0) {
                warnings.add(failed + " of " + all + " samples could not be computed; the first said: " + fault);
            }
            if (inaccurate > 0) {
                warnings.add(inaccurate + " of " + all + " samples did not reach the asked accuracy");
            }
            if (warned > 0) {
                warnings.add(warned + " of " + all + " samples warn of what the job's own values do not");
            }
        }
    }
}
