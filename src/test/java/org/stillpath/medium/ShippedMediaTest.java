package org.stillpath.medium;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.nio.file.Path;
import java.util.List;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;
import org.stillpath.geometry.Vector;
import org.stillpath.io.FileSources;
import org.stillpath.problem.Problems;

/** Every shipped medium: it reads, says where it comes from, and has the index that its sample points state. */
class ShippedMediaTest {
    static Stream<String> names() {
        return FileSources.shipped().stream().filter(n -> !n.startsWith("demo/") && !n.startsWith("materials/"));
    }

    @ParameterizedTest
    @MethodSource("names")
    void hasTheIndexOfItsSource(String name) {
        Problems problems = new Problems();
        MediumFile file = MediumFile.read(name, FileSources.of(Path.of("job.yaml"), false), problems);
        assertThat(problems.list()).isEmpty();
        assertThat(file.title()).isNotEmpty();
        assertThat(file.medium().source()).isNotEmpty();
        assertThat(file.samples()).hasSizeGreaterThanOrEqualTo(2);
        for (MediumFile.Sample s : file.samples()) {
            IndexField field = file.medium().field(s.wavelength(), file.medium().frame(Vector.ZERO));
            double value = Differences.value(field, s.at().x(), s.at().y(), s.at().z());
            assertThat(Math.sqrt(1 + value)).isCloseTo(s.index(), within(2e-15));
        }
    }

    @Test
    void shipsWhatTheDocumentationNames() {
        assertThat(names().toList())
                .containsAll(List.of(
                        "rods/parabolic",
                        "rods/hyperbolic-secant",
                        "rods/helical",
                        "rods/even-powers",
                        "spheres/luneburg",
                        "spheres/fisheye",
                        "spheres/eaton",
                        "spheres/gutman",
                        "eyes/liou-brennan-front",
                        "eyes/liou-brennan-back"));
    }
}
