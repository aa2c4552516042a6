package org.stillpath.io;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Optional;
import java.util.function.DoubleBinaryOperator;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.job.Section;
import org.stillpath.medium.FieldMedium;
import org.stillpath.medium.MediaReader;
import org.stillpath.medium.Medium;
import org.stillpath.problem.Problem;
import org.stillpath.problem.Problems;

/** Media of a job whose index is a grid in a file. */
class GridMediaTest {
    @TempDir
    Path folder;

    private Problems problems = new Problems();

    @BeforeEach
    void lay() throws IOException {
        Files.writeString(
                folder.resolve("block.csv"), csv("x [mm],y [mm],z [mm],value", 5, 1, (u, v) -> 1.5 + u - 2 * v));
        Files.writeString(folder.resolve("bare.csv"), csv("x,y,z,value", 5, 1, (u, v) -> 1.5 + u - 2 * v));
        try (var in = GridMediaTest.class.getResourceAsStream("vtk/binary.vtr")) {
            Files.write(folder.resolve("block.vtr"), in == null ? new byte[0] : in.readAllBytes());
        }
    }

    /** A grid over a cube from 0 to {@code side}, the value a function of x and y + z/2. */
    private static String csv(String header, int n, double side, DoubleBinaryOperator f) {
        StringBuilder b = new StringBuilder(header).append('\n');
        for (int i = 0; i < n; i++) {
            for (int j = 0; j < n; j++) {
                for (int k = 0; k < n; k++) {
                    double x = side * i / (n - 1);
                    double y = side * j / (n - 1);
                    double z = side * k / (n - 1);
                    b.append(x + "," + y + "," + z + "," + f.applyAsDouble(x, y + z / 2) + "\n");
                }
            }
        }
        return b.toString();
    }

    private Medium medium(String grid) {
        problems = new Problems();
        String yaml = "m: {index: {grid: {" + grid + "}}}\n";
        String job = folder.resolve("job.yaml").toString();
        var node = YamlReader.parse(yaml.getBytes(StandardCharsets.UTF_8), job, problems);
        return MediaReader.read(
                        Optional.of(Section.of(node, "media", problems)),
                        FileSources.of(folder.resolve("job.yaml"), false),
                        problems)
                .find("m")
                .orElseThrow();
    }

    private double index(Medium medium, double x, double y, double z) {
        assertThat(problems.list()).isEmpty();
        Samples s = new Samples(1);
        ((FieldMedium) medium)
                .scalar()
                .sample(new double[] {x}, new double[] {y}, new double[] {z}, 1, Double.NaN, Order.VALUE, s);
        return 1 + s.value[0];
    }

    @Test
    void aLinearIndexIsReproduced() {
        Medium m = medium("file: block.csv");
        assertThat(index(m, 0.31e-3, 0.77e-3, 0.18e-3)).isCloseTo(1.5 + 0.31 - 2 * (0.77 + 0.09), within(2e-15));
        assertThat(m.warnings()).isEmpty();
        assertThat(index(medium("file: bare.csv, unit: cm"), 0.31e-2, 0.77e-2, 0.18e-2))
                .isCloseTo(1.5 + 0.31 - 2 * (0.77 + 0.09), within(2e-15));
        // three times linear: the tensor product of straight lines
        assertThat(index(medium("file: block.vtr, unit: mm, array: n index"), 0.3e-3, 2.2e-3, 1.1e-3))
                .isCloseTo(1.5 + 0.003 - 0.044 + 0.0033 + 0.001 * 0.3 * 2.2 * 1.1, within(4e-15));
    }

    @Test
    void theErrorOfASmoothIndexFallsWithTheFourthPower() throws IOException {
        // a Gaussian that has died out at the faces, where a natural spline would fall short;
        // de Boor, A Practical Guide to Splines, ch. V: the error of a cubic spline falls with the fourth power of the
        // spacing
        double[] error = new double[2];
        for (int i = 0; i < 2; i++) {
            int n = i == 0 ? 21 : 41;
            Files.writeString(folder.resolve("smooth.csv"), csv("x [m],y [m],z [m],n", n, 1e-2, GridMediaTest::bell));
            Medium m = medium("file: smooth.csv");
            for (double t = 0; t < 1; t += 0.013) {
                double x = 4e-3 + 2e-3 * t;
                double y = 3e-3 + 1e-3 * t * t;
                double z = 3e-3 - 1e-3 * t;
                error[i] = Math.max(error[i], Math.abs(index(m, x, y, z) - bell(x, y + z / 2)));
            }
        }
        assertThat(error[0] / error[1]).isBetween(12.0, 20.0);
        assertThat(error[1]).isLessThan(1e-5);
    }

