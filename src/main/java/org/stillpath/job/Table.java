package org.stillpath.job;

import java.util.Collections;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;

/**
 * A table of numbers from a file that a job names.
 *
 * @param source name of the file, for messages
 * @param headers headers of the columns of numbers as written, without their units
 * @param units the unit in brackets behind each header, {@code mm} for {@code x [mm]}; empty where there is none
 * @param columns numbers by column, all of one length, in the unit of their header (not converted)
 * @param words columns that hold no numbers but words, by header, such as the names of stations; as long as the others
 * @param notes what was told about reading it: decimal commas, a byte-order mark
 */
public record Table(
        String source,
        List<String> headers,
        List<String> units,
        List<double[]> columns,
        Map<String, List<String>> words,
        List<String> notes) {
    public Table {
        headers = List.copyOf(headers);
        units = List.copyOf(units);
        columns = columns.stream().map(double[]::clone).toList();
        Map<String, List<String>> copied = new LinkedHashMap<>();
        words.forEach((header, cells) -> copied.put(header, List.copyOf(cells)));
        words = Collections.unmodifiableMap(copied);
        notes = List.copyOf(notes);
        if (headers.size() != columns.size() || units.size() != columns.size()) {
            throw new IllegalArgumentException("as many headers and units as columns are needed");
        }
    }

    /** A table without columns of words. */
    public Table(String source, List<String> headers, List<String> units, List<double[]> columns, List<String> notes) {
        this(source, headers, units, columns, Map.of(), notes);
    }

    /** Number of rows. */
    public int rows() {
        if (!columns.isEmpty()) {
            return columns.get(0).length;
        }
        return words.values().stream().findFirst().map(List::size).orElse(0);
    }
}
