package org.stillpath.medium;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Coordinate;
import org.stillpath.formula.Order;
import org.stillpath.formula.PerThread;
import org.stillpath.formula.Samples;

/**
 * The pressure of air at rest, dp/dh = −ρ g, through a temperature and a humidity of height alone.
 *
 * <p>The value comes from a {@link HydrostaticTable}; its derivatives are the equation itself and its derivative, so that
 * they are exact whatever the table's error. {@code full} takes the gravity of the height, g₀(r₀/(r₀ + h))² with r₀ =
 * 6356.766 km (US Standard Atmosphere 1976), and the density of moist air, (p − 0.378 e)/(R T); otherwise g = 9.80665 m/s²
 * and dry air. Both take R = 287.05287 J/(kg K).
 */
final class Hydrostatic implements Pressure {
    static final double GRAVITY = 9.80665;
    static final double EARTH = 6356766;
    static final double GAS = 287.05287;
    private static final double LIGHTER = 0.378;
    private static final double K = GRAVITY / GAS;
    // Gauss and Legendre's points and weights for eight points on -1..1, positive half
    private static final double[] POINTS = {
        0.1834346424956498, 0.5255324099163290, 0.7966664774136267, 0.9602898564975363
    };
    private static final double[] WEIGHTS = {
        0.3626837833783620, 0.3137066458778873, 0.2223810344533745, 0.1012285362903763
    };

    /** Where the pressure was given, and what it is there. */
    private record Given(double pressure, double height) {}

    private final HydrostaticTable table;
    private final Given given;
    private final boolean full;
    private final Humidity humidity;
    private final Chart chart;
    private final ScalarField temperature;
    private final double low;
    private final double high;
    private final PerThread<Work> work;

    private static final class Work {
        final double[] saturated = new double[Saturation.JET];
        final double[] jet = new double[AirLaw.JET];
        final double[] zero = new double[8];
        final double[] heights = new double[8];
        final Samples t = new Samples(8);
        final Samples w = new Samples(8);
    }

    private Hydrostatic(
            HydrostaticTable table,
            Given given,
            boolean full,
            Humidity humidity,
            Chart chart,
            ScalarField temperature,
            double low,
            double high,
            PerThread<Work> work) {
        this.table = table;
        this.given = given;
        this.full = full;
        this.humidity = humidity;
        this.chart = chart;
        this.temperature = temperature;
        this.low = low;
        this.high = high;
        this.work = work;
    }

    /**
     * Solves the equation.
     *
     * @param temperature in kelvin, of height alone
     * @param humidity of height alone where {@code full}
     * @param pressure at {@code height}, pascal
     * @param height metres
     */
    static Hydrostatic of(ScalarField temperature, Humidity humidity, double pressure, double height, boolean full) {
        ScalarField t = temperature.on(Chart.FLAT);
        Humidity moist = full && !humidity.isNone()
                ? humidity.with(humidity.quantity().on(Chart.FLAT))
                : Humidity.none(humidity.saturation());
        List<Double> breaks = new ArrayList<>();
        for (ScalarField f : List.of(t, moist.quantity())) {
            for (Seam s : f.seams(Double.NaN)) {
                if (s.coordinate() instanceof ChartLevel) {
                    Arrays.stream(s.knots()).forEach(breaks::add);
                }
            }
        }
        HydrostaticTable table = HydrostaticTable.of(
                rate(t, moist, full),
                pressure,
                height,
                breaks.stream().mapToDouble(Double::doubleValue).toArray());
        return new Hydrostatic(
                table,
                new Given(pressure, height),
                full,
                moist,
                Chart.FLAT,
                t,
                Double.NEGATIVE_INFINITY,
                Double.POSITIVE_INFINITY,
                PerThread.of(Work::new));
    }

    private static HydrostaticTable.Rate rate(ScalarField t, Humidity moist, boolean full) {
        return new HydrostaticTable.Rate() {
            private final double[] saturated = new double[Saturation.JET];
            private final double[] jet = new double[AirLaw.JET];
            private Samples ts = new Samples(1);
            private Samples ws = new Samples(1);
            private double[] zero = new double[1];
            private double[] pull = new double[1];
            private double[] vapour = new double[1];

            @Override
            public boolean coupled() {
                return !moist.isNone();
            }

            @Override
            public void over(double[] heights) {
                int n = heights.length;
                if (zero.length < n) {
                    ts = new Samples(n);
                    ws = new Samples(n);
                    zero = new double[n];
                    pull = new double[n];
                    vapour = new double[n];
                }
                t.sample(zero, zero, heights, n, Double.NaN, Order.VALUE, ts);
                if (coupled()) {
                    moist.quantity().sample(zero, zero, heights, n, Double.NaN, Order.VALUE, ws);
                }
                for (int i = 0; i < n; i++) {
                    pull[i] = HydrostaticTable.possible(ts.value[i]) ? -K * gravity(heights[i], full) : Double.NaN;
                    vapour[i] = coupled() && !moist.ofPressure() ? vapour(i, Double.NaN) : 0;
                }
            }

            @Override
            public void at(double[] pressures, double[] rates) {
                boolean again = moist.ofPressure();
                for (int i = 0; i < pressures.length; i++) {
                    double e = again ? vapour(i, pressures[i]) : vapour[i];
                    rates[i] = pull[i] * (1 - LIGHTER * e / pressures[i]) / ts.value[i];
                }
            }

            private double vapour(int i, double pressure) {
                moist.jet(ts.value[i], pressure, ws.value[i], Order.VALUE, saturated, jet);
                return jet[AirLaw.N];
            }
        };
    }

