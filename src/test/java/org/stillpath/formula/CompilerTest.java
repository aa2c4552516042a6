package org.stillpath.formula;

import static org.assertj.core.api.Assertions.assertThat;

import com.sun.management.ThreadMXBean;
import java.lang.management.ManagementFactory;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Random;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import org.junit.jupiter.api.Test;
import org.objectweb.asm.ClassReader;
import org.objectweb.asm.ClassVisitor;
import org.objectweb.asm.ClassWriter;
import org.objectweb.asm.Label;
import org.objectweb.asm.MethodVisitor;
import org.objectweb.asm.Opcodes;
import org.stillpath.unit.Dimension;

class CompilerTest {
    private static final double WAVELENGTH = 632.8e-9;
    private static final Samples[] NO_CHARTS = {};

    /** A ground with a hill: all of the ten components differ. */
    static final Chart HILL = (coordinate, x, y, z, count, order, out) -> {
        for (int i = 0; i < count; i++) {
            double k = 1 + coordinate.slot();
            out.value[i] = z[i] * k + x[i] * y[i] + x[i] * x[i] * z[i];
            out.gx[i] = y[i] + 2 * x[i] * z[i];
            out.gy[i] = x[i];
            out.gz[i] = k + x[i] * x[i];
            out.hxx[i] = 2 * z[i];
            out.hxy[i] = 1;
            out.hxz[i] = 2 * x[i];
            out.hyy[i] = 0;
            out.hyz[i] = 0;
            out.hzz[i] = 0;
        }
    };

    private static Formula parse(String text) throws FormulaException {
        Map<String, Dimension> with = new LinkedHashMap<>();
        with.put("alpha", Dimension.NONE);
        with.put("beta", Dimension.NONE);
        with.put("L", Dimension.LENGTH);
        return Formula.parse(text, Names.of(Names.SIGHT, with));
    }

    static double[] values(Formula f, double alpha, double beta, double l) {
        Map<String, Double> values = Map.of("alpha", alpha, "beta", beta, "L", l);
        return f.arguments().stream().mapToDouble(values::get).toArray();
    }

    static Samples[] charts(Program program, double[] x, double[] y, double[] z, Order order) {
        Samples[] charts = new Samples[3];
        for (Coordinate c : program.charts()) {
            charts[c.slot()] = new Samples(x.length);
            HILL.sample(c, x, y, z, x.length, order, charts[c.slot()]);
        }
        return charts;
    }

    /** Points at random, on the axis, at the origin, far out and nowhere. */
    private static double[][] points(Random random, int count) {
        double[] special = {0, -0.0, 1e-200, 1e200, Double.NaN, Double.POSITIVE_INFINITY, 1, -1};
        double[][] points = new double[3][count];
        for (int i = 0; i < count; i++) {
            for (double[] p : points) {
                p[i] = random.nextInt(4) == 0 ? special[random.nextInt(special.length)] : 4 * random.nextDouble() - 2;
            }
        }
        return points;
    }

    private static void assertSame(Formula f, Order order, Random random) {
        Program program = f.executable(order).program();
        Compiler.Compiled compiled = Compiler.compile(program).orElseThrow();
        double[] arguments = values(f, 2 * random.nextDouble() - 0.5, random.nextDouble(), 0.5 + random.nextDouble());
        double[] scratch = new double[compiled.scratch()];
        for (int count : new int[] {1, 9, 70}) {
            double[][] p = points(random, count);
            Samples[] charts = charts(program, p[0], p[1], p[2], order);
            Samples wanted = new Samples(count);
            Samples found = new Samples(count);
            Evaluator.run(program, p[0], p[1], p[2], count, arguments, WAVELENGTH, charts, order, wanted);
            if (count == 1) {
                compiled.kernel().one(p[0], p[1], p[2], 0, arguments, WAVELENGTH, charts, found, scratch);
            } else {
                compiled.kernel().run(p[0], p[1], p[2], count, arguments, WAVELENGTH, charts, found, scratch);
            }
            assertEqual(f, wanted, found);
        }
    }

    /** Equality of all bits, except that one NaN is as good as another; the arrays beyond the order are zero in both. */
    private static void assertEqual(Formula f, Samples wanted, Samples found) {
        for (int k = 0; k < 10; k++) {
            double[] w = Evaluator.component(wanted, k);
            double[] o = Evaluator.component(found, k);
            for (int i = 0; i < w.length; i++) {
                if (Double.doubleToLongBits(w[i]) != Double.doubleToLongBits(o[i])) {
                    throw new AssertionError("component " + k + " is " + o[i] + ", not " + w[i] + ", in " + f);
                }
            }
        }
    }

    @Test
    void givesTheBitsOfTheEvaluator() {
        Random random = new Random(20261202);
        for (int i = 0; i < 1000; i++) {
            Formula f = parsable(random);
            assertSame(f, Order.HESSIAN, random);
            assertSame(f, i % 2 == 0 ? Order.VALUE : Order.GRADIENT, random);
        }
    }

