package org.stillpath.ray;

import org.hipparchus.analysis.UnivariateFunction;
import org.hipparchus.analysis.solvers.BracketedUnivariateSolver;
import org.hipparchus.analysis.solvers.BracketingNthOrderBrentSolver;
import org.hipparchus.exception.MathRuntimeException;
import org.hipparchus.ode.ODEState;
import org.hipparchus.ode.ODEStateAndDerivative;
import org.hipparchus.ode.OrdinaryDifferentialEquation;
import org.hipparchus.ode.events.Action;
import org.hipparchus.ode.events.AdaptableInterval;
import org.hipparchus.ode.events.ODEEventDetector;
import org.hipparchus.ode.events.ODEEventHandler;
import org.hipparchus.ode.nonstiff.DormandPrince853Integrator;
import org.hipparchus.ode.sampling.ODEStateInterpolator;
import org.hipparchus.ode.sampling.ODEStepHandler;
import org.stillpath.medium.IndexField;

/**
 * The reference engine: Hipparchus' Dormand-Prince 8(5,3) pair (Hairer, Nørsett and Wanner, <i>Solving Ordinary Differential
 * Equations I</i>, section II.10) with its event detection.
 *
 * <p>Events are located on the interpolant, which is one order less accurate than the step; so the last step is taken again
 * from its start to the time found, and the rest, far below the tolerance, is closed by Newton's method. Chosen as the
 * reference because its code is shared with nothing else here; it allocates in its loop and costs several times what the
 * production engine costs.
 */
public final class HipparchusPropagator implements Propagator {
    private static final double LEAST_TOLERANCE = 3e-15;
    private static final int TRAIL_POINTS_PER_STEP = 8;
    private static final int RETRIES = 60;

    private final double tolerance;
    private final double scale;
    private final double stride;
    private final Flow flow = new Flow();

    /**
     * @param tolerance local error allowed a step, as a fraction of the scale
     * @param scale length of the scene, metres: what positions are judged against
     * @param stride share of the scene that a step may reach
     */
    public HipparchusPropagator(double tolerance, double scale, double stride) {
        if (!(tolerance > 0) || !(scale > 0) || !(stride > 0)) {
            throw new IllegalArgumentException(
                    "tolerance, scale and stride must be positive: " + tolerance + ", " + scale + ", " + stride);
        }
        this.stride = stride;
        this.tolerance = Math.max(tolerance, LEAST_TOLERANCE);
        this.scale = scale;
    }

    @Override
    public long evaluations() {
        return flow.evaluations();
    }

    @Override
    public int advance(double[] y, IndexField field, Target[] targets, Trail trail) {
        double[] rate = new double[y.length];
        if (!flow.rate(field, y, rate)) {
            return UNDEFINED;
        }
        double[] bias = Departure.biases(y, rate, field, flow, targets, scale);
        double maxStep = stride * scale;
        for (int attempt = 0; attempt < RETRIES; attempt++) {
            Run run = new Run(field, targets, bias, trail, y);
            int met = run.integrate(y, maxStep);
            if (met >= 0) {
                flow.polish(y, field, targets[met], rate);
                trail.add(y[0], y[1], y[2]);
                return met;
            }
            // a stage fell where the field is undefined: creep up to that place with shorter and shorter steps
            maxStep *= 0.25;
            if (maxStep < 1e-14 * scale) {
                return run.stuck ? STUCK : UNDEFINED;
            }
        }
        return STUCK;
    }

    /** One integration from a state to the first target, or to where the field is undefined. */
    private final class Run implements OrdinaryDifferentialEquation, ODEStepHandler {
        private final IndexField field;
        private final Target[] targets;
        private final double[] bias;
        private final Trail trail;
        private final int size;
        private double[] stepStart;
        private double stepStartTime;
        private int met = UNDEFINED;
        private boolean stuck;

        Run(IndexField field, Target[] targets, double[] bias, Trail trail, double[] y) {
            this.field = field;
            this.targets = targets;
            this.bias = bias;
            this.trail = trail;
            this.size = y.length;
            this.stepStart = y.clone();
        }

        /** Index of the target met, with {@code y} at it; otherwise negative, with {@code y} at the last sound step. */
        int integrate(double[] y, double maxStep) {
            DormandPrince853Integrator integrator = integrator(maxStep);
            integrator.addStepHandler(this);
            for (int i = 0; i < targets.length; i++) {
                integrator.addEventDetector(new Detector(i));
            }
            try {
                ODEStateAndDerivative end = integrator.integrate(this, new ODEState(0, y), 1e9 * scale);
                if (met < 0) {
                    stuck = true;
                    return STUCK;
                }
                double[] landed = stepStart;
                if (end.getTime() > stepStartTime) {
                    DormandPrince853Integrator again = integrator(Math.max(maxStep, end.getTime() - stepStartTime));
                    again.setInitialStepSize(end.getTime() - stepStartTime);
                    landed = again.integrate(this, new ODEState(stepStartTime, stepStart), end.getTime())
                            .getPrimaryState();
                }
                System.arraycopy(landed, 0, y, 0, size);
                return met;
            } catch (Undefined e) {
                System.arraycopy(stepStart, 0, y, 0, size);
                return UNDEFINED;
            } catch (MathRuntimeException e) {
                // Hipparchus reports a step below its minimum this way
                System.arraycopy(stepStart, 0, y, 0, size);
                stuck = true;
                return STUCK;
            }
        }

