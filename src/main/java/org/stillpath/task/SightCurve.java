package org.stillpath.task;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.stillpath.path.Sightings;

/**
 * What the eye sees at the target's distance: the height that light of each apparent elevation comes from, made continuous from
 * the rays that the search shot. Between two of them the height is the cubic through both heights and slopes, where that runs
 * one way or has its one turn between them, and else a straight line; no further ray is shot for a picture. It costs nothing and
 * is as good as the search's samples are dense.
 *
 * @param pieces from the lowest elevation to the highest: parts without a turn, a jump or a gap
 * @param jumps elevations at which the height jumps, with the heights below and above
 * @param gaps elevations from which no light comes: where each starts and ends; the first may start at minus infinity
 * @param shot highest elevation of the rays that were shot; beyond it the curve is continued straight
 */
record SightCurve(List<Piece> pieces, List<double[]> jumps, List<double[]> gaps, double shot) {
    /** Of a target that no ray comes to. */
    static final SightCurve NONE = new SightCurve(List.of(), List.of(), List.of(), Double.NaN);

    private static final double RESOLVED = 2.4e-6;
    private static final int STEPS = 12;
    /** Nearer to each other rays are the same, or on both sides of a jump, rad. */
    private static final double SAME = 1e-12;
    /** A turn that changes the height by less is noise of the rays beside a jump, metres. */
    private static final double NOISE = 1e-4;

    SightCurve {
        pieces = List.copyOf(pieces);
        jumps = List.copyOf(jumps);
        gaps = List.copyOf(gaps);
    }

    /**
     * A part in which the height only rises or only falls with the elevation.
     *
     * @param elevation apparent, ascending, rad
     * @param height at the target's distance, metres
     * @param fold whether it starts where the one before it ends: at a fold
     */
    record Piece(double[] elevation, double[] height, boolean fold) {
        int last() {
            return elevation.length - 1;
        }

        /** The last place whose elevation is not above another. */
        int upTo(double limit) {
            int i = last();
            while (i > 0 && elevation[i] > limit) {
                i--;
            }
            return i;
        }

        /** Whether a telescope could show it: half a second of arc. */
        boolean isResolved() {
            return elevation[last()] - elevation[0] > RESOLVED;
        }

        boolean erect() {
            return height[last()] >= height[0];
        }

        double low() {
            return Math.min(height[0], height[last()]);
        }

        double high() {
            return Math.max(height[0], height[last()]);
        }

        /** The elevation in which a height is seen, which must lie between {@link #low} and {@link #high}. */
        double elevationOf(double h) {
            for (int i = 1; i <= last(); i++) {
                double a = height[i - 1];
                double b = height[i];
                if (Math.min(a, b) <= h && h <= Math.max(a, b)) {
                    return a == b
                            ? elevation[i]
                            : elevation[i - 1] + (h - a) / (b - a) * (elevation[i] - elevation[i - 1]);
                }
            }
            return erect() == h > height[0] ? elevation[last()] : elevation[0];
        }
    }

    /**
     * The curve of what the search found, continued to a height where that lies above all of it: the search goes no higher than it
     * must to find the images, and what is above is open.
     */
    static SightCurve of(Sightings.Outcome seen, double top) {
        double[][] t = seen.transfer();
        double[] blocked = seen.blocked();
        List<Piece> pieces = new ArrayList<>();
        List<double[]> jumps = new ArrayList<>();
        List<double[]> gaps = new ArrayList<>();
        if (t.length == 0) {
            return NONE;
        }
        if (blocked.length > 0 && blocked[0] < t[0][0]) {
            gaps.add(new double[] {Double.NEGATIVE_INFINITY, t[0][0]});
        }
        List<double[]> run = new ArrayList<>();
        run.add(t[0]);
        for (int i = 1; i < t.length; i++) {
            double[] a = run.get(run.size() - 1);
            double[] b = t[i];
            double apart = b[0] - a[0];
            boolean jump = apart < SAME && Math.abs(b[1] - a[1]) > 1e-3 + 10 * apart * steepest(a, b);
            if (isBetween(blocked, a[0], b[0])) {
                gaps.add(new double[] {a[0], b[0]});
            } else if (jump) {
                jumps.add(new double[] {b[0], a[1], b[1]});
            } else if (apart < SAME) {
                continue;
            } else {
                run.add(b);
                continue;
            }
            split(run, pieces);
            run = new ArrayList<>(List.of(b));
        }
        double[] last = t[t.length - 1];
        if (last[1] < top && last[2] > 0) {
            double more = 1.25 * (top - last[1]);
            run.add(new double[] {last[0] + more / last[2], last[1] + more, last[2]});
        }
        split(run, pieces);
        return new SightCurve(pieces, jumps, gaps, last[0]);
    }

    private static double steepest(double[] a, double[] b) {
        return Math.max(Math.abs(a[2]), Math.abs(b[2]));
    }

    private static boolean isBetween(double[] sorted, double low, double high) {
        int at = Arrays.binarySearch(sorted, low);
        int next = at >= 0 ? at + 1 : -at - 1;
        return next < sorted.length && sorted[next] < high;
    }

    /** Splits a continuous run at its turns. */
    private static void split(List<double[]> run, List<Piece> pieces) {
        if (run.size() < 2) {
            return;
        }
        List<double[]> fine = new ArrayList<>();
        fine.add(run.get(0));
        for (int i = 1; i < run.size(); i++) {
            between(run.get(i - 1), run.get(i), fine);
        }
        int start = 0;
        int turn = 0;
        boolean fold = false;
        int way = 0;
        for (int i = 1; i < fine.size(); i++) {
            double h = fine.get(i)[1];
            double extreme = fine.get(turn)[1];
            if (way == 0) {
                way = (int) Math.signum(h - extreme);
                turn = i;
            } else if (way * (h - extreme) >= 0) {
                turn = i;
            } else if (way * (h - extreme) < -NOISE) {
                pieces.add(piece(fine.subList(start, turn + 1), fold));
                start = turn;
                fold = true;
                way = -way;
                turn = i;
            }
        }
        pieces.add(piece(fine.subList(start, fine.size()), fold));
    }

    private static Piece piece(List<double[]> points, boolean fold) {
        return new Piece(
                points.stream().mapToDouble(p -> p[0]).toArray(),
                points.stream().mapToDouble(p -> p[1]).toArray(),
                fold);
    }

    private static void between(double[] a, double[] b, List<double[]> fine) {
        double w = b[0] - a[0];
        double secant = (b[1] - a[1]) / w;
        // Fritsch & Carlson (1980): with slopes of the secant's sign and at most three times it a cubic runs one way
        boolean even = a[2] * secant >= 0 && b[2] * secant >= 0 && steepest(a, b) <= 3 * Math.abs(secant);
        boolean turns = a[2] * b[2] < 0;
        int steps = even || turns ? STEPS : 1;
        for (int k = 1; k < steps; k++) {
            double s = (double) k / steps;
            double r = 1 - s;
            double h = a[1] * r * r * (1 + 2 * s) + b[1] * s * s * (1 + 2 * r) + w * s * r * (a[2] * r - b[2] * s);
            fine.add(new double[] {a[0] + s * w, h});
        }
        fine.add(new double[] {b[0], b[1]});
    }

    /** In how many elevations a height is seen, as far as a telescope could tell. */
    int count(double height) {
        return (int) pieces.stream()
                .filter(Piece::isResolved)
                .filter(p -> p.low() <= height && height < p.high())
                .count();
    }
}
