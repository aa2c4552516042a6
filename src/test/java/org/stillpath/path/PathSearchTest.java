package org.stillpath.path;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.List;
import java.util.Random;
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

/** Published and closed-form two-point problems; recomputed from the formulas named, two ways where noted. */
class PathSearchTest {
    private static final Vector FREE = Vector.ZERO;

    private static List<StationaryPath> search(Train train, Vector from, Vector to, double halfAngle, Vector plane) {
        return PathSearch.run(new PathSearch.Query(train, from, to, Vector.ZERO, halfAngle, plane, 1e-11))
                .paths();
    }

    /** n² = c − 2 a y. */
    private static IndexField falling(double c, double a) {
        return Fields.slope(Math.sqrt(c), new Vector(0, -a, 0));
    }

    /** n² = 2.25 − 0.2 y from (0, 0) to (1, 15): parabolas, L = (c − aY)t − a²t³/6 (two ways); beyond the envelope none. */
    @Test
    void findsTheLowAndTheHighTrajectory() {
        Train train = Train.through(falling(2.25, 0.1));
        List<StationaryPath> paths = search(train, Vector.ZERO, new Vector(0, 1, 15), Math.toRadians(85), FREE);
        assertThat(paths).hasSize(2);
        assertThat(paths.get(0).opticalLength()).isCloseTo(21.542780085893725, within(1e-11));
        assertThat(paths.get(0).kind()).isEqualTo(StationaryPath.Kind.MINIMUM);
        assertThat(paths.get(1).opticalLength()).isCloseTo(25.00961511885065, within(1e-11));
        assertThat(paths.get(1).kind()).isEqualTo(StationaryPath.Kind.SADDLE);
        assertThat(paths.get(1).morseIndex()).isEqualTo(1);
        List<StationaryPath> level = search(train, Vector.ZERO, new Vector(0, 0, 20), Math.toRadians(85), FREE);
        // launch elevations asin(Z a/c)/2 and its complement
        assertThat(Math.toDegrees(Math.asin(level.get(0).launch().y()))).isCloseTo(31.36697777463359, within(1e-8));
        assertThat(Math.toDegrees(Math.asin(level.get(1).launch().y()))).isCloseTo(58.63302222536641, within(1e-8));
        // the greatest range is c/a = 22.5
        assertThat(search(train, Vector.ZERO, new Vector(0, 0, 22.499), Math.toRadians(85), FREE))
                .hasSize(2);
        assertThat(search(train, Vector.ZERO, new Vector(0, 0, 22.501), Math.toRadians(85), FREE))
                .isEmpty();
    }

    /** Alhazen's problem in the unit circle, A (0.6, 0.2), B (−0.5, 0.3): four points of reflection (his quartic; two ways). */
    @Test
    void solvesAlhazensProblem() {
        Surface circle =
                new Surface(Frame.at(new Vector(0, 0, -1)), new Quadric(1, 1, 1), true, Double.POSITIVE_INFINITY);
        IndexField air = Fields.uniform(1);
        Train train = new Train(air, List.of(new Element(circle, new Action.Reflect(), air)));
        List<StationaryPath> paths =
                search(train, new Vector(0, 0.6, 0.2), new Vector(0, -0.5, 0.3), Math.PI, new Vector(1, 0, 0));
        double[] wanted = {1.7800345082848994, 1.8512039824698365, 1.8611256420789812, 2.740893470181066};
        assertThat(paths).hasSize(4);
        for (int i = 0; i < 4; i++) {
            assertThat(paths.get(i).opticalLength()).isCloseTo(wanted[i], within(1e-11));
        }
        // minima and maxima over the meeting point alternate round the circle
        assertThat(paths.stream().filter(p -> p.overInterfaces() == StationaryPath.Kind.MINIMUM))
                .hasSize(2);
        assertThat(paths.stream().filter(p -> p.overInterfaces() == StationaryPath.Kind.MAXIMUM))
                .hasSize(2);
    }

    /** Between the foci of an ellipsoid a = 13, b = 12 (c = 5) every reflection has the length 26: one degenerate path. */
    @Test
    void namesTheContinuumBetweenFoci() {
        // the cap's vertex is at z = −13: curvature a/b² at the end of the long axis, conic constant −e²
        double c = 13 / 144.0;
        Quadric ellipsoid = new Quadric(c, c, (1 - 25 / 169.0) * c);
        Surface mirror = new Surface(Frame.at(new Vector(0, 0, -13)), ellipsoid, true, Double.POSITIVE_INFINITY);
        IndexField air = Fields.uniform(1);
        Train train = new Train(air, List.of(new Element(mirror, new Action.Reflect(), air)));
        List<StationaryPath> paths =
                search(train, new Vector(0, 0, -5), new Vector(0, 0, 5), Math.PI, new Vector(1, 0, 0));
        assertThat(paths).hasSize(1);
        assertThat(paths.get(0).kind()).isEqualTo(StationaryPath.Kind.DEGENERATE);
        assertThat(paths.get(0).opticalLength()).isCloseTo(26, within(1e-9));
    }

    /** On the axis of a parabolic rod the index is 0, 2 and 4 after 0.2, 0.75 and 1.3 pitches (double points each half pitch). */
    @Test
    void countsAlongTheAxisOfARod() {
        IndexField rod = Fields.rod(1.6, 0.3);
        double pitch = 2 * Math.PI / 0.3;
        double[] pitches = {0.2, 0.75, 1.3};
        int[] index = {0, 2, 4};
        for (int i = 0; i < 3; i++) {
            List<StationaryPath> paths = search(
                    Train.through(rod), Vector.ZERO, new Vector(0, 0, pitches[i] * pitch), Math.toRadians(5), FREE);
            StationaryPath axial = paths.get(0);
            assertThat(axial.launch().z()).isCloseTo(1, within(1e-12));
            assertThat(axial.morseIndex()).isEqualTo(index[i]);
        }
    }

