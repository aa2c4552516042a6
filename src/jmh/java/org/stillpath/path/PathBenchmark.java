package org.stillpath.path;

import java.util.Map;
import java.util.concurrent.TimeUnit;
import java.util.stream.Collectors;
import org.openjdk.jmh.annotations.Benchmark;
import org.openjdk.jmh.annotations.BenchmarkMode;
import org.openjdk.jmh.annotations.Fork;
import org.openjdk.jmh.annotations.Measurement;
import org.openjdk.jmh.annotations.Mode;
import org.openjdk.jmh.annotations.OutputTimeUnit;
import org.openjdk.jmh.annotations.Scope;
import org.openjdk.jmh.annotations.State;
import org.openjdk.jmh.annotations.TearDown;
import org.openjdk.jmh.annotations.Warmup;
import org.stillpath.formula.Formula;
import org.stillpath.formula.FormulaException;
import org.stillpath.formula.Names;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.Declaration;
import org.stillpath.medium.FieldMedium;
import org.stillpath.medium.FormulaField;
import org.stillpath.ray.Train;
import org.stillpath.unit.Dimension;

/**
 * All paths between two points at 1e-9: three images over a hot road, where the index depends on height alone, and three
 * behind a bump in a medium without any symmetry. Tells the numbers of paths, rays and field evaluations.
 *
 * <p>Run: {@code mvn -q -B test-compile exec:exec@jmh -Djmh=PathBenchmark}.
 */
@State(Scope.Thread)
@BenchmarkMode(Mode.AverageTime)
@OutputTimeUnit(TimeUnit.MILLISECONDS)
@Warmup(iterations = 5, time = 2)
@Measurement(iterations = 5, time = 2)
@Fork(1)
public class PathBenchmark {
    private PathSearch.Query road = query(
            "1 + 2.7e-4 - 2e-5*exp(-(z/d)^2)",
            Map.of("d", 0.3),
            new Vector(0, 0, 1.5),
            new Vector(600, 0, 0.6),
            Math.toRadians(60));
    private PathSearch.Query bumps = query(
            "1.5 + 0.3*exp(-((x - 0.1 m)^2 + (y + 0.05 m)^2 + (z - 4 m)^2)/w^2)"
                    + " - 0.03*exp(-((x + 0.4 m)^2 + (y - 0.2 m)^2 + (z - 3 m)^2)/w^2)"
                    + " + 0.03*exp(-((x - 0.3 m)^2 + (y - 0.5 m)^2 + (z - 6 m)^2)/w^2)",
            Map.of("w", 0.9),
            new Vector(0.05, 0.1, 0),
            new Vector(0, 0.02, 12),
            Math.toRadians(60));

    private static PathSearch.Query query(
            String formula, Map<String, Double> values, Vector from, Vector to, double halfAngle) {
        Map<String, Dimension> with =
                values.keySet().stream().collect(Collectors.toMap(k -> k, k -> Dimension.LENGTH));
        try {
            Formula parsed = Formula.parse(formula, Names.of(Names.PLACE, with), Dimension.NONE);
            Train train = Train.through(
                    new FieldMedium(Declaration.of("medium"), FormulaField.of(parsed, values), false, false)
                            .field(500e-9, Frame.JOB));
            return new PathSearch.Query(train, from, to, Vector.ZERO, halfAngle, Vector.ZERO, 1e-9);
        } catch (FormulaException e) {
            throw new IllegalStateException(e);
        }
    }

    /** Three images over a hot road. */
    @Benchmark
    public PathSearch.Outcome road() {
        return PathSearch.run(road);
    }

    /** Three images in space. */
    @Benchmark
    public PathSearch.Outcome space() {
        return PathSearch.run(bumps);
    }

    /** Tells what was computed. */
    @TearDown
    public void tell() {
        for (PathSearch.Query q : new PathSearch.Query[] {road, bumps}) {
            PathSearch.Outcome o = PathSearch.run(q);
            System.out.printf(
                    "%n%d paths, %s, %d rays, %d field evaluations%n",
                    o.paths().size(), o.planar() ? "in a plane" : "in space", o.shots(), o.evaluations());
        }
    }
}
