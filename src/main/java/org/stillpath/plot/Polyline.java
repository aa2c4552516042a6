package org.stillpath.plot;

import java.util.ArrayList;
import java.util.List;

/** Points on paper joined by lines. Arrays are not changed after construction. */
record Polyline(double[] x, double[] y) {
    int size() {
        return x.length;
    }

    double length() {
        double sum = 0;
        for (int i = 1; i < x.length; i++) {
            sum += Math.hypot(x[i] - x[i - 1], y[i] - y[i - 1]);
        }
        return sum;
    }

    /** The point at a part of the length, 0 at the start and 1 at the end, and the direction there: x, y, dx, dy. */
    double[] at(double part) {
        double left = Math.min(Math.max(part, 0), 1) * length();
        for (int i = 1; i < x.length; i++) {
            double step = Math.hypot(x[i] - x[i - 1], y[i] - y[i - 1]);
            if (step > 0 && (left <= step || i == x.length - 1)) {
                double t = Math.min(left / step, 1);
                double dx = (x[i] - x[i - 1]) / step;
                double dy = (y[i] - y[i - 1]) / step;
                return new double[] {x[i - 1] + t * (x[i] - x[i - 1]), y[i - 1] + t * (y[i] - y[i - 1]), dx, dy};
            }
            left -= step;
        }
        return new double[] {x[0], y[0], 1, 0};
    }

    /** The parts of the line inside a box. */
    List<Polyline> inside(Box box) {
        List<Polyline> parts = new ArrayList<>();
        List<double[]> run = new ArrayList<>();
        for (int i = 1; i < x.length; i++) {
            boolean finite = Double.isFinite(x[i - 1] + y[i - 1] + x[i] + y[i]);
            Box.Part part = finite ? box.part(x[i - 1], y[i - 1], x[i], y[i]) : Box.Part.NONE;
            if (part.isEmpty()) {
                flush(run, parts);
                continue;
            }
            if (part.from() > 0) {
                flush(run, parts);
            }
            if (run.isEmpty()) {
                run.add(between(i, part.from()));
            }
            run.add(between(i, part.to()));
            if (part.to() < 1) {
                flush(run, parts);
            }
        }
        flush(run, parts);
        return parts;
    }

    /** The parts of the line outside a box. */
    List<Polyline> outside(Box box) {
        List<Polyline> parts = new ArrayList<>();
        List<double[]> run = new ArrayList<>();
        run.add(new double[] {x[0], y[0]});
        for (int i = 1; i < x.length; i++) {
            Box.Part part = box.part(x[i - 1], y[i - 1], x[i], y[i]);
            if (!part.isEmpty()) {
                run.add(between(i, part.from()));
                flush(run, parts);
                run.add(between(i, part.to()));
            }
            run.add(new double[] {x[i], y[i]});
        }
        flush(run, parts);
        parts.removeIf(p -> p.length() < 0.5);
        return parts;
    }

    private double[] between(int i, double t) {
        return new double[] {x[i - 1] + t * (x[i] - x[i - 1]), y[i - 1] + t * (y[i] - y[i - 1])};
    }

    private static void flush(List<double[]> run, List<Polyline> parts) {
        if (run.size() >= 2) {
            parts.add(of(run));
        }
        run.clear();
    }

    static Polyline of(List<double[]> points) {
        double[] x = new double[points.size()];
        double[] y = new double[points.size()];
        for (int i = 0; i < x.length; i++) {
            x[i] = points.get(i)[0];
            y[i] = points.get(i)[1];
        }
        return new Polyline(x, y);
    }

    /** Fewer points, the line nowhere further than {@code tolerance} from the old one (Douglas &amp; Peucker 1973). */
    Polyline thinned(double tolerance) {
        int n = x.length;
        if (n < 3) {
            return this;
        }
        boolean[] keep = new boolean[n];
        keep[0] = true;
        keep[n - 1] = true;
        List<int[]> open = new ArrayList<>();
        open.add(new int[] {0, n - 1});
        while (!open.isEmpty()) {
            int[] range = open.remove(open.size() - 1);
            int far = -1;
            double most = tolerance;
            for (int i = range[0] + 1; i < range[1]; i++) {
                double d = distance(i, range[0], range[1]);
                if (d > most) {
                    most = d;
                    far = i;
                }
            }
            if (far >= 0) {
                keep[far] = true;
                open.add(new int[] {range[0], far});
                open.add(new int[] {far, range[1]});
            }
        }
        List<double[]> points = new ArrayList<>();
        for (int i = 0; i < n; i++) {
            if (keep[i]) {
                points.add(new double[] {x[i], y[i]});
            }
        }
        return of(points);
    }

    private double distance(int i, int a, int b) {
        double dx = x[b] - x[a];
        double dy = y[b] - y[a];
        double square = dx * dx + dy * dy;
        double t = square == 0 ? 0 : ((x[i] - x[a]) * dx + (y[i] - y[a]) * dy) / square;
        t = Math.min(Math.max(t, 0), 1);
        return Math.hypot(x[i] - x[a] - t * dx, y[i] - y[a] - t * dy);
    }
}