        private DormandPrince853Integrator integrator(double maxStep) {
            double[] absolute = new double[size];
            double[] relative = new double[size];
            for (int i = 0; i < State.COLUMNS; i++) {
                absolute[i] = i >= State.P && i < State.EXCESS ? tolerance : tolerance * scale;
            }
            for (int i = State.COLUMNS; i < size; i++) {
                int column = (i - State.COLUMNS) / State.COLUMN;
                boolean place = (i - State.COLUMNS) % State.COLUMN < 3;
                boolean ofPlace = column < 2;
                double unit = place == ofPlace ? 1 : place ? scale : 1 / scale;
                absolute[i] = 10 * tolerance * unit;
                relative[i] = 10 * tolerance;
            }
            return new DormandPrince853Integrator(1e-17 * scale, Math.max(maxStep, 1e-16 * scale), absolute, relative);
        }

        @Override
        public int getDimension() {
            return size;
        }

        @Override
        public double[] computeDerivatives(double t, double[] state) {
            double[] rate = new double[size];
            if (!flow.rate(field, state, rate)) {
                throw new Undefined();
            }
            return rate;
        }

        @Override
        public void handleStep(ODEStateInterpolator step) {
            if (!step.isPreviousStateInterpolated()) {
                stepStart = step.getPreviousState().getPrimaryState();
                stepStartTime = step.getPreviousState().getTime();
            }
            double begin = step.getPreviousState().getTime();
            trail.conjugates()
                    .ifPresent(c -> c.span(
                            field,
                            (t, out) -> System.arraycopy(
                                    step.getInterpolatedState(t).getPrimaryState(), 0, out, 0, size),
                            begin,
                            step.getCurrentState().getTime(),
                            size));
            if (trail.wanted()) {
                double from = step.getPreviousState().getTime();
                double to = step.getCurrentState().getTime();
                for (int i = 0; i < TRAIL_POINTS_PER_STEP; i++) {
                    double[] p = step.getInterpolatedState(from + (to - from) * i / TRAIL_POINTS_PER_STEP)
                            .getPrimaryState();
                    trail.add(p[0], p[1], p[2]);
                }
            }
            if (!step.isCurrentStateInterpolated() && met < 0) {
                stepStart = step.getCurrentState().getPrimaryState();
                stepStartTime = step.getCurrentState().getTime();
            }
        }

        /** Watches one target. */
        private final class Detector implements ODEEventDetector, ODEEventHandler {
            private final int target;

            Detector(int target) {
                this.target = target;
            }

            @Override
            public AdaptableInterval getMaxCheckInterval() {
                // no target can be crossed twice before the distance to it, at its steepest, is used up
                return (state, forward) -> {
                    double[] y = state.getPrimaryState();
                    double speed = Math.sqrt(y[3] * y[3] + y[4] * y[4] + y[5] * y[5]);
                    double away = Math.abs(targets[target].value(y) + bias[target]);
                    double reach = away / targets[target].steepness(y, speed);
                    return Math.max(reach, 1e-3 * scale) / speed;
                };
            }

            @Override
            public int getMaxIterationCount() {
                return 200;
            }

            @Override
            public BracketedUnivariateSolver<UnivariateFunction> getSolver() {
                return new BracketingNthOrderBrentSolver(1e-15, 1e-15 * scale, 0, 5);
            }

            @Override
            public ODEEventHandler getHandler() {
                return this;
            }

            @Override
            public double g(ODEStateAndDerivative state) {
                return targets[target].value(state.getPrimaryState()) + bias[target];
            }

            @Override
            public Action eventOccurred(ODEStateAndDerivative state, ODEEventDetector detector, boolean increasing) {
                if (!targets[target].accepts(state.getPrimaryState())) {
                    return Action.CONTINUE;
                }
                met = target;
                return Action.STOP;
            }
        }
    }

    /** Leaves Hipparchus' loop when a stage falls where the field is undefined; it offers no other way out. */
    private static final class Undefined extends RuntimeException {
        private static final long serialVersionUID = 1L;

        Undefined() {
            super("the field is undefined", null, false, false);
        }
    }
}
