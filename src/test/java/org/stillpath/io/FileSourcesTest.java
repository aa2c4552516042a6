package org.stillpath.io;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assumptions.assumeThat;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.stillpath.job.Table;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;

class FileSourcesTest {
    @TempDir
    Path top;

    private Path folder = Path.of("");
    private FileSources sources = FileSources.of(Path.of("job.yaml"), false);
    private Place asked = Place.of("job.yaml");

    @BeforeEach
    void lay() throws IOException {
        folder = Files.createDirectories(top.resolve("jobs"));
        Path job = folder.resolve("job.yaml");
        Files.writeString(job, "task: lens\n");
        sources = FileSources.of(job, false);
        asked = new Place(job.toString(), 3, 9);
    }

    @Test
    void readsShippedDocuments() {
        var root = sources.document("test/linear", asked);
        assertThat(root.find("index").orElseThrow().place())
                .isEqualTo(new Place("media-models/test/linear.yaml", 2, 8));
        assertThatThrownBy(() -> sources.document("test/nothing-here", asked))
                .hasMessageContaining("job.yaml:3:9: \"test/nothing-here\" is not a shipped document");
        assertThatThrownBy(() -> sources.document("a/../../x", asked))
                .hasMessageContaining("is not a shipped document");
    }

    @Test
    void readsOwnDocumentsAndWhatLiesBesideThem() throws IOException {
        Path sub = Files.createDirectories(folder.resolve("air"));
        Files.writeString(sub.resolve("mine.yaml"), "index: {profile: {file: mast.csv}}\n");
        Files.writeString(sub.resolve("mast.csv"), "height [m],n\n0,1.0003\n2,1.0002\n");
        var root = sources.document("./air/mine.yaml", asked);
        Place within = root.place();
        assertThat(within.source()).isEqualTo(sub.resolve("mine.yaml").toString());
        Table table = sources.table("mast.csv", within);
        assertThat(table.headers()).containsExactly("height", "n");
        assertThat(table.units()).containsExactly("m", "");
        assertThat(table.columns().get(1)).containsExactly(1.0003, 1.0002);
        assertThat(table.notes()).isEmpty();
        assertThat(sources.table("air/mast.csv", asked).rows()).isEqualTo(2);
    }

    @Test
    void staysInsideTheFolder() throws IOException {
        Path outside = top.resolve("outside.csv");
        Files.writeString(outside, "a,b\n1,2\n");
        assertThatThrownBy(() -> sources.table("../outside.csv", asked))
                .hasMessageContaining("\"../outside.csv\" lies outside the job's folder;"
                        + " move it there, or give --allow-outside");
        assertThatThrownBy(() -> sources.table(outside.toString(), asked)).hasMessageContaining("lies outside");
        assertThat(FileSources.of(folder.resolve("job.yaml"), true)
                        .table("../outside.csv", asked)
                        .rows())
                .isEqualTo(1);
        Path link = folder.resolve("link.csv");
        try {
            Files.createSymbolicLink(link, outside);
        } catch (UnsupportedOperationException | IOException e) {
            assumeThat(false).as("links can be made here").isTrue();
        }
        assertThatThrownBy(() -> sources.table("link.csv", asked)).hasMessageContaining("lies outside");
    }

    @Test
    void namesWhatIsMissing() throws IOException {
        Files.writeString(folder.resolve("mast.csv"), "a\n1\n");
        assertThatThrownBy(() -> sources.table("mats.csv", asked))
                .isInstanceOfSatisfying(
                        ProblemException.class,
                        e -> assertThat(e.problems().get(0).kind()).isEqualTo(Problem.Kind.FILE))
                .hasMessageContaining("there is no file \"mats.csv\" (there is \"mast.csv\"); it is looked for in");
        assertThatThrownBy(() -> sources.table(".", asked)).hasMessageContaining("is not a plain file");
        assertThatThrownBy(() -> sources.table("a\0b", asked)).hasMessageContaining("is not the name of a file");
    }

