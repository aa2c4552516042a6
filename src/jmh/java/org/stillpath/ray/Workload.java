package org.stillpath.ray;

import java.util.Map;
import java.util.Random;
import java.util.stream.Collectors;
import org.apache.commons.math3.ode.FirstOrderDifferentialEquations;
import org.hipparchus.exception.MathRuntimeException;
import org.hipparchus.ode.ODEState;
import org.hipparchus.ode.OrdinaryDifferentialEquation;
import org.hipparchus.ode.nonstiff.DormandPrince853Integrator;
import org.stillpath.formula.Formula;
import org.stillpath.formula.FormulaException;
import org.stillpath.formula.Names;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.Declaration;
import org.stillpath.medium.FieldMedium;
import org.stillpath.medium.FormulaField;
import org.stillpath.medium.IndexField;
import org.stillpath.unit.Dimension;

/**
 * A fan of rays through one formula field up to a fixed parameter τ (dτ = ds/n), with the accuracies that are asked for at
 * its end.
 */
public enum Workload {
    /** A parabolic rod, 20 mm, skew rays at heights to 0.8 mm. */
    ROD("n0*sqrt(1 - (g*r)^2)", Map.of("n0", 1.6, "g", 300.0), 20e-3, 1.6, new double[] {0.8e-9, 0.8e-12, 0.8e-15}) {
        @Override
        Vector[] ray(Random random) {
            return skew(random);
        }
    },
    /** The same with higher even powers. */
    EVEN_POWERS(
            "n0*sqrt(1 - (g*r)^2 + 2/3*(g*r)^4 - 17/45*(g*r)^6)",
            Map.of("n0", 1.6, "g", 300.0),
            20e-3, 1.6,
            new double[] {0.8e-9, 0.8e-12, 0.8e-15}) {
        @Override
        Vector[] ray(Random random) {
            return skew(random);
        }
    },
    /** Air warmed from below over a round earth, 20 km along x. */
    SIGHT(
            "1 + 2.7e-4*exp(-((2*R*z + rho^2)/(R + sqrt(r^2 + (z + R)^2)))/H)*288/(288 + 8*exp(-((2*R*z + rho^2)/(R +"
                    + " sqrt(r^2 + (z + R)^2)))/w))",
            Map.of("R", 6371e3, "H", 8400.0, "w", 2.0),
            20e3, 1,
            new double[] {1e-3, 1e-6, 1e-9}) {
        @Override
        Vector[] ray(Random random) {
            double elevation = 2e-3 * (random.nextDouble() - 0.5);
            return new Vector[] {
                new Vector(0, 0, 2 + 28 * random.nextDouble()), new Vector(Math.cos(elevation), 0, Math.sin(elevation))
            };
        }
    },
    /** A window heated in its middle, 25 mm. */
    PLATE(
            "1.5 + 1e-3*exp(-2*r^2/w^2)*(1 + 0.3*sin(pi*z/L))",
            Map.of("w", 5e-3, "L", 25e-3),
            25e-3, 1.5,
            new double[] {5e-9, 5e-12, 5e-15}) {
        @Override
        Vector[] ray(Random random) {
            return new Vector[] {
                new Vector(8e-3 * (random.nextDouble() - 0.5), 8e-3 * (random.nextDouble() - 0.5), 0),
                new Vector(0.02 * (random.nextDouble() - 0.5), 0.02 * (random.nextDouble() - 0.5), 1).unit()
            };
        }
    };

    private static final long SEED = 20261201L;

    private final String formula;
    private final Map<String, Double> values;
    private final double end;
    private final double length;
    private final double[] accuracies;

    Workload(String formula, Map<String, Double> values, double length, double index, double[] accuracies) {
        this.formula = formula;
        this.values = values;
        this.length = length;
        this.end = length / index;
        this.accuracies = accuracies;
    }

    private static Vector[] skew(Random random) {
        double height = 0.8e-3 * Math.sqrt(random.nextDouble());
        double phi = 2 * Math.PI * random.nextDouble();
        return new Vector[] {
            new Vector(height * Math.cos(phi), height * Math.sin(phi), 0),
            new Vector(0.1 * (random.nextDouble() - 0.5), 0.1 * (random.nextDouble() - 0.5), 1).unit()
        };
    }

    abstract Vector[] ray(Random random);

    /** τ at the end, metres. */
    double end() {
        return end;
    }

    /** Length of the scene, metres. */
    double scale() {
        return length;
    }

    /** Largest distance from the true end that is allowed at a level from 1 to 3, metres. */
    double accuracy(int level) {
        return accuracies[level - 1];
    }

