package org.stillpath.report;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.task.RayRow;
import org.stillpath.task.Result;

/**
 * A result as plain text for a terminal of 80 columns: the answer first, then the numbers with their decimal points in
 * one line and their units in a column of their own, then warnings and cautions by these words.
 */
public final class TextReport {
    private static final int WIDTH = 80;
    private static final int MOST_RAYS = 20;

    private TextReport() {}

    /** The text, ending with a line feed. */
    public static String of(Result result) {
        StringBuilder text = new StringBuilder();
        text.append(PlainText.wrapped(result.headline(), "", "", WIDTH));
        List<Row> rows = Row.of(result);
        if (!rows.isEmpty()) {
            text.append('\n');
            quantities(rows, text);
        }
        if (!result.rays().isEmpty()) {
            text.append('\n');
            rays(result.rays(), text);
        }
        if (!result.warnings().isEmpty() || !result.cautions().isEmpty()) {
            text.append('\n');
        }
        for (String warning : result.warnings()) {
            text.append(PlainText.wrapped(warning, "warning: ", "         ", WIDTH));
        }
        for (String caution : result.cautions()) {
            text.append(PlainText.wrapped(caution, "caution: ", "         ", WIDTH));
        }
        return text.toString();
    }

    private static void quantities(List<Row> rows, StringBuilder text) {
        List<String> numbers = Column.aligned(
                rows.stream().map(r -> r.isWord() ? "" : r.value()).toList());
        int width = 0;
        int names = 0;
        for (int i = 0; i < rows.size(); i++) {
            width = Math.max(width, PlainText.columns(numbers.get(i)));
            names = Math.max(names, PlainText.columns(rows.get(i).name()));
        }
        for (int i = 0; i < rows.size(); i++) {
            Row row = rows.get(i);
            String value = row.isWord() ? row.value() : numbers.get(i);
            line(List.of(padded(row.name(), names), padded(value, width), row.unit()), text);
        }
    }

    private static void rays(List<RayRow> rays, StringBuilder text) {
        List<RayRow> shown = rays.subList(0, Math.min(rays.size(), MOST_RAYS));
        double[] positions = new double[3 * shown.size()];
        double[] positionErrors = new double[shown.size()];
        double[] opticals = new double[shown.size()];
        double[] opticalErrors = new double[shown.size()];
        for (int i = 0; i < shown.size(); i++) {
            RayRow ray = shown.get(i);
            positions[3 * i] = ray.position().x();
            positions[3 * i + 1] = ray.position().y();
            positions[3 * i + 2] = ray.position().z();
            opticals[i] = ray.opticalLength();
            positionErrors[i] = ray.errors().getOrDefault("position", 0.0);
            opticalErrors[i] = ray.errors().getOrDefault("optical-length", 0.0);
        }
        Column.Cells position = Column.of(positions, positionErrors, "m");
        Column.Cells optical = Column.of(opticals, opticalErrors, "m");
        List<List<String>> columns = new ArrayList<>();
        columns.add(column("ray", range(shown.size())));
        columns.add(column("status", shown.stream().map(r -> Labels.of(r.status())).toList()));
        for (int axis = 0; axis < 3; axis++) {
            List<String> numbers = new ArrayList<>();
            for (int i = 0; i < shown.size(); i++) {
                numbers.add(position.texts().get(3 * i + axis));
            }
            columns.add(column("xyz".charAt(axis) + " / " + position.unit(), Column.aligned(numbers)));
        }
        columns.add(column("optical length / " + optical.unit(), Column.aligned(optical.texts())));
        for (int i = 0; i <= shown.size(); i++) {
            List<String> cells = new ArrayList<>();
            for (List<String> column : columns) {
                int width = column.stream().mapToInt(PlainText::columns).max().orElse(0);
                cells.add(padded(column.get(i), width));
            }
            line(cells, text);
        }
        for (int i = 0; i < shown.size(); i++) {
            if (!shown.get(i).note().isEmpty()) {
                text.append(PlainText.wrapped(
                        "ray " + i + ": " + shown.get(i).note(), "  ", "  ", WIDTH));
            }
        }
        if (shown.size() < rays.size()) {
            text.append("  and " + (rays.size() - shown.size()) + " more rays: see --json or --out\n");
        }
    }

    private static List<String> range(int count) {
        List<String> numbers = new ArrayList<>();
        for (int i = 0; i < count; i++) {
            numbers.add(String.valueOf(i));
        }
        return numbers;
    }

    private static List<String> column(String header, List<String> cells) {
        List<String> all = new ArrayList<>();
        all.add(header);
        all.addAll(cells);
        return all;
    }

    private static void line(List<String> cells, StringBuilder text) {
        text.append(("  " + String.join("  ", cells)).stripTrailing()).append('\n');
    }

    private static String padded(String text, int width) {
        return text + " ".repeat(Math.max(0, width - PlainText.columns(text)));
    }
}
