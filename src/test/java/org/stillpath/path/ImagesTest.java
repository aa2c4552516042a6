package org.stillpath.path;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.function.DoubleUnaryOperator;
import org.junit.jupiter.api.Test;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Quadric;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;
import org.stillpath.ray.Action;
import org.stillpath.ray.Element;
import org.stillpath.ray.Fields;
import org.stillpath.ray.Train;

/**
 * All images of a point in media and trains whose rays have a closed form: one equation for one unknown, whose roots a fine scan
 * with bisection finds here, and the optical length at each. The formulas are derived beside each check from the ray equation;
 * published values are named.
 */
class ImagesTest {
    private static final Vector IN_YZ = new Vector(1, 0, 0);
    private static final IndexField AIR = Fields.uniform(1);

    private static List<StationaryPath> search(Train train, Vector from, Vector to, Vector around, double halfAngle) {
        return PathSearch.run(new PathSearch.Query(train, from, to, around, halfAngle, IN_YZ, 1e-11))
                .paths();
    }

    /** Zeros of a function between two values, where it is defined; a jump is none. */
    private static List<Double> zeros(DoubleUnaryOperator f, double low, double high) {
        int parts = 200_000;
        List<Double> found = new ArrayList<>();
        for (int i = 0; i < parts; i++) {
            double a = low + (high - low) * i / parts;
            double b = low + (high - low) * (i + 1) / parts;
            double fa = f.applyAsDouble(a);
            if (fa * f.applyAsDouble(b) < 0) {
                for (int k = 0; k < 100; k++) {
                    double m = 0.5 * (a + b);
                    if (f.applyAsDouble(m) * fa > 0) {
                        a = m;
                    } else {
                        b = m;
                    }
                }
                if (Math.abs(f.applyAsDouble(a)) < 1e-6) {
                    found.add(0.5 * (a + b));
                }
            }
        }
        return found;
    }

    private static void compare(List<StationaryPath> paths, List<Double> lengths, double tolerance) {
        lengths.sort(Comparator.naturalOrder());
        assertThat(paths).hasSize(lengths.size());
        for (int i = 0; i < lengths.size(); i++) {
            assertThat(paths.get(i).opticalLength()).isCloseTo(lengths.get(i), within(tolerance * lengths.get(i)));
        }
    }

    /**
     * An inferior mirage: n² = m² − Δ e^{−y/h} over warm ground. y'² + Δe^{−y/h} = q² along a ray, so e^{y/2h} = (√Δ/q) cosh(q(τ −
     * τ₀)/2h), z = √(m² − q²) τ, S = m²τ − 2hq [tanh].
     */
    @Test
    void findsTheTwoImagesOfAnInferiorMirage() {
        double m = 1.00027;
        double delta = 4e-5;
        double h = 0.2;
        double y1 = 1.5;
        double y2 = 1.1;
        double z = 700;
        IndexField road = (x, y, zz, count, order, out) -> {
            for (int i = 0; i < count; i++) {
                double e = delta * Math.exp(-y[i] / h);
                out.value[i] = (m - 1) * (m + 1) - e;
                out.gx[i] = 0;
                out.gy[i] = 0.5 * e / h;
                out.gz[i] = 0;
                out.hxx[i] = 0;
                out.hxy[i] = 0;
                out.hxz[i] = 0;
                out.hyy[i] = -0.5 * e / (h * h);
                out.hyz[i] = 0;
                out.hzz[i] = 0;
            }
        };
        double c1 = Math.exp(y1 / (2 * h)) / Math.sqrt(delta);
        double c2 = Math.exp(y2 / (2 * h)) / Math.sqrt(delta);
        List<Double> lengths = new ArrayList<>();
        // the ray may turn between the points, or climb or fall all the way
        for (int way : new int[] {1, -1}) {
            DoubleUnaryOperator equation = q -> {
                double tau = z / Math.sqrt(m * m - q * q);
                return arcosh(c1 * q) + way * arcosh(c2 * q) - q * tau / (2 * h);
            };
            for (double q : zeros(equation, 1 / c2 * (1 + 1e-12), 0.02)) {
                double tau = z / Math.sqrt(m * m - q * q);
                double before = arcosh(c1 * q);
                double behind = way * arcosh(c2 * q);
                lengths.add(m * m * tau - 2 * h * q * (Math.tanh(before) + Math.tanh(behind)));
            }
        }
        List<StationaryPath> paths =
                search(Train.through(road), new Vector(0, y1, 0), new Vector(0, y2, z), Vector.ZERO, Math.toRadians(5));
        assertThat(lengths).hasSize(2);
        compare(paths, lengths, 1e-13);
        // the image by way of the ground is inverted and a saddle: its rays have crossed
        assertThat(paths.stream().filter(p -> p.morseIndex() == 0)).hasSize(1);
        assertThat(paths.stream().filter(p -> p.morseIndex() == 1)).hasSize(1);
    }

