package org.stillpath.cli;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.ObjectMapper;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

/** The packaged program from the outside. */
class ProgramIT {
    private static final Path PROJECT = Path.of("").toAbsolutePath();
    private static final String DEMO =
            PROJECT.resolve("media-models/demo/rod.yaml").toString();

    @TempDir
    Path folder;

    /** f = 1/(n0 g sin gL), back focus = n cot(gL)/(n0 g), n the air's index (Gomez-Reino, Perez and Bao 2002, chapter 1). */
    @Test
    void givesTheFocalLengthOfTheShippedRod() throws Exception {
        Packaged.Ended end = Packaged.run(folder, "run", DEMO, "--json");
        assertThat(end.status()).as(end.err()).isZero();
        JsonNode q = new ObjectMapper().readTree(end.out()).get("quantities");
        double phase = 304 * 2.5e-3;
        double f = 1 / (1.607 * 304 * Math.sin(phase));
        assertThat(q.get("effective-focal-length").get("value").asDouble()).isCloseTo(f, within(1e-11));
        assertThat(q.get("effective-focal-length").get("error").asDouble()).isBetween(1e-18, 1e-11);
        double air = q.get("rear-focal-length").get("value").asDouble() / f;
        // Ciddor 1996 at 20 degC, 101.325 kPa, 420 ppm CO2, 633 nm: 1.00027179, in the project's own unit tests
        assertThat(air).isCloseTo(1.00027179, within(2e-8));
        assertThat(q.get("back-focal-distance").get("value").asDouble())
                .isCloseTo(air * Math.cos(phase) * f, within(1e-11));
    }

    @Test
    void saysTheAnswerFirst() throws Exception {
        Packaged.Ended end = Packaged.run(folder, "run", DEMO);
        assertThat(end.out().lines().findFirst()).hasValue("Effective focal length 2.971261 mm");
        assertThat(end.out()).contains("back focal distance").contains("caution:");
        assertThat(end.out().lines().mapToInt(String::length).max().orElse(0)).isLessThanOrEqualTo(80);
    }

    @Test
    void writesAFolderOfResults() throws Exception {
        Packaged.Ended end = Packaged.run(folder, "run", DEMO, "--out", "out", "--quiet");
        assertThat(end.status()).as(end.err()).isZero();
        Path out = folder.resolve("out");
        try (Stream<Path> files = Files.list(out)) {
            assertThat(files.map(p -> String.valueOf(p.getFileName())))
                    .containsExactlyInAnyOrder("result.json", "rays.svg", "rays.png", "report.html");
        }
        assertThat(Files.readString(out.resolve("rays.svg"), StandardCharsets.UTF_8))
                .contains("z / mm");
        JsonNode json = new ObjectMapper().readTree(out.resolve("result.json").toFile());
        assertThat(json.get("figures").get(0).asText()).isEqualTo("rays.svg");
        assertThat(Files.readString(out.resolve("report.html"), StandardCharsets.UTF_8))
                .contains("<svg")
                .doesNotContain("http://www.w3.org/1999/xhtml\" src");
    }

    @Test
    void goesOnAfterAJobAtFault() throws Exception {
        Files.writeString(folder.resolve("bad.yaml"), "task: lens\nwavelength: 633 m m\nthrough: air\n");
        Packaged.Ended end = Packaged.run(folder, "run", "bad.yaml", DEMO, "--json");
        assertThat(end.status()).isEqualTo(2);
        List<String> lines = end.out().lines().toList();
        assertThat(lines).hasSize(2);
        JsonNode first = new ObjectMapper().readTree(lines.get(0));
        assertThat(first.get("job").asText()).isEqualTo("bad.yaml");
        assertThat(first.get("faults").size()).isPositive();
        assertThat(new ObjectMapper().readTree(lines.get(1)).get("task").asText())
                .isEqualTo("lens");
    }

    @Test
    void takesValuesFromTheCommandLine() throws Exception {
        Packaged.Ended end = Packaged.run(
                folder,
                "run",
                DEMO,
                "--json",
                "--set",
                "media.rod.with.g=0.31 1/mm",
                "--set",
                "train.surfaces[1].at=4 mm");
        assertThat(end.status()).as(end.err()).isZero();
        double f = new ObjectMapper()
                .readTree(end.out())
                .get("quantities")
                .get("effective-focal-length")
                .get("value")
                .asDouble();
        assertThat(f).isCloseTo(1 / (1.607 * 310 * Math.sin(310 * 4e-3)), within(1e-11));
    }