    /** A random formula; those of which a constant part is undefined are no formulas. */
    static Formula parsable(Random random) {
        while (true) {
            try {
                return parse(text(random, 1 + random.nextInt(5)));
            } catch (FormulaException e) {
                assertThat(e).hasMessageContaining(" in `");
            }
        }
    }

    /** A pure number made of everything that a formula may hold; undefined at many places. */
    private static String text(Random random, int depth) {
        if (depth == 0 || random.nextInt(8) == 0) {
            String[] leaves = {
                "x/L",
                "y/(1 m)",
                "z/L",
                "r/L",
                "rho/L",
                "(height/(1 m))",
                "clearance/L",
                "distance/L",
                "alpha",
                "beta",
                "wavelength/(1 um)",
                "0.7",
                "2",
                "pi",
                "(x/L)^2",
                "(r/L)^2"
            };
            return leaves[random.nextInt(leaves.length)];
        }
        String a = text(random, depth - 1);
        String b = text(random, depth - 1);
        String[] functions = {
            "sqrt", "exp", "log", "log10", "sin", "cos", "tan", "asin", "acos", "atan", "sinh", "cosh", "tanh", "sech",
            "erf", "E1", "abs"
        };
        String[] pairs = {"atan2", "min", "max", "hypot"};
        return switch (random.nextInt(9)) {
            case 0 -> "(" + a + " + " + b + ")";
            case 1 -> "(" + a + " - " + b + ")";
            case 2 -> "(" + a + ")*(" + b + ")";
            case 3 -> "(" + a + ")/(" + b + ")";
            case 4 -> "(" + a + ")^" + (random.nextInt(10) == 0 ? 70 : random.nextInt(9) - 3);
            case 5 -> "abs(" + a + ")^(" + b + ")";
            case 6 -> pairs[random.nextInt(pairs.length)] + "(" + a + ", " + b + ")";
            default -> functions[random.nextInt(functions.length)] + "(" + a + ")";
        };
    }

    /** The longest texts: code in several methods, each short enough for HotSpot to compile. */
    @Test
    void splitsLongPrograms() throws FormulaException {
        Random random = new Random(20261203);
        List<String> texts = new ArrayList<>();
        texts.add("sin(".repeat(98) + "x/L" + ")".repeat(98));
        for (String term : List.of(
                "sin(2*x/L)",
                "exp(-r/L)*z/L",
                "cos(2*alpha)*z/L",
                "alpha*height/L",
                "(1 + beta*rho/L)^0.3",
                "alpha^9")) {
            texts.add(longest(term, "+"));
            texts.add(longest(term, "*"));
        }
        int split = 0;
        for (String text : texts) {
            Formula f = parse(text);
            for (Order order : Order.values()) {
                Program program = f.executable(order).program();
                if (program.size() <= Compiler.LARGEST_PROGRAM) {
                    Compiler.ClassFile file = Compiler.translate(program);
                    split += file.scratch() > 0 ? 1 : 0;
                    assertThat(longestMethod(file.code()))
                            .as("%s of %.40s", order, text)
                            .isLessThan(8000);
                    assertSame(f, order, random);
                }
            }
        }
        assertThat(split).isGreaterThan(8);
    }

    /** Different terms, so that nothing is shared, up to the longest text that is read. */
    private static String longest(String term, String operator) {
        StringBuilder text = new StringBuilder(term);
        for (int i = 0; ; i++) {
            String next = operator + (3 + i) + "*" + term.replace("2*", i + "*").replace("r/L", "(r/L - " + i + ")");
            if (text.length() + next.length() > Formula.LONGEST_TEXT) {
                return text.toString();
            }
            text.append(next);
        }
    }

    /** Bytes of the longest method of a class. */
    private static int longestMethod(byte[] code) {
        int[] longest = {0};
        ClassVisitor measuring = new ClassVisitor(Opcodes.ASM9, new ClassWriter(0)) {
            @Override
            public MethodVisitor visitMethod(
                    int access, String name, String descriptor, String signature, String[] thrown) {
                return new MethodVisitor(Opcodes.ASM9, super.visitMethod(access, name, descriptor, signature, thrown)) {
                    @Override
                    public void visitMaxs(int stack, int locals) {
                        Label end = new Label();
                        super.visitLabel(end);
                        longest[0] = Math.max(longest[0], end.getOffset());
                        super.visitMaxs(stack, locals);
                    }
                };
            }
        };
        new ClassReader(code).accept(measuring, 0);
        return longest[0];
    }

    /** The Hessian of a product of two hundred factors: too long, so it stays with the evaluator. */
    @Test
    void leavesTheLongestToTheEvaluator() throws FormulaException {
        StringBuilder text = new StringBuilder("1");
        for (int i = 0; i < 200; i++) {
            text.append("*tanh(x*y*z/L^3+").append(i).append(")");
        }
        Formula f = parse(text.toString());
        Executable hessian = f.executable(Order.HESSIAN);
        assertThat(hessian.program().size()).isGreaterThan(Compiler.LARGEST_PROGRAM);
        assertThat(hessian.compile()).isFalse();
        Samples out = new Samples(1);
        double[] at = {0.3};
        for (int i = 0; i < 20; i++) {
            f.sample(at, at, at, 1, values(f, 1, 1, 1), WAVELENGTH, Order.HESSIAN, out);
        }
        assertThat(hessian.kernel()).isEmpty();
        assertThat(out.hxx[0]).isNotZero().isFinite();
    }