    private static Table csv(String text) {
        return CsvReader.read(text.getBytes(StandardCharsets.UTF_8), "t.csv");
    }

    @Test
    void readsRfc4180() {
        Table t = csv(
                "\"x [mm]\",\"a \"\"quoted\"\" one\",\"note,s\"\r\n1,\"2\",\"Cairn, north\"\r\n\r\n-3e-1 , 4 ,B\r\n");
        assertThat(t.headers()).containsExactly("x", "a \"quoted\" one");
        assertThat(t.units()).containsExactly("mm", "");
        assertThat(t.columns().get(0)).containsExactly(1, -0.3);
        assertThat(t.columns().get(1)).containsExactly(2, 4);
        assertThat(t.words()).containsOnlyKeys("note,s");
        assertThat(t.words().get("note,s")).containsExactly("Cairn, north", "B");
        assertThat(t.rows()).isEqualTo(2);
    }

    @Test
    void readsEuropeanSpreadsheetsAndTells() {
        Table t = csv("\ufeff# exported\nheight [m];T [degC]\n0,5;20\n2;-1,25\n");
        assertThat(t.columns().get(0)).containsExactly(0.5, 2);
        assertThat(t.columns().get(1)).containsExactly(20, -1.25);
        assertThat(t.notes())
                .containsExactly(
                        "a byte-order mark was skipped",
                        "1 line of comment before the header left out",
                        "semicolons separate the columns",
                        "decimal commas were read as decimal points, first \"0,5\" in line 3");
        assertThat(csv("a\tb\n1\t2\n").columns().get(1)).containsExactly(2);
        assertThat(csv("a,b\n\"1,5\",2\n").columns().get(0)).containsExactly(1.5);
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            value = {
                "a,b\\n1,2\\n3,\\n5,6\\n | t.csv:3:3: column \"b\", row 2: the cell is empty; a number is needed",
                "a,b\\n1,2\\n3,4\\n5,NaN\\n"
                        + "| t.csv:4:3: column \"b\", row 3: \"NaN\" is not a number that can be computed with",
                "a,b\\n1,2\\n3,4\\n5,inf\\n"
                        + "| t.csv:4:3: column \"b\", row 3: \"inf\" is not a number that can be computed with",
                "a,b\\n1,2\\n3\\n | t.csv:3:1: row 2 has 1 cell, the header 2",
                "a,b\\n1,5,2,5\\n"
                        + "| t.csv:2:1: row 1 has 4 cells, the header 2;"
                        + " decimal commas need semicolons or tabs between the columns",
                "a;b\\n1,5;2\\n2;3.5\\n"
                        + "| t.csv:2:1: decimal commas and decimal points are mixed:"
                        + " \"1,5\" here, \"3.5\" at line 3, column 3",
                "a;b\\n1.234,5;2\\n1;2\\n2;3\\n"
                        + "| t.csv:2:1: column \"a\", row 1: \"1.234,5\" is not a number;"
                        + " groups of thousands are not understood",
                "a,b\\n\"1,234\",2\\n"
                        + "| t.csv:2:1: \"1,234\" may be a decimal comma or a group of thousands;"
                        + " write decimal points, or semicolons between the columns",
                "1,2\\n3,4\\n" + "| t.csv:1:1: a header line must stand before the numbers, such as \"height [m],n\"",
                "a,a\\n1,2\\n | t.csv:1:3: header \"a\" stands here twice",
                "a,,b\\n1,2,3\\n | t.csv:1:3: column 2 has no header",
                "a,b\\n | t.csv:2:1: the table has no rows below its header",
                "\\n | t.csv:1:1: the table is empty; a header line and rows of numbers are needed",
                "a\\n\"1 | t.csv:2:1: a quote is opened here and not closed",
                "a\\n\"1\"2\\n | t.csv:2:1: after a quoted cell only a separator or the line's end may stand",
            })
    void tablesAtFault(String text, String message) {
        assertThatThrownBy(() -> csv(text.replace("\\n", "\n")))
                .isInstanceOf(ProblemException.class)
                .hasMessage(message);
    }
}
