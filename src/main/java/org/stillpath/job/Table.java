package org.stillpath.job;

import java.util.List;

/**
 * A table of numbers from a file that a job names.
 *
 * @param source name of the file, for messages
 * @param headers column headers as written, without their units
 * @param units the unit in brackets behind each header, {@code mm} for {@code x [mm]}; empty where there is none
 * @param columns numbers by column, all of one length, in the unit of their header (not converted)
 * @param notes what was told about reading it: decimal commas, a byte-order mark
 */
public record Table(
        String source, List<String> headers, List<String> units, List<double[]> columns, List<String> notes) {
    public Table {
        headers = List.copyOf(headers);
        units = List.copyOf(units);
        columns = columns.stream().map(double[]::clone).toList();
        notes = List.copyOf(notes);
        if (headers.size() != columns.size() || units.size() != columns.size()) {
            throw new IllegalArgumentException("as many headers and units as columns are needed");
        }
    }

    /** Number of rows. */
    public int rows() {
        return columns.isEmpty() ? 0 : columns.get(0).length;
    }
}