    private static double bell(double u, double v) {
        double a = (u - 5e-3) / 1.2e-3;
        double b = (v - 4.5e-3) / 1.2e-3;
        return 1.5 + 0.05 * Math.exp(-a * a - b * b);
    }

    @Test
    void whatHoldsBeyondTheGridIsChosen() {
        assertThat(index(medium("file: block.csv, beyond: hold"), 9e-3, 0.5e-3, 0))
                .isCloseTo(1.5, within(1e-14));
        assertThat(index(medium("file: block.csv, beyond: fault"), 9e-3, 0.5e-3, 0))
                .isNaN();
        assertThat(index(medium("file: block.csv, interpolate: spline"), 1e-3, 0, 0))
                .isCloseTo(2.5, within(1e-14));
    }

    @Test
    void sizesThatDoNotGoWithTheIndexAreTold() {
        Medium m = medium("file: bare.csv, unit: m");
        assertThat(problems.list()).isEmpty();
        assertThat(m.warnings())
                .containsExactly(folder.resolve("block.csv").resolveSibling("bare.csv")
                        + ": the grid is 1 m long and its index goes up to 2.5; if that is not meant, its unit of length is"
                        + " wrong, such as m for mm");
        assertThat(medium("file: bare.csv, unit: nm").warnings())
                .singleElement()
                .asString()
                .contains("such as mm for m");
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            value = {
                "file: bare.csv | bare.csv:1:1: media.m.index.grid: column \"x\" has no unit; a length is needed, with a"
                        + " header such as x [mm], or `unit: mm` beside `file`",
                "file: block.vtr, array: n index | block.vtr is a VTK file, which names no units; `unit: mm` beside `file`"
                        + " says in which its coordinates are",
                "file: block.csv, unit: mm | block.csv names its units itself, x [mm]; leave `unit` out",
                "file: bare.csv, unit: furlong | job.yaml:1:42: media.m.index.grid.unit: \"furlong\" is not a unit; the unit"
                        + " of a length is needed, such as `unit: mm`",
                "file: bare.csv, unit: K | \"K\" does not fit; the unit of a length is needed",
                "file: bare.csv, unit: mm, value-unit: K"
                        + " | \"K\" does not fit; the unit of a pure number is needed, which is 1; leave `value-unit` out",
                "file: block.csv, beyond: linear | \"linear\" is not known here; one of fault, hold is needed",
                "file: block.csv, interpolate: linear | \"linear\" is not known here; the word is spline",
                "'file: block.csv, columns: [x, y, z]' | four names are needed, of x, y, z and of the value, not 3",
                "file: block.csv, arary: n | unknown key \"arary\"; did you mean \"array\"?",
                "file: block.cvs | there is no file \"block.cvs\" (there is \"block.csv\")",
                "array: n | \"file\" is missing; add it in media.m.index.grid, such as \"file: block.csv\"",
            })
    void gridsAtFault(String grid, String message) {
        medium(grid.replace("'", ""));
        List<String> told = problems.list().stream().map(Problem::toString).toList();
        assertThat(told).isNotEmpty();
        assertThat(told.get(0)).contains(message);
    }

    @Test
    void unitsThatDoNotFitAreToldAtTheirHeader() throws IOException {
        Files.writeString(folder.resolve("bad.csv"), csv("x [mm],y [furlong],z [s],value [K]", 2, 1, (u, v) -> u + v));
        medium("file: bad.csv");
        assertThat(problems.list().stream().map(Problem::toString))
                .containsExactly(
                        folder.resolve("bad.csv")
                                + ":1:8: media.m.index.grid: column \"y\" is in \"furlong\", which is not a"
                                + " unit; a length is needed, with a header such as y [mm]",
                        folder.resolve("bad.csv")
                                + ":1:20: media.m.index.grid: column \"z\" is in \"s\"; a length is needed,"
                                + " with a header such as z [mm]",
                        folder.resolve("bad.csv")
                                + ":1:26: media.m.index.grid: column \"value\" is in \"K\"; a pure number is needed");
    }
}
