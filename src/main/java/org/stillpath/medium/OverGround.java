package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;

/** A field above the ground: the same field, whose region also ends at the ground ({@link GroundLevel}). */
public final class OverGround implements IndexField {
    private final IndexField field;
    private final List<Level> limits;

    /**
     * A field above the ground of a chart.
     *
     * @param sunk metres below the ground at which rays end, as for {@link GroundLevel}
     */
    public OverGround(IndexField field, EarthChart chart, double sunk) {
        this.field = field;
        List<Level> all = new ArrayList<>();
        all.add(new GroundLevel(chart, sunk));
        all.addAll(field.limits());
        this.limits = List.copyOf(all);
    }

    @Override
    public void sample(double[] x, double[] y, double[] z, int count, Order order, Samples out) {
        field.sample(x, y, z, count, order, out);
    }

    @Override
    public boolean uniform() {
        return field.uniform();
    }

    @Override
    public boolean ofHeightAlone() {
        return field.ofHeightAlone();
    }

    @Override
    public List<Level> limits() {
        return limits;
    }

    @Override
    public List<Seam> seams() {
        return field.seams();
    }

    @Override
    public IndexField piece(int[] cells) {
        return field.piece(cells);
    }

    @Override
    public String explain(double x, double y, double z) {
        return field.explain(x, y, z);
    }
}
