package org.stillpath.ray;

import com.fasterxml.jackson.databind.ObjectMapper;
import java.io.IOException;
import java.io.PrintStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Collection;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import org.openjdk.jmh.results.RunResult;
import org.openjdk.jmh.runner.Runner;
import org.openjdk.jmh.runner.RunnerException;
import org.openjdk.jmh.runner.options.OptionsBuilder;
import org.openjdk.jmh.runner.options.TimeValue;

/**
 * All benchmarks in one run: bundles of rays against general-purpose libraries at the same measured accuracy, the engines
 * interleaved and the median of the rounds taken, since machines change their speed; then the others. Leaves {@code
 * summary.txt} and {@code summary.json} in {@code target/benchmarks}.
 *
 * <p>Run: {@code mvn -q -B test-compile exec:exec@benchmarks}, some twenty minutes.
 */
public final class Benchmarks {
    private static final int ROUNDS = Integer.getInteger("rounds", 3);
    /** Rays by which tolerances are found. */
    private static final int TUNED = 512;
    private static final String[] NAMES = {"W1", "W2", "W3", "W4"};

    private Benchmarks() {}

    /** One cell: an engine at one accuracy of one workload. */
    private record Cell(Contestant contestant, double tolerance, double error, List<Double> rates) {
        double median() {
            List<Double> sorted = rates.stream().sorted().toList();
            return sorted.get(sorted.size() / 2);
        }
    }

    /**
     * Runs them.
     *
     * @param args a regular expression for the other benchmarks; none runs all of them, {@code -} none
     */
    public static void main(String[] args) throws RunnerException, IOException {
        Map<String, Object> summary = new LinkedHashMap<>();
        StringBuilder text = new StringBuilder();
        bundles(summary, text);
        String others = args.length > 0 ? args[0] : ".*";
        if (!"-".equals(others)) {
            others(others, summary, text);
        }
        Path folder = Files.createDirectories(Path.of("target", "benchmarks"));
        Files.writeString(folder.resolve("summary.txt"), text);
        new ObjectMapper()
                .writerWithDefaultPrettyPrinter()
                .writeValue(folder.resolve("summary.json").toFile(), summary);
        new PrintStream(System.out, true, StandardCharsets.UTF_8).print(text);
    }

    private static void bundles(Map<String, Object> summary, StringBuilder text) throws RunnerException {
        List<Map<String, Object>> rows = new ArrayList<>();
        Map<Workload, List<List<Cell>>> cells = new LinkedHashMap<>();
        for (Workload w : Workload.values()) {
            double[][] starts = w.starts(TUNED);
            double[][] truth = w.truth(starts);
            List<List<Cell>> levels = new ArrayList<>();
            for (int level = 1; level <= 3; level++) {
                List<Cell> row = new ArrayList<>();
                for (Contestant c : Contestant.values()) {
                    double[] tuned = c.tune(w, level, starts, truth);
                    row.add(new Cell(c, tuned[0], tuned[1], new ArrayList<>()));
                }
                levels.add(row);
            }
            cells.put(w, levels);
        }
        for (int round = 0; round < ROUNDS; round++) {
            for (Map.Entry<Workload, List<List<Cell>>> w : cells.entrySet()) {
                for (List<Cell> row : w.getValue()) {
                    for (Cell cell : row) {
                        cell.rates().add(rate(w.getKey(), cell));
                    }
                }
            }
        }
        text.append(String.format("rays a second, one thread, median of %d interleaved rounds%n%n", ROUNDS));
        double sum = 0;
        int count = 0;
        for (Map.Entry<Workload, List<List<Cell>>> w : cells.entrySet()) {
            for (int level = 1; level <= 3; level++) {
                Map<String, Object> rates = new LinkedHashMap<>();
                Map<String, Object> errors = new LinkedHashMap<>();
                Map<String, Object> ranges = new LinkedHashMap<>();
                Map<Contestant, Double> medians = new LinkedHashMap<>();
                for (Cell cell : w.getValue().get(level - 1)) {
                    String label = cell.contestant().label();
                    medians.put(cell.contestant(), cell.median());
                    rates.put(label, cell.median());
                    errors.put(label, cell.error());
                    ranges.put(
                            label,
                            List.of(
                                    cell.rates().stream().mapToDouble(Double::doubleValue).min().orElse(0),
                                    cell.rates().stream().mapToDouble(Double::doubleValue).max().orElse(0)));
                }
                String name = NAMES[w.getKey().ordinal()];
                rows.add(Map.of(
                        "workload", name,
                        "accuracy", "a" + level,
                        "rays-per-second", rates,
                        "range", ranges,
                        "error", errors));
                double own = medians.getOrDefault(Contestant.STILLPATH, 0.0);
                double ratio = own / medians.getOrDefault(Contestant.HIPPARCHUS, 1.0);
                double transfer = own / medians.getOrDefault(Contestant.STILLPATH_TRANSFER, 1.0);
                sum += Math.log(ratio);
                count++;
                text.append(String.format(Locale.ROOT, "%s a%d", name, level));
                medians.forEach((c, rate) -> text.append(String.format(Locale.ROOT, "  %s %.3g", c.label(), rate)));
                text.append(String.format(
                        Locale.ROOT, "  %.1f times hipparchus; transfer matrix costs %.1f rays%n", ratio, transfer));
            }
        }
        double mean = Math.exp(sum / count);
        text.append(String.format(Locale.ROOT, "geometric mean %.1f times hipparchus%n%n", mean));
        summary.put("bundles", rows);
        summary.put("bundles-over-hipparchus", mean);
    }

    private static double rate(Workload workload, Cell cell) throws RunnerException {
        Collection<RunResult> results = new Runner(new OptionsBuilder()
                        .include(BundleBenchmark.class.getSimpleName())
                        .param("workload", workload.name())
                        .param("contestant", cell.contestant().name())
                        .param("tolerance", Double.toString(cell.tolerance()))
                        .warmupIterations(2)
                        .warmupTime(TimeValue.milliseconds(500))
                        .measurementIterations(3)
                        .measurementTime(TimeValue.milliseconds(300))
                        .forks(1)
                        .build())
                .run();
        return results.iterator().next().getPrimaryResult().getScore();
    }

    private static void others(String which, Map<String, Object> summary, StringBuilder text) throws RunnerException {
        Collection<RunResult> results = new Runner(new OptionsBuilder()
                        .include(which)
                        .exclude(BundleBenchmark.class.getSimpleName())
                        .build())
                .run();
        List<Map<String, Object>> rows = new ArrayList<>();
        for (RunResult r : results) {
            StringBuilder name = new StringBuilder(r.getParams().getBenchmark().replace("org.stillpath.", ""));
            for (String key : r.getParams().getParamsKeys()) {
                name.append(' ').append(key).append('=').append(r.getParams().getParam(key));
            }
            rows.add(Map.of(
                    "benchmark", name.toString(),
                    "score", r.getPrimaryResult().getScore(),
                    "unit", r.getPrimaryResult().getScoreUnit(),
                    "threads", r.getParams().getThreads()));
            text.append(String.format(
                    Locale.ROOT,
                    "%s  %.4g %s%n",
                    name,
                    r.getPrimaryResult().getScore(),
                    r.getPrimaryResult().getScoreUnit()));
        }
        summary.put("others", rows);
    }
}
