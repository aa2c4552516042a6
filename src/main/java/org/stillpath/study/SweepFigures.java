package org.stillpath.study;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.stream.IntStream;
import org.stillpath.task.ChartFigure;
import org.stillpath.task.Figure;
import org.stillpath.task.MapFigure;
import org.stillpath.unit.Display;

/** The figure of a sweep, one for each result: a curve over one input, a map over two. */
final class SweepFigures {
    private static final int MOST = 8;

    private SweepFigures() {}

    /**
     * Figures.
     *
     * @param columns values of the inputs by input and run
     * @param inner number of values of the second input; 1 where there is one only
     */
    static List<Figure> of(
            Bench bench, List<Input> inputs, double[][] columns, int inner, List<Watched> watch, Crew.Runs runs) {
        List<Figure> list = new ArrayList<>();
        for (int k = 0; k < Math.min(MOST, watch.size()); k++) {
            double[] results = runs.column(k);
            SweepStudy.Span span = SweepStudy.Span.of(results);
            if (span.count() < 2) {
                continue;
            }
            Watched w = watch.get(k);
            String name =
                    bench.stem("sweep" + (watch.size() > 1 ? "-" + w.path().stem() : ""));
            if (inputs.size() == 1) {
                list.add(curve(name, bench, inputs.get(0), columns[0], w, results, span));
            } else if (inner > 1 && runs.count() / inner > 1) {
                list.add(map(name, bench, inputs, columns, inner, w, results, span));
            }
        }
        return list;
    }

    private static String variant(Bench bench) {
        return bench.variant().isEmpty() ? "" : ", variant " + bench.variant();
    }

    private static ChartFigure.Axis axis(Input input) {
        return new ChartFigure.Axis(input.path(), input.unit(), input.shown());
    }

    private static Figure curve(
            String name, Bench bench, Input input, double[] values, Watched w, double[] results, SweepStudy.Span span) {
        int n = values.length;
        List<Integer> order = IntStream.range(0, n)
                .boxed()
                .sorted(Comparator.comparingDouble(i -> values[i]))
                .toList();
        double[] x = new double[n];
        double[] y = new double[n];
        for (int i = 0; i < n; i++) {
            x[i] = values[order.get(i)];
            y[i] = results[order.get(i)];
        }
        List<ChartFigure.Series> series = new ArrayList<>();
        if (input.nominal() > x[0] && input.nominal() < x[n - 1]) {
            series.add(new ChartFigure.Series(
                    ChartFigure.Style.MARKS, "the job's value", new double[] {input.nominal()}, new double[1]));
        }
        series.add(new ChartFigure.Series(ChartFigure.Style.CURVE, "", x, y));
        int missing = n - span.count();
        String lost = missing == 0 ? "" : " (" + missing + " of " + n + " runs without one)";
        return new ChartFigure(
                name,
                "How the " + w.path().label() + " goes with " + input.path() + variant(bench) + lost,
                SweepStudy.capital(w.path().label()) + " between " + said(span.low(), w, span) + " and "
                        + said(span.high(), w, span),
                axis(input),
                new ChartFigure.Axis(w.path().label(), w.unitOrOne(), ""),
                series);
    }

    private static String said(double value, Watched w, SweepStudy.Span span) {
        return Display.of(value, w.unitOrOne(), span.said(w.error(), 1e-3)).toString();
    }

    private static Figure map(
            String name,
            Bench bench,
            List<Input> inputs,
            double[][] columns,
            int inner,
            Watched w,
            double[] results,
            SweepStudy.Span span) {
        int outer = results.length / inner;
        double[] x = new double[outer];
        double[] y = new double[inner];
        double[] values = new double[results.length];
        List<Integer> across = sorted(outer, i -> columns[0][i * inner]);
        List<Integer> up = sorted(inner, j -> columns[1][j]);
        for (int i = 0; i < outer; i++) {
            x[i] = columns[0][across.get(i) * inner];
            for (int j = 0; j < inner; j++) {
                y[j] = columns[1][up.get(j)];
                values[j * outer + i] = results[across.get(i) * inner + up.get(j)];
            }
        }
        int missing = results.length - span.count();
        String lost = missing == 0 ? "" : " (white: no result, " + missing + " of " + results.length + " runs)";
        return new MapFigure(
                name,
                "How the " + w.path().label() + " goes with two inputs" + variant(bench) + lost,
                SweepStudy.capital(w.path().label()) + " between " + said(span.low(), w, span) + " and "
                        + said(span.high(), w, span),
                axis(inputs.get(0)),
                axis(inputs.get(1)),
                new ChartFigure.Axis(w.path().label(), w.unitOrOne(), ""),
                x,
                y,
                values);
    }

    private static List<Integer> sorted(int n, java.util.function.IntToDoubleFunction value) {
        return IntStream.range(0, n)
                .boxed()
                .sorted(Comparator.comparingDouble(value::applyAsDouble))
                .toList();
    }
}