    private static double arcosh(double x) {
        return Math.log(x + Math.sqrt((x - 1) * (x + 1)));
    }

    /**
     * Several pitches of a parabolic rod: y = y₀ cos ωτ + (p/ω) sin ωτ, ω = n₀g, z = p_z τ, S = n₀²τ − ω²∫y² dτ.
     */
    @Test
    void findsAllPathsOverSeveralPitchesOfARod() {
        double n0 = 1.6;
        double g = 0.3;
        double w = n0 * g;
        double y0 = 0.7;
        double y1 = 0.4;
        double z = 2.3 * 2 * Math.PI / g;
        DoubleUnaryOperator p = tau -> w * (y1 - y0 * Math.cos(w * tau)) / Math.sin(w * tau);
        DoubleUnaryOperator equation = tau -> {
            double py = p.applyAsDouble(tau);
            double pz = z / tau;
            return py * py + pz * pz - (n0 * n0 - w * w * y0 * y0);
        };
        List<Double> lengths = new ArrayList<>();
        double n = Math.sqrt(n0 * n0 - w * w * y0 * y0);
        for (double tau : zeros(equation, z / n, 2.5 * z / n)) {
            double py = p.applyAsDouble(tau);
            double angle = Math.atan2(py, z / tau);
            double chord = Math.atan2(y1 - y0, z);
            if (Math.abs(angle - chord) > Math.toRadians(60)) {
                continue;
            }
            double s = Math.sin(2 * w * tau);
            double sin = Math.sin(w * tau);
            double squares = y0 * y0 * (0.5 * tau + s / (4 * w))
                    + py * py / (w * w) * (0.5 * tau - s / (4 * w))
                    + y0 * py / (w * w) * sin * sin;
            lengths.add(n0 * n0 * tau - w * w * squares);
        }
        List<StationaryPath> paths = search(
                Train.through(Fields.rod(n0, g)),
                new Vector(0, y0, 0),
                new Vector(0, y1, z),
                Vector.ZERO,
                Math.toRadians(60));
        assertThat(lengths.size()).isGreaterThan(4);
        compare(paths, lengths, 1e-10);
        // conjugate points come every half pitch in τ: 4 or more of them lie on each path
        assertThat(paths).allMatch(q -> q.morseIndex() >= 4 && q.reducedIndex() == q.morseIndex());
    }

    /**
     * A ball of index 1.5 and radius 1 about the origin: a ray of impact parameter b sweeps the angle arccos(b/d) − arccos(b/R)
     * outside on each side and 2 arccos(b/nR) within (geometry of its triangles). Three images inside the caustic, one outside.
     */
    @Test
    void findsOneOrThreeImagesThroughABall() {
        int[] counts = new int[2];
        Vector[] targets = {new Vector(0, 0.01, 1.7), new Vector(0, 0.5, 3)};
        for (int k = 0; k < 2; k++) {
            double d = 6;
            Vector from = new Vector(0, 0, -d);
            Vector to = targets[k];
            double dB = to.norm();
            // from the source's side to the target's, turning as y turns into −z
            double turn = Math.PI - Math.atan2(to.y(), to.z());
            double other = 2 * Math.PI - turn;
            List<Double> lengths = new ArrayList<>();
            for (double swept : new double[] {turn, other}) {
                DoubleUnaryOperator equation = b -> sweep(b, d, dB, 2) - swept;
                for (double b : zeros(equation, 0, 1)) {
                    lengths.add(length(b, d, dB, 2));
                }
            }
            counts[k] = lengths.size();
            Element in = new Element(ball(), new Action.Refract(false), Fields.uniform(1.5));
            Element out = new Element(ball(), new Action.Refract(false), AIR);
            List<StationaryPath> paths =
                    search(new Train(AIR, List.of(in, out)), from, to, new Vector(0, 0, 1), Math.toRadians(12));
            compare(paths, lengths, 1e-11);
        }
        assertThat(counts).containsExactly(3, 1);
    }

    /**
     * A drop with one reflection inside, on both sides of the primary rainbow, 180° − D = 42.0345° for n = 1.3333 (Descartes, cos²i =
     * (n² − 1)/3; recomputed): two images within, none beyond.
     */
    @Test
    void findsTwoImagesWithinTheRainbowAndNoneBeyond() {
        double n = 1.3333;
        double bow = Math.toRadians(42.03450149020016);
        double d = 1e4;
        Element in = new Element(ball(), new Action.Refract(false), Fields.uniform(n));
        Element back = new Element(ball(), new Action.Reflect(), Fields.uniform(n));
        Element out = new Element(ball(), new Action.Refract(false), AIR);
        Train drop = new Train(AIR, List.of(in, back, out));
        for (double inside : new double[] {Math.toRadians(0.5), -Math.toRadians(0.5)}) {
            double angle = bow - inside;
            Vector from = new Vector(0, 0, -d);
            // seen from the drop, at this angle from the source
            Vector to = new Vector(0, -d * Math.sin(angle), -d * Math.cos(angle));
            List<Double> lengths = new ArrayList<>();
            for (double swept : new double[] {2 * Math.PI - angle, 2 * Math.PI + angle}) {
                for (double b : zeros(b -> sweep(b, d, d, n, 4) - swept, 0, 1)) {
                    lengths.add(length(b, d, d, n, 4));
                }
            }
            List<StationaryPath> paths = search(drop, from, to, new Vector(0, 0, 1), 1.2e-4);
            assertThat(lengths).hasSize(inside > 0 ? 2 : 0);
            compare(paths, lengths, 1e-12);
        }
    }

