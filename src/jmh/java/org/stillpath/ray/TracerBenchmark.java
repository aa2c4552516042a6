package org.stillpath.ray;

import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.ForkJoinPool;
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
import org.openjdk.jmh.annotations.TearDown;
import org.openjdk.jmh.annotations.Warmup;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;

/**
 * Rays through a rod with plane faces to a plane behind it, as a job traces them: two runs each, error estimates and all. One
 * by one, and in bundles by one thread and two.
 *
 * <p>Run: {@code mvn -q -B test-compile exec:exec@jmh -Djmh=TracerBenchmark}.
 */
@org.openjdk.jmh.annotations.State(Scope.Benchmark)
@BenchmarkMode(Mode.AverageTime)
@OutputTimeUnit(TimeUnit.MICROSECONDS)
@Warmup(iterations = 3, time = 1)
@Measurement(iterations = 5, time = 1)
@Fork(1)
public class TracerBenchmark {
    private static final int RAYS = 32_768;

    /** Threads; 0 stands for rays one by one. */
    @Param({"0", "1", "2"})
    public int threads = 1;

    private List<RayStart> starts = List.of();
    private Tracer tracer = new Tracer(
            Train.through(Workload.ROD.field()), new Ending.AtZ(1), new Tracer.Settings(1e-9, false, false));
    private ForkJoinPool pool = new ForkJoinPool(1);

    /** Makes train and rays. */
    @Setup(Level.Trial)
    public void prepare() {
        pool.shutdown();
        pool = new ForkJoinPool(Math.max(1, threads));
        IndexField air = new org.stillpath.medium.UniformMedium(
                        org.stillpath.medium.Declaration.of("air"), 1, false)
                .field(500e-9, org.stillpath.geometry.Frame.JOB);
        Train train = new Train(
                air,
                List.of(
                        new Element(Surface.plane(0), new Action.Refract(false), Workload.ROD.field()),
                        new Element(Surface.plane(20e-3), new Action.Refract(false), air)));
        tracer = new Tracer(train, new Ending.AtZ(30e-3), new Tracer.Settings(1e-9, false, false));
        List<RayStart> list = new ArrayList<>();
        for (double[] s : Workload.ROD.starts(RAYS)) {
            list.add(RayStart.of(new Vector(s[0], s[1], -1e-3), new Vector(s[3], s[4], s[5])));
        }
        starts = list;
    }

    /** Ends the threads. */
    @TearDown(Level.Trial)
    public void end() {
        pool.shutdown();
    }

    /** All rays once. */
    @Benchmark
    @OperationsPerInvocation(RAYS)
    public List<Traced> rays() throws Exception {
        if (threads == 0) {
            return starts.stream().map(tracer::trace).toList();
        }
        return pool.submit(() -> tracer.trace(starts)).get();
    }
}
