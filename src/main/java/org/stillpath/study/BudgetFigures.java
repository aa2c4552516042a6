package org.stillpath.study;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.Locale;
import java.util.stream.IntStream;
import org.stillpath.task.BarFigure;
import org.stillpath.task.ChartFigure;
import org.stillpath.task.Figure;
import org.stillpath.unit.Display;

/** The figures of a budget: what contributes, and the distribution of the samples against the normal one. */
final class BudgetFigures {
    private static final int MOST_BARS = 12;
    private static final int LEAST_BINS = 20;
    private static final int MOST_BINS = 60;
    private static final int CURVE = 121;

    private BudgetFigures() {}

    static List<Figure> of(
            Bench bench,
            Watched w,
            LinearBudget linear,
            MonteCarlo.Summary mc,
            List<Input> inputs,
            double coverage,
            boolean several) {
        List<Figure> list = new ArrayList<>();
        String ending = several ? "-" + w.path().stem() : "";
        String variant = bench.variant().isEmpty() ? "" : ", variant " + bench.variant();
        if (linear.isComplete() && linear.standardUncertainty() > 0) {
            list.add(contributions(bench.stem("budget-contributions" + ending), w, linear, inputs, variant));
        }
        if (mc.samples() > LEAST_BINS && mc.standardUncertainty() > 0) {
            list.add(histogram(bench.stem("budget-histogram" + ending), w, linear, mc, coverage, variant));
        }
        return list;
    }

    private static Figure contributions(
            String name, Watched w, LinearBudget linear, List<Input> inputs, String variant) {
        List<Integer> order = IntStream.range(0, inputs.size())
                .boxed()
                .sorted(Comparator.comparingDouble(i -> -linear.contributions()[i]))
                .toList();
        double sum = 0;
        for (double c : linear.contributions()) {
            sum += c * c;
        }
        List<BarFigure.Bar> bars = new ArrayList<>();
        double rest = 0;
        for (int k = 0; k < order.size(); k++) {
            double c = linear.contributions()[order.get(k)];
            if (k >= MOST_BARS - 1 && order.size() > MOST_BARS) {
                rest += c * c;
                continue;
            }
            bars.add(bar(inputs.get(order.get(k)).path(), c, c * c / sum, w));
        }
        if (rest > 0) {
            bars.add(bar((order.size() - MOST_BARS + 1) + " more, together", Math.sqrt(rest), rest / sum, w));
        }
        int first = order.get(0);
        double share = linear.contributions()[first] * linear.contributions()[first] / sum;
        return new BarFigure(
                name,
                "What contributes to the standard uncertainty of the "
                        + w.path().label() + variant,
                inputs.get(first).path() + " makes up "
                        + Display.in(share, "%", 0.01) + " of the variance; standard uncertainty "
                        + Display.of(linear.standardUncertainty(), w.unitOrOne(), 0.1 * linear.standardUncertainty()),
                new ChartFigure.Axis("contribution", w.unitOrOne(), ""),
                bars,
                0);
    }

    private static BarFigure.Bar bar(String label, double c, double share, Watched w) {
        return new BarFigure.Bar(
                label,
                c,
                Display.of(c, w.unitOrOne(), 0.1 * c) + ", " + Display.in(share, "%", share < 0.1 ? 1e-3 : 0.01));
    }

    private static Figure histogram(
            String name, Watched w, LinearBudget linear, MonteCarlo.Summary mc, double coverage, String variant) {
        double[] values = mc.values();
        int n = values.length;
        // the outermost 1 in 10 000 on either side would make everything else narrow
        double low = values[n / 10_000];
        double high = values[n - 1 - n / 10_000];
        double quartiles = values[(int) (0.75 * n)] - values[(int) (0.25 * n)];
        // width after Freedman and Diaconis (1981)
        int bins = (int) Math.min(
                MOST_BINS, Math.max(LEAST_BINS, (high - low) / Math.max(2 * quartiles / Math.cbrt(n), 1e-300)));
        double width = (high - low) / bins;
        double[] edges = new double[bins + 1];
        double[] parts = new double[bins];
        for (int i = 0; i <= bins; i++) {
            edges[i] = low + i * width;
        }
        for (double v : values) {
            int i = (int) Math.floor((v - low) / width);
            if (v >= low && v <= high) {
                parts[Math.min(i, bins - 1)] += 1.0 / n;
            }
        }
        List<ChartFigure.Series> series = new ArrayList<>();
        series.add(new ChartFigure.Series(ChartFigure.Style.STEPS, "", edges, parts));
        double half = linear.expandedUncertainty();
        if (linear.isComplete() && linear.standardUncertainty() > 0) {
            double[] x = new double[CURVE];
            double[] y = new double[CURVE];
            double u = linear.standardUncertainty();
            for (int i = 0; i < CURVE; i++) {
                x[i] = low + (high - low) * i / (CURVE - 1);
                double z = (x[i] - linear.value()) / u;
                y[i] = width / (u * Math.sqrt(2 * Math.PI)) * Math.exp(-0.5 * z * z);
            }
            series.add(new ChartFigure.Series(ChartFigure.Style.MODEL, "normal, linear budget", x, y));
        }
        String interval = Display.in(coverage, "%", 0) + " interval";
        series.add(new ChartFigure.Series(ChartFigure.Style.MARKS, interval, mc.shortest(), new double[2]));
        boolean agrees = mc.agrees(linear);
        // where the two disagree the samples are to be believed
        String answer = agrees
                ? BudgetText.said(w, linear.value(), half) + ": Monte Carlo agrees with the linear budget"
                : BudgetText.interval(w, mc.shortest(), mc.standardUncertainty()) + ": the linear budget "
                        + (linear.isComplete() ? "disagrees" : "fails");
        String counted =
                count(n) + " samples" + (mc.missing() > 0 ? "; " + count(mc.missing()) + " more have none" : "");
        return new ChartFigure(
                name,
                "Distribution of the " + w.path().label() + ", " + counted + variant,
                SweepStudy.capital(w.path().label()) + " is " + answer,
                new ChartFigure.Axis(w.path().label(), w.unitOrOne(), ""),
                new ChartFigure.Axis("samples in each bar", "1", "%"),
                series);
    }

    private static String count(int n) {
        return String.format(Locale.ROOT, "%,d", n).replace(',', ' ');
    }
}
