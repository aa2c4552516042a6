package org.stillpath.study;

import java.util.ArrayList;
import java.util.Collections;
import java.util.List;
import org.stillpath.task.Table;

/**
 * A table of a study: for people, in readable units with the digits that the errors support, and as CSV in SI with all
 * digits.
 *
 * @param name stem of the CSV file, such as {@code sweep}
 * @param heading for people
 * @param columns from left to right, all of one length
 * @param details names of columns that a terminal leaves out
 */
public record Listing(String name, String heading, List<Column> columns, List<String> details) {
    public Listing {
        columns = List.copyOf(columns);
        details = List.copyOf(details);
        if (columns.stream().mapToInt(Column::size).distinct().count() > 1) {
            throw new IllegalArgumentException("columns of " + name + " must be of one length");
        }
    }

    /** A table that a terminal shows in full. */
    public Listing(String name, String heading, List<Column> columns) {
        this(name, heading, columns, List.of());
    }

    /** The same without its details. */
    public Listing brief() {
        return new Listing(
                name,
                heading,
                columns.stream().filter(c -> !details.contains(c.name())).toList());
    }

    /** One column. */
    public sealed interface Column {
        /** Its header, without unit. */
        String name();

        /** How many cells it has. */
        int size();
    }

    /**
     * Numbers of one unit.
     *
     * @param name header
     * @param unit SI unit symbol
     * @param shown unit for people; empty: one that suits the size
     * @param values in SI; NaN where there is none
     * @param error of each of them, for people; 0 where unknown
     */
    public record Numbers(String name, String unit, String shown, double[] values, double error) implements Column {
        public Numbers {
            values = values.clone();
        }

        /** A copy. */
        @Override
        public double[] values() {
            return values.clone();
        }

        @Override
        public int size() {
            return values.length;
        }

        @Override
        public boolean equals(Object o) {
            return o instanceof Numbers n && name.equals(n.name) && java.util.Arrays.equals(values, n.values);
        }

        @Override
        public int hashCode() {
            return name.hashCode() + 31 * java.util.Arrays.hashCode(values);
        }
    }

    /**
     * Numbers with a unit each.
     *
     * @param name header
     * @param values in SI; NaN where there is none
     * @param units SI unit symbols
     * @param shown units for people; empty texts: one that suits the size
     * @param errors of each, for people; 0 where unknown
     */
    public record Mixed(String name, double[] values, List<String> units, List<String> shown, double[] errors)
            implements Column {
        public Mixed {
            values = values.clone();
            units = List.copyOf(units);
            shown = List.copyOf(shown);
            errors = errors.clone();
        }

        /** Numbers in units that suit their size. */
        public Mixed(String name, double[] values, List<String> units, double[] errors) {
            this(name, values, units, Collections.nCopies(units.size(), ""), errors);
        }

        /** A copy. */
        @Override
        public double[] values() {
            return values.clone();
        }

        /** A copy. */
        @Override
        public double[] errors() {
            return errors.clone();
        }

        @Override
        public int size() {
            return values.length;
        }

        @Override
        public boolean equals(Object o) {
            return o instanceof Mixed n && name.equals(n.name) && java.util.Arrays.equals(values, n.values);
        }

        @Override
        public int hashCode() {
            return name.hashCode() + 31 * java.util.Arrays.hashCode(values);
        }
    }

    /**
     * Texts.
     *
     * @param name header
     * @param cells the texts
     */
    public record Texts(String name, List<String> cells) implements Column {
        public Texts {
            cells = List.copyOf(cells);
        }

        @Override
        public int size() {
            return cells.size();
        }
    }

    /** Number of rows. */
    public int rows() {
        return columns.isEmpty() ? 0 : columns.get(0).size();
    }

    /** The table as it is written to CSV. */
    public Table table() {
        List<String> headers = new ArrayList<>();
        for (Column c : columns) {
            if (c instanceof Numbers n) {
                headers.add(n.unit().equals("1") ? n.name() : n.name() + " [" + n.unit() + "]");
            } else {
                headers.add(c.name());
                if (c instanceof Mixed) {
                    headers.add(c.name() + " unit");
                }
            }
        }
        List<List<String>> rows = new ArrayList<>();
        for (int i = 0; i < rows(); i++) {
            List<String> row = new ArrayList<>();
            for (Column c : columns) {
                if (c instanceof Numbers n) {
                    row.add(number(n.values[i]));
                } else if (c instanceof Mixed m) {
                    row.add(number(m.values[i]));
                    row.add(m.units.get(i));
                } else if (c instanceof Texts t) {
                    row.add(t.cells.get(i));
                }
            }
            rows.add(row);
        }
        return new Table(name, headers, rows);
    }

    private static String number(double value) {
        return Double.isFinite(value) ? Double.toString(value) : "";
    }
}
