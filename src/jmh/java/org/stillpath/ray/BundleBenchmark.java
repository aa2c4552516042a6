package org.stillpath.ray;

import java.util.concurrent.TimeUnit;
import org.openjdk.jmh.annotations.Benchmark;
import org.openjdk.jmh.annotations.BenchmarkMode;
import org.openjdk.jmh.annotations.Fork;
import org.openjdk.jmh.annotations.Level;
import org.openjdk.jmh.annotations.Measurement;
import org.openjdk.jmh.annotations.Mode;
import org.openjdk.jmh.annotations.OperationsPerInvocation;
import org.openjdk.jmh.annotations.OutputTimeUnit;
import org.openjdk.jmh.annotations.Param;
import org.openjdk.jmh.annotations.Scope;
import org.openjdk.jmh.annotations.Setup;
import org.openjdk.jmh.annotations.Warmup;

/**
 * Rays a second through formula fields, one thread, at a tolerance of each engine's own. {@link Benchmarks} finds the tolerances
 * that give the same accuracy and interleaves the engines; by itself: {@code mvn -q -B test-compile exec:exec@jmh
 * -Djmh=BundleBenchmark}.
 */
@org.openjdk.jmh.annotations.State(Scope.Thread)
@BenchmarkMode(Mode.Throughput)
@OutputTimeUnit(TimeUnit.SECONDS)
@Warmup(iterations = 3, time = 1)
@Measurement(iterations = 5, time = 1)
@Fork(1)
public class BundleBenchmark {
    static final int RAYS = 2048;

    /** What is traced. */
    @Param
    public Workload workload = Workload.ROD;

    /** By what. */
    @Param({"STILLPATH", "HIPPARCHUS"})
    public Contestant contestant = Contestant.STILLPATH;

    /** How well, in the engine's own terms. */
    @Param("1e-9")
    public double tolerance = 1e-9;

    private double[] starts = {};
    private double[] states = {};
    private Contestant.Runner runner = states -> {};

    /** Makes the rays. */
    @Setup(Level.Trial)
    public void prepare() {
        starts = Contestant.states(workload.starts(RAYS));
        states = new double[starts.length];
        runner = contestant.runner(workload, tolerance);
    }

    /** All rays once. */
    @Benchmark
    @OperationsPerInvocation(RAYS)
    public double[] rays() {
        System.arraycopy(starts, 0, states, 0, starts.length);
        runner.run(states);
        return states;
    }
}
