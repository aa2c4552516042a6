package org.stillpath.io;

import java.math.BigDecimal;
import java.util.Arrays;
import java.util.List;
import java.util.function.IntFunction;
import org.stillpath.job.Lattice;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;

/**
 * Sorts nodes that come in any order, x, y, z and a value each, into a rectilinear grid.
 *
 * <p>Each coordinate is looked up among the planes met so far, so that a row keeps three plane numbers and a value: 20
 * bytes, and time in proportion to the rows. Coordinates are the same plane if they are the same double; planes that
 * differ only by rounding are a fault, because joining them would guess. Mutable on purpose; belongs to one file.
 */
final class LatticeRows {
    private static final int NODES_TOLD = 5;
    /** Planes nearer than this part of the axis are taken for one plane written in two ways. */
    private static final double NEAR = 1e-9;

    private final Planes[] axes = {new Planes(), new Planes(), new Planes()};
    private final int[][] plane = new int[3][];
    private double[] values;
    private int count;

    /** Rows to come. {@code expected} is how many, about. */
    LatticeRows(int expected) {
        values = new double[Math.max(16, expected)];
        for (int a = 0; a < 3; a++) {
            plane[a] = new int[values.length];
        }
    }

    /** How many there are so far. */
    int count() {
        return count;
    }

    /** Takes a row: x, y, z, value. */
    void add(double[] node) {
        if (count == values.length) {
            int longer = count + count / 2;
            values = Arrays.copyOf(values, longer);
            for (int a = 0; a < 3; a++) {
                plane[a] = Arrays.copyOf(plane[a], longer);
            }
        }
        for (int a = 0; a < 3; a++) {
            // 0 and -0 are one place
            plane[a][count] = axes[a].number(node[a] + 0.0, count);
        }
        values[count] = node[3];
        count++;
    }

    /**
     * The grid.
     *
     * @param source name of the file
     * @param headings of x, y, z and the value
     * @param notes what was told about the file
     * @param placeOfRow where a row, counted from 0, stands
     * @throws ProblemException if the rows are no rectilinear grid
     */
    Lattice lattice(String source, List<Lattice.Column> headings, List<String> notes, IntFunction<Place> placeOfRow) {
        Problems problems = new Problems();
        double[][] at = new double[3][];
        int[][] rank = new int[3][];
        for (int a = 0; a < 3; a++) {
            at[a] = axes[a].sorted();
            rank[a] = axes[a].ranks(at[a]);
            near(a, at[a], headings.get(a), placeOfRow, problems);
        }
        problems.throwIfAny();
        for (int a = 0; a < 3; a++) {
            if (at[a].length < 2) {
                problems.add(
                        headings.get(a).place(),
                        "",
                        "there is one plane only along " + headings.get(a).name() + ", at "
                                + shown(at[a][0], headings.get(a)) + "; a grid needs two or more on each axis. Where"
                                + " nothing changes along it, give the same values on a second plane");
            }
        }
        problems.throwIfAny();
        int nx = at[0].length;
        int ny = at[1].length;
        int nz = at[2].length;
        long nodes = (long) nx * ny > Lattice.MOST_NODES ? Long.MAX_VALUE : (long) nx * ny * nz;
        if (nodes > 2L * count && nodes > 16) {
            throw new ProblemException(Problem.input(
                    headings.get(0).place(),
                    "",
                    "these points are no rectilinear grid: " + count + " rows with " + nx + " different x, " + ny
                            + " different y and " + nz + " different z. A grid has one row for each combination,"
                            + " the same places written alike in each; scattered points must be put on one first"));
        }
        if (nodes > Lattice.MOST_NODES) {
            throw new ProblemException(Problem.input(
                    headings.get(0).place(),
                    "",
                    "the limit of nodes in a grid, " + Lattice.MOST_NODES + ", is exceeded; leave out planes"));
        }
        double[] out = new double[(int) nodes];
        // the row of each node, counted from 1
        int[] owner = new int[out.length];
        for (int r = 0; r < count; r++) {
            int slot = rank[0][plane[0][r]] + nx * (rank[1][plane[1][r]] + ny * rank[2][plane[2][r]]);
            if (owner[slot] != 0) {
                problems.add(
                        placeOfRow.apply(r),
                        "",
                        "the node at " + node(slot, at, headings) + " stands here again, first in line "
                                + placeOfRow.apply(owner[slot] - 1).line() + "; each is needed once");
                if (problems.list().size() >= NODES_TOLD) {
                    break;
                }
                continue;
            }
            owner[slot] = r + 1;
            out[slot] = values[r];
        }
        problems.throwIfAny();
        missing(owner, at, headings, placeOfRow);
        return new Lattice(
                source,
                column(headings.get(0), at[0]),
                column(headings.get(1), at[1]),
                column(headings.get(2), at[2]),
                column(headings.get(3), out),
                true,
                notes);
    }

