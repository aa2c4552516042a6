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
import org.stillpath.medium.IndexField;

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
    private IndexField field = Workload.ROD.field();
    private Workload.Hipparchus peer = new Workload.Hipparchus(field, 1, 1);
    private NystromPropagator own = new NystromPropagator(1, 1, 1);
    private final double[] state = new double[org.stillpath.ray.State.size(0)];

    private interface Engine {
        double[] end(double[] start);
    }

    /** Finds the tolerances. */
    @Setup(Level.Trial)
    public void tune() {
        starts = workload.starts(RAYS);
        field = workload.field();
        double[][] truth = workload.truth(starts);
        boolean peerReached = false;
        boolean ownReached = false;
        for (int k = 8; k <= 68; k++) {
            double tolerance = Math.pow(10, -k / 4.0);
            if (!peerReached) {
                peer = new Workload.Hipparchus(field, workload.scale(), tolerance);
                peerReached = reached(s -> peer.end(s, workload.end()), truth);
            }
            if (!ownReached) {
                own = new NystromPropagator(tolerance, workload.scale(), 1);
                ownReached = reached(this::own, truth);
            }
        }
        if (!peerReached || !ownReached) {
            throw new IllegalStateException("no tolerance reaches the accuracy");
        }
    }

    private boolean reached(Engine engine, double[][] truth) {
        for (int i = 0; i < RAYS; i++) {
            if (!(distance(engine.end(starts[i]), truth[i]) <= workload.accuracy(accuracy))) {
                return false;
            }
        }
        return true;
    }

    private static double distance(double[] a, double[] b) {
        return Math.sqrt((a[0] - b[0]) * (a[0] - b[0]) + (a[1] - b[1]) * (a[1] - b[1]) + (a[2] - b[2]) * (a[2] - b[2]));
    }

    private double[] own(double[] start) {
        System.arraycopy(start, 0, state, 0, start.length);
        state[org.stillpath.ray.State.EXCESS] = 0;
        state[org.stillpath.ray.State.LENGTH] = 0;
        if (!own.follow(state, field, workload.end())) {
            state[0] = Double.NaN;
        }
        return state;
    }

    /** Hipparchus' DormandPrince853 on place and momentum alone. */
    @Benchmark
    @OperationsPerInvocation(RAYS)
    public void hipparchus(Blackhole hole) {
        for (double[] start : starts) {
            hole.consume(peer.end(start, workload.end()));
        }
    }

    /** The production engine, with optical excess and length. */
    @Benchmark
    @OperationsPerInvocation(RAYS)
    public void production(Blackhole hole) {
        for (double[] start : starts) {
            hole.consume(own(start));
        }
    }
}
