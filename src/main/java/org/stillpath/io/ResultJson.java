package org.stillpath.io;

import com.fasterxml.jackson.core.JsonFactory;
import com.fasterxml.jackson.core.JsonGenerator;
import com.fasterxml.jackson.core.StreamWriteFeature;
import com.fasterxml.jackson.core.util.DefaultIndenter;
import com.fasterxml.jackson.core.util.DefaultPrettyPrinter;
import java.io.IOException;
import java.io.OutputStream;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.TreeMap;
import org.stillpath.geometry.Vector;
import org.stillpath.problem.Problem;
import org.stillpath.study.Doc;
import org.stillpath.study.Outcome;
import org.stillpath.task.ImageRow;
import org.stillpath.task.PathRow;
import org.stillpath.task.Quantity;
import org.stillpath.task.RayRow;
import org.stillpath.task.Result;
import org.stillpath.task.StarRow;

/**
 * Writes a result document as JSON (RFC 8259), in UTF-8.
 *
 * <p>Values are in SI, keys in kebab-case. Numbers are written with the fewest digits that read back as the same double;
 * a number that is not finite is never written, its key is left out. Arrays are always there, empty if nothing was
 * found.
 *
 * <p>Written token by token rather than bound from objects: a binding library costs a quarter of a second of start-up,
 * which a short job would feel; the price is that the layout stands here by hand.
 */
public final class ResultJson {
    // Shortest round-trip digits; the JDK 17's own Double.toString sometimes gives one too many.
    private static final JsonFactory JSON = JsonFactory.builder()
            .enable(StreamWriteFeature.USE_FAST_DOUBLE_WRITER)
            .build();

    private final JsonGenerator json;

    private ResultJson(JsonGenerator json) {
        this.json = json;
    }

    /**
     * Writes a result document on one line, a line feed at its end.
     *
     * @param version the program's version
     * @param tables names of the CSV files written beside the document
     * @param figures names of the figure files written beside the document
     * @param out receives the text; not closed
     * @throws IOException if {@code out} fails
     */
    public static void writeLine(
            Outcome outcome, String version, List<String> tables, List<String> figures, OutputStream out)
            throws IOException {
        try (JsonGenerator json = generator(out)) {
            new ResultJson(json).document(outcome, version, tables, figures);
            json.writeRaw('\n');
        }
    }

    /**
     * The same for a result without a study.
     *
     * @throws IOException if {@code out} fails
     */
    public static void writeLine(
            Result result, String version, List<String> tables, List<String> figures, OutputStream out)
            throws IOException {
        writeLine(Outcome.of(result), version, tables, figures, out);
    }

    /**
     * Writes a result document indented for people, otherwise as {@link #writeLine}.
     *
     * @throws IOException if {@code out} fails
     */
    public static void writeIndented(
            Outcome outcome, String version, List<String> tables, List<String> figures, OutputStream out)
            throws IOException {
        try (JsonGenerator json = generator(out)) {
            json.setPrettyPrinter(new DefaultPrettyPrinter().withObjectIndenter(new DefaultIndenter("  ", "\n")));
            new ResultJson(json).document(outcome, version, tables, figures);
            json.writeRaw('\n');
        }
    }

    /**
     * Writes what is told of a job at fault, on one line: {@code {"job": .., "faults": [{kind, file, line, column, path,
     * message}]}}; {@code line} and {@code column} are absent where the fault has no place within a file.
     *
     * @param job the job file as it was named
     * @param out receives the text; not closed
     * @throws IOException if {@code out} fails
     */
    public static void writeFaults(String job, List<Problem> faults, OutputStream out) throws IOException {
        try (JsonGenerator json = generator(out)) {
            json.writeStartObject();
            json.writeStringField("job", job);
            json.writeArrayFieldStart("faults");
            for (Problem fault : faults) {
                json.writeStartObject();
                json.writeStringField("kind", fault.kind().name().toLowerCase(Locale.ROOT));
                json.writeStringField("file", fault.place().source());
                if (fault.place().line() > 0) {
                    json.writeNumberField("line", fault.place().line());
                    json.writeNumberField("column", fault.place().column());
                }
                json.writeStringField("path", fault.path());
                json.writeStringField("message", fault.message());
                json.writeEndObject();
            }
            json.writeEndArray();
            json.writeEndObject();
            json.writeRaw('\n');
        }
    }

