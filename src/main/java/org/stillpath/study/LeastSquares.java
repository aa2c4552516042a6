package org.stillpath.study;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.hipparchus.exception.MathRuntimeException;
import org.hipparchus.linear.Array2DRowRealMatrix;
import org.hipparchus.linear.ArrayRealVector;
import org.hipparchus.linear.RealMatrix;
import org.hipparchus.linear.RealVector;
import org.hipparchus.optim.nonlinear.vector.leastsquares.LeastSquaresBuilder;
import org.hipparchus.optim.nonlinear.vector.leastsquares.LevenbergMarquardtOptimizer;
import org.hipparchus.optim.nonlinear.vector.leastsquares.MultivariateJacobianFunction;
import org.hipparchus.util.Pair;

/**
 * Bounded nonlinear least squares: Hipparchus' Levenberg-Marquardt (Moré 1978, as in MINPACK) with steps cut off at the
 * bounds, repeated with the unknowns fixed that rest on a bound with the slope pressing outward, and freed again where it
 * does not (an active set). Against a change of variables that maps the bounds to infinity, this leaves the covariance of
 * unknowns inside the bounds as it is. Derivatives are differences of fourth order, all points of one set at a time, so
 * that a crew can run them together.
 */
final class LeastSquares {
    private static final int MOST_EVALUATIONS = 300;
    private static final int MOST_ROUNDS = 20;
    private static final double SHORTEST_STEP = 1e-4;
    private static final double LONGEST_STEP = 1e-2;

    private final Unknown[] unknowns;
    private final double[] target;
    private final double[] weight;
    private final double noise;
    private final Model model;

    /**
     * An unknown.
     *
     * @param low may be infinite, as {@code high}
     */
    record Unknown(double low, double high) {
        double clamped(double x) {
            return Math.min(Math.max(x, low), high);
        }
    }

    /** What is fitted. */
    @FunctionalInterface
    interface Model {
        /** Values at each of the points; NaN where there is none. */
        double[][] at(double[][] points);
    }

    /**
     * Where a fit ended.
     *
     * @param x the unknowns
     * @param fitted values there
     * @param jacobian derivatives of the values by the unknowns there
     * @param chiSquare sum of the squares of (value − target)·weight
     * @param fixed which unknowns rest on a bound
     * @param converged whether it ended by itself
     */
    record Solution(
            double[] x, double[] fitted, double[][] jacobian, double chiSquare, boolean[] fixed, boolean converged) {}

    /**
     * A problem.
     *
     * @param target values wanted
     * @param weight one over their standard uncertainties
     * @param noise numerical error of the model's values, relative
     */
    LeastSquares(Unknown[] unknowns, double[] target, double[] weight, double noise, Model model) {
        this.unknowns = unknowns.clone();
        this.target = target.clone();
        this.weight = weight.clone();
        this.noise = noise;
        this.model = model;
    }

    /** Fits from a starting point; throws nothing for a model without values on the way, the step is shortened then. */
    Solution solve(double[] start) {
        int n = unknowns.length;
        double[] scale = new double[n];
        for (int j = 0; j < n; j++) {
            scale[j] = scale(j, start[j]);
        }
        double[] x = start.clone();
        boolean[] fixed = new boolean[n];
        Best best = new Best(x, Double.POSITIVE_INFINITY);
        boolean converged = true;
        for (int round = 0; round < MOST_ROUNDS; round++) {
            double before = best.cost;
            converged = descend(x, scale, fixed, best);
            x = best.x.clone();
            boolean[] resting = resting(x, scale);
            boolean same = Arrays.equals(resting, fixed);
            boolean stalled = round > 0 && !(best.cost < before * (1 - 1e-9));
            if (same || stalled) {
                fixed = resting;
                break;
            }
            fixed = resting;
            if (all(fixed)) {
                break;
            }
        }
        double[][] jacobian = new double[target.length][n];
        double[] fitted = derivatives(x, scale, jacobian);
        return new Solution(x, fitted, jacobian, cost(fitted), fixed, converged);
    }

    /** The best point met. Mutable. */
    private static final class Best {
        private double[] x;
        private double cost;

        Best(double[] x, double cost) {
            this.x = x.clone();
            this.cost = cost;
        }

        void see(double[] at, double value) {
            if (value < cost) {
                cost = value;
                x = at.clone();
            }
        }
    }

    private double scale(int j, double at) {
        Unknown u = unknowns[j];
        double range = u.high() - u.low();
        double size = Math.abs(at);
        if (Double.isFinite(range)) {
            return size > 0.01 * range ? Math.min(size, range) : 0.1 * range;
        }
        return size > 0 ? size : 1;
    }

