package org.stillpath.job;

import java.util.List;
import org.stillpath.problem.Place;

/**
 * A table from a file as it stands there, every cell a text with its place: for those who judge the rows one by one.
 *
 * @param source name of the file, for messages
 * @param headers from left to right
 * @param rows from above
 * @param notes what was told about reading it: decimal commas, a byte-order mark
 */
public record Cells(String source, List<Header> headers, List<Row> rows, List<String> notes) {
    public Cells {
        headers = List.copyOf(headers);
        rows = List.copyOf(rows);
        notes = List.copyOf(notes);
    }

    /**
     * A header.
     *
     * @param name without its unit
     * @param unit the unit in brackets behind it; empty where there is none
     * @param place where it stands
     */
    public record Header(String name, String unit, Place place) {
        /** As written. */
        public String text() {
            return unit.isEmpty() ? name : name + " [" + unit + "]";
        }
    }

    /**
     * A row.
     *
     * @param line its line in the file
     * @param cells texts from left to right, numbers with a decimal point; may be more or fewer than the headers
     * @param columns columns at which the cells start, counted from 1
     */
    public record Row(int line, List<String> cells, List<Integer> columns) {
        public Row {
            cells = List.copyOf(cells);
            columns = List.copyOf(columns);
        }
    }
}
