package org.stillpath.medium;

import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;

/** Reads the CSV files of published values that stand beside the tests: {@code #} lines, a header, rows without quotes. */
final class Rows {
    private Rows() {}

    static List<Row> read(String name) {
        try (InputStream in = Rows.class.getResourceAsStream(name)) {
            if (in == null) {
                throw new IllegalStateException("no resource " + name);
            }
            List<String> lines = new String(in.readAllBytes(), StandardCharsets.UTF_8)
                    .lines()
                    .filter(l -> !l.startsWith("#") && !l.isBlank())
                    .toList();
            String[] header = lines.get(0).split(",", -1);
            List<Row> rows = new ArrayList<>();
            for (String line : lines.subList(1, lines.size())) {
                String[] cells = line.split(",", -1);
                Map<String, String> row = new LinkedHashMap<>();
                for (int i = 0; i < header.length; i++) {
                    row.put(header[i], cells[i]);
                }
                rows.add(new Row(row));
            }
            return rows;
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    /** One row: cells by header. */
    record Row(Map<String, String> cells) {
        String text(String header) {
            String cell = cells.get(header);
            if (cell == null) {
                throw new IllegalArgumentException("no column " + header);
            }
            return cell;
        }

        /** The cell as a number; NaN where it is empty. */
        double number(String header) {
            return text(header).isEmpty() ? Double.NaN : Double.parseDouble(text(header));
        }
    }
}
