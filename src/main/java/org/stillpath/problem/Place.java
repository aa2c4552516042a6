package org.stillpath.problem;

/**
 * A place in a text that a user wrote.
 *
 * @param source name of the file (or of the option) as the user would write it
 * @param line line, counted from 1; 0 where the text has no lines (a command-line option)
 * @param column column in code points, counted from 1; 0 together with line 0
 */
public record Place(String source, int line, int column) {
    public Place {
        if (line < 0 || column < 0) {
            throw new IllegalArgumentException("line and column must not be negative: " + line + ", " + column);
        }
    }

    /** The place of a whole source that has no lines, such as a command-line option or a missing file. */
    public static Place of(String source) {
        return new Place(source, 0, 0);
    }

    /** This place moved right by {@code columns} within its line; a place without lines stays what it is. */
    public Place plusColumns(int columns) {
        return line == 0 ? this : new Place(source, line, column + columns);
    }

    /** {@code source:line:column}, or {@code source} alone where there are no lines. */
    @Override
    public String toString() {
        return line == 0 ? source : source + ":" + line + ":" + column;
    }
}
