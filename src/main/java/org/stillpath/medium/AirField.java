package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Order;
import org.stillpath.formula.PerThread;
import org.stillpath.formula.Samples;

/**
 * The refractivity of air whose temperature, pressure and humidity vary from place to place, at one wavelength: the
 * three quantities through the law by the chain rule, to the Hessian, without differences and without allocation.
 */
final class AirField implements ScalarField {
    private final AirLaw law;
    private final AirLaw.Dispersion dispersion;
    private final ScalarField temperature;
    private final Pressure pressure;
    private final Humidity humidity;
    private final MergedSeams seams;
    private final PerThread<Work> work;

    private static final class Work {
        Samples t = new Samples(1);
        Samples p = new Samples(1);
        Samples w = new Samples(1);
        final double[] n = new double[AirLaw.JET];
        final double[] e = new double[AirLaw.JET];
        final double[] saturated = new double[Saturation.JET];

        Work with(int count) {
            if (t.capacity() < count) {
                t = new Samples(count);
                p = new Samples(count);
                w = new Samples(count);
            }
            return this;
        }
    }

    AirField(AirLaw law, AirLaw.Dispersion dispersion, ScalarField temperature, Pressure pressure, Humidity humidity) {
        this(law, dispersion, temperature, pressure, humidity, PerThread.of(Work::new));
    }

    private AirField(
            AirLaw law,
            AirLaw.Dispersion dispersion,
            ScalarField temperature,
            Pressure pressure,
            Humidity humidity,
            PerThread<Work> work) {
        this.law = law;
        this.dispersion = dispersion;
        this.temperature = temperature;
        this.pressure = pressure;
        this.humidity = humidity;
        this.seams = MergedSeams.of(List.of(
                temperature.seams(Double.NaN),
                pressure.seams(),
                humidity.quantity().seams(Double.NaN)));
        this.work = work;
    }

    @Override
    public void sample(double[] x, double[] y, double[] z, int count, double wavelength, Order order, Samples out) {
        Work k = work.get().with(count);
        temperature.sample(x, y, z, count, Double.NaN, order, k.t);
        humidity.quantity().sample(x, y, z, count, Double.NaN, order, k.w);
        pressure.sample(x, y, z, count, k.t, k.w, order, k.p);
        boolean dry = humidity.isNone();
        for (int i = 0; i < count; i++) {
            double kelvin = k.t.value[i];
            double pascal = k.p.value[i];
            double vapour = 0;
            if (!dry) {
                humidity.jet(kelvin, pascal, k.w.value[i], order, k.saturated, k.e);
                vapour = k.e[AirLaw.N];
            }
            if (!(kelvin > 0 && pascal > 0 && vapour >= 0 && vapour <= pascal)) {
                out.undefine(order, i);
                continue;
            }
            law.refractivity(dispersion, kelvin, pascal, vapour, order, k.n);
            out.value[i] = k.n[AirLaw.N];
            if (order != Order.VALUE) {
                if (!dry) {
                    throughVapour(k.n, k.e, order);
                }
                spread(k, !dry, order, out, i);
            }
        }
    }

    /** Turns derivatives by T, p, e into derivatives by T, p and the humidity's quantity, in place. */
    private static void throughVapour(double[] n, double[] e, Order order) {
        double ne = n[AirLaw.E];
        double eT = e[AirLaw.T];
        double eP = e[AirLaw.P];
        double eW = e[AirLaw.E];
        n[AirLaw.T] += ne * eT;
        n[AirLaw.P] += ne * eP;
        n[AirLaw.E] = ne * eW;
        if (order == Order.HESSIAN) {
            double nTe = n[AirLaw.TE];
            double nPe = n[AirLaw.PE];
            double nee = n[AirLaw.EE];
            n[AirLaw.TT] += (2 * nTe + nee * eT) * eT + ne * e[AirLaw.TT];
            n[AirLaw.TP] += nTe * eP + nPe * eT + nee * eT * eP + ne * e[AirLaw.TP];
            n[AirLaw.PP] += (2 * nPe + nee * eP) * eP + ne * e[AirLaw.PP];
            n[AirLaw.TE] = (nTe + nee * eT) * eW + ne * e[AirLaw.TE];
            n[AirLaw.PE] = (nPe + nee * eP) * eW + ne * e[AirLaw.PE];
            n[AirLaw.EE] = nee * eW * eW + ne * e[AirLaw.EE];
        }
    }

