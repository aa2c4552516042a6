package org.stillpath.cli;

import static org.assertj.core.api.Assertions.assertThat;

import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Objects;
import java.util.SplittableRandom;
import java.util.concurrent.TimeUnit;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

/** Studies of the packaged program: killed and taken up again, refused, and as the starters show them. */
class StudyIT {
    private static final String SWEEP = """
            task: lens
            accuracy: 1e-12
            wavelength: 633 nm
            media:
              rod: {index: "n0*sqrt(1 - (g*r)^2)", with: {n0: 1.6, g: 0.3 1/mm}}
            train:
              from: vacuum
              surfaces:
                - {at: 0 mm, into: rod, aperture: 0.9 mm}
                - {at: 2.5 mm, into: vacuum, aperture: 0.9 mm}
            figures: []
            study:
              sweep: {media.rod.with.g: {from: 0.28 1/mm, to: 0.32 1/mm, count: 20000}}
              watch: [quantities.back-focal-distance]
            """;

    @TempDir
    Path folder;

    private Process start(String into) throws Exception {
        return new ProcessBuilder(
                        Objects.requireNonNull(System.getProperty("stillpath.launcher")),
                        "run",
                        "job.yaml",
                        "--quiet",
                        "--out",
                        into)
                .directory(folder.toFile())
                .redirectErrorStream(true)
                .redirectOutput(folder.resolve("log.txt").toFile())
                .start();
    }

    private void runToTheEnd(String into) throws Exception {
        assertThat(Packaged.run(folder, "run", "job.yaml", "--quiet", "--out", into)
                        .status())
                .isZero();
    }

    private void hasTheSameBytes(String one, String other) {
        for (String name : List.of("result.json", "sweep.csv")) {
            assertThat(folder.resolve(one).resolve(name))
                    .hasSameBinaryContentAs(folder.resolve(other).resolve(name));
        }
        assertThat(folder.resolve(one).resolve("study.unfinished")).doesNotExist();
    }

    /**
     * Killed (kill -9) at random moments of its whole run, start-up and writing included, each time in a folder of its own; each
     * is taken up again and ends with the bytes of a run that was left alone. {@code -Dstillpath.kills=20} does it twenty times.
     */
    @Test
    void everyKilledRunGoesOnToTheSameBytes() throws Exception {
        int kills = Integer.getInteger("stillpath.kills", 3);
        Files.writeString(folder.resolve("job.yaml"), SWEEP);
        runToTheEnd("first"); // warms the launcher's archive
        long start = System.nanoTime();
        runToTheEnd("whole");
        long whole = (System.nanoTime() - start) / 1_000_000;
        SplittableRandom random = new SplittableRandom(20_261_201);
        int unfinished = 0;
        for (int k = 0; k < kills; k++) {
            String into = "killed" + k;
            Process process = start(into);
            boolean ended = process.waitFor(random.nextLong(whole), TimeUnit.MILLISECONDS);
            process.destroyForcibly().waitFor(10, TimeUnit.SECONDS);
            unfinished += !ended && Files.exists(folder.resolve(into).resolve("study.unfinished")) ? 1 : 0;
            runToTheEnd(into);
            hasTheSameBytes(into, "whole");
        }
        // of three one at least was at work on its runs, of twenty most
        assertThat(unfinished).isGreaterThanOrEqualTo(Math.max(1, kills / 3));
    }

    private void killAfterSomeRuns() throws Exception {
        Path kept = folder.resolve("out/study.unfinished");
        Process process = start("out");
        long before = Files.exists(kept) ? Files.size(kept) : 0;
        while (process.isAlive() && (!Files.exists(kept) || Files.size(kept) < before + 20_000)) {
            Thread.sleep(20);
        }
        assertThat(process.isAlive()).as("still at work when killed").isTrue();
        process.destroyForcibly().waitFor(10, TimeUnit.SECONDS);
        assertThat(folder.resolve("out/result.json")).doesNotExist();
    }

    @Test
    void goesOnAfterBeingKilledTwiceAndRefusesAnotherJob() throws Exception {
        Files.writeString(folder.resolve("job.yaml"), SWEEP);
        runToTheEnd("whole");
        killAfterSomeRuns();
        killAfterSomeRuns();
        Files.writeString(folder.resolve("other.yaml"), SWEEP.replace("0.28", "0.29"));
        Packaged.Ended refused = Packaged.run(folder, "run", "other.yaml", "--quiet", "--out", "out");
        assertThat(refused.status()).isEqualTo(2);
        assertThat(refused.err()).contains("unfinished study of another job").contains("study.unfinished");
        runToTheEnd("out");
        hasTheSameBytes("out", "whole");
    }

    /** The studies that a starter shows as comments are sound once their # is gone. */
    @Test
    void startersShowSoundStudies() throws Exception {
        String starter = Packaged.run(folder, "new", "lens").out();
        int from = starter.indexOf("# study:");
        assertThat(from).isPositive();
        String shown = starter.substring(from).replaceAll("(?m)^# ", "");
        Files.writeString(folder.resolve("rods.csv"), "rod,media.rod.with.g [1/mm]\nA,0.3\nB,0.31\n");
        Files.writeString(folder.resolve("lens.yaml"), starter.substring(0, from) + shown);
        Packaged.Ended end = Packaged.run(folder, "check", "lens.yaml");
        assertThat(end.err()).isEmpty();
        assertThat(end.status()).isZero();
    }

    @Test
    void batchWritesItsTable() throws Exception {
        Files.writeString(folder.resolve("rods.csv"), "rod;media.rod.with.g [1/mm]\nA;0,3\nB;x\nC;0,31\n");
        Files.writeString(
                folder.resolve("job.yaml"),
                SWEEP.substring(0, SWEEP.indexOf("study:"))
                        + "study: {batch: {file: rods.csv}, watch: [quantities.back-focal-distance]}\n");
        Packaged.Ended end = Packaged.run(folder, "run", "job.yaml", "--out", "out");
        assertThat(end.status()).isZero();
        assertThat(end.out())
                .startsWith("2 of 3 rows of rods.csv were computed")
                .contains("rods.csv:3:3: media.rod.with.g: \"x\" is not a number in 1/mm");
        List<String> lines = Files.readAllLines(folder.resolve("out/batch.csv"));
        assertThat(lines).hasSize(4);
        assertThat(lines.get(0)).isEqualTo("rod,media.rod.with.g [1/mm],quantities.back-focal-distance [m],fault");
        assertThat(lines.get(2)).startsWith("B,x,,");
        assertThat(Files.readString(folder.resolve("out/report.html"))).contains("rods.csv:3:3");
    }
}
