package org.stillpath.io;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.stillpath.job.Lattice;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Words;

/** What legacy and XML files of VTK have in common: a block of nodes with arrays on it, of which one is taken. */
final class VtkBlock {
    private VtkBlock() {}

    /**
     * An array on the nodes.
     *
     * @param name its name
     * @param components numbers a node
     * @param type type of its numbers
     * @param place where it stands
     */
    record Array(String name, int components, VtkType type, Place place) {}

    /** Checks what the job wants of a VTK file. */
    static void check(Lattice.Wanted wanted, String source, Place asked) {
        if (!wanted.columns().isEmpty()) {
            throw fault(
                    asked,
                    "`columns` belongs to CSV files; " + source + " is a VTK file, of which `array: NAME` is taken");
        }
    }

    /**
     * The array that is taken: the one asked for, else the only one with one number a node.
     *
     * @param arrays all arrays on the nodes
     * @param onCells whether there are arrays on the cells
     * @param end where the file's point data stand, for a fault
     * @return its place in the list
     */
    static int chosen(
            List<Array> arrays, boolean onCells, Lattice.Wanted wanted, String source, Place end, Place asked) {
        List<String> names = new ArrayList<>();
        int only = -1;
        for (int i = 0; i < arrays.size(); i++) {
            Array a = arrays.get(i);
            if (a.components() == 1) {
                names.add(a.name());
                only = i;
            }
            if (wanted.array().filter(a.name()::equals).isPresent()) {
                if (a.components() != 1) {
                    throw fault(
                            a.place(),
                            "the array " + Words.quoted(a.name()) + " has " + a.components()
                                    + " numbers a node; an array with one is needed");
                }
                return i;
            }
        }
        if (names.isEmpty()) {
            throw fault(
                    end,
                    "there is no array with one number a node (POINT_DATA, <PointData>)"
                            + (onCells ? "; values of cells must be put on the nodes before" : ""));
        }
        if (wanted.array().isPresent()) {
            throw fault(
                    asked,
                    source + " has no array " + Words.quoted(wanted.array().get()) + " on its nodes"
                            + Words.remedy(wanted.array().get(), names));
        }
        if (names.size() > 1) {
            throw fault(
                    asked,
                    source + " has " + names.size() + " arrays on its nodes (" + String.join(", ", names)
                            + "); `array: NAME` beside `file` says which to take");
        }
        return only;
    }

    /**
     * How many nodes a grid of these numbers of planes has.
     *
     * @throws ProblemException if there is an axis without two planes, or there are too many nodes
     */
    static int nodes(long[] planes, Place place) {
        long nodes = 1;
        for (int a = 0; a < 3; a++) {
            if (planes[a] < 2) {
                throw fault(
                        place,
                        "the grid has " + planes[a] + (planes[a] == 1 ? " plane" : " planes") + " along "
                                + "xyz".charAt(a) + "; two or more are needed on each axis. Where nothing changes"
                                + " along it, give the same values on a second plane");
            }
            if (planes[a] > Lattice.MOST_NODES || (nodes *= planes[a]) > Lattice.MOST_NODES) {
                throw fault(
                        place,
                        "the limit of nodes in a grid, " + Lattice.MOST_NODES + ", is exceeded; leave out planes");
            }
        }
        return (int) nodes;
    }

    /** Planes at even distances. */
    static double[] even(long first, int count, double origin, double spacing) {
        double[] at = new double[count];
        for (int i = 0; i < count; i++) {
            at[i] = origin + (first + i) * spacing;
        }
        return at;
    }

    /**
     * The grid.
     *
     * @param axes planes along x, y and z
     * @param where where each axis stands
     * @param array what the values are
     * @param values x running fastest, then y
     * @throws ProblemException if planes do not ascend or a value is no number
     */
    static Lattice lattice(String source, double[][] axes, Place[] where, Array array, double[] values) {
        List<Lattice.Column> columns = new ArrayList<>();
        for (int a = 0; a < 3; a++) {
            double[] at = axes[a];
            String axis = String.valueOf("xyz".charAt(a));
            for (int i = 0; i < at.length; i++) {
                if (!Double.isFinite(at[i])) {
                    throw fault(where[a], "plane " + (i + 1) + " along " + axis + " is " + at[i] + ", not a number");
                }
                if (i > 0 && at[i] <= at[i - 1]) {
                    throw fault(
                            where[a],
                            "planes must ascend: along " + axis + " number " + (i + 1) + ", " + at[i] + ", comes after "
                                    + at[i - 1]);
                }
            }
            columns.add(new Lattice.Column(axis, "", where[a], at));
        }
        for (int n = 0; n < values.length; n++) {
            if (!Double.isFinite(values[n])) {
                int nx = axes[0].length;
                int ny = axes[1].length;
                throw fault(
                        array.place(),
                        "the array " + Words.quoted(array.name()) + " has " + values[n] + " at node " + (n + 1)
                                + ", x = " + axes[0][n % nx] + ", y = " + axes[1][n / nx % ny] + ", z = "
                                + axes[2][n / nx / ny] + "; every node needs a number, holes must be filled before");
            }
        }
        List<String> notes = array.type() == VtkType.FLOAT32
                ? List.of("the array " + Words.quoted(array.name()) + " is in single precision, so that its values are"
                        + " rounded by up to 6e-8 of their size")
                : List.of();
        Lattice.Column value = new Lattice.Column(array.name(), "", array.place(), values);
        return new Lattice(source, columns.get(0), columns.get(1), columns.get(2), value, false, notes);
    }

    static ProblemException fault(Place place, String message) {
        return new ProblemException(Problem.input(place, "", message));
    }

    /** Where every array of the three axes stands, if that is one place. */
    static Place[] thrice(Place place) {
        Place[] three = new Place[3];
        Arrays.fill(three, place);
        return three;
    }
}
