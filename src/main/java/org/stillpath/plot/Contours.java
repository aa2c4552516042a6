package org.stillpath.plot;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.HashMap;
import java.util.List;
import java.util.Map;

/**
 * Lines of equal value on a raster, by marching squares with linear interpolation along the sides (Lorensen &amp; Cline
 * 1987, in two dimensions); a saddle is cut by the mean of its corners. Squares with a corner that is not a number have no line.
 */
final class Contours {
    private final double[] x;
    private final double[] y;
    private final double[] values;

    /**
     * @param x places of the columns; {@code y} of the rows
     * @param values by rows
     */
    Contours(double[] x, double[] y, double[] values) {
        this.x = x;
        this.y = y;
        this.values = values;
    }

    /** The lines of one level, joined, the longest first. */
    List<Polyline> at(double level) {
        int columns = x.length;
        Map<Long, long[]> ends = new HashMap<>();
        List<long[]> segments = new ArrayList<>();
        for (int r = 0; r + 1 < y.length; r++) {
            for (int c = 0; c + 1 < columns; c++) {
                double[] v = {value(c, r), value(c + 1, r), value(c + 1, r + 1), value(c, r + 1)};
                if (!Double.isFinite(v[0] + v[1] + v[2] + v[3])) {
                    continue;
                }
                // sides: 0 below, 1 right, 2 above, 3 left
                long[] side = {edge(c, r, 0), edge(c + 1, r, 1), edge(c, r + 1, 0), edge(c, r, 1)};
                List<Long> crossed = new ArrayList<>(4);
                for (int i = 0; i < 4; i++) {
                    if ((v[i] >= level) != (v[(i + 1) % 4] >= level)) {
                        crossed.add(side[i]);
                    }
                }
                if (crossed.size() == 2) {
                    segments.add(new long[] {crossed.get(0), crossed.get(1)});
                } else if (crossed.size() == 4) {
                    boolean middle = (v[0] + v[1] + v[2] + v[3]) / 4 >= level;
                    boolean corner = v[0] >= level;
                    int shift = middle == corner ? 0 : 3;
                    segments.add(new long[] {side[shift % 4], side[(shift + 1) % 4]});
                    segments.add(new long[] {side[(shift + 2) % 4], side[(shift + 3) % 4]});
                }
            }
        }
        for (int i = 0; i < segments.size(); i++) {
            for (long e : segments.get(i)) {
                long[] list = ends.computeIfAbsent(e, k -> new long[] {-1, -1});
                list[list[0] < 0 ? 0 : 1] = i;
            }
        }
        return joined(segments, ends, level);
    }

    private List<Polyline> joined(List<long[]> segments, Map<Long, long[]> ends, double level) {
        boolean[] used = new boolean[segments.size()];
        List<Polyline> lines = new ArrayList<>();
        // open lines first, from an end; what is left after them are rings
        for (int pass = 0; pass < 2; pass++) {
            for (int i = 0; i < used.length; i++) {
                if (used[i]) {
                    continue;
                }
                long start = -1;
                for (long e : segments.get(i)) {
                    if (count(ends, e) == 1) {
                        start = e;
                    }
                }
                if (start < 0 && pass == 0) {
                    continue;
                }
                lines.add(follow(segments, ends, used, i, start < 0 ? segments.get(i)[0] : start, level));
            }
        }
        lines.sort((a, b) -> Double.compare(b.length(), a.length()));
        return lines;
    }

    private static int count(Map<Long, long[]> ends, long edge) {
        long[] list = ends.get(edge);
        return list == null ? 0 : (int) Arrays.stream(list).filter(s -> s >= 0).count();
    }

    private Polyline follow(
            List<long[]> segments, Map<Long, long[]> ends, boolean[] used, int first, long start, double level) {
        List<double[]> points = new ArrayList<>();
        long edge = start;
        int segment = first;
        points.add(point(edge, level));
        while (segment >= 0) {
            used[segment] = true;
            long[] s = segments.get(segment);
            edge = s[0] == edge ? s[1] : s[0];
            points.add(point(edge, level));
            segment = -1;
            long[] next = ends.get(edge);
            if (next != null) {
                for (long n : next) {
                    if (n >= 0 && !used[(int) n]) {
                        segment = (int) n;
                    }
                }
            }
        }
        return Polyline.of(points);
    }

    private double value(int c, int r) {
        return values[r * x.length + c];
    }

    private long edge(int c, int r, int upright) {
        return 2L * ((long) r * x.length + c) + upright;
    }

    private double[] point(long edge, double level) {
        boolean upright = edge % 2 == 1;
        int node = (int) (edge / 2);
        int c = node % x.length;
        int r = node / x.length;
        double a = value(c, r);
        double b = upright ? value(c, r + 1) : value(c + 1, r);
        double t = (level - a) / (b - a);
        return upright
                ? new double[] {x[c], y[r] + t * (y[r + 1] - y[r])}
                : new double[] {x[c] + t * (x[c + 1] - x[c]), y[r]};
    }
}
