package org.stillpath.job;

import java.util.List;
import java.util.Optional;
import org.stillpath.problem.Place;

/**
 * The nodes of a rectilinear grid from a file that a job names, each with one value, in the units of the file.
 *
 * <p>The planes of each axis and the values are kept apart, where a table would repeat three coordinates in every row:
 * that is a quarter of the memory, and whoever joins the nodes needs them so.
 *
 * @param source name of the file, for messages
 * @param x planes along x, ascending; likewise {@code y} and {@code z}
 * @param value values by node, x running fastest, then y: {@code numbers()[i + nx·(j + ny·k)]}
 * @param namesUnits whether files of this format can name their units at all
 * @param notes what was told about reading it
 */
public record Lattice(
        String source, Column x, Column y, Column z, Column value, boolean namesUnits, List<String> notes) {
    /** Most nodes of a grid; its spline then takes some 200 MB while it is made. */
    public static final int MOST_NODES = 4_000_000;

    public Lattice {
        notes = List.copyOf(notes);
        long nodes = (long) x.numbers.length * y.numbers.length * z.numbers.length;
        if (nodes != value.numbers.length || nodes > MOST_NODES) {
            throw new IllegalArgumentException("values must be as many as nodes, at most " + MOST_NODES + ": "
                    + value.numbers.length + " for " + nodes);
        }
    }

    /**
     * Numbers of one quantity.
     *
     * @param name its name in the file
     * @param unit its unit in the file, {@code mm}; empty where the file names none
     * @param place where the file names it
     * @param numbers in that unit, finite; copied
     */
    public record Column(String name, String unit, Place place, double[] numbers) {
        public Column {
            numbers = numbers.clone();
        }
    }

    /**
     * What of a file is taken.
     *
     * @param columns four headers of a CSV file, of x, y, z and the value; empty for what the headers say themselves
     * @param array name of the array of a VTK file; empty for the only one
     */
    public record Wanted(List<String> columns, Optional<String> array) {
        public Wanted {
            columns = List.copyOf(columns);
            if (!columns.isEmpty() && columns.size() != 4) {
                throw new IllegalArgumentException("columns must be none or four: " + columns);
            }
        }

        /** What a file holds anyway. */
        public static Wanted any() {
            return new Wanted(List.of(), Optional.empty());
        }
    }
}