    /** In smooth bumps the number of images is odd (Burke, Astrophys. J. 244 (1981) L1), and ends can be exchanged. */
    @Test
    void findsOddNumbersAndTheSameWayBack() {
        Random r = new Random(20261201);
        for (int k = 0; k < PROBLEMS; k++) {
            double[][] bumps = new double[3][];
            for (int b = 0; b < bumps.length; b++) {
                bumps[b] = new double[] {
                    r.nextDouble() - 0.5,
                    r.nextDouble() - 0.5,
                    2 + 4 * r.nextDouble(),
                    0.25 * (2 * r.nextDouble() - 1),
                    0.5 + r.nextDouble()
                };
            }
            IndexField lumpy = Fields.bumps(1.5, bumps);
            Vector from = new Vector(0.3 * r.nextDouble(), 0.3 * r.nextDouble(), 0);
            Vector to = new Vector(0.3 * r.nextDouble(), 0.3 * r.nextDouble(), 12);
            Train train = Train.through(lumpy);
            List<StationaryPath> there = search(train, from, to, Math.toRadians(40), FREE);
            List<StationaryPath> back = search(train, to, from, Math.toRadians(40), FREE);
            assertThat(there.size() % 2).as("problem " + k).isEqualTo(1);
            assertThat(back).as("problem " + k).hasSameSizeAs(there);
            for (int i = 0; i < there.size(); i++) {
                assertThat(back.get(i).opticalLength()).isCloseTo(there.get(i).opticalLength(), within(1e-9));
                assertThat(back.get(i).morseIndex()).isEqualTo(there.get(i).morseIndex());
            }
            assertThat(there.get(0).kind()).isEqualTo(StationaryPath.Kind.MINIMUM);
        }
    }

    private static final int PROBLEMS = 4;

    /**
     * n² = n₀² + k²y²: rays part as e^{kτ}, here by 2e8, so that the last bit of the launch moves the end by 1e-8 of the way. y =
     * y₀ cosh kτ + (p/k) sinh kτ, z = p_z τ, S = ∫n² dτ (closed form of the repelling oscillator; p_z by bisection).
     */
    @Test
    void mendsWhatIsTooUnstableForOneShot() {
        double n0 = 1.5;
        double k = 1;
        double y0 = 0.5;
        double y1 = 0.4;
        double z = 30;
        IndexField repelling = (x, y, zz, count, order, out) -> {
            for (int i = 0; i < count; i++) {
                out.value[i] = n0 * n0 - 1 + k * k * y[i] * y[i];
                out.gx[i] = 0;
                out.gy[i] = k * k * y[i];
                out.gz[i] = 0;
                out.hxx[i] = 0;
                out.hxy[i] = 0;
                out.hxz[i] = 0;
                out.hyy[i] = k * k;
                out.hyz[i] = 0;
                out.hzz[i] = 0;
            }
        };
        double low = 0.5;
        double high = 2;
        double tau = 0;
        double p = 0;
        for (int i = 0; i < 200; i++) {
            double pz = 0.5 * (low + high);
            tau = z / pz;
            p = k * (y1 - y0 * Math.cosh(k * tau)) / Math.sinh(k * tau);
            if (p * p + pz * pz > n0 * n0 + k * k * y0 * y0) {
                high = pz;
            } else {
                low = pz;
            }
        }
        // ∫y² dτ with y = a e^{kτ} + b e^{−kτ}; a = (y₁ − y₀e^{−kτ})/(e^{kτ} − e^{−kτ}) keeps its digits
        double a = (y1 - y0 * Math.exp(-k * tau)) / (2 * Math.sinh(k * tau));
        double b = y0 - a;
        double e = Math.exp(k * tau);
        double squares = (a * a * (e * e - 1) + b * b * (1 - 1 / (e * e))) / (2 * k) + 2 * a * b * tau;
        double wanted = n0 * n0 * tau + k * k * squares;
        List<StationaryPath> paths = PathSearch.run(new PathSearch.Query(
                        Train.through(repelling),
                        new Vector(0, y0, 0),
                        new Vector(0, y1, z),
                        Vector.ZERO,
                        Math.toRadians(60),
                        FREE,
                        1e-12))
                .paths();
        assertThat(paths).hasSize(1);
        assertThat(paths.get(0).opticalLength()).isCloseTo(wanted, within(1e-11 * wanted));
        assertThat(paths.get(0).residual()).isLessThan(1e-11);
        assertThat(paths.get(0).kind()).isEqualTo(StationaryPath.Kind.MINIMUM);
    }

    /** A symmetric plane is seen where there is one and not where there is none. */
    @Test
    void seesSymmetry() {
        IndexField layered = falling(2.25, 0.1);
        Vector normal = new Symmetry(Train.through(layered), Vector.ZERO, new Vector(1, 2, 3))
                .plane()
                .orElseThrow();
        assertThat(normal.y()).isCloseTo(0, within(1e-15));
        IndexField skew =
                Fields.bumps(1.5, new double[][] {{1, 0.3, 0.2, 0.1, 1}, {-0.2, 1, 2, 0.1, 1}, {0, 0, 3, 0.1, 2}});
        assertThat(new Symmetry(Train.through(skew), Vector.ZERO, new Vector(1, 2, 3)).plane())
                .isEmpty();
    }
}
