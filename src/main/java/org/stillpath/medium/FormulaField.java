package org.stillpath.medium;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.concurrent.ConcurrentHashMap;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Coordinate;
import org.stillpath.formula.Formula;
import org.stillpath.formula.IndexBlocks;
import org.stillpath.formula.Kink;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;

/**
 * A quantity given by a formula. The values of its {@code with} names are run-time arguments: the same formula
 * serves any number of them.
 */
public final class FormulaField implements ScalarField {
    private final Formula formula;
    private final double[] arguments;
    private final Chart chart;
    /** Pieces between kinks and knots of the ground, by the cells, made when a ray first comes there. */
    private final Map<List<Integer>, FormulaField> pieces = new ConcurrentHashMap<>();

    private FormulaField(Formula formula, double[] arguments, Chart chart) {
        this.chart = chart;
        this.formula = formula;
        this.arguments = arguments;
    }

    /**
     * A formula with the values of its names.
     *
     * @param formula in its own frame's coordinates
     * @param values by name, in SI; every name that the formula uses must be there
     */
    public static FormulaField of(Formula formula, Map<String, Double> values) {
        return new FormulaField(formula, arguments(formula, values), Chart.FLAT);
    }

    @Override
    public void sample(double[] x, double[] y, double[] z, int count, double wavelength, Order order, Samples out) {
        formula.sample(x, y, z, count, arguments, wavelength, chart, order, out);
    }

    @Override
    public Optional<ManyPoints> manyPoints(boolean fromOne) {
        return IndexBlocks.of(formula, fromOne)
                .map(blocks -> (x, y, z, count, wavelength, order, out) ->
                        blocks.sample(x, y, z, count, arguments, wavelength, chart, order, out));
    }

    @Override
    public ScalarField on(Chart other) {
        return formula.coordinates().stream().anyMatch(Coordinate::charted)
                ? new FormulaField(formula, arguments, other)
                : this;
    }

    @Override
    public boolean ofHeightAlone() {
        return formula.coordinates().stream().allMatch(c -> c == Coordinate.HEIGHT);
    }

    /** The knots of the ground, where the clearance over it bends. */
    private Optional<Seam> groundSeam() {
        return formula.uses(Coordinate.CLEARANCE) && chart instanceof GroundChart g ? g.groundSeam() : Optional.empty();
    }

    @Override
    public boolean isConstant() {
        return Arrays.stream(Coordinate.values()).noneMatch(c -> c != Coordinate.WAVELENGTH && formula.uses(c));
    }

    @Override
    public boolean needsWavelength() {
        return formula.uses(Coordinate.WAVELENGTH);
    }

    @Override
    public List<Seam> seams(double wavelength) {
        List<Seam> list = new ArrayList<>();
        for (Kink k : formula.kinks()) {
            Formula difference = k.difference();
            double[] chosen = difference.arguments().stream()
                    .mapToDouble(name -> arguments[formula.arguments().indexOf(name)])
                    .toArray();
            list.add(new Seam(
                    new FormulaLevel(difference, chosen, wavelength, "a kink of the formula", chart),
                    new double[] {0}));
        }
        groundSeam().ifPresent(list::add);
        return List.copyOf(list);
    }

    /** The kinks' cells come first, that of the ground last. */
    @Override
    public ScalarField piece(int[] cells) {
        if (cells.length == 0) {
            return this;
        }
        return pieces.computeIfAbsent(Arrays.stream(cells).boxed().toList(), key -> {
            Chart over = chart;
            int kinks = cells.length;
            if (groundSeam().isPresent() && chart instanceof GroundChart g) {
                kinks--;
                over = g.piece(cells[kinks]);
            }
            boolean[] positive = new boolean[kinks];
            for (int i = 0; i < kinks; i++) {
                positive[i] = cells[i] > 0;
            }
            return new FormulaField(kinks == 0 ? formula : formula.piece(positive), arguments, over);
        });
    }

    @Override
    public String explain(double x, double y, double z, double wavelength) {
        return formula.explain(x, y, z, arguments, wavelength, chart);
    }

    /** The values of a formula's names in its own order. */
    static double[] arguments(Formula formula, Map<String, Double> values) {
        return formula.arguments().stream()
                .mapToDouble(name -> {
                    Double value = values.get(name);
                    if (value == null) {
                        throw new IllegalArgumentException("values must hold " + name + ": " + values.keySet());
                    }
                    return value;
                })
                .toArray();
    }
}
