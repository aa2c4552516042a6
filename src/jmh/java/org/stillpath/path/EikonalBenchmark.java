package org.stillpath.path;

import java.util.List;
import java.util.concurrent.TimeUnit;
import org.openjdk.jmh.annotations.Benchmark;
import org.openjdk.jmh.annotations.BenchmarkMode;
import org.openjdk.jmh.annotations.Fork;
import org.openjdk.jmh.annotations.Measurement;
import org.openjdk.jmh.annotations.Mode;
import org.openjdk.jmh.annotations.OutputTimeUnit;
import org.openjdk.jmh.annotations.Scope;
import org.openjdk.jmh.annotations.State;
import org.openjdk.jmh.annotations.Warmup;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;

/**
 * First arrivals in Maxwell's fisheye, on 400 × 400 nodes and on 80³.
 *
 * <p>Run: {@code mvn -q -B test-compile exec:exec@jmh -Djmh=EikonalBenchmark}.
 */
@State(Scope.Thread)
@BenchmarkMode(Mode.AverageTime)
@OutputTimeUnit(TimeUnit.MILLISECONDS)
@Warmup(iterations = 3, time = 1)
@Measurement(iterations = 5, time = 1)
@Fork(1)
public class EikonalBenchmark {
    private static final IndexField FISHEYE = (x, y, z, count, order, out) -> {
        for (int i = 0; i < count; i++) {
            double n = 1.5 / (1 + 0.25 * (x[i] * x[i] + y[i] * y[i] + z[i] * z[i]));
            out.value[i] = (n - 1) * (n + 1);
            out.gx[i] = -n * n * n / 3 * x[i];
            out.gy[i] = -n * n * n / 3 * y[i];
            out.gz[i] = -n * n * n / 3 * z[i];
        }
    };

    private static FrontGrid.Axis axis(double x, double y, double z, int count) {
        return new FrontGrid.Axis(new Vector(x, y, z), 2.0 / (count - 1), count);
    }

    /** In a plane. */
    @Benchmark
    public Fronts plane() {
        FrontGrid grid = new FrontGrid(new Vector(-1, -1, 0), List.of(axis(1, 0, 0, 400), axis(0, 1, 0, 400)));
        return Eikonal.fronts(FISHEYE, new Vector(-0.5, -0.3, 0), grid);
    }

    /** In space. */
    @Benchmark
    public Fronts space() {
        FrontGrid grid = new FrontGrid(
                new Vector(-1, -1, -1), List.of(axis(1, 0, 0, 80), axis(0, 1, 0, 80), axis(0, 0, 1, 80)));
        return Eikonal.fronts(FISHEYE, new Vector(-0.5, -0.3, 0.2), grid);
    }
}
