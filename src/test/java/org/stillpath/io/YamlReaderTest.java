package org.stillpath.io;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.stillpath.job.Node;
import org.stillpath.job.Paths;
import org.stillpath.job.Section;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.unit.Kind;

class YamlReaderTest {
    private static Node.Mapping parse(String text, Problems problems) {
        return YamlReader.parse(text.getBytes(StandardCharsets.UTF_8), "job.yaml", problems);
    }

    /** All messages, those collected and those that ended the reading. */
    private static List<String> faults(byte[] bytes) {
        Problems problems = new Problems();
        List<Problem> all = new ArrayList<>();
        try {
            YamlReader.parse(bytes, "job.yaml", problems);
        } catch (ProblemException e) {
            all.addAll(e.problems());
        }
        all.addAll(0, problems.list());
        return all.stream().map(Problem::toString).toList();
    }

    private static List<String> faults(String text) {
        return faults(text.getBytes(StandardCharsets.UTF_8));
    }

    @Test
    void keepsTextAndPlaces() {
        Problems problems = new Problems();
        Node.Mapping root = parse("""
                # a comment
                title: "µ: a quoted one"
                transfer: yes
                angle: 12°30'15.5"
                time: 12:30
                train:
                  surfaces:
                    - {at: 0 mm, into: rod}
                    - at: 1e-3 m
                empty:
                """, problems);
        assertThat(problems.isEmpty()).isTrue();
        assertThat(scalar(root, "title"))
                .isEqualTo(new Node.Scalar(new Place("job.yaml", 2, 8), "µ: a quoted one", true));
        assertThat(scalar(root, "transfer").text()).isEqualTo("yes");
        assertThat(scalar(root, "angle").text()).isEqualTo("12°30'15.5\"");
        assertThat(scalar(root, "time").text()).isEqualTo("12:30");
        assertThat(scalar(root, "train.surfaces[0].into").place()).isEqualTo(new Place("job.yaml", 8, 24));
        assertThat(scalar(root, "train.surfaces.1.at"))
                .isEqualTo(new Node.Scalar(new Place("job.yaml", 9, 11), "1e-3 m", false));
        assertThat(scalar(root, "empty").text()).isEmpty();
    }

    private static Node.Scalar scalar(Node.Mapping root, String path) {
        return (Node.Scalar) Paths.find(root, path).orElseThrow();
    }

    @Test
    void skipsTheByteOrderMark() {
        Node.Mapping root = parse("\ufefftask: lens\n", new Problems());
        assertThat(scalar(root, "task").place()).isEqualTo(new Place("job.yaml", 1, 7));
    }

    @Test
    void tellsEveryDuplicateKey() {
        assertThat(faults("task: lens\nmedia:\n  rod: {g: 1, g: 2}\ntask: trace\n"))
                .containsExactly(
                        "job.yaml:3:15: media.rod: key \"g\" stands here twice; the first is at line 3, column 9",
                        "job.yaml:4:1: key \"task\" stands here twice; the first is at line 1, column 1");
    }

    @Test
    void tellsSyntaxOnceWithPlaceAndRemedy() {
        assertThat(faults("task: lens\nmedia: {rod: {index: 1.5}\ntrain: {}\n"))
                .singleElement()
                .asString()
                .startsWith("job.yaml:3:1: this is not sound YAML: ")
                .endsWith("; look for a missing comma, or close what is opened at line 2, column 8")
                .doesNotContain("\n");
        assertThat(faults("title: a: b\n"))
                .singleElement()
                .asString()
                .isEqualTo("job.yaml:1:9: this is not sound YAML: mapping values are not allowed here;"
                        + " a text with a colon and a blank in it needs quotes, and keys of one section stand in one"
                        + " column");
        assertThat(faults("a:\n\tb: 1\n"))
                .singleElement()
                .asString()
                .startsWith("job.yaml:2:1: this is not sound YAML: ")
                .endsWith("; indent with blanks, not with tabs");
        assertThat(faults("title: \"open\ntask: lens\n"))
                .singleElement()
                .asString()
                .contains("; what is opened at line 1, column 8 is not closed");
        assertThat(faults("a: 1\n b: 2\n")).singleElement().asString().startsWith("job.yaml:2:3: ");
    }

