package org.stillpath.path;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.ArrayList;
import java.util.List;
import java.util.function.DoubleUnaryOperator;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;
import org.stillpath.formula.Coordinate;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.medium.Beyond;
import org.stillpath.medium.EarthChart;
import org.stillpath.medium.Ground;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Interpolation;
import org.stillpath.medium.Spline;
import org.stillpath.ray.Status;

class SightingsTest {
    private static final double R = 6_371_000;

    /** A field of the height alone, by its refractivity and two derivatives. */
    private record Layers(
            double radius, DoubleUnaryOperator nu, DoubleUnaryOperator slope, DoubleUnaryOperator bend, boolean layered)
            implements IndexField {
        @Override
        public void sample(double[] x, double[] y, double[] z, int count, Order order, Samples out) {
            EarthChart chart = Double.isInfinite(radius)
                    ? EarthChart.flat(Ground.level(0))
                    : EarthChart.sphere(radius, Ground.level(0));
            Samples h = new Samples(count);
            chart.sample(Coordinate.HEIGHT, x, y, z, count, order, h);
            for (int i = 0; i < count; i++) {
                double v = nu.applyAsDouble(h.value[i]);
                double n = 1 + v;
                out.value[i] = v * (2 + v);
                if (order == Order.VALUE) {
                    continue;
                }
                double g = n * slope.applyAsDouble(h.value[i]);
                out.gx[i] = g * h.gx[i];
                out.gy[i] = g * h.gy[i];
                out.gz[i] = g * h.gz[i];
                if (order == Order.HESSIAN) {
                    double s = slope.applyAsDouble(h.value[i]);
                    double b = s * s + n * bend.applyAsDouble(h.value[i]);
                    out.hxx[i] = g * h.hxx[i] + b * h.gx[i] * h.gx[i];
                    out.hxy[i] = g * h.hxy[i] + b * h.gx[i] * h.gy[i];
                    out.hxz[i] = g * h.hxz[i] + b * h.gx[i] * h.gz[i];
                    out.hyy[i] = g * h.hyy[i] + b * h.gy[i] * h.gy[i];
                    out.hyz[i] = g * h.hyz[i] + b * h.gy[i] * h.gz[i];
                    out.hzz[i] = g * h.hzz[i] + b * h.gz[i] * h.gz[i];
                }
            }
        }

        @Override
        public boolean ofHeightAlone() {
            return layered;
        }
    }

    /** Air of even fall with a duct: −dν/dh is larger by a bump about a height. */
    private static Layers duct(double step, double at, double width, boolean layered) {
        return new Layers(
                R,
                h -> 2.8e-4 * Math.exp(-h / 9000) - 0.5 * step * (1 + Math.tanh((h - at) / width)),
                h -> -2.8e-4 / 9000 * Math.exp(-h / 9000)
                        - 0.5 * step / width / Math.pow(Math.cosh((h - at) / width), 2),
                h -> 2.8e-4 / 81e6 * Math.exp(-h / 9000)
                        + step / width / width * Math.tanh((h - at) / width) / Math.pow(Math.cosh((h - at) / width), 2),
                layered);
    }

    private static Sightings through(Layers field, double accuracy) {
        return Sightings.through(field, EarthChart.sphere(R, Ground.level(0)), accuracy);
    }

    @ParameterizedTest
    @CsvSource({"5000, 1e-8", "100000, 1e-6"})
    void bouguersIntegralAgrees(double distance, double agreement) {
        // issue 5: 1e-8 m over 5 km, 1e-6 m over 100 km
        Layers air = duct(2e-6, 300, 60, true);
        double h = distance > 50_000 ? 800 : 12;
        Sightings.Outcome seen = through(air, 1e-12).find(h, distance, h + 7);
        assertThat(seen.images()).isNotEmpty();
        for (Sighting s : seen.images()) {
            assertThat(s.secondMethod()).as("at %s", s.launch()).isCloseTo(0, within(agreement));
        }
    }

