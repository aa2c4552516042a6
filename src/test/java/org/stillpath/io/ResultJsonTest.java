package org.stillpath.io;

import static org.assertj.core.api.Assertions.assertThat;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.ObjectMapper;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.SplittableRandom;
import org.junit.jupiter.api.Test;
import org.stillpath.geometry.Vector;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.task.Quantity;
import org.stillpath.task.RayRow;
import org.stillpath.task.Result;

class ResultJsonTest {
    @Test
    void writesTheDocumentInTheAgreedLayout() throws IOException {
        Map<String, Quantity> quantities = new LinkedHashMap<>();
        quantities.put("power", new Quantity.Amount(60.342820440202374, "1/m", 3e-13));
        quantities.put("image-kind", new Quantity.Word("virtual"));
        quantities.put("zernike", new Quantity.Amounts(new double[] {0, 1e-9}, "m", 1e-12));
        RayRow arrived = new RayRow(
                "arrived",
                new Vector(1e-3, -2e-3, 0.02),
                new Vector(0, 0, 1),
                0.04,
                0.03,
                1.3e-10,
                1.5,
                new double[][] {{1, 0.5}, {0, 1}},
                "",
                Map.of("position", 1e-15, "index", Double.POSITIVE_INFINITY));
        RayRow lost = new RayRow(
                "lost",
                new Vector(5, 0, 0),
                new Vector(0, 0, 1),
                Double.NaN,
                Double.POSITIVE_INFINITY,
                0,
                1,
                new double[0][],
                "gone",
                Map.of());
        Result result = new Result(
                "lens",
                "a \"quoted\" title µ",
                "headline",
                quantities,
                List.of(arrived, lost),
                List.of(),
                List.of(),
                List.of("careful"),
                List.of(),
                true);

        String text = line(result);

        assertThat(text).endsWith("}\n").doesNotContain("NaN", "Infinity", "null");
        assertThat(text.indexOf('\n')).isEqualTo(text.length() - 1);
        assertThat(text).contains("60.342820440202374");
        JsonNode json = new ObjectMapper().readTree(text);
        assertThat(json.fieldNames())
                .toIterable()
                .containsExactly(
                        "stillpath",
                        "task",
                        "title",
                        "quantities",
                        "rays",
                        "paths",
                        "images",
                        "stars",
                        "study",
                        "tables",
                        "figures",
                        "warnings",
                        "cautions");
        assertThat(json.at("/title").asText()).isEqualTo("a \"quoted\" title µ");
        assertThat(json.at("/quantities/power/unit").asText()).isEqualTo("1/m");
        assertThat(json.at("/quantities/image-kind").toString()).isEqualTo("{\"word\":\"virtual\"}");
        assertThat(json.at("/quantities/zernike/value/1").asDouble()).isEqualTo(1e-9);
        assertThat(json.at("/rays/0/position/1").asDouble()).isEqualTo(-2e-3);
        assertThat(json.at("/rays/0/transfer/0/1").asDouble()).isEqualTo(0.5);
        assertThat(json.at("/rays/0/errors").toString()).isEqualTo("{\"position\":1.0E-15}");
        assertThat(json.at("/rays/1").has("optical-length")).isFalse();
        assertThat(json.at("/rays/1").has("length")).isFalse();
        assertThat(json.at("/rays/1/note").asText()).isEqualTo("gone");
        assertThat(json.at("/study").toString()).isEqualTo("{}");
        assertThat(json.at("/paths").toString()).isEqualTo("[]");
        assertThat(json.at("/tables/0").asText()).isEqualTo("rays.csv");
        assertThat(json.at("/warnings/0").asText()).isEqualTo("careful");
    }

    /** Every double must read back as itself, and 2e-3 as few digits as it was written with. */
    @Test
    void numbersReadBackAndAreShort() throws IOException {
        assertThat(line(with(2e-3))).contains("\"value\":0.002,");
        // JDK-4511638: Double.toString of JDK 17 gives 2.0E-3 as it should, but one digit too many here
        assertThat(Double.toString(2e23)).isNotEqualTo("2.0E23");
        assertThat(line(with(2e23))).contains("\"value\":2.0E23,");
        SplittableRandom random = new SplittableRandom(7);
        for (int i = 0; i < 1000; i++) {
            double value = Double.longBitsToDouble(random.nextLong());
            if (Double.isFinite(value)) {
                JsonNode json = new ObjectMapper().readTree(line(with(value)));
                assertThat(json.at("/quantities/q/value").doubleValue()).isEqualTo(value);
            }
        }
    }

    @Test
    void tellsFaultsOfAJobOnOneLine() throws IOException {
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        ResultJson.writeFaults(
                "a.yaml",
                List.of(
                        Problem.input(new Place("a.yaml", 3, 7), "media.rod", "wrong"),
                        Problem.file(Place.of("a.yaml"), "gone")),
                out);
        assertThat(out.toString(StandardCharsets.UTF_8))
                .isEqualTo("{\"job\":\"a.yaml\",\"faults\":[{\"kind\":\"input\",\"file\":\"a.yaml\",\"line\":3,"
                        + "\"column\":7,\"path\":\"media.rod\",\"message\":\"wrong\"},{\"kind\":\"file\","
                        + "\"file\":\"a.yaml\",\"path\":\"\",\"message\":\"gone\"}]}\n");
    }

    private static Result with(double value) {
        return new Result(
                "lens",
                "",
                "",
                Map.of("q", new Quantity.Amount(value, "m", 0)),
                List.of(),
                List.of(),
                List.of(),
                List.of(),
                List.of(),
                true);
    }

    private static String line(Result result) throws IOException {
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        ResultJson.writeLine(result, "0.1.0", List.of("rays.csv"), List.of(), out);
        return out.toString(StandardCharsets.UTF_8);
    }
}
