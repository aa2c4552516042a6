package org.stillpath.formula;

import java.util.Arrays;
import java.util.List;

/**
 * Runs a {@link Program} one operation at a time over a block of points, a column of results an operation. Every
 * operation is the JDK's or {@link Special}'s, in the order of the program. Against walking
 * the operations point by point this costs a scratch array a call and gains the vector units for the simple operations. It
 * is what {@link Compiler} is tested against, and serves until a formula is compiled, and for the longest.
 */
final class Evaluator {
    /** Points a block: columns of this length stay in the first-level cache for formulas of usual size. */
    private static final int BLOCK = 64;

    private Evaluator() {}

    static void run(
            Program program,
            double[] x,
            double[] y,
            double[] z,
            int count,
            double[] arguments,
            double wavelength,
            Samples[] charts,
            Order order,
            Samples out) {
        List<Program.Instruction> list = program.instructions();
        int block = Math.min(count, BLOCK);
        double[][] columns = new double[list.size()][block];
        for (int i = 0; i < program.invariants(); i++) {
            Arrays.fill(columns[i], invariant(list.get(i), columns, arguments, wavelength));
        }
        double[][] targets = targets(out, order);
        for (int from = 0; from < count; from += block) {
            int n = Math.min(block, count - from);
            for (int i = program.invariants(); i < list.size(); i++) {
                Program.Instruction in = list.get(i);
                switch (in.op()) {
                    case X -> System.arraycopy(x, from, columns[i], 0, n);
                    case Y -> System.arraycopy(y, from, columns[i], 0, n);
                    case Z -> System.arraycopy(z, from, columns[i], 0, n);
                    case CHART ->
                        System.arraycopy(component(charts[in.index() / 10], in.index() % 10), from, columns[i], 0, n);
                    default -> column(in, columns, columns[i], n);
                }
            }
            for (int k = 0; k < targets.length; k++) {
                System.arraycopy(columns[program.outputs().get(k)], 0, targets[k], from, n);
            }
            for (int i = from; i < from + n; i++) {
                out.value[i] = finiteOrNaN(out.value[i]);
            }
        }
    }

    /** An overflow is as undefined as a domain fault. */
    static double finiteOrNaN(double v) {
        return v + 0 * v;
    }

    static double[][] targets(Samples s, Order order) {
        return switch (order) {
            case VALUE -> new double[][] {s.value};
            case GRADIENT -> new double[][] {s.value, s.gx, s.gy, s.gz};
            case HESSIAN -> new double[][] {s.value, s.gx, s.gy, s.gz, s.hxx, s.hxy, s.hxz, s.hyy, s.hyz, s.hzz};
        };
    }

    static double[] component(Samples s, int component) {
        return switch (component) {
            case 0 -> s.value;
            case 1 -> s.gx;
            case 2 -> s.gy;
            case 3 -> s.gz;
            case 4 -> s.hxx;
            case 5 -> s.hxy;
            case 6 -> s.hxz;
            case 7 -> s.hyy;
            case 8 -> s.hyz;
            default -> s.hzz;
        };
    }

    private static double invariant(Program.Instruction in, double[][] columns, double[] arguments, double wavelength) {
        return switch (in.op()) {
            case CONSTANT -> in.value();
            case ARGUMENT -> arguments[in.index()];
            case WAVELENGTH -> wavelength;
            default -> in.op().apply(columns[in.a()][0], columns[in.b()][0], columns[in.c()][0], columns[in.d()][0]);
        };
    }

    private static void column(Program.Instruction in, double[][] columns, double[] to, int n) {
        double[] a = columns[in.a()];
        double[] b = columns[in.b()];
        switch (in.op()) {
            case ADD -> {
                for (int i = 0; i < n; i++) {
                    to[i] = a[i] + b[i];
                }
            }
            case SUBTRACT -> {
                for (int i = 0; i < n; i++) {
                    to[i] = a[i] - b[i];
                }
            }
            case MULTIPLY -> {
                for (int i = 0; i < n; i++) {
                    to[i] = a[i] * b[i];
                }
            }
            case RECIPROCAL -> {
                for (int i = 0; i < n; i++) {
                    to[i] = 1 / a[i];
                }
            }
            case SQRT -> {
                for (int i = 0; i < n; i++) {
                    to[i] = Math.sqrt(a[i]);
                }
            }
            default -> {
                double[] c = columns[in.c()];
                double[] d = columns[in.d()];
                for (int i = 0; i < n; i++) {
                    to[i] = in.op().apply(a[i], b[i], c[i], d[i]);
                }
            }
        }
    }
}