    @Test
    void refusesWhatIsNotText() {
        assertThat(faults(new byte[] {'a', ':', ' ', 0, 1, 2}))
                .containsExactly("job.yaml:1:4: this is a binary file, not text");
        assertThat(faults(new byte[] {(byte) 0x89, 'P', 'N', 'G', '\r', '\n', 0x1a, '\n', 0, 0}))
                .containsExactly("job.yaml:1:1: this is a binary file, not text");
        assertThat(faults("task: lens\ntitle: Größe\n".getBytes(StandardCharsets.ISO_8859_1)))
                .containsExactly("job.yaml:2:10: byte 0xF6 is not UTF-8; save the file as UTF-8");
        assertThat(faults("task: lens\n".getBytes(StandardCharsets.UTF_16)))
                .containsExactly("job.yaml:1:1: the file is UTF-16 text; save it as UTF-8");
        assertThat(faults("a: \u0007\n"))
                .containsExactly("job.yaml:1:4: control character U+0007; this does not look like a text file");
        assertThat(faults("a: \ufffe\n")).singleElement().asString().contains("U+FFFE may not stand in YAML");
    }

    @Test
    void refusesTheEmptyFile() {
        for (String text : List.of("", "\n\n", "# only a comment\n", "---\n", "\ufeff")) {
            assertThat(faults(text))
                    .singleElement()
                    .asString()
                    .endsWith(": the file is empty; keys with values are needed, such as \"task: lens\"");
        }
    }

    @Test
    void wantsOneMapping() {
        assertThat(faults("lens\n"))
                .containsExactly("job.yaml:1:1: \"lens\" stands at the top of the file;"
                        + " keys with values are needed, such as \"task: lens\"");
        assertThat(faults("- a\n")).singleElement().asString().startsWith("job.yaml:1:1: a list stands");
        assertThat(faults("a: 1\n---\nb: 2\n"))
                .containsExactly("job.yaml:2:1: a second document starts here; a file holds one");
        assertThat(faults("[a, b]: 1\nc: 2\n"))
                .containsExactly("job.yaml:1:1: a key must be a single word, not a list or a section");
    }

    @Test
    void refusesAnchorsAliasesAndTags() {
        assertThat(faults("a: &x 1\nb: *x\nc: !!str 3\n"))
                .hasSize(3)
                .satisfiesExactly(
                        m -> assertThat(m).startsWith("job.yaml:1:4: a: an anchor"),
                        m -> assertThat(m).startsWith("job.yaml:2:4: b: an alias"),
                        m -> assertThat(m).startsWith("job.yaml:3:4: c: a tag"));
    }

    @Test
    void putsTogetherWhatACommaToreApart() {
        Problems problems = new Problems();
        Node.Mapping root = parse(
                "media:\n  a: {index: 1.5 + atan2(y, x)*max(z, 1 mm), with: {g: 1}}\n  b: [max(a, b), 2]\n", problems);
        assertThat(problems.list().stream().map(Problem::toString))
                .containsExactly(
                        "job.yaml:2:14: media.a.index: \"1.5 + atan2(y\" has an unbalanced parenthesis;"
                                + " within braces and brackets a formula with a comma is quoted:"
                                + " '1.5 + atan2(y, x)*max(z, 1 mm)'",
                        "job.yaml:3:7: media.b[0]: \"max(a\" has an unbalanced parenthesis;"
                                + " within braces and brackets a formula with a comma is quoted: 'max(a, b)'");
        assertThat(scalar(root, "media.a.index").text()).isEqualTo("1.5 + atan2(y, x)*max(z, 1 mm)");
        assertThat(Paths.find(root, "media.a.with.g")).isPresent();
        assertThat(scalar(root, "media.b[1]").text()).isEqualTo("2");
        assertThat(faults("a: {b: 'atan2(y, x)'}\nc: atan2(y, x)\n")).isEmpty();
        assertThat(faults("a: {b: x), c: (x}\n"))
                .containsExactly(
                        "job.yaml:1:8: a.b: \"x)\" has an unbalanced parenthesis; an opening one is missing",
                        "job.yaml:1:15: a.c: \"(x\" has an unbalanced parenthesis; a closing one is missing");
    }

