package org.stillpath.plot;

/** A rectangle in points, y downward. */
record Box(double left, double top, double right, double bottom) {
    double width() {
        return right - left;
    }

    double height() {
        return bottom - top;
    }

    boolean meets(Box o, double gap) {
        return left < o.right + gap && o.left < right + gap && top < o.bottom + gap && o.top < bottom + gap;
    }

    boolean holds(Box o) {
        return o.left >= left && o.right <= right && o.top >= top && o.bottom <= bottom;
    }

    boolean holds(double x, double y) {
        return x >= left && x <= right && y >= top && y <= bottom;
    }

    Box grown(double by) {
        return new Box(left - by, top - by, right + by, bottom + by);
    }

    /** The part of the segment inside, as its ends in parts of its length; {@code from > to} where nothing is inside. */
    Part part(double x0, double y0, double x1, double y1) {
        double from = 0;
        double to = 1;
        double dx = x1 - x0;
        double dy = y1 - y0;
        // Liang & Barsky (1984), "A new concept and method for line clipping"
        double[] p = {-dx, dx, -dy, dy};
        double[] q = {x0 - left, right - x0, y0 - top, bottom - y0};
        for (int i = 0; i < 4; i++) {
            if (p[i] == 0) {
                if (q[i] < 0) {
                    return Part.NONE;
                }
            } else if (p[i] < 0) {
                from = Math.max(from, q[i] / p[i]);
            } else {
                to = Math.min(to, q[i] / p[i]);
            }
        }
        return from > to ? Part.NONE : new Part(from, to);
    }

    /** Part of a segment, 0 at its start and 1 at its end. */
    record Part(double from, double to) {
        static final Part NONE = new Part(1, 0);

        boolean isEmpty() {
            return from > to;
        }
    }
}
