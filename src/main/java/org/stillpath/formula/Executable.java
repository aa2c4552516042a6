package org.stillpath.formula;

import java.util.Arrays;
import java.util.Optional;
import java.util.concurrent.atomic.AtomicLong;
import java.util.function.Supplier;
import org.jspecify.annotations.Nullable;

/**
 * One order of a formula, ready to run: made when it is first asked for, walked by the {@link Evaluator} at first and
 * translated by the {@link Compiler} once the walking has cost about what a translation costs. So a short job does not
 * pay for the compiler, and a long one pays at most about twice the least that was possible, whichever length it turns
 * out to have.
 *
 * <p>Safe for any number of threads: the one that reaches the threshold compiles, the others walk on meanwhile.
 */
final class Executable {
    /**
     * Work by the evaluator, in its steps of one operation at one point, after which a program is compiled. Measured on
     * JDK 17 from a cold start, in CPU time of the calling thread: a step takes 13 ns, setting an operation up for a call
     * ten times that, and the first compilation of a process 60 ms, hence this many; later compilations take 1 ms. For a
     * formula of 40 operations it is reached after 10,000 single points or 1,400 blocks of 64.
     */
    static final long COMPILE_AFTER = 4_500_000;

    /** Steps that setting an operation up for a call is worth. */
    private static final int CALL_STEPS = 10;

    private static final Coordinate[] NO_COORDINATES = {};
    private static final Samples[] NO_CHARTS = {};
    private static final double[] NO_CELLS = {};

    private final Order order;
    private final Supplier<Program> maker;
    private final AtomicLong walked = new AtomicLong();
    private final PerThread<Scratch> scratch = PerThread.of(Scratch::new);
    private volatile @Nullable Plan plan;

    Executable(Order order, Supplier<Program> maker) {
        this.order = order;
        this.maker = maker;
    }

    /**
     * What is run.
     *
     * @param program the operations
     * @param charted the charted coordinates that they use
     * @param kernel their translation, once there is one
     * @param cells how many numbers that needs room for
     * @param bare whether the kernel needs neither charts nor cells
     */
    private record Plan(
            Program program, Coordinate[] charted, @Nullable Kernel kernel, int cells, boolean bare) {}

    /** What a thread needs besides the caller's arrays. Mutable, one a thread. */
    private static final class Scratch {
        private Samples[] charts = NO_CHARTS;
        private double[] cells = NO_CELLS;

        /** Room for the charted coordinates at so many points. */
        Samples[] charts(Coordinate[] charted, int count) {
            if (charts.length == 0) {
                charts = new Samples[Coordinate.CHARTED.size()];
                Arrays.fill(charts, new Samples(0)); // until it is asked for
            }
            for (Coordinate c : charted) {
                if (charts[c.slot()].capacity() < count) {
                    charts[c.slot()] = new Samples(count);
                }
            }
            return charts;
        }

        double[] cells(int size) {
            if (cells.length < size) {
                cells = new double[size];
            }
            return cells;
        }
    }

    /** The operations. */
    Program program() {
        return plan().program();
    }

    private Plan plan() {
        Plan known = plan;
        if (known == null) {
            synchronized (this) {
                known = plan;
                if (known == null) {
                    Program program = maker.get();
                    known = new Plan(program, program.charts().toArray(NO_COORDINATES), null, 0, false);
                    plan = known;
                }
            }
        }
        return known;
    }

    /** Compiles now, unless the program is too long; returns whether it is compiled. Does nothing the second time. */
    boolean compile() {
        synchronized (this) {
            Plan known = plan();
            if (known.kernel() == null) {
                Optional<Compiler.Compiled> made = Compiler.compile(known.program());
                if (made.isEmpty()) {
                    return false;
                }
                int cells = made.get().scratch();
                boolean bare = cells == 0 && known.charted().length == 0;
                plan = new Plan(known.program(), known.charted(), made.get().kernel(), cells, bare);
            }
            return true;
        }
    }

    /** The compiled program, if it has been compiled. */
    Optional<Kernel> kernel() {
        Plan known = plan;
        return known == null ? Optional.empty() : Optional.ofNullable(known.kernel());
    }

    /**
     * Samples checked arrays of points. Allocates nothing once it is compiled and has seen as many points at once before
     * on the same thread, if the chart allocates nothing.
     */
    void run(
            double[] x,
            double[] y,
            double[] z,
            int count,
            double[] arguments,
            double wavelength,
            Chart chart,
            Samples out) {
        Plan now = plan();
        Kernel kernel = now.kernel();
        if (kernel != null && now.bare()) {
            run(kernel, x, y, z, count, arguments, wavelength, NO_CHARTS, out, NO_CELLS);
            return;
        }
        Samples[] charts = NO_CHARTS;
        if (now.charted().length > 0) {
            charts = scratch.get().charts(now.charted(), count);
            for (Coordinate c : now.charted()) {
                chart.sample(c, x, y, z, count, order, charts[c.slot()]);
            }
        }
        if (kernel != null) {
            double[] cells = scratch.get().cells(now.cells());
            run(kernel, x, y, z, count, arguments, wavelength, charts, out, cells);
        } else {
            walk(now.program(), x, y, z, count, arguments, wavelength, charts, out);
        }
    }

    private static void run(
            Kernel kernel,
            double[] x,
            double[] y,
            double[] z,
            int count,
            double[] arguments,
            double wavelength,
            Samples[] charts,
            Samples out,
            double[] cells) {
        if (count == 1) {
            kernel.one(x, y, z, 0, arguments, wavelength, charts, out, cells);
        } else {
            kernel.run(x, y, z, count, arguments, wavelength, charts, out, cells);
        }
    }

    private void walk(
            Program program,
            double[] x,
            double[] y,
            double[] z,
            int count,
            double[] arguments,
            double wavelength,
            Samples[] charts,
            Samples out) {
        Evaluator.run(program, x, y, z, count, arguments, wavelength, charts, order, out);
        long work = (long) (count + CALL_STEPS) * program.size();
        long before = walked.getAndAdd(work);
        if (before < COMPILE_AFTER && before + work >= COMPILE_AFTER) {
            compile();
        }
    }
}