    private static JsonGenerator generator(OutputStream out) throws IOException {
        return JSON.createGenerator(out).disable(JsonGenerator.Feature.AUTO_CLOSE_TARGET);
    }

    private void document(Outcome outcome, String version, List<String> tables, List<String> figures)
            throws IOException {
        Result result = outcome.result();
        json.writeStartObject();
        json.writeStringField("stillpath", version);
        json.writeStringField("task", result.task());
        json.writeStringField("title", result.title());
        json.writeObjectFieldStart("quantities");
        for (Map.Entry<String, Quantity> entry : result.quantities().entrySet()) {
            json.writeFieldName(entry.getKey());
            quantity(entry.getValue());
        }
        json.writeEndObject();
        json.writeArrayFieldStart("rays");
        for (RayRow ray : result.rays()) {
            ray(ray);
        }
        json.writeEndArray();
        json.writeArrayFieldStart("paths");
        for (PathRow path : result.paths()) {
            path(path);
        }
        json.writeEndArray();
        json.writeArrayFieldStart("images");
        for (ImageRow image : result.images()) {
            image(image);
        }
        json.writeEndArray();
        json.writeArrayFieldStart("stars");
        for (StarRow star : result.stars()) {
            star(star);
        }
        json.writeEndArray();
        json.writeFieldName("study");
        doc(outcome.doc());
        texts("tables", tables);
        texts("figures", figures);
        texts("warnings", result.warnings());
        texts("cautions", result.cautions());
        json.writeEndObject();
    }

    private void doc(Doc doc) throws IOException {
        if (doc instanceof Doc.Fields fields) {
            json.writeStartObject();
            for (Map.Entry<String, Doc> entry : fields.values().entrySet()) {
                json.writeFieldName(entry.getKey());
                doc(entry.getValue());
            }
            json.writeEndObject();
        } else if (doc instanceof Doc.Items items) {
            json.writeStartArray();
            for (Doc item : items.values()) {
                doc(item);
            }
            json.writeEndArray();
        } else if (doc instanceof Doc.Amount amount) {
            if (Double.isFinite(amount.value())) {
                json.writeNumber(amount.value());
            } else {
                json.writeNull();
            }
        } else if (doc instanceof Doc.Count count) {
            json.writeNumber(count.value());
        } else if (doc instanceof Doc.Flag flag) {
            json.writeBoolean(flag.value());
        } else if (doc instanceof Doc.Text text) {
            json.writeString(text.value());
        }
    }

    private void quantity(Quantity quantity) throws IOException {
        json.writeStartObject();
        if (quantity instanceof Quantity.Word word) {
            json.writeStringField("word", word.word());
        } else if (quantity instanceof Quantity.Amount amount) {
            number("value", amount.value());
            json.writeStringField("unit", amount.unit());
            number("error", amount.error());
        } else if (quantity instanceof Quantity.Amounts amounts) {
            numbers("value", amounts.values());
            json.writeStringField("unit", amounts.unit());
            number("error", amounts.error());
        }
        json.writeEndObject();
    }

    private void ray(RayRow ray) throws IOException {
        json.writeStartObject();
        json.writeStringField("status", ray.status());
        vector("position", ray.position());
        vector("direction", ray.direction());
        number("optical-length", ray.opticalLength());
        number("length", ray.length());
        number("travel-time", ray.travelTime());
        number("index", ray.index());
        json.writeArrayFieldStart("transfer");
        for (double[] row : ray.transfer()) {
            array(row);
        }
        json.writeEndArray();
        if (!ray.note().isEmpty()) {
            json.writeStringField("note", ray.note());
        }
        errors(ray.errors());
        json.writeEndObject();
    }