    @Test
    void limitsAreTold() {
        assertThat(faults("a: " + "[".repeat(5000) + "]".repeat(5000) + "\n"))
                .singleElement()
                .asString()
                .contains("the limit of nesting, 60 levels, is exceeded");
        assertThat(faults("a: [" + "1,".repeat(YamlReader.MOST_NODES) + "]\n"))
                .singleElement()
                .asString()
                .contains("the limit of values in one file, 200000, is exceeded");
        assertThat(faults("a: " + "x".repeat(YamlReader.MOST_BYTES)))
                .singleElement()
                .asString()
                .contains("larger than the limit of file size, 4194304 bytes");
    }

    @Test
    void settingsReplaceValues(@TempDir Path folder) throws Exception {
        Path file = folder.resolve("rod.yaml");
        Files.writeString(file, "media: {rod: {with: {g: 0.3 1/mm}}}\ntrain: {surfaces: [{at: 0 mm}, {at: 4 mm}]}\n");
        Problems problems = new Problems();
        JobFile job = JobFile.read(file, problems)
                .with(
                        List.of(
                                "media.rod.with.g=0.31 mm",
                                "train.surfaces[1].at=5 mm",
                                "train.surfaces.0.powers.4=1",
                                "x=[1,2]",
                                "sensor.at = 12 mm"),
                        problems);
        assertThat(problems.isEmpty()).isTrue();
        assertThat(job.name()).isEqualTo("rod");
        Section top = Section.of(job.root(), "", problems);
        top.need("media")
                .section()
                .need("rod")
                .section()
                .need("with")
                .section()
                .need("g")
                .quantity(Kind.INVERSE_LENGTH);
        assertThat(problems.list().get(0))
                .hasToString("--set media.rod.with.g: media.rod.with.g: \"0.31 mm\" is a length;"
                        + " an inverse length is needed, such as 0.31 1/mm");
        assertThat(scalar(job.root(), "train.surfaces[1].at").text()).isEqualTo("5 mm");
        assertThat(scalar(job.root(), "train.surfaces[0].powers.4").text()).isEqualTo("1");
        assertThat(scalar(job.root(), "x[1]").text()).isEqualTo("2");
        assertThat(scalar(job.root(), "sensor.at").text()).isEqualTo("12 mm");
    }

    @Test
    void settingsAtFault() {
        Problems problems = new Problems();
        JobFile job = new JobFile(Path.of("job.yaml"), parse("a: {b: [1, 2], c: 3}\n", problems));
        JobFile after = job.with(
                List.of("novalue", "=3", "a.b[2]=1", "a.c.d=1", "a.b.x=1", "a..b=1", "a={b: [1", "a.b[x]=1"), problems);
        assertThat(after).isEqualTo(job);
        assertThat(problems.list().stream().map(Problem::toString))
                .contains(
                        "--set: \"novalue\" does not read as PATH=VALUE, such as media.rod.with.g=\"0.31 1/mm\"",
                        "--set a.b[2]: a.b is a list of 2 elements, counted from 0 to 1; there is no \"[2]\" in it",
                        "--set a.c.d: the path leads through a.c, which is the single value \"3\" and has no \"d\"",
                        "--set a.b.x: a.b is a list of 2 elements, counted from 0 to 1; there is no \"x\" in it",
                        "--set a..b: \"a..b\" is not a path; one is written like media.rod.with.g or"
                                + " train.surfaces[1].at")
                .hasSize(8);
    }

    @Test
    void filesThatCannotBeRead(@TempDir Path folder) {
        Path missing = folder.resolve("none.yaml");
        assertThatThrownBy(() -> JobFile.read(missing, new Problems()))
                .isInstanceOfSatisfying(ProblemException.class, e -> {
                    assertThat(e.problems().get(0).kind()).isEqualTo(Problem.Kind.FILE);
                    assertThat(e.problems().get(0).message()).isEqualTo("there is no file \"" + missing + "\"");
                });
        assertThatThrownBy(() -> JobFile.read(folder, new Problems())).hasMessageContaining("is a folder, not a file");
    }
}
