package org.stillpath.formula;

import java.util.LinkedHashMap;
import java.util.Map;
import java.util.Random;
import java.util.concurrent.TimeUnit;
import org.openjdk.jmh.annotations.Benchmark;
import org.openjdk.jmh.annotations.BenchmarkMode;
import org.openjdk.jmh.annotations.Fork;
import org.openjdk.jmh.annotations.Measurement;
import org.openjdk.jmh.annotations.Mode;
import org.openjdk.jmh.annotations.OutputTimeUnit;
import org.openjdk.jmh.annotations.Param;
import org.openjdk.jmh.annotations.Scope;
import org.openjdk.jmh.annotations.Setup;
import org.openjdk.jmh.annotations.State;
import org.openjdk.jmh.annotations.Warmup;
import org.stillpath.unit.Dimension;

/**
 * What a call of a formula costs against Java written by hand for it, with all that does not depend on the place worked
 * out beforehand: compiled, and walked by the evaluator. One point at a time, as the ray engine asks, and sixty-four.
 *
 * <p>Run with {@code mvn -q -B test-compile exec:exec@jmh}. It takes some five minutes. Iterations are many and short, so
 * that the least of {@code rawData} in target/jmh.json is free of what else the machine does; read ratios within one run
 * only.
 */
@State(Scope.Thread)
@BenchmarkMode(Mode.AverageTime)
@OutputTimeUnit(TimeUnit.NANOSECONDS)
@Warmup(iterations = 10, time = 100, timeUnit = TimeUnit.MILLISECONDS)
@Measurement(iterations = 40, time = 20, timeUnit = TimeUnit.MILLISECONDS)
@Fork(3)
public class FormulaBenchmark {
    private static final int POINTS = 1024;
    private static final double N0 = 1.6;
    private static final double G = 300;
    private static final double DN = 1e-3;
    private static final double W = 5e-3;
    private static final double L = 25e-3;

    /** Formulas with the same by hand. */
    public enum Subject {
        /** A rod whose squared index falls as r². */
        ROD("n0*sqrt(1 - (g*r)^2)") {
            @Override
            Hand hand() {
                return new HandRod(N0, G);
            }
        },
        /** A rod with even powers up to the sixth. */
        POWERS("n0*sqrt(1 - (g*r)^2 + 2/3*(g*r)^4 - 17/45*(g*r)^6)") {
            @Override
            Hand hand() {
                return new HandPowers(N0, G);
            }
        },
        /** A heated plate. */
        PLATE("n0 + dn*exp(-2*r^2/w^2)*(1 + 0.3*sin(pi*z/L))") {
            @Override
            Hand hand() {
                return new HandPlate(N0, DN, W, L);
            }
        };

        private final String text;

        Subject(String text) {
            this.text = text;
        }

        abstract Hand hand();
    }

    /** Which formula. */
    @Param
    public Subject subject = Subject.ROD;

    /** Points a call. */
    @Param({"1", "64"})
    public int count = 1;

    /** Derivatives wanted. */
    @Param({"GRADIENT", "HESSIAN"})
    public Order order = Order.GRADIENT;

    private final double[] px = new double[POINTS];
    private final double[] py = new double[POINTS];
    private final double[] pz = new double[POINTS];
    private double[] x = {};
    private double[] y = {};
    private double[] z = {};
    private Samples out = new Samples(0);
    private int at;
    private Formula formula;
    private double[] arguments = {};
    private Hand hand = Subject.ROD.hand();

    /** Seeded points within the media. */
    @Setup
    public void prepare() throws FormulaException {
        Map<String, Dimension> with = new LinkedHashMap<>();
        with.put("n0", Dimension.NONE);
        with.put("dn", Dimension.NONE);
        with.put("g", Dimension.LENGTH.power(-1, 1));
        with.put("w", Dimension.LENGTH);
        with.put("L", Dimension.LENGTH);
        Map<String, Double> values = Map.of("n0", N0, "dn", DN, "g", G, "w", W, "L", L);
        formula = Formula.parse(subject.text, Names.of(Names.PLACE, with));
        arguments = formula.arguments().stream().mapToDouble(values::get).toArray();
        formula.executable(order).compile();
        hand = subject.hand();
        Random random = new Random(20261201);
        for (int i = 0; i < POINTS; i++) {
            px[i] = 1e-3 * (random.nextDouble() - 0.5);
            py[i] = 1e-3 * (random.nextDouble() - 0.5);
            pz[i] = 20e-3 * random.nextDouble();
        }
        x = new double[count];
        y = new double[count];
        z = new double[count];
        out = new Samples(count);
    }

    private void move() {
        at = (at + count) % POINTS;
        if (count == 1) {
            x[0] = px[at];
            y[0] = py[at];
            z[0] = pz[at];
        } else {
            System.arraycopy(px, at, x, 0, count);
            System.arraycopy(py, at, y, 0, count);
            System.arraycopy(pz, at, z, 0, count);
        }
    }

