package org.stillpath.ray;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import org.apache.commons.math3.ode.FirstOrderDifferentialEquations;
import org.apache.commons.math3.ode.nonstiff.GraggBulirschStoerIntegrator;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;

/**
 * The engine against an integrator that shares no code with it: Commons Math's Gragg-Bulirsch-Stoer extrapolation, on the ray
 * equation with z as the parameter (x' = px/pz, px' = n ∂n/∂x / pz, S' = n²/pz), written out here once more.
 */
class CommonsMathTest {
    @ParameterizedTest
    @ValueSource(doubles = {1e-6, 1e-9, 1e-12})
    void agreesOnARod(double accuracy) {
        double n0 = 1.6;
        double w = n0 * n0 * 300 * 300;
        compare(
                accuracy,
                Fields.rod(n0, 300),
                new Vector(0.4e-3, -0.1e-3, 0),
                new Vector(0.05, 0.1, 1),
                30e-3,
                (x, y, z, f) -> {
                    f[0] = n0 * n0 - w * (x * x + y * y);
                    f[1] = -w * x;
                    f[2] = -w * y;
                });
    }

    @ParameterizedTest
    @ValueSource(doubles = {1e-6, 1e-9, 1e-12})
    void agreesOnAFisheye(double accuracy) {
        double a = 10e-3;
        compare(
                accuracy,
                Fields.fisheye(2, a),
                new Vector(-3e-3, 1e-3, -4e-3),
                new Vector(0.4, 0.3, 1),
                3e-3,
                (x, y, z, f) -> {
                    double u = 1 + (x * x + y * y + z * z) / (a * a);
                    f[0] = 4 / (u * u);
                    f[1] = -8 * x / (a * a * u * u * u);
                    f[2] = -8 * y / (a * a * u * u * u);
                });
    }

    /** n² and ½∂n²/∂x, ½∂n²/∂y at a place. */
    private interface Field {
        void at(double x, double y, double z, double[] out);
    }

    private static void compare(
            double accuracy, IndexField field, Vector from, Vector toward, double z, Field written) {
        for (Propagator.Maker engine : Engines.ALL) {
            compare(engine, accuracy, field, from, toward, z, written);
        }
    }

    private static void compare(
            Propagator.Maker engine,
            double accuracy,
            IndexField field,
            Vector from,
            Vector toward,
            double z,
            Field written) {
        Vector d = toward.unit();
        Traced end = new Tracer(
                        Train.through(field), new Ending.AtZ(z), new Tracer.Settings(accuracy, false, false), engine)
                .trace(RayStart.of(from, d));
        double[] f = new double[3];
        written.at(from.x(), from.y(), from.z(), f);
        double n = Math.sqrt(f[0]);
        double[] y = {from.x(), from.y(), n * d.x(), n * d.y(), 0};
        FirstOrderDifferentialEquations equations = new FirstOrderDifferentialEquations() {
            @Override
            public int getDimension() {
                return 5;
            }

            @Override
            public void computeDerivatives(double t, double[] s, double[] rate) {
                written.at(s[0], s[1], t, f);
                double pz = Math.sqrt(f[0] - s[2] * s[2] - s[3] * s[3]);
                rate[0] = s[2] / pz;
                rate[1] = s[3] / pz;
                rate[2] = f[1] / pz;
                rate[3] = f[2] / pz;
                rate[4] = f[0] / pz;
            }
        };
        new GraggBulirschStoerIntegrator(1e-9, 1e-2, 1e-16, 1e-14).integrate(equations, from.z(), y, z, y);
        double across = end.position().minus(from).norm();
        assertThat(Math.hypot(end.position().x() - y[0], end.position().y() - y[1]))
                .isLessThan(accuracy * across);
        assertThat(end.opticalLength()).isCloseTo(y[4], within(accuracy * y[4]));
        double index = end.index();
        assertThat(end.direction().x()).isCloseTo(y[2] / index, within(accuracy));
        assertThat(end.direction().y()).isCloseTo(y[3] / index, within(accuracy));
    }
}
