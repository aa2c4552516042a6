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
import org.openjdk.jmh.annotations.State;
import org.openjdk.jmh.annotations.Warmup;
import org.openjdk.jmh.infra.Blackhole;

/**
 * Rays one at a time through formula fields at matched accuracy: each engine runs at the largest tolerance on a grid of four
 * a decade with which all rays end within the asked distance of the truth.
 *
 * <p>Run: {@code mvn -q -B test-compile exec:exec@jmh -Djmh=RayBenchmark}.
 */
@State(Scope.Thread)
@BenchmarkMode(Mode.AverageTime)
@OutputTimeUnit(TimeUnit.MICROSECONDS)
@Warmup(iterations = 3, time = 1)
@Measurement(iterations = 5, time = 1)
@Fork(1)
public class RayBenchmark {
    private static final int RAYS = 256;

    /** What is traced. */
    @Param
    public Workload workload = Workload.ROD;

    /** How accurately, from 1 to 3. */
    @Param({"1", "2", "3"})
    public int accuracy = 1;

    private double[][] starts = {};
    private Workload.Hipparchus peer = new Workload.Hipparchus(Workload.ROD.field(), 1, 1);

    /** Finds the tolerance. */
    @Setup(Level.Trial)
    public void tune() {
        starts = workload.starts(RAYS);
        double[][] truth = workload.truth(starts);
        for (int k = 8; k <= 60; k++) {
            peer = new Workload.Hipparchus(workload.field(), workload.scale(), Math.pow(10, -k / 4.0));
            boolean reached = true;
            for (int i = 0; i < RAYS && reached; i++) {
                reached = distance(peer.end(starts[i], workload.end()), truth[i]) <= workload.accuracy(accuracy);
            }
            if (reached) {
                return;
            }
        }
        throw new IllegalStateException("no tolerance reaches the accuracy");
    }

    private static double distance(double[] a, double[] b) {
        return Math.sqrt((a[0] - b[0]) * (a[0] - b[0]) + (a[1] - b[1]) * (a[1] - b[1]) + (a[2] - b[2]) * (a[2] - b[2]));
    }

    /** Hipparchus' DormandPrince853. */
    @Benchmark
    @OperationsPerInvocation(RAYS)
    public void hipparchus(Blackhole hole) {
        for (double[] start : starts) {
            hole.consume(peer.end(start, workload.end()));
        }
    }
}