    /** The rule that the others are measured by. */
    @Benchmark
    public double byHand() {
        move();
        hand.sample(x, y, z, count, order, out);
        return out.value[0];
    }

    /** A compiled formula, as the ray engine calls it. */
    @Benchmark
    public double compiled() {
        move();
        formula.sample(x, y, z, count, arguments, 500e-9, order, out);
        return out.value[0];
    }

    /** A formula that is not compiled yet. */
    @Benchmark
    public double walked() {
        move();
        Program program = formula.executable(order).program();
        Evaluator.run(program, x, y, z, count, arguments, 500e-9, new Samples[0], order, out);
        return out.value[0];
    }

    interface Hand {
        void sample(double[] x, double[] y, double[] z, int count, Order order, Samples out);
    }

    private static final class HandRod implements Hand {
        private final double n0;
        private final double gg;

        HandRod(double n0, double g) {
            this.n0 = n0;
            this.gg = g * g;
        }

        @Override
        public void sample(double[] x, double[] y, double[] z, int count, Order order, Samples out) {
            for (int i = 0; i < count; i++) {
                double root = Math.sqrt(1 - gg * (x[i] * x[i] + y[i] * y[i]));
                double over = 1 / root;
                double slope = -n0 * gg * over;
                out.value[i] = n0 * root;
                out.gx[i] = slope * x[i];
                out.gy[i] = slope * y[i];
                out.gz[i] = 0;
                if (order == Order.HESSIAN) {
                    double bend = gg * slope * over * over;
                    out.hxx[i] = slope + bend * x[i] * x[i];
                    out.hxy[i] = bend * x[i] * y[i];
                    out.hyy[i] = slope + bend * y[i] * y[i];
                    out.hxz[i] = 0;
                    out.hyz[i] = 0;
                    out.hzz[i] = 0;
                }
            }
        }
    }

    private static final class HandPowers implements Hand {
        private static final double C4 = 2.0 / 3;
        private static final double C6 = -17.0 / 45;
        private final double n0;
        private final double gg;

        HandPowers(double n0, double g) {
            this.n0 = n0;
            this.gg = g * g;
        }

        @Override
        public void sample(double[] x, double[] y, double[] z, int count, Order order, Samples out) {
            for (int i = 0; i < count; i++) {
                double u = gg * (x[i] * x[i] + y[i] * y[i]);
                double root = Math.sqrt(1 + u * (-1 + u * (C4 + u * C6)));
                double over = 1 / root;
                double first = -1 + u * (2 * C4 + u * 3 * C6);
                double slope = n0 * gg * first * over;
                out.value[i] = n0 * root;
                out.gx[i] = slope * x[i];
                out.gy[i] = slope * y[i];
                out.gz[i] = 0;
                if (order == Order.HESSIAN) {
                    double second = 2 * C4 + u * 6 * C6;
                    double bend = n0 * gg * gg * over * (2 * second - first * first * over * over);
                    out.hxx[i] = slope + bend * x[i] * x[i];
                    out.hxy[i] = bend * x[i] * y[i];
                    out.hyy[i] = slope + bend * y[i] * y[i];
                    out.hxz[i] = 0;
                    out.hyz[i] = 0;
                    out.hzz[i] = 0;
                }
            }
        }
    }

    private static final class HandPlate implements Hand {
        private final double n0;
        private final double dn;
        private final double k;
        private final double q;

        HandPlate(double n0, double dn, double w, double l) {
            this.n0 = n0;
            this.dn = dn;
            this.k = -2 / (w * w);
            this.q = Math.PI / l;
        }

        @Override
        public void sample(double[] x, double[] y, double[] z, int count, Order order, Samples out) {
            for (int i = 0; i < count; i++) {
                double bell = dn * Math.exp(k * (x[i] * x[i] + y[i] * y[i]));
                double sine = 0.3 * Math.sin(q * z[i]);
                double cosine = 0.3 * q * Math.cos(q * z[i]);
                double rise = bell * (1 + sine);
                double slope = 2 * k * rise;
                double along = bell * cosine;
                out.value[i] = n0 + rise;
                out.gx[i] = slope * x[i];
                out.gy[i] = slope * y[i];
                out.gz[i] = along;
                if (order == Order.HESSIAN) {
                    double bend = 2 * k * slope;
                    double mixed = 2 * k * along;
                    out.hxx[i] = slope + bend * x[i] * x[i];
                    out.hxy[i] = bend * x[i] * y[i];
                    out.hyy[i] = slope + bend * y[i] * y[i];
                    out.hxz[i] = mixed * x[i];
                    out.hyz[i] = mixed * y[i];
                    out.hzz[i] = -q * q * bell * sine;
                }
            }
        }
    }
}
