package org.stillpath.cli;

import static org.assertj.core.api.Assertions.assertThat;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.ObjectMapper;
import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Set;
import java.util.TreeSet;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;

/** The gallery is what the demo jobs give today: the numbers behind its pictures, and the pictures' names. */
class GalleryIT {
    private static final Path PROJECT = Path.of("").toAbsolutePath();
    private static final Path JOBS = PROJECT.resolve("media-models/demo");
    private static final Path PLOTS = PROJECT.resolve("plots");
    private static final ObjectMapper JSON = new ObjectMapper();

    @TempDir
    Path folder;

    static List<String> jobs() throws IOException {
        try (Stream<Path> files = Files.list(JOBS)) {
            return files.map(f -> f.getFileName().toString())
                    .filter(f -> f.endsWith(".yaml"))
                    .map(f -> f.substring(0, f.length() - ".yaml".length()))
                    .sorted()
                    .toList();
        }
    }

    @ParameterizedTest
    @MethodSource("jobs")
    void aJobGivesTheNumbersBehindItsPictures(String job) throws Exception {
        Packaged.Ended end =
                Packaged.run(folder, "run", JOBS.resolve(job + ".yaml").toString(), "--out", "out", "--quiet");
        assertThat(end.status()).as(end.err()).isZero();
        JsonNode now = JSON.readTree(folder.resolve("out/result.json").toFile());
        JsonNode kept = JSON.readTree(PLOTS.resolve(job + "/result.json").toFile());
        assertThat(now.get("figures")).isEqualTo(kept.get("figures"));
        for (JsonNode figure : kept.get("figures")) {
            String svg = figure.asText();
            assertThat(PLOTS.resolve(job).resolve(svg)).isRegularFile();
            assertThat(PLOTS.resolve(job).resolve(svg.replace(".svg", ".png"))).isRegularFile();
        }
        assertThat(names(now.get("quantities"))).isEqualTo(names(kept.get("quantities")));
        for (String name : names(kept.get("quantities"))) {
            quantity(
                    job + ": " + name,
                    now.get("quantities").get(name),
                    kept.get("quantities").get(name));
        }
        for (String rows : List.of("rays", "paths", "images", "stars")) {
            rows(job + ": " + rows, now.path(rows), kept.path(rows));
        }
        // a study's rows carry no errors: the jobs' accuracy, and that of differences in a budget
        alike(job + ": study", now.path("study"), kept.path("study"), 1e-6);
    }

    private static void quantity(String name, JsonNode now, JsonNode kept) {
        if (kept.has("word")) {
            assertThat(now.get("word")).as(name).isEqualTo(kept.get("word"));
            return;
        }
        double error = now.path("error").asDouble() + kept.path("error").asDouble();
        alike(name, now.get("value"), kept.get("value"), error, 1e-12);
    }

    private static void rows(String name, JsonNode now, JsonNode kept) {
        assertThat(now.size()).as(name).isEqualTo(kept.size());
        for (int i = 0; i < kept.size(); i++) {
            for (String key : names(kept.get(i).path("errors"))) {
                double error = kept.get(i).get("errors").get(key).asDouble()
                        + now.get(i).get("errors").get(key).asDouble();
                // the drift of a constant of the motion is told as an error alone, without a value of its own
                if (kept.get(i).has(key)) {
                    alike(name + i + key, now.get(i).path(key), kept.get(i).get(key), error, 1e-12);
                }
            }
        }
    }

    private static void alike(String name, JsonNode now, JsonNode kept, double relative) {
        alike(name, now, kept, 0, relative);
    }

    private static void alike(String name, JsonNode now, JsonNode kept, double error, double relative) {
        if (kept.isNumber()) {
            double size = Math.max(Math.abs(kept.asDouble()), Math.abs(now.asDouble()));
            assertThat(Math.abs(now.asDouble() - kept.asDouble()))
                    .as(name)
                    .isLessThanOrEqualTo(error + relative * size);
            return;
        }
        assertThat(now.getNodeType()).as(name).isEqualTo(kept.getNodeType());
        assertThat(now.size()).as(name).isEqualTo(kept.size());
        if (kept.isArray()) {
            for (int i = 0; i < kept.size(); i++) {
                alike(name + "." + i, now.get(i), kept.get(i), error, relative);
            }
        } else if (kept.isObject()) {
            assertThat(names(now)).as(name).isEqualTo(names(kept));
            names(kept).forEach(k -> alike(name + "." + k, now.get(k), kept.get(k), error, relative));
        } else {
            assertThat(now).as(name).isEqualTo(kept);
        }
    }

    private static Set<String> names(JsonNode node) {
        Set<String> names = new TreeSet<>();
        node.fieldNames().forEachRemaining(names::add);
        return names;
    }

    @Test
    void everyTaskStudyAndFigureIsShown() throws Exception {
        Set<String> tasks = new TreeSet<>();
        Set<String> studies = new TreeSet<>();
        Set<String> figures = new TreeSet<>();
        for (String job : jobs()) {
            JsonNode kept = JSON.readTree(PLOTS.resolve(job + "/result.json").toFile());
            tasks.add(kept.get("task").asText());
            studies.addAll(names(kept.path("study")));
            // a study of several results numbers its figures by their names
            kept.get("figures").forEach(f -> figures.add(f.asText().replaceAll("(-.*-.*)?\\.svg", "")));
        }
        assertThat(tasks).containsExactlyInAnyOrderElementsOf(NewCommand.STARTERS);
        assertThat(studies).contains("sweep", "batch", "budget", "fit");
        assertThat(figures)
                .contains("rays", "construction", "spot", "wavefront", "aberration", "focus", "zernike", "chromatic")
                .contains("paths", "arrival", "sightline", "profile", "transfer", "view", "temperature")
                .contains("sweep", "budget-contributions", "budget-histogram", "fit-residuals", "fit-correlation");
    }
}