    /** Heron's mirror: the way over a plane is as long as the straight line to the target's mirror image, and no other is shorter. */
    @Test
    void findsHeronsWayOverAPlaneMirror() {
        Surface plane =
                new Surface(Frame.at(new Vector(0, 0, 2)), new Quadric(0, 0, 0), false, Double.POSITIVE_INFINITY);
        Train mirror = new Train(AIR, List.of(new Element(plane, new Action.Reflect(), AIR)));
        Vector from = new Vector(0.3, 0.1, 0.5);
        Vector to = new Vector(-0.4, 1.3, -1);
        List<StationaryPath> paths = PathSearch.run(new PathSearch.Query(
                        mirror, from, to, new Vector(0, 0, 1), Math.toRadians(60), Vector.ZERO, 1e-12))
                .paths();
        double wanted = from.minus(new Vector(to.x(), to.y(), 4 - to.z())).norm();
        assertThat(paths).hasSize(1);
        assertThat(paths.get(0).opticalLength()).isCloseTo(wanted, within(1e-13));
        assertThat(paths.get(0).overInterfaces()).isEqualTo(StationaryPath.Kind.MINIMUM);
        assertThat(paths.get(0).kind()).isEqualTo(StationaryPath.Kind.MINIMUM);
    }

    private static Surface ball() {
        return new Surface(Frame.at(new Vector(0, 0, -1)), new Quadric(1, 1, 1), true, Double.POSITIVE_INFINITY);
    }

    private static double sweep(double b, double d, double dB, double halves) {
        return sweep(b, d, dB, 1.5, halves);
    }

    /** The angle about the centre of a unit ball from a place at d to one at dB, so many half chords within. */
    private static double sweep(double b, double d, double dB, double n, double halves) {
        return Math.acos(b / d) + Math.acos(b / dB) - 2 * Math.acos(b) + halves * Math.acos(b / n);
    }

    private static double length(double b, double d, double dB, double halves) {
        return length(b, d, dB, 1.5, halves);
    }

    private static double length(double b, double d, double dB, double n, double halves) {
        return Math.sqrt(d * d - b * b)
                + Math.sqrt(dB * dB - b * b)
                - 2 * Math.sqrt(1 - b * b)
                + halves * n * Math.sqrt(1 - b * b / (n * n));
    }

    /**
     * Maxwell's fisheye n₀ = 2, a = 1: every path to the image −q/|q|² is πn₀a/2 = π long (Maxwell 1854), one path with two null
     * directions; to any other point the short and the long arc of one circle, (n₀a/2) times the arc on the sphere of the
     * stereographic projection, with Morse indices 0 and 2.
     */
    @Test
    void findsTheImageAndBothArcsOfAFisheye() {
        Train fisheye = Train.through(Fields.fisheye(2, 1));
        Vector from = new Vector(0.3, 0.4, 1.2);
        Vector image = new Vector(-0.17751479289940827, -0.23668639053254437, -0.7100591715976331);
        List<StationaryPath> all = PathSearch.run(
                        new PathSearch.Query(fisheye, from, image, Vector.ZERO, Math.toRadians(60), Vector.ZERO, 1e-11))
                .paths();
        assertThat(all).hasSize(1);
        assertThat(all.get(0).kind()).isEqualTo(StationaryPath.Kind.DEGENERATE);
        assertThat(all.get(0).nullDirections()).isEqualTo(2);
        assertThat(all.get(0).opticalLength()).isCloseTo(Math.PI, within(1e-10));
        Vector to = new Vector(0.5, -0.6, 0.3);
        double arc = 2
                * Math.atan2(
                        from.minus(to).norm(),
                        Math.sqrt((1 + from.dot(from)) * (1 + to.dot(to))
                                - from.minus(to).dot(from.minus(to))));
        List<StationaryPath> arcs = PathSearch.run(
                        new PathSearch.Query(fisheye, from, to, Vector.ZERO, Math.PI, Vector.ZERO, 1e-11))
                .paths();
        assertThat(arcs).hasSize(2);
        assertThat(arcs.get(0).opticalLength()).isCloseTo(arc, within(1e-10));
        assertThat(arcs.get(0).morseIndex()).isEqualTo(0);
        assertThat(arcs.get(1).opticalLength()).isCloseTo(2 * Math.PI - arc, within(1e-9));
        assertThat(arcs.get(1).morseIndex()).isEqualTo(2);
    }
}
