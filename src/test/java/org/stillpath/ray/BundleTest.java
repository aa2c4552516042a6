package org.stillpath.ray;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.offset;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Random;
import java.util.concurrent.ForkJoinPool;
import java.util.stream.Collectors;
import org.assertj.core.data.Offset;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.EnumSource;
import org.stillpath.formula.Formula;
import org.stillpath.formula.FormulaException;
import org.stillpath.formula.Names;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Quadric;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.Beyond;
import org.stillpath.medium.Declaration;
import org.stillpath.medium.FieldMedium;
import org.stillpath.medium.FormulaField;
import org.stillpath.medium.Grid;
import org.stillpath.medium.IndexField;
import org.stillpath.unit.Dimension;

/** Rays in bundles against the same rays one at a time, and against closed forms. */
class BundleTest {
    private static final int RAYS = 400;
    private static final double ACCURACY = 1e-9;

    @ParameterizedTest
    @EnumSource(AnalyticCase.Kind.class)
    void endsWhereTheClosedFormSays(AnalyticCase.Kind kind) {
        Random random = new Random(20261201);
        for (int i = 0; i < 6; i++) {
            AnalyticCase c = kind.random(random, 1);
            List<RayStart> starts = new ArrayList<>();
            for (int k = 0; k < RAYS; k++) {
                starts.add(RayStart.of(c.from(), c.direction()));
            }
            Tracer tracer = new Tracer(
                    Train.through(c.field()),
                    new Ending.AtOpticalLength(c.opticalLength()),
                    new Tracer.Settings(ACCURACY, false, false));
            Traced alone = tracer.trace(starts.get(0));
            List<Traced> bundle = tracer.trace(starts);
            assertThat(bundle).hasSize(RAYS);
            for (Traced t : bundle) {
                assertThat(t.status()).isEqualTo(alone.status());
                double off = t.position().minus(c.position()).norm();
                assertThat(off).isLessThanOrEqualTo(t.errors().position());
                assertThat(t.opticalLength()).isCloseTo(c.opticalLength(), offset(1e-13 * c.opticalLength()));
                assertThat(t.position().minus(alone.position()).norm())
                        .isLessThanOrEqualTo(
                                t.errors().position() + alone.errors().position());
                assertThat(t.length()).isCloseTo(alone.length(), within(t, alone));
                // equal rays give equal digits wherever they stand in the bundle
                assertThat(t.state()).isEqualTo(bundle.get(0).state());
            }
        }
    }

    private static IndexField medium(String formula, Map<String, Double> values) throws FormulaException {
        Map<String, Dimension> with = values.keySet().stream()
                .collect(Collectors.toMap(
                        k -> k,
                        k -> "g".equals(k)
                                ? Dimension.LENGTH.power(-1, 1)
                                : "n0".equals(k) ? Dimension.NONE : Dimension.LENGTH));
        Formula parsed = Formula.parse(formula, Names.of(Names.PLACE, with), Dimension.NONE);
        return new FieldMedium(Declaration.of("medium"), FormulaField.of(parsed, values), false, false)
                .field(500e-9, Frame.JOB);
    }

    /** A rod with curved faces, in air, with a stop: rays arrive, miss, are clipped; some graze the back face. */
    private static Train rod() throws FormulaException {
        IndexField air = Fields.uniform(1);
        IndexField rod =
                medium("n0*sqrt(1 - (g*r)^2 + 2/3*(g*r)^4) + 1e-3*sin(z/w)", Map.of("n0", 1.6, "g", 300.0, "w", 1e-3));
        return new Train(
                air,
                List.of(
                        new Element(Surface.cap(0, 4e-3, 0), new Action.Refract(false), rod),
                        new Element(
                                new Surface(Frame.at(new Vector(0, 0, 6e-3)), Quadric.PLANE, false, 0.5e-3),
                                new Action.Stop(),
                                rod),
                        new Element(Surface.cap(12e-3, -3e-3, 0), new Action.Refract(false), air)));
    }

    /** Nodes of a smooth index, or of one with noise, of 0.1 mm in a plate of 2 mm. */
    private static IndexField grid(double noise) {
        Random random = new Random(20261202);
        double[] across = new double[41];
        double[] along = new double[21];
        for (int i = 0; i < across.length; i++) {
            across[i] = 1e-4 * (i - 20);
        }
        for (int i = 0; i < along.length; i++) {
            along[i] = 1e-4 * i;
        }
        double[] values = new double[across.length * across.length * along.length];
        int at = 0;
        for (double z : along) {
            for (double y : across) {
                for (double x : across) {
                    double r2 = (x * x + y * y) / 1e-6;
                    values[at++] = 1.5 + 1e-2 * Math.exp(-r2) * (1 + z / 4e-3) + noise * random.nextGaussian();
                }
            }
        }
        Grid grid = Grid.of(across, across, along, values, Beyond.FAULT);
        return new FieldMedium(Declaration.of("plate"), grid, false, false).field(500e-9, Frame.JOB);
    }

