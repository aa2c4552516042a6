package org.stillpath.task;

import java.util.List;

/**
 * A table of a result, written as CSV.
 *
 * @param name file name without its ending, such as {@code rays}
 * @param columns headers with units, {@code position-x [m]}
 * @param rows cells as text, numbers in full precision with a decimal point; each row as long as {@code columns}
 */
public record Table(String name, List<String> columns, List<List<String>> rows) {
    public Table {
        columns = List.copyOf(columns);
        rows = rows.stream().map(List::copyOf).toList();
    }
}