    @ParameterizedTest
    @ValueSource(doubles = {0.07, 0.13, 0.2, 0.9, -1})
    void anEvenBendIsFoundExactly(double k) {
        // n = A r^-k: e = e0 + (1 - k) theta, both heights equal: e0 = -(1 - k) theta/2 (FORMULAS: closed case,
        // derived)
        Layers air = new Layers(
                R,
                h -> 1.00028 * Math.pow(1 + h / R, -k) - 1,
                h -> -k * 1.00028 / R * Math.pow(1 + h / R, -k - 1),
                h -> k * (k + 1) * 1.00028 / R / R * Math.pow(1 + h / R, -k - 2),
                true);
        double distance = 20_000;
        Sighting s = through(air, 1e-12).find(500, distance, 500).images().get(0);
        double exact = -0.5 * (1 - k) * distance / R;
        assertThat(s.launch()).isCloseTo(exact, within(3e-14));
        assertThat(s.arrival()).isCloseTo(-exact, within(3e-14));
        assertThat(Math.abs(s.launch() - exact)).isLessThanOrEqualTo(s.errors().launch());
        assertThat(s.slope()).isCloseTo(distance * (1 + 500 / R), within(0.02 * Math.abs(1 - k) * distance + 1));
    }

    @ParameterizedTest
    @CsvSource({"12, 30", "17, 40", "19, 35", "22, 30", "15, 15", "18.5, 35", "20.5, 40", "16, 60"})
    void theTableOfTheSearchFindsWhatTheAirItselfGives(double from, double km) {
        // the same air once tabulated, once traced as if it depended on more than the height
        Sightings.Outcome quick = through(duct(3.9e-6, 20, 3, true), 1e-9).find(from, 1e3 * km, 19);
        Sightings.Outcome slow = through(duct(3.9e-6, 20, 3, false), 1e-9).find(from, 1e3 * km, 19);
        List<Double> a = quick.images().stream().map(Sighting::launch).toList();
        assertThat(quick.images()).hasSameSizeAs(slow.images());
        for (Sighting s : slow.images()) {
            assertThat(a).as("images %s, and %s", a, s.launch()).anyMatch(e -> Math.abs(e - s.launch()) < 1e-11);
        }
    }

    @Test
    void aDuctShowsFiveImagesWhereAUniformFanFindsFour() {
        Sightings s = through(duct(3.9e-6, 20, 3, true), 1e-9);
        double from = 19;
        double distance = 35_000;
        Sightings.Outcome seen = s.find(from, distance, 19);
        assertThat(seen.images()).hasSize(5);
        for (int i = 1; i < 5; i++) {
            assertThat(seen.images().get(i).launch())
                    .isLessThan(seen.images().get(i - 1).launch());
            assertThat(seen.images().get(i).slope() > 0)
                    .isNotEqualTo(seen.images().get(i - 1).slope() > 0);
        }
        // each is a ray that arrives
        for (Sighting image : seen.images()) {
            Sightings.Reached r = s.reach(from, image.launch(), distance);
            assertThat(r.status()).isEqualTo(Status.ARRIVED);
            double play = 2e-16 * Math.abs(image.slope()) + 1e-6;
            assertThat(r.height()).isCloseTo(19, within(play));
        }
        // a fan of 2000 even steps, its changes of sign taken for images unless the height jumps between neighbours
        int count = 0;
        double low = -6e-3;
        double step = 12e-3 / 2000;
        double before = Double.NaN;
        for (int i = 0; i <= 2000; i++) {
            Sightings.Reached r = s.reach(from, low + i * step, distance);
            double h = r.status() == Status.ARRIVED ? r.height() - 19 : Double.NaN;
            boolean jump = Math.abs(h - before) > 10;
            count += before > 0 != h > 0 && !Double.isNaN(h + before) && !jump ? 1 : 0;
            before = h;
        }
        assertThat(count).isEqualTo(4);
    }

    @Test
    void aDuctIsNamedWithTheRaysThatItKeeps() {
        Sightings.Outcome seen = through(duct(3.9e-6, 20, 3, true), 1e-9).find(12, 15_000, 10);
        assertThat(seen.ducts()).hasSize(1);
        Sightings.Duct d = seen.ducts().get(0);
        assertThat(d.low()).isBetween(12.0, 20.0);
        assertThat(d.high()).isBetween(20.0, 28.0);
        assertThat(d.kept()).isBetween(1.5e-3, 2.5e-3);
    }