    @ParameterizedTest
    @CsvSource({"0, 1e-9", "0, 1e-11", "1e-5, 1e-9"})
    void raysInDifferentCellsOfAGridShareABundle(double noise, double accuracy) {
        IndexField air = Fields.uniform(1);
        Train plate = new Train(
                air,
                List.of(
                        new Element(Surface.plane(0), new Action.Refract(false), grid(noise)),
                        new Element(Surface.plane(2e-3), new Action.Refract(false), air)));
        // some leave the grid by its sides
        List<RayStart> starts = fan(300);
        Tracer tracer = new Tracer(plate, new Ending.AtLastSurface(), new Tracer.Settings(accuracy, false, false));
        List<Traced> bundle = tracer.trace(starts);
        for (int i = 0; i < starts.size(); i++) {
            // a ray alone takes the pieces one by one
            Traced a = tracer.trace(starts.get(i));
            Traced b = bundle.get(i);
            assertThat(b.status()).as("ray %d", i).isEqualTo(a.status());
            assertThat(b.accurate()).isEqualTo(a.accurate());
            assertThat(b.position().minus(a.position()).norm())
                    .as("ray %d", i)
                    .isLessThanOrEqualTo(a.errors().position() + b.errors().position());
            assertThat(b.opticalLength())
                    .isCloseTo(
                            a.opticalLength(),
                            offset(a.errors().opticalLength() + b.errors().opticalLength()));
        }
    }

    private static List<RayStart> fan(int count) {
        Random random = new Random(20261201);
        List<RayStart> starts = new ArrayList<>();
        for (int i = 0; i < count; i++) {
            double height = 1.3e-3 * Math.sqrt(random.nextDouble());
            double phi = 2 * Math.PI * random.nextDouble();
            starts.add(RayStart.of(
                    new Vector(height * Math.cos(phi), height * Math.sin(phi), -5e-3),
                    new Vector(0.1 * (random.nextDouble() - 0.5), 0.1 * (random.nextDouble() - 0.5), 1).unit()));
        }
        return starts;
    }

    @ParameterizedTest
    @CsvSource({"1e-6, false", "1e-9, false", "1e-9, true", "1e-12, false"})
    void agreesWithRaysTracedAlone(double accuracy, boolean transfer) throws FormulaException {
        List<RayStart> starts = fan(700);
        for (Ending ending :
                new Ending[] {new Ending.AtZ(20e-3), new Ending.AtLastSurface(), new Ending.AtLength(40e-3)}) {
            Tracer tracer = new Tracer(rod(), ending, new Tracer.Settings(accuracy, transfer, false));
            List<Traced> bundle = tracer.trace(starts);
            int arrived = 0;
            for (int i = 0; i < starts.size(); i++) {
                Traced a = tracer.trace(starts.get(i));
                Traced b = bundle.get(i);
                assertThat(b.status()).as("ray %d", i).isEqualTo(a.status());
                assertThat(b.element()).isEqualTo(a.element());
                assertThat(b.note()).isEqualTo(a.note());
                assertThat(b.position().minus(a.position()).norm())
                        .as("ray %d", i)
                        .isLessThanOrEqualTo(a.errors().position() + b.errors().position());
                assertThat(b.opticalLength())
                        .isCloseTo(
                                a.opticalLength(),
                                offset(a.errors().opticalLength() + b.errors().opticalLength()));
                assertThat(b.length()).isCloseTo(a.length(), within(a, b));
                assertThat(b.accurate()).isEqualTo(a.accurate());
                arrived += b.status() == Status.ARRIVED ? 1 : 0;
                for (int k = State.COLUMNS; k < a.state().length && b.status() == Status.ARRIVED; k++) {
                    double size = k % 6 < 5 ? 1 : 1e3;
                    assertThat(b.state()[k])
                            .isCloseTo(a.state()[k], offset(1e-6 * size * (1 + Math.abs(a.state()[k]))));
                }
            }
            assertThat(arrived).isBetween(100, 600);
        }
    }

    @Test
    void digitsDoNotDependOnTheNumberOfThreads() throws Exception {
        List<RayStart> starts = fan(3000);
        Tracer tracer = new Tracer(rod(), new Ending.AtZ(20e-3), new Tracer.Settings(1e-9, false, false));
        List<List<Traced>> results = new ArrayList<>();
        for (int threads : new int[] {1, 2, 4}) {
            ForkJoinPool pool = new ForkJoinPool(threads);
            results.add(pool.submit(() -> tracer.trace(starts)).get());
            pool.shutdown();
        }
        for (int i = 0; i < starts.size(); i++) {
            assertThat(results.get(1).get(i).state())
                    .isEqualTo(results.get(0).get(i).state());
            assertThat(results.get(2).get(i).state())
                    .isEqualTo(results.get(0).get(i).state());
        }
    }

    @Test
    void handsOnRaysAsTheyCome() throws FormulaException {
        List<RayStart> starts = fan(20_000);
        Tracer tracer = new Tracer(rod(), new Ending.AtZ(20e-3), new Tracer.Settings(1e-6, false, false));
        List<Traced> ends = new ArrayList<>();
        tracer.trace(starts.iterator(), ends::add);
        assertThat(ends).isEqualTo(tracer.trace(starts));
    }

    private static Offset<Double> within(Traced a, Traced b) {
        return offset(a.errors().length() + b.errors().length());
    }
}
