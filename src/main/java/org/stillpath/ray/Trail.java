package org.stillpath.ray;

import java.util.Arrays;
import java.util.Optional;

/** What is noted along a ray: places passed, for drawing, and points conjugate to its start. Mutable, one a ray. */
public final class Trail {
    /** Points beyond this are thinned out: every second one goes. */
    private static final int LIMIT = 4096;

    private final boolean wanted;
    private double[] xyz;
    private int size;

    private final Optional<ConjugatePoints> conjugates;

    private Trail(boolean wanted, Columns columns) {
        this.wanted = wanted;
        this.conjugates = columns.conjugates() ? Optional.of(new ConjugatePoints(columns)) : Optional.empty();
        this.xyz = new double[wanted ? 3 * 64 : 0];
    }

    /**
     * A trail.
     *
     * @param places whether places are kept
     * @param columns say whether conjugate points are looked for
     */
    public static Trail of(boolean places, Columns columns) {
        return new Trail(places, columns);
    }

    /** Looks for conjugate points, if they are wanted. */
    Optional<ConjugatePoints> conjugates() {
        return conjugates;
    }

    /** Whether points are kept, so that a caller may spare itself the work of finding them. */
    public boolean wanted() {
        return wanted;
    }

    /** Adds a place (metres, job's coordinates); the same place twice in a row is kept once. */
    public void add(double x, double y, double z) {
        if (!wanted) {
            return;
        }
        int n = 3 * size;
        if (size > 0 && xyz[n - 3] == x && xyz[n - 2] == y && xyz[n - 1] == z) {
            return;
        }
        if (size == LIMIT) {
            thin();
            n = 3 * size;
        }
        if (n + 3 > xyz.length) {
            xyz = Arrays.copyOf(xyz, 2 * xyz.length);
        }
        xyz[n] = x;
        xyz[n + 1] = y;
        xyz[n + 2] = z;
        size++;
    }

    /** The points as x, y, z triples in order (a copy). */
    public double[] points() {
        return Arrays.copyOf(xyz, 3 * size);
    }

    private void thin() {
        int kept = 0;
        for (int i = 0; i < size; i += 2) {
            System.arraycopy(xyz, 3 * i, xyz, 3 * kept, 3);
            kept++;
        }
        size = kept;
    }
}
