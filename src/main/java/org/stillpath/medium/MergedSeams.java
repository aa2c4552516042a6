package org.stillpath.medium;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.stream.DoubleStream;

/**
 * The seams of several quantities as those of one: seams along the same coordinate become one with the knots of all, so
 * that a ray lands once where two tables share a knot.
 */
final class MergedSeams {
    private final List<List<Seam>> parts;
    private final List<Seam> seams;

    private MergedSeams(List<List<Seam>> parts, List<Seam> seams) {
        this.parts = parts;
        this.seams = seams;
    }

    /** Merges the seams of several quantities. */
    static MergedSeams of(List<List<Seam>> parts) {
        List<Seam> merged = new ArrayList<>();
        for (List<Seam> part : parts) {
            for (Seam seam : part) {
                int at = find(merged, seam.coordinate());
                if (at < 0) {
                    merged.add(seam);
                } else {
                    double[] all = DoubleStream.concat(
                                    Arrays.stream(merged.get(at).knots()), Arrays.stream(seam.knots()))
                            .sorted()
                            .distinct()
                            .toArray();
                    merged.set(at, new Seam(seam.coordinate(), all));
                }
            }
        }
        return new MergedSeams(List.copyOf(parts), List.copyOf(merged));
    }

    private static int find(List<Seam> list, Level coordinate) {
        for (int i = 0; i < list.size(); i++) {
            if (list.get(i).coordinate().equals(coordinate)) {
                return i;
            }
        }
        return -1;
    }

    /** The seams of all. */
    List<Seam> seams() {
        return seams;
    }

    /** The cells of one quantity's own seams that hold the given cells of the merged ones. */
    int[] cells(int part, int[] merged) {
        List<Seam> own = parts.get(part);
        int[] cells = new int[own.size()];
        for (int i = 0; i < cells.length; i++) {
            int at = find(seams, own.get(i).coordinate());
            int cell = merged[at];
            cells[i] = cell == 0 ? 0 : own.get(i).cell(seams.get(at).knot(cell - 1));
        }
        return cells;
    }
}
