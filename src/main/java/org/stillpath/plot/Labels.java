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

    private record Line(Polyline points, double price) {}

    /**
     * A place for a label.
     *
     * @param box the room taken
     * @param price how much worse than the best place, in points of crossed line
     */
    record Place(Box box, double price) {}

    /** Nothing may be put here. */
    void block(Box box) {
        taken.add(box);
    }

    /** A label may cross this line at {@code price} for each point of its length. */
    void line(Polyline points, double price) {
        lines.add(new Line(points, price));
    }

    /** Takes the best of the places; empty where none is free. */
    Optional<Box> place(List<Place> places) {
        Place best = null;
        double least = Double.POSITIVE_INFINITY;
        for (Place p : places) {
            if (p.price() < least && isFree(p.box())) {
                double price = p.price() + crossed(p.box());
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
        return Optional.of(best.box());
    }

    private boolean isFree(Box box) {
        return frame.holds(box) && taken.stream().noneMatch(t -> t.meets(box, GAP));
    }

    private double crossed(Box box) {
        double price = 0;
        Box near = box.grown(0.8);
        for (Line line : lines) {
            double[] x = line.points().x();
            double[] y = line.points().y();
            double sum = 0;
            for (int i = 1; i < x.length; i++) {
                if (Math.max(x[i], x[i - 1]) < near.left()
                        || Math.min(x[i], x[i - 1]) > near.right()
                        || Math.max(y[i], y[i - 1]) < near.top()
                        || Math.min(y[i], y[i - 1]) > near.bottom()) {
                    continue;
                }
                Box.Part part = near.part(x[i - 1], y[i - 1], x[i], y[i]);
                if (!part.isEmpty()) {
                    sum += (part.to() - part.from()) * Math.hypot(x[i] - x[i - 1], y[i] - y[i - 1]);
                }
            }
            price += sum * line.price();
        }
        return price;
    }
}
