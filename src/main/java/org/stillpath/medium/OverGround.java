package org.stillpath.medium;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;

/** A field above the ground: the same field, whose region also ends at the ground ({@link GroundLevel}). */
public final class OverGround implements IndexField {
    private final IndexField field;
    private final List<Level> limits;
    /** The field's seams, and the knots of the ground, so that no hill between two of them is stepped over. */
    private final List<Seam> seams;

    private final boolean knotted;

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
        List<Seam> also = new ArrayList<>(field.seams());
        Optional<Seam> ground = chart.groundSeam();
        this.knotted = ground.isPresent() && !also.contains(ground.get());
        if (knotted) {
            also.add(ground.get());
        }
        this.seams = List.copyOf(also);
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
        return seams;
    }

    @Override
    public IndexField piece(int[] cells) {
        return field.piece(knotted ? Arrays.copyOf(cells, cells.length - 1) : cells);
    }

    @Override
    public String explain(double x, double y, double z) {
        return field.explain(x, y, z);
    }
}