    private void path(PathRow path) throws IOException {
        json.writeStartObject();
        number("optical-length", path.opticalLength());
        number("excess", path.excess());
        number("length", path.length());
        number("travel-time", path.travelTime());
        vector("launch-direction", path.launch());
        vector("arrival-direction", path.arrival());
        json.writeStringField("kind", path.kind());
        json.writeNumberField("morse-index", path.morseIndex());
        if (path.nullDirections() > 0) {
            json.writeNumberField("null-directions", path.nullDirections());
        }
        numbers("conjugate-points", path.conjugatePoints());
        if (!path.overInterfaces().isEmpty()) {
            json.writeStringField("over-interfaces", path.overInterfaces());
        }
        number("residual", path.residual());
        json.writeArrayFieldStart("points");
        for (double[] point : path.points()) {
            array(point);
        }
        json.writeEndArray();
        errors(path.errors());
        json.writeEndObject();
    }

    private void image(ImageRow image) throws IOException {
        json.writeStartObject();
        number("launch-elevation", image.launch());
        number("arrival-elevation", image.arrival());
        number("back-elevation", -image.arrival());
        number("refraction-at-from", image.refractionAtFrom());
        number("refraction-at-to", image.refractionAtTo());
        number("apparent-displacement", image.displacement());
        if (image.coefficient().isPresent()) {
            number("refraction-coefficient", image.coefficient().getAsDouble());
        }
        if (!image.remark().isEmpty()) {
            json.writeStringField("refraction-coefficient-remark", image.remark());
        }
        number("optical-length", image.opticalLength());
        number("optical-excess", image.excess());
        number("length", image.length());
        number("lowest-clearance", image.lowest());
        number("lowest-clearance-at", image.lowestAt());
        json.writeStringField("orientation", image.orientation());
        number("vertical-magnification", image.magnification());
        json.writeStringField("kind", image.kind());
        json.writeArrayFieldStart("points");
        for (double[] point : image.points()) {
            array(point);
        }
        json.writeEndArray();
        errors(image.errors());
        json.writeEndObject();
    }

    private void star(StarRow star) throws IOException {
        json.writeStartObject();
        number("apparent-zenith", star.apparentZenith());
        if (star.refraction().isPresent()) {
            number("refraction", star.refraction().getAsDouble());
        }
        if (!star.note().isEmpty()) {
            json.writeStringField("note", star.note());
        }
        errors(star.errors());
        json.writeEndObject();
    }

    private void errors(Map<String, Double> errors) throws IOException {
        json.writeObjectFieldStart("errors");
        // sorted: the map has no order of its own, and the same job must give the same text
        for (Map.Entry<String, Double> entry : new TreeMap<>(errors).entrySet()) {
            number(entry.getKey(), entry.getValue());
        }
        json.writeEndObject();
    }

    private void vector(String key, Vector v) throws IOException {
        numbers(key, new double[] {v.x(), v.y(), v.z()});
    }

    private void number(String key, double value) throws IOException {
        if (Double.isFinite(value)) {
            json.writeFieldName(key);
            json.writeNumber(value);
        }
    }

    private void numbers(String key, double[] values) throws IOException {
        for (double value : values) {
            if (!Double.isFinite(value)) {
                return;
            }
        }
        json.writeFieldName(key);
        array(values);
    }

    private void array(double[] values) throws IOException {
        json.writeStartArray();
        for (double value : values) {
            // a place in a row cannot be left out
            if (Double.isFinite(value)) {
                json.writeNumber(value);
            } else {
                json.writeNull();
            }
        }
        json.writeEndArray();
    }

    private void texts(String key, List<String> texts) throws IOException {
        json.writeArrayFieldStart(key);
        for (String text : texts) {
            json.writeString(text);
        }
        json.writeEndArray();
    }
}
