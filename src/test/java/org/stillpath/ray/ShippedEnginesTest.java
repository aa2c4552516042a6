package org.stillpath.ray;

import static org.assertj.core.api.Assertions.assertThat;

import java.nio.file.Path;
import java.util.Random;
import java.util.stream.Stream;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;
import org.stillpath.geometry.Vector;
import org.stillpath.io.FileSources;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.MediumFile;
import org.stillpath.problem.Problems;

/** Reference and production engine agree to the asked accuracy on every medium that ships. */
class ShippedEnginesTest {
    private static final int RAYS = 10;

    static Stream<String> names() {
        return FileSources.shipped().stream().filter(n -> !n.startsWith("demo/") && !n.startsWith("materials/"));
    }

    @ParameterizedTest
    @MethodSource("names")
    void agree(String name) {
        MediumFile file = MediumFile.read(name, FileSources.of(Path.of("job.yaml"), false), new Problems());
        IndexField field = file.medium().field(587.56e-9, file.medium().frame(Vector.ZERO));
        double extent = 0;
        for (MediumFile.Sample s : file.samples()) {
            extent = Math.max(extent, s.at().norm());
        }
        Random r = new Random(name.hashCode());
        int arrived = 0;
        for (int i = 0; i < RAYS; i++) {
            Vector from = AnalyticCase.point(r, 0.5 * extent);
            Vector d = AnalyticCase.unit(r);
            if (name.startsWith("air/")) {
                // air is known above the ground only
                from = new Vector(from.x(), from.y(), Math.abs(from.z()));
                d = new Vector(d.x(), d.y(), Math.abs(d.z()));
            }
            Ending ending = new Ending.AtLength(extent);
            for (double accuracy : new double[] {1e-6, 1e-9, 1e-12}) {
                Traced end = Engines.trace(
                        Train.through(field), ending, new Tracer.Settings(accuracy, true, false), RayStart.of(from, d));
                arrived += end.status() == Status.ARRIVED ? 1 : 0;
                if (end.status() == Status.ARRIVED) {
                    assertThat(end.accurate()).isTrue();
                }
            }
        }
        assertThat(arrived).isPositive();
    }
}
