package org.stillpath.cli;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.PrintStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

/** Whatever a job holds, its outputs stay text: no markup in pages and pictures, no control characters, no formulas. */
class HarmlessOutputsTest {
    /** Markup wherever a job may hold free text, control characters in the title, formulas in a batch's own column. */
    private static final String JOB = """
            title: "</title><script>alert('t')</script> \\e[31mred\\u202Eder & <img src=x onerror=a>"
            task: lens
            wavelength: 633 nm
            media:
              "<b>rod</b>":
                index: n0*sqrt(1 - (g*r)^2)
                with: {n0: 1.607, g: 0.304 1/mm}
            train:
              from: air
              surfaces:
                - {at: 0 mm, into: "<b>rod</b>", aperture: 0.9 mm}
                - {at: 2.5 mm, into: air, aperture: 0.9 mm}
            study:
              watch: [quantities.power]
              batch: {file: "rows <u>&.csv"}
            # a comment </pre><script>alert('c')</script>
            """;

    private static final String ROWS = """
            piece,train.surfaces.1.at [mm]
            =1+1,2.4
            +cmd|' /c calc'!A1,2.5
            -2+3,2.6
            @sum(1),2.7
            <script>alert('r')</script>,2.8
            """;

    @TempDir
    Path folder;

    private final ByteArrayOutputStream out = new ByteArrayOutputStream();

    private void run() throws IOException {
        Path job = folder.resolve("job <u>&.yaml");
        Files.writeString(job, JOB);
        Files.writeString(folder.resolve("rows <u>&.csv"), ROWS);
        ByteArrayOutputStream err = new ByteArrayOutputStream();
        Console console = new Console(
                new PrintStream(out, false, StandardCharsets.UTF_8),
                new PrintStream(err, false, StandardCharsets.UTF_8));
        String[] line = {"run", job.toString(), "--out", folder.resolve("out").toString()};
        int status = Program.run(line, console);
        console.out().flush();
        console.err().flush();
        assertThat(status).as(err.toString(StandardCharsets.UTF_8)).isZero();
    }

    @Test
    void pagesAndPicturesHoldNoMarkupOfAJob() throws Exception {
        run();
        String page = Files.readString(folder.resolve("out/report.html"));
        assertThat(page)
                .doesNotContainIgnoringCase("<script")
                .doesNotContain("<img", "<u>", "<b>")
                .contains("&lt;script&gt;", "&lt;b&gt;rod", "job &lt;u&gt;&amp;.yaml")
                .doesNotContain("\u001b", "\u202e");
        // the pictures in the page have titles of their own
        assertThat(page.split("</title>", -1)).hasSameSizeAs(page.split("<title", -1));
        assertThat(page.split("</pre>", -1)).hasSameSizeAs(page.split("<pre", -1));
        try (Stream<Path> files = Files.list(folder.resolve("out"))) {
            for (Path svg : files.filter(f -> f.toString().endsWith(".svg")).toList()) {
                assertThat(Files.readString(svg)).doesNotContain("<script", "<img", "<b>", "\u001b");
            }
        }
    }

    @Test
    void theTerminalGetsNoControlCharacters() throws Exception {
        run();
        String text = out.toString(StandardCharsets.UTF_8);
        assertThat(text.codePoints().filter(c -> c != '\n' && Character.isISOControl(c)))
                .isEmpty();
        assertThat(text).doesNotContain("\u202e");
    }

    @Test
    void noSpreadsheetTakesACellForAFormula() throws Exception {
        run();
        List<String> lines = Files.readAllLines(folder.resolve("out/batch.csv"));
        assertThat(lines.stream().skip(1).map(l -> l.split(",", 2)[0]))
                .containsExactly(
                        "\"'=1+1\"",
                        "\"'+cmd|' /c calc'!A1\"",
                        "\"'-2+3\"",
                        "\"'@sum(1)\"",
                        "<script>alert('r')</script>");
    }
}
