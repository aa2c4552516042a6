package org.stillpath.plot;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;

/**
 * Finds places for labels beside the things that they name: of the places proposed for a label, the cheapest that is
 * inside the frame and clear of every label and thing already there. Lines may be crossed, at a price. Greedy, in the order asked:
 * an exact solution would be of exponential cost, and figures have tens of labels.
 */
final class Labels {
    /** Room kept between two labels, points. */
    static final double GAP = 1.5;

    private final Box frame;
    private final List<Box> taken = new ArrayList<>();
    private final List<Line> lines = new ArrayList<>();

    Labels(Box frame) {
        this.frame = frame;
    }

    private record Line(Polyline points, double price, Object owner) {}

    /**
     * A place for a label.
     *
     * @param box the room taken
     * @param price how much worse than the best place, in points of crossed line
     * @param x the point that the label names; {@code y} likewise
     */
    record Place(Box box, double price, double x, double y) {
        /** Where the box is next to the point, and the point: the tie between the two. */
        Polyline tie() {
            double nx = Math.min(Math.max(x, box.left()), box.right());
            double ny = Math.min(Math.max(y, box.top()), box.bottom());
            return new Polyline(new double[] {x, nx}, new double[] {y, ny});
        }

        /** Whether the label is so far away that a thin line must tie it to its thing. */
        boolean isTied() {
            return tie().length() > TIED;
        }
    }

    /** Room kept to the lines of other things, so that it is plain what a label belongs to, points. */
    static final double DISTANCE = 4;

    /** How near another thing's line makes a point crowded, points. */
    private static final double CROWD = 6;

    /** Price of contours, the faintest lines. */
    static final double FAINT = 0.25;

    /** From this distance on a label is tied to its thing by a thin line, points. */
    private static final double TIED = 8;

    /** What a label pays for each point by which it crosses the tie of another. */
    private static final double TIE_PRICE = 5;

    /** Nothing may be put here. */
    void block(Box box) {
        taken.add(box);
    }

    /** A label may cross this line at {@code price} for each point of its length; it may come close to that of its own thing. */
    void line(Polyline points, double price, Object owner) {
        lines.add(new Line(points, price, owner));
    }

    /**
     * Takes the best of the places for a label of {@code owner}; empty where none is free.
     *
     * @param distance room that the label had better keep to the lines of other things, points
     */
    Optional<Place> place(List<Place> places, Object owner, double distance) {
        Place best = null;
        double least = Double.POSITIVE_INFINITY;
        for (Place p : places) {
            if (p.price() < least && isFree(p)) {
                double price = p.price() + crossed(p.box(), owner, distance);
                if (price < least) {
                    least = price;
                    best = p;
                }
            }
        }
        if (best == null) {
            return Optional.empty();
        }
        taken.add(best.box());
        if (best.isTied()) {
            lines.add(new Line(best.tie(), TIE_PRICE, best));
        }
        return Optional.of(best);
    }

    private boolean isFree(Place p) {
        if (!frame.holds(p.box()) || taken.stream().anyMatch(t -> t.meets(p.box(), GAP))) {
            return false;
        }
        Polyline tie = p.tie();
        return !p.isTied()
                || taken.stream()
                        .filter(t -> !t.holds(p.x(), p.y()))
                        .allMatch(t -> t.part(tie.x()[0], tie.y()[0], tie.x()[1], tie.y()[1])
                                .isEmpty());
    }

    /** What crossing lines costs: three times for lines under the words, once for other things' lines close by. */
    private double crossed(Box box, Object owner, double distance) {
        double price = 0;
        Box under = box.grown(0.8);
        Box near = box.grown(distance);
        for (Line line : lines) {
            price += line.price() * 3 * inside(under, line.points());
            if (line.owner() != owner) {
                price += line.price() * inside(near, line.points());
            }
        }
        return price;
    }

    /** How crowded a point is by the lines of other things: a label there would not tell which of them it names. */
    double crowd(double x, double y, Object owner) {
        Box near = new Box(x, y, x, y).grown(CROWD);
        return lines.stream()
                .filter(l -> l.owner() != owner)
                .mapToDouble(l -> l.price() * inside(near, l.points()))
                .sum();
    }

    /** Whether a line that is more than a contour runs under the words. */
    boolean isCrossed(Box box) {
        return lines.stream().anyMatch(l -> l.price() > FAINT && inside(box, l.points()) > 0);
    }

    /** Length of the line inside the box. */
    private static double inside(Box box, Polyline points) {
        double[] x = points.x();
        double[] y = points.y();
        double sum = 0;
        for (int i = 1; i < x.length; i++) {
            if (Math.max(x[i], x[i - 1]) < box.left()
                    || Math.min(x[i], x[i - 1]) > box.right()
                    || Math.max(y[i], y[i - 1]) < box.top()
                    || Math.min(y[i], y[i - 1]) > box.bottom()) {
                continue;
            }
            Box.Part part = box.part(x[i - 1], y[i - 1], x[i], y[i]);
            if (!part.isEmpty()) {
                sum += (part.to() - part.from()) * Math.hypot(x[i] - x[i - 1], y[i] - y[i - 1]);
            }
        }
        return sum;
    }
}
