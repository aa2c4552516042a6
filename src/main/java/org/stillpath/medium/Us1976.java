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
 * The temperature of the US Standard Atmosphere 1976 (NOAA-S/T 76-1562), and through {@link Layered} its pressure: seven
 * layers of even lapse in geopotential height H = r₀h/(r₀ + h), r₀ = 6356.766 km, from −5 km to 84.852 km of it, 86 km of
 * height. Closed forms with exact derivatives; the constants are the publication's own, R* = 8314.32 J/(kmol K) among
 * them.
 */
final class Us1976 implements ScalarField {
    /** Lowest height, metres. */
    static final double LOWEST = -5e3;
    /** Highest height, metres: 84.852 km of geopotential height. */
    static final double HIGHEST = 86e3;

    private static final double R0 = Hydrostatic.EARTH;
    /** g₀ M₀/R*, K/m. */
    private static final double K = 9.80665 * 28.9644 / 8314.32;

    private static final double SEA_PRESSURE = 101325;
    private static final double SEA_TEMPERATURE = 288.15;
    private static final double[] BASES = {0, 11e3, 20e3, 32e3, 47e3, 51e3, 71e3};
    private static final double[] LAPSES = {-6.5e-3, 0, 1e-3, 2.8e-3, 0, -2.8e-3, -2e-3};
    private static final double[] BASE_TEMPERATURES = baseTemperatures();
    private static final double[] BASE_PRESSURES = basePressures();
    /** No layer in particular. */
    private static final int ANY = -1;

    private final Chart chart;
    private final int layer;
    private final PerThread<Samples[]> scratch;

    private Us1976(Chart chart, int layer, PerThread<Samples[]> scratch) {
        this.chart = chart;
        this.layer = layer;
        this.scratch = scratch;
    }

    /** The temperature, in kelvin. */
    static Us1976 temperature() {
        return new Us1976(Chart.FLAT, ANY, PerThread.of(() -> new Samples[] {new Samples(1)}));
    }

    /** The pressure that goes with it. */
    static Pressure pressure() {
        return new Layered(Chart.FLAT, ANY);
    }

    /** Geopotential height of a height, both in metres. */
    static double geopotential(double h) {
        return R0 * h / (R0 + h);
    }

    /** Height of a geopotential height. */
    static double geometric(double geopotential) {
        return R0 * geopotential / (R0 - geopotential);
    }

    /** Temperature in kelvin at a geopotential height. */
    static double temperatureAt(double geopotential) {
        int i = layerOf(geopotential);
        return BASE_TEMPERATURES[i] + LAPSES[i] * (geopotential - BASES[i]);
    }

    /** Pressure in pascal at a geopotential height. */
    static double pressureAt(double geopotential) {
        return pressureAt(layerOf(geopotential), geopotential);
    }

    private static double pressureAt(int i, double geopotential) {
        return through(i, BASE_PRESSURES[i], geopotential);
    }

    private static double through(int i, double base, double geopotential) {
        double t = BASE_TEMPERATURES[i];
        double rise = geopotential - BASES[i];
        return LAPSES[i] == 0
                ? base * Math.exp(-K * rise / t)
                : base * Math.exp(-K / LAPSES[i] * Math.log1p(LAPSES[i] * rise / t));
    }

    private static double[] baseTemperatures() {
        double[] t = new double[BASES.length];
        t[0] = SEA_TEMPERATURE;
        for (int i = 1; i < t.length; i++) {
            t[i] = t[i - 1] + LAPSES[i - 1] * (BASES[i] - BASES[i - 1]);
        }
        return t;
    }

    private static double[] basePressures() {
        double[] p = new double[BASES.length];
        p[0] = SEA_PRESSURE;
        for (int i = 1; i < p.length; i++) {
            p[i] = through(i - 1, p[i - 1], BASES[i]);
        }
        return p;
    }

