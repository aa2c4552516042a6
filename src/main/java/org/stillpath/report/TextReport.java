package org.stillpath.report;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.study.Listing;
import org.stillpath.study.Outcome;
import org.stillpath.task.Result;

/**
 * A result as plain text for a terminal of 80 columns: the answer first, then the numbers with their decimal points in
 * one line and their units in a column of their own, then warnings and cautions by these words.
 */
public final class TextReport {
    private static final int WIDTH = 80;
    private static final int MOST_ROWS = 20;

    private TextReport() {}

    /** The text of a result without a study, ending with a line feed. */
    public static String of(Result result) {
        return of(Outcome.of(result));
    }

    /** The text, ending with a line feed: the studies' answers and tables, then the result at the job's own values. */
    public static String of(Outcome outcome) {
        Result result = outcome.result();
        StringBuilder text = new StringBuilder();
        for (String headline : outcome.headlines()) {
            text.append(PlainText.wrapped(headline, "", "", WIDTH));
        }
        for (Listing listing : outcome.listings()) {
            text.append('\n')
                    .append(PlainText.wrapped(listing.heading(), "", "", WIDTH))
                    .append('\n');
            table(RowTable.listing(listing.brief(), MOST_ROWS), "rows", text);
        }
        if (!outcome.findings().isEmpty()) {
            text.append('\n')
                    .append(PlainText.wrapped(
                            "At the job's own values: " + outcome.nominal().headline(), "", "", WIDTH));
        }
        List<Row> rows = Row.of(result);
        if (!rows.isEmpty()) {
            text.append('\n');
            quantities(rows, text);
        }
        if (!result.rays().isEmpty()) {
            text.append('\n');
            table(RowTable.rays(result.rays(), MOST_ROWS), "rays", text);
        }
        if (!result.paths().isEmpty()) {
            text.append('\n');
            table(RowTable.paths(result.paths(), MOST_ROWS), "paths", text);
        }
        if (!result.images().isEmpty()) {
            text.append('\n');
            table(RowTable.images(result.images(), MOST_ROWS), "images", text);
        }
        if (!result.stars().isEmpty()) {
            text.append('\n');
            table(RowTable.stars(result.stars(), MOST_ROWS), "stars", text);
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

    private static void table(RowTable table, String what, StringBuilder text) {
        List<List<String>> lines = new ArrayList<>();
        lines.add(table.headers());
        lines.addAll(table.rows());
        int[] widths = new int[table.headers().size()];
        for (List<String> cells : lines) {
            for (int i = 0; i < widths.length; i++) {
                widths[i] = Math.max(widths[i], PlainText.columns(cells.get(i)));
            }
        }
        for (List<String> cells : lines) {
            List<String> padded = new ArrayList<>();
            for (int i = 0; i < widths.length; i++) {
                padded.add(padded(cells.get(i), widths[i]));
            }
            line(padded, text);
        }
        for (String note : table.notes()) {
            text.append(PlainText.wrapped(note, "  ", "    ", WIDTH));
        }
        if (table.left() > 0) {
            text.append("  and ")
                    .append(table.left())
                    .append(" more ")
                    .append(what)
                    .append(": see --json or --out\n");
        }
    }

    private static void line(List<String> cells, StringBuilder text) {
        text.append(("  " + String.join("  ", cells)).stripTrailing()).append('\n');
    }

    private static String padded(String text, int width) {
        return text + " ".repeat(Math.max(0, width - PlainText.columns(text)));
    }
}