    private void missing(int[] owner, double[][] at, List<Lattice.Column> headings, IntFunction<Place> placeOfRow) {
        int absent = owner.length - count;
        if (absent == 0) {
            return;
        }
        Problems problems = new Problems();
        int before = 1;
        for (int slot = 0; slot < owner.length && problems.list().size() < NODES_TOLD; slot++) {
            if (owner[slot] != 0) {
                before = owner[slot];
                continue;
            }
            problems.add(
                    placeOfRow.apply(before - 1),
                    "",
                    "there is no value at " + node(slot, at, headings) + ", the node next to this row; a grid needs one"
                            + " for each of the " + at[0].length + " x " + at[1].length + " x " + at[2].length
                            + " combinations of x, y and z; "
                            + (absent == 1 ? "only this one is missing" : absent + " are missing"));
        }
        problems.throwIfAny();
    }

    private void near(int axis, double[] at, Lattice.Column heading, IntFunction<Place> placeOfRow, Problems problems) {
        double least = NEAR * (at[at.length - 1] - at[0]);
        for (int i = 1; i < at.length; i++) {
            if (at[i] - at[i - 1] <= least) {
                int one = axes[axis].firstRow(at[i - 1]);
                int two = axes[axis].firstRow(at[i]);
                problems.add(
                        placeOfRow.apply(Math.max(one, two)),
                        "",
                        heading.name() + " = " + shown(at[i - 1], heading) + " and " + shown(at[i], heading)
                                + " differ by rounding only, first in line "
                                + placeOfRow.apply(Math.min(one, two)).line()
                                + " and here; write the same plane alike in every row");
                return;
            }
        }
    }

    private static Lattice.Column column(Lattice.Column heading, double[] numbers) {
        return new Lattice.Column(heading.name(), heading.unit(), heading.place(), numbers);
    }

    private static String node(int slot, double[][] at, List<Lattice.Column> headings) {
        int nx = at[0].length;
        int ny = at[1].length;
        int[] p = {slot % nx, slot / nx % ny, slot / nx / ny};
        StringBuilder b = new StringBuilder();
        for (int a = 0; a < 3; a++) {
            b.append(a == 0 ? "" : ", ")
                    .append(headings.get(a).name())
                    .append(" = ")
                    .append(shown(at[a][p[a]], headings.get(a)));
        }
        return b.toString();
    }

    /** A number as it may stand in the file. */
    private static String shown(double v, Lattice.Column heading) {
        BigDecimal d = BigDecimal.valueOf(v).stripTrailingZeros();
        String number = Math.abs(d.scale()) > 20 ? Double.toString(v) : d.toPlainString();
        return heading.unit().isEmpty() ? number : number + " " + heading.unit();
    }

    /** The different coordinates along one axis, numbered as they are met; a hash table of doubles without objects. */
    private static final class Planes {
        private double[] at = new double[16];
        private int[] row = new int[16];
        private int count;
        /** Number of a plane + 1 by hash; 0 where there is none. Its length is a power of two. */
        private int[] table = new int[64];

        private int last;

        /** The number of a plane, a new one if it was not met before. */
        int number(double u, int fromRow) {
            if (count > 0 && at[last] == u) {
                return last;
            }
            int h = slot(u);
            if (table[h] != 0) {
                last = table[h] - 1;
                return last;
            }
            if (count == at.length) {
                at = Arrays.copyOf(at, 2 * count);
                row = Arrays.copyOf(row, 2 * count);
            }
            at[count] = u;
            row[count] = fromRow;
            last = count;
            table[h] = ++count;
            if (3 * count > table.length) {
                table = new int[2 * table.length];
                for (int i = 0; i < count; i++) {
                    table[slot(at[i])] = i + 1;
                }
            }
            return last;
        }

        /** Row in which a plane that is there was met first. */
        int firstRow(double u) {
            return row[table[slot(u)] - 1];
        }

        double[] sorted() {
            double[] s = Arrays.copyOf(at, count);
            Arrays.sort(s);
            return s;
        }

        /** By number of a plane, its place among the sorted. */
        int[] ranks(double[] sorted) {
            int[] ranks = new int[count];
            for (int i = 0; i < count; i++) {
                ranks[i] = Arrays.binarySearch(sorted, at[i]);
            }
            return ranks;
        }

        private int slot(double u) {
            long bits = Double.doubleToLongBits(u) * 0x9E3779B97F4A7C15L;
            int h = (int) (bits >>> 40) & (table.length - 1);
            while (table[h] != 0 && at[table[h] - 1] != u) {
                h = (h + 1) & (table.length - 1);
            }
            return h;
        }
    }
}
