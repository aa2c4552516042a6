package org.stillpath.cli;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

/** Wrong input: one clear message with line and column, exit status 2, no stack trace, nothing written. */
class WrongFilesIT {
    private static final String ROD = """
            task: lens
            wavelength: 633 nm
            media:
              rod:
                index: n0*sqrt(1 - (g*r)^2)
                with: {n0: 1.607, g: 0.304 1/mm}
            train:
              from: air
              surfaces:
                - {at: 0 mm, into: rod, aperture: 0.9 mm}
                - {at: 2.5 mm, into: air, aperture: 0.9 mm}
            """;

    @TempDir
    Path folder;

    private void refused(String text, String place, String... words) throws IOException, InterruptedException {
        refused(text.getBytes(StandardCharsets.UTF_8), place, words);
    }

    private void refused(byte[] bytes, String place, String... words) throws IOException, InterruptedException {
        Files.write(folder.resolve("job.yaml"), bytes);
        Packaged.Ended end = Packaged.run(folder, "run", "job.yaml", "--out", "out");
        assertThat(end.status()).isEqualTo(2);
        assertThat(end.messages()).as(end.err()).hasSize(1);
        assertThat(end.err()).startsWith(place + ":").contains(words).doesNotContain("Exception", "\tat ");
        assertThat(end.out()).isEmpty();
        assertThat(folder.resolve("out")).doesNotExist();
    }

    @Test
    void aBadUnit() throws Exception {
        refused(ROD.replace("633 nm", "633 nmm"), "job.yaml:2:17", "wavelength", "nmm");
    }

    @Test
    void aWrongDimension() throws Exception {
        refused(
                ROD.replace("0.304 1/mm", "0.304 mm"),
                "job.yaml:5:24",
                "media.rod.index: `(g*r)^2`",
                "cannot be subtracted from `1`, a pure number");
    }

    @Test
    void aWrongDimensionOfAPlainValue() throws Exception {
        refused(
                ROD.replace("at: 2.5 mm", "at: 2.5 1/mm"),
                "job.yaml:11:12",
                "\"2.5 1/mm\" is an inverse length; a length is needed, such as 2.5 mm");
    }

    @Test
    void anUnknownKey() throws Exception {
        refused(ROD.replace("into: air, aperture", "into: air, apperture"), "job.yaml:11:31", "apperture", "aperture");
    }

    @Test
    void aDuplicateKey() throws Exception {
        refused(ROD + "wavelength: 500 nm\n", "job.yaml:12:1", "wavelength", "twice");
    }

    @Test
    void aMissingMedium() throws Exception {
        refused(ROD.replace("into: rod", "into: rods"), "job.yaml:10:24", "no medium \"rods\"", "did you mean \"rod\"");
    }

    @Test
    void aCircle() throws Exception {
        Files.writeString(folder.resolve("a.yaml"), "from: ./b.yaml\n");
        Files.writeString(folder.resolve("b.yaml"), "from: ./a.yaml\n");
        Files.writeString(
                folder.resolve("job.yaml"),
                "task: lens\nmedia: {m: {from: ./a.yaml}}\ntrain: {from: air, surfaces: [{at: 0 mm, into: m}]}\n");
        Packaged.Ended end = Packaged.run(folder, "run", "job.yaml");
        assertThat(end.status()).isEqualTo(2);
        assertThat(end.messages()).hasSize(1);
        assertThat(end.err())
                .startsWith("b.yaml:1:7: ")
                .contains("circle", "a.yaml takes from b.yaml takes from a.yaml");
    }

    @Test
    void crossingSurfaces() throws Exception {
        refused(
                ROD.replace("at: 2.5 mm, into: air", "at: 0.01 mm, radius: -2 mm, into: air"),
                "job.yaml:11:7",
                "crosses train.surfaces[0]");
    }

    @Test
    void aNegativeAperture() throws Exception {
        refused(
                ROD.replace("into: rod, aperture: 0.9 mm", "into: rod, aperture: -0.9 mm"),
                "job.yaml:10:39",
                "greater than 0");
    }

    @Test
    void unsoundYaml() throws Exception {
        refused(
                ROD.replace("into: air, aperture: 0.9 mm}", "into: air, aperture: 0.9 mm"),
                "job.yaml:12:1",
                "not sound YAML",
                "line 11, column 7 is not closed");
    }

    @Test
    void aBinaryFile() throws Exception {
        refused(new byte[] {(byte) 0x89, 'P', 'N', 'G', 0, 1, 2, 3, (byte) 0xff}, "job.yaml:1:1", "text");
    }

    @Test
    void anEmptyFile() throws Exception {
        refused("", "job.yaml:1:1", "empty");
    }

    @Test
    void anUnknownNameInAFormula() throws Exception {
        refused(ROD.replace("(g*r)", "(gg*r)"), "job.yaml:5:25", "unknown name `gg`", "did you mean `g`");
    }

    @Test
    void aFileThatIsNotThere() throws Exception {
        Packaged.Ended end = Packaged.run(folder, "run", "nowhere.yaml");
        assertThat(end.status()).isEqualTo(4);
        assertThat(end.messages()).hasSize(1);
        assertThat(end.err()).startsWith("nowhere.yaml");
    }
}
