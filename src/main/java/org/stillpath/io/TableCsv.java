package org.stillpath.io;

import java.util.List;
import java.util.regex.Pattern;
import org.stillpath.task.Table;

/**
 * A table as CSV after RFC 4180: commas, CRLF, quotes doubled. Numbers stand as they are, with a decimal point; a text
 * that a spreadsheet would take for a formula gets an apostrophe in front and quotes around it.
 */
public final class TableCsv {
    private static final Pattern NUMBER = Pattern.compile("[-+]?(\\d+\\.?\\d*|\\.\\d+)([eE][-+]?\\d+)?");

    private TableCsv() {}

    /** The table as text, a header line first. */
    public static String toText(Table table) {
        StringBuilder text = new StringBuilder();
        line(table.columns(), text);
        for (List<String> row : table.rows()) {
            line(row, text);
        }
        return text.toString();
    }

    private static void line(List<String> cells, StringBuilder text) {
        for (int i = 0; i < cells.size(); i++) {
            if (i > 0) {
                text.append(',');
            }
            text.append(cell(cells.get(i)));
        }
        text.append("\r\n");
    }

    private static String cell(String cell) {
        boolean formula = !cell.isEmpty()
                && "=+-@\t\r".indexOf(cell.charAt(0)) >= 0
                && !NUMBER.matcher(cell).matches();
        if (formula) {
            return quoted("'" + cell);
        }
        boolean special = cell.indexOf(',') >= 0
                || cell.indexOf('"') >= 0
                || cell.indexOf('\n') >= 0
                || cell.indexOf('\r') >= 0
                || !cell.equals(cell.strip());
        return special ? quoted(cell) : cell;
    }

    private static String quoted(String cell) {
        return '"' + cell.replace("\"", "\"\"") + '"';
    }
}