    @Test
    void startersRunAsTheyAre() throws Exception {
        for (String task : new String[] {"lens", "trace"}) {
            Packaged.Ended starter = Packaged.run(folder, "new", task);
            assertThat(starter.status()).isZero();
            Files.writeString(folder.resolve(task + ".yaml"), starter.out());
            Packaged.Ended check = Packaged.run(folder, "check", task + ".yaml");
            assertThat(check.status()).as(check.err()).isZero();
            Packaged.Ended run = Packaged.run(folder, "run", task + ".yaml");
            assertThat(run.status()).as(run.err()).isZero();
            assertThat(run.out()).isNotEmpty();
        }
    }

    @Test
    void showsAShippedMedium() throws Exception {
        assertThat(Packaged.run(folder, "media").out()).contains("rods/parabolic\n", "vacuum\n");
        Packaged.Ended one = Packaged.run(folder, "media", "rods/parabolic");
        assertThat(one.out()).contains("Gomez-Reino").contains("1.52630272");
        Packaged.Ended none = Packaged.run(folder, "media", "rods/parabola");
        assertThat(none.status()).isEqualTo(2);
        assertThat(none.messages()).hasSize(1);
    }

    @Test
    void runsFromAnywhereUnderAnyName() throws Exception {
        Path link = folder.resolve("mit Leerzeichen und Umläuten äöü");
        Files.createDirectory(link);
        Path program = link.resolve("still path");
        Files.createSymbolicLink(program, Path.of(System.getProperty("stillpath.launcher", "")));
        Files.copy(Path.of(DEMO), link.resolve("Prüfstück 1.yaml"));
        Packaged.Ended end =
                Packaged.run(link, List.of(program.toString(), "run", "Prüfstück 1.yaml", "--out", "Ergebnis ß"));
        assertThat(end.status()).as(end.err()).isZero();
        assertThat(link.resolve("Ergebnis ß/result.json")).exists();
    }

    /** A program of a library user's own needs the engine's jar and its own dependencies, and loads no window toolkit. */
    @Test
    void theEngineIsALibrary() throws Exception {
        Path source = folder.resolve("Own.java");
        Files.writeString(source, """
                import org.stillpath.formula.*;
                import org.stillpath.geometry.*;
                import org.stillpath.medium.*;
                import org.stillpath.ray.*;
                import java.util.List;

                public class Own {
                    public static void main(String[] args) {
                        IndexField glass = UniformMedium.of("glass", 1.5).field(Double.NaN, Frame.JOB);
                        IndexField air = UniformMedium.of("none", 1).field(Double.NaN, Frame.JOB);
                        Train train = new Train(air, List.of(new Element(
                                Surface.cap(0, 0.02, 0), new Action.Refract(false), glass)));
                        Traced end = new Tracer(train, new Ending.AtZ(0.06), new Tracer.Settings(1e-9, false, false))
                                .trace(RayStart.of(new Vector(0, 1e-6, -0.01), Vector.Z));
                        System.out.println(Math.abs(end.position().y()) < 1e-9);
                    }
                }
                """);
        String classPath = System.getProperty("stillpath.engine.jar") + ":" + enginePath();
        Packaged.Ended end = Packaged.run(
                folder,
                List.of(
                        Path.of(System.getProperty("java.home"), "bin", "java").toString(),
                        "-Xlog:class+load:file=" + folder.resolve("classes.txt"),
                        "-cp",
                        classPath,
                        source.toString()));
        assertThat(end.status()).as(end.err()).isZero();
        assertThat(end.out()).isEqualTo("true\n");
        assertThat(Files.readString(folder.resolve("classes.txt")))
                .doesNotContain(" java.awt.", "snakeyaml", "picocli", "jfree");
    }

    /** The jars of the engine's own dependencies, as this test was started with them. */
    private static String enginePath() {
        return String.join(
                ":",
                Stream.of(System.getProperty("java.class.path").split(":"))
                        .filter(p -> p.contains("hipparchus") || p.contains("jspecify") || p.contains("/asm-"))
                        .toList());
    }
}