    /** One run of Levenberg-Marquardt over the unknowns that are not fixed; whether it ended by itself. */
    private boolean descend(double[] from, double[] scale, boolean[] fixed, Best best) {
        List<Integer> free = new ArrayList<>();
        for (int j = 0; j < fixed.length; j++) {
            if (!fixed[j]) {
                free.add(j);
            }
        }
        double[] q = new double[free.size()];
        for (int i = 0; i < q.length; i++) {
            q[i] = from[free.get(i)] / scale[free.get(i)];
        }
        MultivariateJacobianFunction function = point -> {
            double[] x = from.clone();
            for (int i = 0; i < free.size(); i++) {
                x[free.get(i)] = point.getEntry(i) * scale[free.get(i)];
            }
            double[][] jacobian = new double[target.length][fixed.length];
            double[] values = derivatives(x, scale, jacobian);
            best.see(x, cost(values));
            return new Pair<RealVector, RealMatrix>(residuals(values), reduced(jacobian, free, scale));
        };
        try {
            new LevenbergMarquardtOptimizer()
                    .withCostRelativeTolerance(1e-14)
                    .withParameterRelativeTolerance(1e-13)
                    .withOrthoTolerance(1e-14)
                    .optimize(new LeastSquaresBuilder()
                            .start(q)
                            .model(function)
                            .target(new double[target.length])
                            .maxEvaluations(MOST_EVALUATIONS)
                            .maxIterations(MOST_EVALUATIONS)
                            .parameterValidator(p -> {
                                RealVector inside = p.copy();
                                for (int i = 0; i < free.size(); i++) {
                                    int j = free.get(i);
                                    inside.setEntry(i, unknowns[j].clamped(p.getEntry(i) * scale[j]) / scale[j]);
                                }
                                return inside;
                            })
                            .build());
            return true;
        } catch (MathRuntimeException e) {
            // "no further reduction possible" is an end as good as any; only the count says that it was none
            return !e.getSpecifier().toString().contains("MAX_COUNT");
        }
    }

    private RealVector residuals(double[] values) {
        double[] r = new double[target.length];
        for (int i = 0; i < r.length; i++) {
            double d = (values[i] - target[i]) * weight[i];
            // a point without a value is so bad that the step to it is taken back
            r[i] = Double.isNaN(d) ? 1e15 : d;
        }
        return new ArrayRealVector(r, false);
    }

    private RealMatrix reduced(double[][] jacobian, List<Integer> free, double[] scale) {
        double[][] m = new double[target.length][free.size()];
        for (int i = 0; i < m.length; i++) {
            for (int k = 0; k < free.size(); k++) {
                int j = free.get(k);
                double d = jacobian[i][j] * weight[i] * scale[j];
                m[i][k] = Double.isNaN(d) ? 0 : d;
            }
        }
        return new Array2DRowRealMatrix(m, false);
    }

    private double cost(double[] values) {
        double sum = 0;
        for (int i = 0; i < target.length; i++) {
            double d = (values[i] - target[i]) * weight[i];
            sum += d * d;
        }
        return Double.isNaN(sum) ? Double.POSITIVE_INFINITY : sum;
    }

    /** Unknowns on a bound that the slope of the sum presses against. */
    private boolean[] resting(double[] x, double[] scale) {
        boolean[] resting = new boolean[x.length];
        boolean any = false;
        for (int j = 0; j < x.length; j++) {
            any |= x[j] <= unknowns[j].low() || x[j] >= unknowns[j].high();
        }
        if (!any) {
            return resting;
        }
        double[][] jacobian = new double[target.length][x.length];
        double[] values = derivatives(x, scale, jacobian);
        for (int j = 0; j < x.length; j++) {
            double slope = 0;
            for (int i = 0; i < target.length; i++) {
                slope += (values[i] - target[i]) * weight[i] * weight[i] * jacobian[i][j];
            }
            resting[j] = (x[j] <= unknowns[j].low() && slope > 0) || (x[j] >= unknowns[j].high() && slope < 0);
        }
        return resting;
    }

    private static boolean all(boolean[] flags) {
        for (boolean f : flags) {
            if (!f) {
                return false;
            }
        }
        return true;
    }

    /** Values at a point; fills the derivatives in. */
    private double[] derivatives(double[] x, double[] scale, double[][] jacobian) {
        int n = x.length;
        // of fourth order: what is cut off goes with h⁴, the noise with 1/h
        double relative = Math.min(LONGEST_STEP, Math.max(SHORTEST_STEP, Math.pow(noise, 0.2)));
        double[][] points = new double[1 + 4 * n][];
        points[0] = x;
        double[] step = new double[n];
        boolean[] central = new boolean[n];
        for (int j = 0; j < n; j++) {
            double h = relative * Math.max(Math.abs(x[j]), 0.1 * scale[j]);
            double below = x[j] - unknowns[j].low();
            double above = unknowns[j].high() - x[j];
            central[j] = Math.min(below, above) > 1e-2 * h;
            step[j] = central[j] ? Math.min(h, Math.min(below, above)) : above >= below ? h : -h;
            double[] offsets = central[j] ? new double[] {1, -1, 0.5, -0.5} : new double[] {0.25, 0.5, 0.75, 1};
            for (int k = 0; k < 4; k++) {
                double[] p = x.clone();
                p[j] += offsets[k] * step[j];
                points[1 + 4 * j + k] = p;
            }
        }
        double[][] values = model.at(points);
        for (int j = 0; j < n; j++) {
            double[] a = values[1 + 4 * j];
            double[] b = values[2 + 4 * j];
            double[] c = values[3 + 4 * j];
            double[] d = values[4 + 4 * j];
            for (int i = 0; i < target.length; i++) {
                if (central[j]) {
                    double wide = (a[i] - b[i]) / (2 * step[j]);
                    double narrow = (c[i] - d[i]) / step[j];
                    jacobian[i][j] = narrow + (narrow - wide) / 3;
                } else {
                    // five points to one side, fourth order (Abramowitz and Stegun, table 25.2)
                    jacobian[i][j] =
                            (-25 * values[0][i] + 48 * a[i] - 36 * b[i] + 16 * c[i] - 3 * d[i]) / (12 * 0.25 * step[j]);
                }
            }
        }
        return values[0];
    }
}
