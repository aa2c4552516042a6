package org.stillpath.medium;

import java.util.Random;
import java.util.concurrent.TimeUnit;
import org.openjdk.jmh.annotations.Benchmark;
import org.openjdk.jmh.annotations.BenchmarkMode;
import org.openjdk.jmh.annotations.Fork;
import org.openjdk.jmh.annotations.Level;
import org.openjdk.jmh.annotations.Measurement;
import org.openjdk.jmh.annotations.Mode;
import org.openjdk.jmh.annotations.OperationsPerInvocation;
import org.openjdk.jmh.annotations.OutputTimeUnit;
import org.openjdk.jmh.annotations.Scope;
import org.openjdk.jmh.annotations.Setup;
import org.openjdk.jmh.annotations.State;
import org.openjdk.jmh.annotations.Warmup;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Frame;

/**
 * A point of a table's index with gradient and Hessian: a cubic grid of a million nodes and a profile of a hundred rows, at
 * points along rays, where neighbours mostly share a cell.
 *
 * <p>Run: {@code mvn -q -B test-compile exec:exec@jmh -Djmh=FieldBenchmark}.
 */
@State(Scope.Thread)
@BenchmarkMode(Mode.AverageTime)
@OutputTimeUnit(TimeUnit.NANOSECONDS)
@Warmup(iterations = 4, time = 1)
@Measurement(iterations = 5, time = 1)
@Fork(1)
public class FieldBenchmark {
    private static final int POINTS = 4096;
    private static final int NODES = 100;

    private final double[] x = new double[POINTS];
    private final double[] y = new double[POINTS];
    private final double[] z = new double[POINTS];
    private final Samples one = new Samples(1);
    private final Samples all = new Samples(POINTS);
    private final double[][] point = new double[3][1];
    private IndexField grid = new UniformIndex(0, java.util.List.of());
    private IndexField profile = new UniformIndex(0, java.util.List.of());

    /** Makes fields and points. */
    @Setup(Level.Trial)
    public void prepare() {
        double[] knots = new double[NODES];
        double[] values = new double[NODES * NODES * NODES];
        double[] rows = new double[NODES];
        for (int i = 0; i < NODES; i++) {
            knots[i] = i / (NODES - 1.0);
            rows[i] = 1e-3 * Math.sin(3 * knots[i]);
        }
        Random random = new Random(20261201);
        for (int i = 0; i < values.length; i++) {
            values[i] = 0.5 + 1e-3 * random.nextDouble();
        }
        grid = new FieldMedium(
                        Declaration.of("grid"), Grid.of(knots, knots, knots, values, Beyond.FAULT), true, false)
                .field(500e-9, Frame.JOB);
        Spline spline = Spline.of(knots, rows, Interpolation.SPLINE, Beyond.FAULT);
        profile = new FieldMedium(Declaration.of("profile"), Profile.of(Along.Z, spline, 1), true, false)
                .field(500e-9, Frame.JOB);
        for (int i = 0; i < POINTS; i++) {
            double t = (i % 64) / 64.0;
            if (i % 64 == 0) {
                x[i] = 0.1 + 0.6 * random.nextDouble();
                y[i] = 0.1 + 0.6 * random.nextDouble();
            } else {
                x[i] = x[i - 1] + 1e-3;
                y[i] = y[i - 1] + 2e-3;
            }
            z[i] = 0.05 + 0.9 * t;
        }
    }

    private double single(IndexField field) {
        double sum = 0;
        for (int i = 0; i < POINTS; i++) {
            point[0][0] = x[i];
            point[1][0] = y[i];
            point[2][0] = z[i];
            field.sample(point[0], point[1], point[2], 1, Order.HESSIAN, one);
            sum += one.value[0];
        }
        return sum;
    }

    /** A grid, a point at a time. */
    @Benchmark
    @OperationsPerInvocation(POINTS)
    public double gridPoint() {
        return single(grid);
    }

    /** A grid, many points at once. */
    @Benchmark
    @OperationsPerInvocation(POINTS)
    public double gridMany() {
        grid.sample(x, y, z, POINTS, Order.HESSIAN, all);
        return all.value[0];
    }

    /** A profile, a point at a time. */
    @Benchmark
    @OperationsPerInvocation(POINTS)
    public double profilePoint() {
        return single(profile);
    }

    /** A profile, many points at once. */
    @Benchmark
    @OperationsPerInvocation(POINTS)
    public double profileMany() {
        profile.sample(x, y, z, POINTS, Order.HESSIAN, all);
        return all.value[0];
    }
}
