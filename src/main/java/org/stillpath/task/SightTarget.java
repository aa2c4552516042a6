package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.task.PanelFigure.Tone;

/** A thing drawn in the figure {@code view}, as polygons upright on an earth radius: x across, y above its foot, metres. */
final class SightTarget {
    /** What it may be. */
    enum Kind {
        /** A graduated staff: black below its middle, orange above, ten fields. */
        STAFF,
        /** A hull with a mast, its flag at the top and the blue band at the water. */
        HULL,
        /** A hillside with a wood at its foot and a tower on its summit. */
        HILLSIDE;

        String word() {
            return name().toLowerCase(java.util.Locale.ROOT);
        }
    }

    /** From this height above its foot on a target is a hill, metres. */
    private static final double HILL = 100;
    /** From this distance on a target on level ground is a ship, metres. */
    private static final double SEA = 3000;

    private final Kind kind;
    private final double height;
    private final List<Part> parts = new ArrayList<>();

    /** One polygon. */
    record Part(Tone tone, double[] x, double[] y) {}

    SightTarget(Kind kind, double height) {
        this.kind = kind;
        this.height = height;
        switch (kind) {
            case STAFF -> staff();
            case HULL -> hull();
            case HILLSIDE -> hillside();
        }
    }

    /** What stands at a target: a hill from 100 m on, else a ship from 3 km on where the ground is level, else a staff. */
    static Kind usual(double height, double distance, boolean level) {
        return height >= HILL ? Kind.HILLSIDE : distance >= SEA && level ? Kind.HULL : Kind.STAFF;
    }

    Kind kind() {
        return kind;
    }

    double height() {
        return height;
    }

    List<Part> parts() {
        return List.copyOf(parts);
    }

    /** Half of its width, metres. */
    double half() {
        double most = 0;
        for (Part p : parts) {
            for (double x : p.x) {
                most = Math.max(most, Math.abs(x));
            }
        }
        return most;
    }

    /** A polygon given by x and y in parts of the height. */
    private void add(Tone tone, double... xy) {
        double[] x = new double[xy.length / 2];
        double[] y = new double[x.length];
        for (int i = 0; i < x.length; i++) {
            x[i] = xy[2 * i] * height;
            y[i] = xy[2 * i + 1] * height;
        }
        parts.add(new Part(tone, x, y));
    }

    private void rectangle(Tone tone, double left, double right, double low, double high) {
        add(tone, left, low, right, low, right, high, left, high);
    }

    private void staff() {
        rectangle(Tone.MIDDLE, -0.105, 0.105, 0, 1);
        rectangle(Tone.WHITE, -0.095, 0.095, 0, 0.99);
        for (int i = 0; i < 10; i++) {
            Tone tone = i < 5 ? Tone.DARK : Tone.SIGNAL;
            boolean left = i % 2 == 0;
            rectangle(tone, left ? -0.095 : 0, left ? 0 : 0.095, 0.1 * i, Math.min(0.99, 0.1 * i + 0.1));
        }
        rectangle(Tone.SECOND, -0.16, 0.16, 0, 0.03);
    }

    private void hull() {
        add(Tone.DARK, -0.72, 0, 0.76, 0, 0.95, 0.24, -0.8, 0.24);
        rectangle(Tone.SECOND, -0.72, 0.76, 0, 0.06);
        rectangle(Tone.MIDDLE, -0.62, -0.12, 0.24, 0.44);
        rectangle(Tone.WHITE, -0.6, -0.14, 0.33, 0.38);
        rectangle(Tone.DARK, -0.46, -0.3, 0.44, 0.6);
        rectangle(Tone.SIGNAL, -0.46, -0.3, 0.5, 0.56);
        rectangle(Tone.DARK, 0.28, 0.32, 0.24, 1);
        rectangle(Tone.DARK, 0.1, 0.5, 0.72, 0.75);
        add(Tone.SIGNAL, 0.32, 0.84, 0.62, 0.91, 0.32, 0.98);
    }

    private void hillside() {
        add(
                Tone.MIDDLE,
                -1.3,
                0,
                1.3,
                0,
                0.95,
                0.3,
                0.6,
                0.52,
                0.38,
                0.72,
                0.06,
                0.93,
                -0.04,
                0.94,
                -0.3,
                0.7,
                -0.52,
                0.6,
                -0.85,
                0.28);
        add(Tone.GROUND, 0.06, 0.93, -0.04, 0.94, -0.2, 0.79, -0.08, 0.82, 0.02, 0.76, 0.12, 0.84, 0.22, 0.82);
        add(Tone.DARK, -1.3, 0, 1.3, 0, 1.12, 0.155, 0.7, 0.13, 0.3, 0.2, -0.2, 0.14, -0.6, 0.19, -1.03, 0.17);
        rectangle(Tone.DARK, -0.01, 0.03, 0.92, 1);
        rectangle(Tone.SIGNAL, -0.025, 0.045, 0.965, 1);
    }

    /** The part of a polygon between two heights above its foot, with its points at the given heights between them. */
    static double[][] slice(Part part, double low, double high) {
        double[][] p = {part.x, part.y};
        for (int side = 0; side < 2; side++) {
            double sign = side == 0 ? 1 : -1;
            double edge = side == 0 ? low : -high;
            List<double[]> out = new ArrayList<>();
            int n = p[0].length;
            for (int i = 0; i < n; i++) {
                int j = (i + 1) % n;
                double a = sign * p[1][i] - edge;
                double b = sign * p[1][j] - edge;
                if (a >= 0) {
                    out.add(new double[] {p[0][i], p[1][i]});
                }
                if (a >= 0 != b >= 0) {
                    double t = a / (a - b);
                    out.add(new double[] {p[0][i] + t * (p[0][j] - p[0][i]), p[1][i] + t * (p[1][j] - p[1][i])});
                }
            }
            p = new double[][] {
                out.stream().mapToDouble(q -> q[0]).toArray(),
                out.stream().mapToDouble(q -> q[1]).toArray()
            };
        }
        return p;
    }
}