    @Test
    void theHorizonIsThatOfBouguersClosedForm() {
        // cos(dip) = n(0) R/(n(h)(R + h)), exact where n r rises with the height
        Layers air = duct(0, 20, 3, true);
        for (double h : new double[] {2, 10, 150, 3000}) {
            Sightings.Horizon found = through(air, 1e-12).horizon(h).orElseThrow();
            double dnu = air.nu.applyAsDouble(0) - air.nu.applyAsDouble(h);
            double less = (h * (1 + air.nu.applyAsDouble(h)) - dnu * R) / ((1 + air.nu.applyAsDouble(h)) * (R + h));
            double dip = 2 * Math.asin(Math.sqrt(0.5 * less));
            assertThat(found.dip()).isCloseTo(dip, within(1e-13 + 1e-11 * dip));
            assertThat(found.dipError()).isGreaterThanOrEqualTo(Math.abs(found.dip() - dip));
            // the same by rays over ground that is called uneven
            Sightings.Horizon traced =
                    through(duct(0, 20, 3, false), 1e-12).horizon(h).orElseThrow();
            assertThat(traced.dip()).isCloseTo(dip, within(1e-11));
            assertThat(traced.distance()).isCloseTo(found.distance(), within(1e-2));
        }
    }

    @Test
    void aHillHidesWhatAStraightLineOverItHides() {
        // in vacuum: the line that touches the top of a hill bounds what is seen behind it
        Ground hill = Ground.profile(Spline.of(
                new double[] {0, 900, 1000, 1100, 3000},
                new double[] {0, 0, 20, 0, 0},
                Interpolation.MONOTONE,
                Beyond.HOLD));
        EarthChart chart = EarthChart.flat(hill);
        Layers vacuum = new Layers(Double.POSITIVE_INFINITY, h -> 0, h -> 0, h -> 0, true);
        Sightings.Outcome seen = Sightings.through(vacuum, chart, 1e-9).find(10, 3000, 20);
        assertThat(seen.images()).isEmpty();
        double most = 0;
        for (double x = 950; x < 1050; x += 0.01) {
            most = Math.max(most, (hill.height(x) - 10) / x);
        }
        assertThat(seen.limb().orElseThrow().height()).isCloseTo(10 + 3000 * most, within(1e-4));
        assertThat(seen.limb().orElseThrow().bound()).isEqualTo(Sightings.Bound.GROUND);
        assertThat(Sightings.through(vacuum, chart, 1e-9).find(10, 3000, 60).images())
                .hasSize(1);
    }

    @Test
    void errorsHoldWhereTheExactRayIsKnown() {
        // n^2 = ninf^2 - B exp(-alpha h) over a flat earth (FORMULAS: closed form, evaluated): exact arrival heights
        double nu = 2.7e-4;
        double b = 4e-5;
        double alpha = 5;
        DoubleUnaryOperator n2 = h -> (1 + nu) * (1 + nu) - b * Math.exp(-alpha * h);
        Layers air = new Layers(
                Double.POSITIVE_INFINITY,
                h -> (nu * (2 + nu) - b * Math.exp(-alpha * h)) / (1 + Math.sqrt(n2.applyAsDouble(h))),
                h -> 0.5 * alpha * b * Math.exp(-alpha * h) / Math.sqrt(n2.applyAsDouble(h)),
                h -> {
                    double n = Math.sqrt(n2.applyAsDouble(h));
                    double f = 0.5 * alpha * b * Math.exp(-alpha * h);
                    return -alpha * f / n - f * f / (n * n * n);
                },
                true);
        Sightings s = Sightings.through(air, EarthChart.flat(Ground.level(0)), 1e-10);
        int worse = 0;
        List<Double> ratios = new ArrayList<>();
        for (double to = 0.3; to < 2; to += 0.1) {
            for (Sighting image : s.find(1.5, 600, to).images()) {
                double c = Math.sqrt(n2.applyAsDouble(1.5)) * Math.cos(image.launch());
                // ninf^2 - C^2 without the difference
                double q = b * Math.exp(-alpha * 1.5) + n2.applyAsDouble(1.5) * Math.pow(Math.sin(image.launch()), 2);
                double phase = Math.signum(image.launch()) * acosh(Math.sqrt(q / b) * Math.exp(0.5 * alpha * 1.5));
                double h = 2
                        / alpha
                        * Math.log(Math.sqrt(b / q) * Math.cosh(alpha * Math.sqrt(q) * 600 / (2 * c) + phase));
                double miss = Math.abs(h - to) / Math.abs(image.slope());
                worse += miss > image.errors().launch() + 3e-15 ? 1 : 0;
                ratios.add(image.errors().launch() / Math.max(miss, 1e-17));
            }
        }
        assertThat(worse).isZero();
        assertThat(ratios).hasSizeGreaterThan(20);
    }

    private static double acosh(double x) {
        return Math.log(x + Math.sqrt(x * x - 1));
    }
}
