package org.stillpath.medium;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.concurrent.ConcurrentHashMap;
import org.stillpath.formula.Coordinate;
import org.stillpath.formula.Formula;
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
    /** Pieces between kinks, by the sides of the kinks as bits, made when a ray first comes there. */
    private final Map<Long, FormulaField> pieces = new ConcurrentHashMap<>();

    private FormulaField(Formula formula, double[] arguments) {
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
        return new FormulaField(formula, arguments(formula, values));
    }

    @Override
    public void sample(double[] x, double[] y, double[] z, int count, double wavelength, Order order, Samples out) {
        formula.sample(x, y, z, count, arguments, wavelength, order, out);
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
                    new FormulaLevel(difference, chosen, wavelength, "a kink of the formula"), new double[] {0}));
        }
        return List.copyOf(list);
    }

    /** More kinks than a mask has bits are not taken apart; nor is a formula without any. */
    @Override
    public ScalarField piece(int[] cells) {
        if (cells.length == 0 || cells.length > Long.SIZE - 1) {
            return this;
        }
        long sides = 0;
        for (int i = 0; i < cells.length; i++) {
            sides |= (long) cells[i] << i;
        }
        return pieces.computeIfAbsent(sides, key -> {
            boolean[] positive = new boolean[cells.length];
            for (int i = 0; i < cells.length; i++) {
                positive[i] = cells[i] > 0;
            }
            return new FormulaField(formula.piece(positive), arguments);
        });
    }

    @Override
    public String explain(double x, double y, double z, double wavelength) {
        return formula.explain(x, y, z, arguments, wavelength);
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