    /** Gravity at a height over that at the datum. */
    private static double gravity(double h, boolean full) {
        double u = full ? EARTH / (EARTH + h) : 1;
        return u * u;
    }

    HydrostaticTable table() {
        return table;
    }

    @Override
    public void sample(double[] x, double[] y, double[] z, int count, Samples t, Samples w, Order order, Samples out) {
        Work work = this.work.get();
        boolean dry = humidity.isNone();
        for (int i = 0; i < count; i++) {
            double h = z[i];
            double p = h < low ? beyond(low, h, work) : h > high ? beyond(high, h, work) : pressure(h, work);
            out.value[i] = p;
            if (order == Order.VALUE) {
                continue;
            }
            double kelvin = t.value[i];
            double over = 1 / kelvin;
            double k = K * gravity(h, full);
            double m = p;
            if (!dry) {
                humidity.jet(kelvin, p, w.value[i], Order.GRADIENT, work.saturated, work.jet);
                m = p - LIGHTER * work.jet[AirLaw.N];
            }
            double slope = -k * m * over;
            out.gx[i] = 0;
            out.gy[i] = 0;
            out.gz[i] = slope;
            if (order == Order.HESSIAN) {
                double rise = slope;
                if (!dry) {
                    double[] e = work.jet;
                    rise -= LIGHTER * (e[AirLaw.T] * t.gz[i] + e[AirLaw.P] * slope + e[AirLaw.E] * w.gz[i]);
                }
                double kSlope = full ? -2 * k / (EARTH + h) : 0;
                out.hxx[i] = 0;
                out.hxy[i] = 0;
                out.hxz[i] = 0;
                out.hyy[i] = 0;
                out.hyz[i] = 0;
                out.hzz[i] = over * (-kSlope * m - k * rise + k * m * over * t.gz[i]);
            }
        }
    }

    /** The pressure at a height, or past the table's own ends. */
    private double pressure(double h, Work work) {
        double p = table.pressure(h);
        boolean past = Double.isNaN(p) && !Double.isNaN(h) && !table.isEmpty();
        return past ? beyond(Math.max(table.low(), Math.min(table.high(), h)), h, work) : p;
    }

    /**
     * The pressure past the edge of a piece, through the temperature of that piece continued: for an integrator that
     * takes its stages past a seam before it lands there. The vapour follows the pressure to first order.
     */
    private double beyond(double edge, double h, Work work) {
        double p = table.pressure(edge);
        double half = (h - edge) / 2;
        for (int i = 0; i < 8; i++) {
            double s = i < 4 ? POINTS[i] : -POINTS[i - 4];
            work.heights[i] = edge + half * (1 + s);
        }
        temperature.sample(work.zero, work.zero, work.heights, 8, Double.NaN, Order.VALUE, work.t);
        boolean dry = humidity.isNone();
        if (!dry) {
            humidity.quantity().sample(work.zero, work.zero, work.heights, 8, Double.NaN, Order.VALUE, work.w);
        }
        double sum = 0;
        for (int i = 0; i < 8; i++) {
            double kelvin = work.t.value[i];
            double k = K * gravity(work.heights[i], full) / kelvin;
            double drier = 1;
            if (!dry) {
                double near = p * Math.exp(-k * (work.heights[i] - edge));
                humidity.jet(kelvin, near, work.w.value[i], Order.VALUE, work.saturated, work.jet);
                drier = 1 - LIGHTER * work.jet[AirLaw.N] / near;
            }
            sum += WEIGHTS[i % 4] * k * drier;
        }
        return p * Math.exp(-half * sum);
    }

    @Override
    public Pressure on(Chart other) {
        return new Hydrostatic(table, given, full, humidity, other, temperature, low, high, work);
    }

    @Override
    public Pressure joinedOtherwise(ScalarField other, Humidity moist) {
        return of(other, moist, given.pressure, given.height, full);
    }

    @Override
    public boolean ofHeightAlone() {
        return true;
    }

    @Override
    public List<Level> limits() {
        Level height = new ChartLevel(Coordinate.HEIGHT, chart);
        return List.of(new PressureEdge(height, table, false), new PressureEdge(height, table, true));
    }

    @Override
    public Pressure piece(int[] cells, ScalarField t, ScalarField w, double from, double to) {
        return new Hydrostatic(
                table, given, full, humidity.isNone() ? humidity : humidity.with(w), chart, t, from, to, work);
    }

    @Override
    public String explain(double x, double y, double z) {
        double h = new ChartLevel(Coordinate.HEIGHT, chart).value(x, y, z, new double[3]);
        if (!Double.isNaN(table.pressure(h))) {
            return "";
        }
        return "height = " + Told.length(h) + " is outside the range of the hydrostatic pressure, which runs from "
                + Told.length(table.low()) + " to " + Told.length(table.high());
    }
}
