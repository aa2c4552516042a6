package org.stillpath.report;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.Test;
import org.stillpath.geometry.Vector;
import org.stillpath.task.Quantity;
import org.stillpath.task.RayRow;
import org.stillpath.task.Result;

class TextReportTest {
    @Test
    void putsTheAnswerFirstAndAlignsNumbersOnTheirPoints() {
        Map<String, Quantity> quantities = new LinkedHashMap<>();
        quantities.put("effective-focal-length", new Quantity.Amount(0.002083333333, "m", 1e-9));
        quantities.put("back-focal-distance", new Quantity.Amount(-0.0121, "m", 1e-7));
        quantities.put("front-focal-distance", new Quantity.Amount(2e-20, "m", 1e-12));
        quantities.put("magnification", new Quantity.Amount(-2, "1", 0));
        quantities.put("image-kind", new Quantity.Word("at-infinity"));
        String text = TextReport.of(result(quantities, List.of(), List.of("mind the \u001b[31mstep"), List.of("hot")));

        assertThat(text).isEqualTo("""
                The answer.

                  effective focal length    2.083333  mm
                  back focal distance     -12.1000    mm
                  front focal distance      0         mm
                  magnification            -2
                  image kind              at infinity

                warning: mind the [31mstep
                caution: hot
                """);
    }

    @Test
    void rayTablesStayWithinEightyColumns() {
        List<RayRow> rays = new ArrayList<>();
        for (int i = 0; i < 30; i++) {
            rays.add(new RayRow(
                    i == 3 ? "totally-reflected" : "arrived",
                    new Vector(-0.1 * i, 1e-3 / (i + 1), 123.456789012345),
                    Vector.Z,
                    150 + i / 7.0,
                    100,
                    1e-9,
                    1.5,
                    new double[0][],
                    i == 3 ? "it met the face at z = 3 mm at 60 deg" : "",
                    Map.of("position", 1e-11, "optical-length", 1e-11)));
        }
        String text = TextReport.of(result(Map.of(), rays, List.of(), List.of()));

        assertThat(text.lines()).allMatch(line -> PlainText.columns(line) <= 80);
        assertThat(text)
                .contains("  and 10 more rays")
                .contains("ray 3: it met the face")
                .contains("x / m");
        List<String> table =
                text.lines().filter(line -> line.contains("arrived")).toList();
        assertThat(table).hasSize(19);
        assertThat(table.stream().map(line -> line.indexOf('.')).distinct()).hasSize(1);
    }

    @Test
    void longWarningsAreBrokenAtBlanks() {
        String text = TextReport.of(result(Map.of(), List.of(), List.of("word ".repeat(40)), List.of()));
        assertThat(text.lines()).allMatch(line -> line.length() <= 80);
        assertThat(text).contains("\n         word");
    }

    private static Result result(
            Map<String, Quantity> quantities, List<RayRow> rays, List<String> warnings, List<String> cautions) {
        return new Result(
                "lens", "title", "The answer.", quantities, rays, List.of(), List.of(), warnings, cautions, true);
    }
}
