package org.stillpath.formula;

import java.util.ArrayList;
import java.util.EnumMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;

/**
 * A formula for a refractive index n, or for n − 1, made ready for what the ray equation needs at many points at once: n² − 1,
 * ½∇n², ½∇∇n². The square is formed in the formula itself, so that an index that is a root of something simple costs no root, and
 * the whole is a few short vector loops ({@link BlockCompiler}). What a point gives does not depend on the points beside it; it
 * may differ in the last digit from the same by {@link Formula#sample}.
 *
 * <p>Safe for any number of threads.
 */
public final class IndexBlocks {
    /** Makes an undefined index (below 0) a number below −1 where the square alone would not show it. */
    private static final double PENALTY = 1e300;

    private static final Samples[] NO_CHARTS = {};

    private final Map<Order, Block> blocks = new EnumMap<>(Order.class);
    private final PerThread<Scratch> scratch = PerThread.of(Scratch::new);

    private record Block(Coordinate[] charted, BlockCompiler.Compiled code) {}

    /** What a thread needs besides the caller's arrays. Mutable, one a thread. */
    private static final class Scratch {
        private Samples[] charts = NO_CHARTS;
        private double[][] rows = {};
        private double[] cells = {};

        void fit(Block block, int count) {
            int rowCount = block.code().rows();
            if (rows.length < rowCount || (rowCount > 0 && rows[0].length < count)) {
                rows = new double[Math.max(rows.length, rowCount)][count];
            }
            if (cells.length < block.code().cells()) {
                cells = new double[block.code().cells()];
            }
            if (block.charted().length > 0 && (charts.length == 0 || charts[0].capacity() < count)) {
                charts = new Samples[Coordinate.CHARTED.size()];
                for (int i = 0; i < charts.length; i++) {
                    charts[i] = new Samples(count);
                }
            }
        }
    }

    private IndexBlocks() {}

    /**
     * Makes a formula ready.
     *
     * @param formula gives n, or n − 1
     * @param fromOne whether it gives n − 1
     * @return none if the formula is too long
     */
    public static Optional<IndexBlocks> of(Formula formula, boolean fromOne) {
        IndexBlocks made = new IndexBlocks();
        for (Order order : new Order[] {Order.GRADIENT, Order.HESSIAN}) {
            Program program = program(formula, fromOne, order);
            Optional<BlockCompiler.Compiled> code = BlockCompiler.compile(program);
            if (code.isEmpty()) {
                return Optional.empty();
            }
            made.blocks.put(order, new Block(program.charts().toArray(new Coordinate[0]), code.get()));
        }
        return Optional.of(made);
    }

    /**
     * Samples n² − 1 and half the derivatives of n².
     *
     * @param x points in the formula's own frame, metres, at least {@code count} of them; likewise {@code y}, {@code z}
     * @param argumentValues of the formula's names, in SI
     * @param wavelength vacuum wavelength, metres
     * @param chart gives the charted coordinates
     * @param order gradient or Hessian
     * @param out receives them; the value is NaN where the index is undefined
     */
    public void sample(
            double[] x,
            double[] y,
            double[] z,
            int count,
            double[] argumentValues,
            double wavelength,
            Chart chart,
            Order order,
            Samples out) {
        Block block = blocks.get(order);
        if (block == null) {
            throw new IllegalArgumentException("order must be gradient or Hessian: " + order);
        }
        Scratch s = scratch.get();
        s.fit(block, count);
        for (Coordinate c : block.charted()) {
            chart.sample(c, x, y, z, count, order, s.charts[c.slot()]);
        }
        block.code().kernel().run(x, y, z, count, argumentValues, wavelength, s.charts, out, s.rows, s.cells);
        double[] value = out.value;
        for (int i = 0; i < count; i++) {
            if (!(value[i] > -1 && value[i] < Double.POSITIVE_INFINITY)) {
                value[i] = Double.NaN;
            }
        }
    }

    private static Program program(Formula formula, boolean fromOne, Order order) {
        Graph g = new Graph();
        int f = formula.build(g);
        Optional<Integer> square = fromOne ? Optional.empty() : g.squareOfRoot(f);
        return Program.from(g, square.isPresent() ? ofSquare(g, square.get(), order) : ofIndex(g, f, fromOne, order));
    }

    /** From n² itself. */
    private static List<Integer> ofSquare(Graph g, int square, Order order) {
        Derivatives.Cartesian d = new Derivatives(g, square).cartesian(square, order == Order.HESSIAN);
        int half = g.constant(0.5);
        List<Integer> outputs = new ArrayList<>(List.of(g.add(square, g.minusOne)));
        d.gradient().forEach(node -> outputs.add(g.multiply(half, node)));
        d.hessian().forEach(node -> outputs.add(g.multiply(half, node)));
        return outputs;
    }

    /** From n, with N = n − 1: N(2 + N), n∇n, n∇∇n + ∇n∇nᵀ. */
    private static List<Integer> ofIndex(Graph g, int f, boolean fromOne, Order order) {
        Derivatives.Cartesian d = new Derivatives(g, f).cartesian(f, order == Order.HESSIAN);
        int n = fromOne ? g.add(g.one, f) : f;
        int excess = fromOne ? f : g.lessOne(f);
        int value = g.times(excess, g.add(g.constant(2), excess));
        int below = g.call(Op.MIN, n, g.zero);
        List<Integer> outputs = new ArrayList<>(List.of(g.add(value, g.multiply(g.constant(PENALTY), below))));
        d.gradient().forEach(node -> outputs.add(g.times(n, node)));
        for (int a = 0, k = 0; a < 3 && !d.hessian().isEmpty(); a++) {
            for (int b = a; b < 3; b++, k++) {
                int bend = g.times(n, d.hessian().get(k));
                outputs.add(
                        g.add(bend, g.times(d.gradient().get(a), d.gradient().get(b))));
            }
        }
        return outputs;
    }
}