    /** The field as a job would make it. */
    IndexField field() {
        Map<String, Dimension> with = values.keySet().stream()
                .collect(Collectors.toMap(
                        k -> k, k -> "g".equals(k) ? Dimension.LENGTH.power(-1, 1) : "n0".equals(k) ? Dimension.NONE : Dimension.LENGTH));
        try {
            Formula parsed = Formula.parse(formula, Names.of(Names.PLACE, with), Dimension.NONE);
            return new FieldMedium(Declaration.of(name()), FormulaField.of(parsed, values), false, false)
                    .field(500e-9, Frame.JOB);
        } catch (FormulaException e) {
            throw new IllegalStateException(e);
        }
    }

    /** States q, p at the start of so many rays. */
    double[][] starts(int count) {
        Random random = new Random(SEED);
        IndexField field = field();
        Samples s = new Samples(1);
        double[][] starts = new double[count][];
        for (int i = 0; i < count; i++) {
            Vector[] ray = ray(random);
            Vector q = ray[0];
            field.sample(new double[] {q.x()}, new double[] {q.y()}, new double[] {q.z()}, 1, Order.VALUE, s);
            Vector p = ray[1].times(Math.sqrt(1 + s.value[0]));
            starts[i] = new double[] {q.x(), q.y(), q.z(), p.x(), p.y(), p.z()};
        }
        return starts;
    }

    /** The ends of rays by Hipparchus' integrator near the rounding limit, as q, p. */
    double[][] truth(double[][] starts) {
        Hipparchus reference = new Hipparchus(field(), scale(), 2e-15);
        double[][] ends = new double[starts.length][];
        for (int i = 0; i < starts.length; i++) {
            ends[i] = reference.end(starts[i], end);
        }
        return ends;
    }

    /** Apache Commons Math's DormandPrince853 on q and p alone, likewise. */
    static final class CommonsMath implements FirstOrderDifferentialEquations {
        private final IndexField field;
        private final org.apache.commons.math3.ode.nonstiff.DormandPrince853Integrator integrator;
        private final double[] x = new double[1];
        private final double[] y = new double[1];
        private final double[] z = new double[1];
        private final Samples s = new Samples(1);

        CommonsMath(IndexField field, double scale, double tolerance) {
            this.field = field;
            double[] absolute = new double[6];
            for (int i = 0; i < 6; i++) {
                absolute[i] = i < 3 ? tolerance * scale : tolerance;
            }
            this.integrator = new org.apache.commons.math3.ode.nonstiff.DormandPrince853Integrator(
                    1e-15 * scale, scale, absolute, new double[6]);
        }

        /** The end of a ray; NaN where steps were so long that they left the field's domain. */
        double[] end(double[] start, double end) {
            double[] state = new double[6];
            try {
                integrator.integrate(this, 0, start, end, state);
            } catch (org.apache.commons.math3.exception.MathIllegalStateException
                    | org.apache.commons.math3.exception.MathIllegalArgumentException e) {
                state[0] = Double.NaN;
            }
            return state;
        }

        @Override
        public int getDimension() {
            return 6;
        }

        @Override
        public void computeDerivatives(double t, double[] state, double[] rate) {
            x[0] = state[0];
            y[0] = state[1];
            z[0] = state[2];
            field.sample(x, y, z, 1, Order.GRADIENT, s);
            rate[0] = state[3];
            rate[1] = state[4];
            rate[2] = state[5];
            rate[3] = s.gx[0];
            rate[4] = s.gy[0];
            rate[5] = s.gz[0];
        }
    }

    /** Hipparchus' DormandPrince853 on q and p alone, the shortest way to use it: no events, no optical length. */
    static final class Hipparchus implements OrdinaryDifferentialEquation {
        private final IndexField field;
        private final DormandPrince853Integrator integrator;
        private final double[] x = new double[1];
        private final double[] y = new double[1];
        private final double[] z = new double[1];
        private final Samples s = new Samples(1);

        Hipparchus(IndexField field, double scale, double tolerance) {
            this.field = field;
            double[] absolute = new double[6];
            for (int i = 0; i < 6; i++) {
                absolute[i] = i < 3 ? tolerance * scale : tolerance;
            }
            this.integrator = new DormandPrince853Integrator(1e-15 * scale, scale, absolute, new double[6]);
        }

        /** The end of a ray; NaN where steps were so long that they left the field's domain. */
        double[] end(double[] start, double end) {
            try {
                return integrator.integrate(this, new ODEState(0, start), end).getPrimaryState();
            } catch (MathRuntimeException e) {
                return new double[] {Double.NaN, Double.NaN, Double.NaN, Double.NaN, Double.NaN, Double.NaN};
            }
        }

        @Override
        public int getDimension() {
            return 6;
        }

        @Override
        public double[] computeDerivatives(double t, double[] state) {
            x[0] = state[0];
            y[0] = state[1];
            z[0] = state[2];
            field.sample(x, y, z, 1, Order.GRADIENT, s);
            return new double[] {state[3], state[4], state[5], s.gx[0], s.gy[0], s.gz[0]};
        }
    }
}