    @Test
    void compilesWhenItHasPaidAndOnce() throws FormulaException {
        Formula f = parse("alpha + beta*exp(-2*r^2/L^2)*sin(z/L)");
        Executable gradient = f.executable(Order.GRADIENT);
        double[] at = {0.3};
        Samples first = new Samples(1);
        Samples later = new Samples(1);
        double[] arguments = values(f, 1.5, 1e-3, 2);
        f.sample(at, at, at, 1, arguments, WAVELENGTH, Order.GRADIENT, first);
        for (int i = 0; i < 1000; i++) {
            f.sample(at, at, at, 1, arguments, WAVELENGTH, Order.GRADIENT, later);
        }
        assertThat(gradient.kernel()).isEmpty();
        for (int i = 0; i < Executable.COMPILE_AFTER / gradient.program().size(); i += 10) {
            f.sample(at, at, at, 1, arguments, WAVELENGTH, Order.GRADIENT, later);
        }
        assertEqual(f, first, later);
        Kernel kernel = gradient.kernel().orElseThrow();
        assertThat(f.executable(Order.HESSIAN).kernel()).isEmpty();
        for (int i = 0; i < 100; i++) {
            double[] others = values(f, i, 1e-3 * i, 1 + i);
            f.sample(at, at, at, 1, others, WAVELENGTH, Order.GRADIENT, later);
            Evaluator.run(gradient.program(), at, at, at, 1, others, WAVELENGTH, NO_CHARTS, Order.GRADIENT, first);
            assertEqual(f, first, later);
        }
        assertThat(gradient.compile()).isTrue();
        assertThat(gradient.kernel()).containsSame(kernel);
    }

    @Test
    void servesManyThreads() throws Exception {
        Formula f = parse("alpha*sqrt(1 - (r/L)^2) + beta*height/L");
        double[] arguments = values(f, 1.5, 1e-3, 4);
        ExecutorService pool = Executors.newFixedThreadPool(4);
        try {
            List<Future<Samples>> all = new ArrayList<>();
            for (int t = 0; t < 4; t++) {
                all.add(pool.submit(() -> {
                    Samples sum = new Samples(1);
                    Samples out = new Samples(1);
                    double[] at = new double[1];
                    for (int i = 0; i < 20_000; i++) {
                        at[0] = 1e-4 * i;
                        f.sample(at, at, at, 1, arguments, WAVELENGTH, HILL, Order.HESSIAN, out);
                        for (int k = 0; k < 10; k++) {
                            Evaluator.component(sum, k)[0] += Evaluator.component(out, k)[0];
                        }
                    }
                    return sum;
                }));
            }
            for (Future<Samples> one : all) {
                assertEqual(f, all.get(0).get(), one.get());
            }
        } finally {
            pool.shutdownNow();
        }
        assertThat(f.executable(Order.HESSIAN).kernel()).isPresent();
    }

    /** One point at a time is how rays are followed: plain, with charts, and in several methods. */
    @Test
    void allocatesNothingForOnePoint() throws FormulaException {
        ThreadMXBean threads = (ThreadMXBean) ManagementFactory.getThreadMXBean();
        for (String text :
                List.of("alpha*sqrt(1 - (r/L)^2)", "exp(-height/L)*clearance/L", longest("sin(2*x/L)", "+"))) {
            Formula f = parse(text);
            double[] arguments = values(f, 1.5, 1e-3, 4);
            double[] at = {0.1};
            Samples out = new Samples(1);
            for (Order order : Order.values()) {
                assertThat(f.executable(order).compile()).isTrue();
                // loading and linking of classes counts as the thread's
                long least = Long.MAX_VALUE;
                for (int round = 0; round < 5; round++) {
                    long before = threads.getCurrentThreadAllocatedBytes();
                    for (int i = 0; i < 1000; i++) {
                        f.sample(at, at, at, 1, arguments, WAVELENGTH, HILL, order, out);
                    }
                    least = Math.min(least, threads.getCurrentThreadAllocatedBytes() - before);
                }
                assertThat(least).as("%s of %.20s", order, text).isZero();
            }
        }
    }

    @Test
    void takesNothingOfTheTextIntoTheClass() throws FormulaException {
        Formula f = parse("alpha*height/L + beta");
        byte[] code = Compiler.translate(f.executable(Order.HESSIAN).program()).code();
        assertThat(new String(code, StandardCharsets.ISO_8859_1)).doesNotContain("alpha", "beta", "height");
    }

    @Test
    void hasOutputsThatDoNotDependOnThePlace() throws FormulaException {
        for (String text : List.of("2", "alpha + beta", "alpha^beta*wavelength/L", "x/L")) {
            for (Order order : Order.values()) {
                assertSame(parse(text), order, new Random(20261204));
            }
        }
    }
}