    private static void spread(Work k, boolean moist, Order order, Samples out, int i) {
        double[] n = k.n;
        Samples t = k.t;
        Samples p = k.p;
        Samples w = k.w;
        double nT = n[AirLaw.T];
        double nP = n[AirLaw.P];
        double nW = moist ? n[AirLaw.E] : 0;
        out.gx[i] = nT * t.gx[i] + nP * p.gx[i] + nW * w.gx[i];
        out.gy[i] = nT * t.gy[i] + nP * p.gy[i] + nW * w.gy[i];
        out.gz[i] = nT * t.gz[i] + nP * p.gz[i] + nW * w.gz[i];
        if (order != Order.HESSIAN) {
            return;
        }
        out.hxx[i] = nT * t.hxx[i]
                + nP * p.hxx[i]
                + nW * w.hxx[i]
                + form(k, moist, t.gx[i], p.gx[i], w.gx[i], t.gx[i], p.gx[i], w.gx[i]);
        out.hxy[i] = nT * t.hxy[i]
                + nP * p.hxy[i]
                + nW * w.hxy[i]
                + form(k, moist, t.gx[i], p.gx[i], w.gx[i], t.gy[i], p.gy[i], w.gy[i]);
        out.hxz[i] = nT * t.hxz[i]
                + nP * p.hxz[i]
                + nW * w.hxz[i]
                + form(k, moist, t.gx[i], p.gx[i], w.gx[i], t.gz[i], p.gz[i], w.gz[i]);
        out.hyy[i] = nT * t.hyy[i]
                + nP * p.hyy[i]
                + nW * w.hyy[i]
                + form(k, moist, t.gy[i], p.gy[i], w.gy[i], t.gy[i], p.gy[i], w.gy[i]);
        out.hyz[i] = nT * t.hyz[i]
                + nP * p.hyz[i]
                + nW * w.hyz[i]
                + form(k, moist, t.gy[i], p.gy[i], w.gy[i], t.gz[i], p.gz[i], w.gz[i]);
        out.hzz[i] = nT * t.hzz[i]
                + nP * p.hzz[i]
                + nW * w.hzz[i]
                + form(k, moist, t.gz[i], p.gz[i], w.gz[i], t.gz[i], p.gz[i], w.gz[i]);
    }

    /** The second derivatives of the law between two directions' changes of the three quantities. */
    private static double form(
            Work k, boolean moist, double t1, double p1, double w1, double t2, double p2, double w2) {
        double[] n = k.n;
        double sum = n[AirLaw.TT] * t1 * t2 + n[AirLaw.TP] * (t1 * p2 + p1 * t2) + n[AirLaw.PP] * p1 * p2;
        if (moist) {
            sum += n[AirLaw.TE] * (t1 * w2 + w1 * t2) + n[AirLaw.PE] * (p1 * w2 + w1 * p2) + n[AirLaw.EE] * w1 * w2;
        }
        return sum;
    }

    @Override
    public ScalarField on(Chart chart) {
        return new AirField(
                law,
                dispersion,
                temperature.on(chart),
                pressure.on(chart),
                humidity.with(humidity.quantity().on(chart)),
                work);
    }

    @Override
    public boolean ofHeightAlone() {
        return temperature.ofHeightAlone()
                && pressure.ofHeightAlone()
                && humidity.quantity().ofHeightAlone();
    }

    @Override
    public boolean isConstant() {
        return temperature.isConstant()
                && humidity.quantity().isConstant()
                && pressure instanceof Pressure.Given g
                && g.quantity().isConstant();
    }

    @Override
    public List<Level> limits() {
        List<Level> list = new ArrayList<>(temperature.limits());
        list.addAll(pressure.limits());
        list.addAll(humidity.quantity().limits());
        return List.copyOf(list);
    }

    @Override
    public List<Seam> seams(double wavelength) {
        return seams.seams();
    }

    @Override
    public ScalarField piece(int[] cells) {
        ScalarField t = temperature.piece(seams.cells(0, cells));
        ScalarField w = humidity.quantity().piece(seams.cells(2, cells));
        double low = Double.NEGATIVE_INFINITY;
        double high = Double.POSITIVE_INFINITY;
        for (int i = 0; i < cells.length; i++) {
            Seam seam = seams.seams().get(i);
            if (seam.coordinate() instanceof ChartLevel) {
                low = Math.max(low, cells[i] > 0 ? seam.knot(cells[i] - 1) : Double.NEGATIVE_INFINITY);
                high = Math.min(high, cells[i] < seam.count() ? seam.knot(cells[i]) : Double.POSITIVE_INFINITY);
            }
        }
        Pressure p = pressure.piece(seams.cells(1, cells), t, w, low, high);
        return new AirField(law, dispersion, t, p, humidity.with(w), work);
    }

    @Override
    public String explain(double x, double y, double z, double wavelength) {
        for (String why : List.of(
                temperature.explain(x, y, z, Double.NaN),
                pressure.explain(x, y, z),
                humidity.quantity().explain(x, y, z, Double.NaN))) {
            if (!why.isEmpty()) {
                return why;
            }
        }
        Work k = new Work();
        double[] xs = {x};
        double[] ys = {y};
        double[] zs = {z};
        temperature.sample(xs, ys, zs, 1, Double.NaN, Order.VALUE, k.t);
        humidity.quantity().sample(xs, ys, zs, 1, Double.NaN, Order.VALUE, k.w);
        double kelvin = k.t.value[0];
        if (!(kelvin > 0)) {
            return "the temperature is " + Told.number(kelvin) + " K, and it must be above 0";
        }
        pressure.sample(xs, ys, zs, 1, k.t, k.w, Order.VALUE, k.p);
        double pascal = k.p.value[0];
        if (!(pascal > 0)) {
            return "the pressure is " + Told.pressure(pascal) + ", and it must be above 0";
        }
        double vapour = humidity.vapourPressure(kelvin, pascal, k.w.value[0]);
        return vapour >= 0 && vapour <= pascal
                ? ""
                : "the vapour pressure is " + Told.pressure(vapour) + ", and it must lie between 0 and the pressure "
                        + Told.pressure(pascal);
    }
}
