package org.stillpath.medium;

import java.util.List;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;

/** The pressure of the air: given as a quantity, or following from the temperature. */
sealed interface Pressure permits Pressure.Given, Hydrostatic, Us1976.Layered {
    /**
     * Samples the pressure. One that follows from the temperature stands on {@link Chart#FLAT}: z is the height.
     *
     * @param t samples of the temperature at the same points, to the same order
     * @param w samples of the humidity's quantity, likewise
     */
    void sample(double[] x, double[] y, double[] z, int count, Samples t, Samples w, Order order, Samples out);

    /** The same on a chart; only seams, limits and words of one that follows from the temperature know of it. */
    Pressure on(Chart chart);

    /**
     * The pressure of the same air with its tables joined by another interpolant.
     *
     * @param temperature so joined
     * @param humidity so joined
     */
    Pressure joinedOtherwise(ScalarField temperature, Humidity humidity);

    /** Whether it depends on the height alone. */
    boolean ofHeightAlone();

    /** Seams of its own, besides those of the temperature. */
    default List<Seam> seams() {
        return List.of();
    }

    /** Margins of its own range. */
    default List<Level> limits() {
        return List.of();
    }

    /**
     * The piece that holds where the temperature and the humidity are the given pieces.
     *
     * @param cells of its own {@link #seams}
     * @param low height where the piece of the temperature begins, metres, −∞ where it has no lower end
     * @param high height where it ends
     */
    Pressure piece(int[] cells, ScalarField temperature, ScalarField humidity, double low, double high);

    /** Why it is undefined at a point; empty text where it is defined. */
    String explain(double x, double y, double z);

    /**
     * A pressure given as a quantity.
     *
     * @param quantity in pascal
     */
    record Given(ScalarField quantity) implements Pressure {
        @Override
        public void sample(
                double[] x, double[] y, double[] z, int count, Samples t, Samples w, Order order, Samples out) {
            quantity.sample(x, y, z, count, Double.NaN, order, out);
        }

        @Override
        public Pressure on(Chart chart) {
            return new Given(quantity.on(chart));
        }

        @Override
        public Pressure joinedOtherwise(ScalarField temperature, Humidity humidity) {
            return quantity.joinedOtherwise().<Pressure>map(Given::new).orElse(this);
        }

        @Override
        public boolean ofHeightAlone() {
            return quantity.ofHeightAlone();
        }

        @Override
        public List<Seam> seams() {
            return quantity.seams(Double.NaN);
        }

        @Override
        public List<Level> limits() {
            return quantity.limits();
        }

        @Override
        public Pressure piece(int[] cells, ScalarField temperature, ScalarField humidity, double low, double high) {
            return new Given(quantity.piece(cells));
        }

        @Override
        public String explain(double x, double y, double z) {
            return quantity.explain(x, y, z, Double.NaN);
        }
    }
}