    private static int layerOf(double geopotential) {
        int i = Arrays.binarySearch(BASES, geopotential);
        return Math.max(0, i >= 0 ? i : -i - 2);
    }

    private static double[] knots() {
        return Arrays.stream(BASES).skip(1).map(Us1976::geometric).toArray();
    }

    @Override
    public void sample(double[] x, double[] y, double[] z, int count, double wavelength, Order order, Samples out) {
        Samples[] held = scratch.get();
        if (held[0].capacity() < count) {
            held[0] = new Samples(count);
        }
        Samples u = held[0];
        chart.sample(Coordinate.HEIGHT, x, y, z, count, order, u);
        for (int n = 0; n < count; n++) {
            double h = u.value[n];
            double up = 1 / (R0 + h);
            double geopotential = R0 * h * up;
            int i = layer == ANY ? layerOf(geopotential) : layer;
            out.value[n] = BASE_TEMPERATURES[i] + LAPSES[i] * (geopotential - BASES[i]);
            if (order != Order.VALUE) {
                double slope = LAPSES[i] * R0 * R0 * up * up;
                AlongHeight.chain(slope, -2 * slope * up, u, order, out, n);
            }
        }
    }

    @Override
    public ScalarField on(Chart other) {
        return new Us1976(other, layer, scratch);
    }

    @Override
    public boolean ofHeightAlone() {
        return true;
    }

    @Override
    public List<Level> limits() {
        Level height = new ChartLevel(Coordinate.HEIGHT, chart);
        List<Level> list = new ArrayList<>();
        list.add(new EdgeLevel(height, LOWEST, false, "us-1976"));
        list.add(new EdgeLevel(height, HIGHEST, true, "us-1976"));
        return list;
    }

    @Override
    public List<Seam> seams(double wavelength) {
        return List.of(new Seam(new ChartLevel(Coordinate.HEIGHT, chart), knots()));
    }

    @Override
    public ScalarField piece(int[] cells) {
        return new Us1976(chart, cells[0], scratch);
    }

    /**
     * The pressure of the layers.
     *
     * @param chart gives the height, for words
     * @param layer the layer that holds everywhere, or none in particular
     */
    record Layered(Chart chart, int layer) implements Pressure {
        @Override
        public void sample(
                double[] x, double[] y, double[] z, int count, Samples t, Samples w, Order order, Samples out) {
            for (int n = 0; n < count; n++) {
                double up = 1 / (R0 + z[n]);
                double geopotential = R0 * z[n] * up;
                double p = pressureAt(layer == ANY ? layerOf(geopotential) : layer, geopotential);
                out.value[n] = p;
                if (order == Order.VALUE) {
                    continue;
                }
                double rise = R0 * R0 * up * up;
                double over = 1 / t.value[n];
                double slope = -K * p * rise * over;
                out.gx[n] = 0;
                out.gy[n] = 0;
                out.gz[n] = slope;
                if (order == Order.HESSIAN) {
                    out.hxx[n] = 0;
                    out.hxy[n] = 0;
                    out.hxz[n] = 0;
                    out.hyy[n] = 0;
                    out.hyz[n] = 0;
                    out.hzz[n] = -K * over * rise * (slope - p * (2 * up + over * t.gz[n]));
                }
            }
        }

        @Override
        public Pressure on(Chart other) {
            return new Layered(other, layer);
        }

        @Override
        public Pressure joinedOtherwise(ScalarField temperature, Humidity humidity) {
            return this;
        }

        @Override
        public boolean ofHeightAlone() {
            return true;
        }

        @Override
        public Pressure piece(int[] cells, ScalarField temperature, ScalarField humidity, double low, double high) {
            boolean open = Double.isInfinite(high);
            double inside = Double.isInfinite(low) ? high - 1 : open ? low + 1 : (low + high) / 2;
            return new Layered(chart, Double.isFinite(inside) ? layerOf(geopotential(inside)) : ANY);
        }

        @Override
        public String explain(double x, double y, double z) {
            return "";
        }
    }
}
