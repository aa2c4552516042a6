package org.stillpath.ray;

import org.stillpath.medium.IndexField;

/** An engine that takes the rays of a {@link Workload} to their ends. */
public enum Contestant {
    /** Bundles, with optical length. */
    STILLPATH("stillpath") {
        @Override
        Runner runner(Workload workload, double tolerance) {
            Bundle bundle = new Bundle(0, false, tolerance, workload.scale());
            IndexField field = workload.field().forBundles();
            return states -> bundle.follow(states, 0, states.length / State.COLUMNS, workload.end(), field);
        }
    },
    /** Bundles, with optical length and the 4×4 transfer matrix. */
    STILLPATH_TRANSFER("stillpath with transfer matrix") {
        @Override
        Runner runner(Workload workload, double tolerance) {
            Bundle bundle = new Bundle(State.TRANSFER_COLUMNS, false, tolerance, workload.scale());
            IndexField field = workload.field().forBundles();
            int width = State.size(State.TRANSFER_COLUMNS);
            double[][] room = {new double[0]};
            return states -> {
                int count = states.length / State.COLUMNS;
                if (room[0].length < count * width) {
                    room[0] = new double[count * width];
                }
                double[] wide = room[0];
                java.util.Arrays.fill(wide, 0);
                for (int i = 0; i < count; i++) {
                    System.arraycopy(states, i * State.COLUMNS, wide, i * width, State.COLUMNS);
                    // unit places and momenta across; what keeps p·δp = 0 is small and costs nothing
                    wide[i * width + State.COLUMNS] = 1;
                    wide[i * width + State.COLUMNS + State.COLUMN + 1] = 1;
                    wide[i * width + State.COLUMNS + 2 * State.COLUMN + 3] = 1;
                    wide[i * width + State.COLUMNS + 3 * State.COLUMN + 4] = 1;
                }
                bundle.follow(wide, 0, count, workload.end(), field);
                for (int i = 0; i < count; i++) {
                    System.arraycopy(wide, i * width, states, i * State.COLUMNS, State.COLUMNS);
                }
            };
        }
    },
    /** The production engine a ray at a time, with optical length and length. */
    STILLPATH_ALONE("stillpath, one ray at a time") {
        @Override
        Runner runner(Workload workload, double tolerance) {
            NystromPropagator engine = new NystromPropagator(tolerance, workload.scale(), 1);
            IndexField field = workload.field();
            double[] state = new double[State.COLUMNS];
            return states -> each(states, at -> {
                System.arraycopy(states, at, state, 0, state.length);
                if (!engine.follow(state, field, workload.end())) {
                    state[0] = Double.NaN;
                }
                return state;
            });
        }
    },
    /** Hipparchus' DormandPrince853 on place and momentum alone. */
    HIPPARCHUS("hipparchus") {
        @Override
        Runner runner(Workload workload, double tolerance) {
            Workload.Hipparchus engine = new Workload.Hipparchus(workload.field(), workload.scale(), tolerance);
            double[] start = new double[6];
            return states -> each(states, at -> {
                System.arraycopy(states, at, start, 0, start.length);
                return engine.end(start, workload.end());
            });
        }
    },
    /** Apache Commons Math's likewise. */
    COMMONS_MATH("commons-math") {
        @Override
        Runner runner(Workload workload, double tolerance) {
            Workload.CommonsMath engine = new Workload.CommonsMath(workload.field(), workload.scale(), tolerance);
            double[] start = new double[6];
            return states -> each(states, at -> {
                System.arraycopy(states, at, start, 0, start.length);
                return engine.end(start, workload.end());
            });
        }
    };

    private final String label;

    Contestant(String label) {
        this.label = label;
    }

    /** The name in tables. */
    String label() {
        return label;
    }

    /** Takes states, one behind the other as {@link State} has them, to their ends in place. */
    @FunctionalInterface
    interface Runner {
        void run(double[] states);
    }

    @FunctionalInterface
    private interface One {
        double[] end(int at);
    }

    private static void each(double[] states, One one) {
        for (int at = 0; at < states.length; at += State.COLUMNS) {
            double[] end = one.end(at);
            System.arraycopy(end, 0, states, at, 6);
        }
    }

    /** This engine at a tolerance. */
    abstract Runner runner(Workload workload, double tolerance);

    /**
     * The largest tolerance, of four a decade, with which all of some rays end within the accuracy of a level.
     *
     * @return the tolerance and the largest error with it
     * @throws IllegalStateException if there is none
     */
    double[] tune(Workload workload, int level, double[][] starts, double[][] truth) {
        for (int k = 8; k <= 68; k++) {
            double tolerance = Math.pow(10, -k / 4.0);
            double[] states = states(starts);
            runner(workload, tolerance).run(states);
            double error = 0;
            for (int i = 0; i < starts.length; i++) {
                double d = 0;
                for (int c = 0; c < 3; c++) {
                    double off = states[State.COLUMNS * i + c] - truth[i][c];
                    d += off * off;
                }
                error = Double.isNaN(d) ? Double.POSITIVE_INFINITY : Math.max(error, Math.sqrt(d));
            }
            if (error <= workload.accuracy(level)) {
                return new double[] {tolerance, error};
            }
        }
        throw new IllegalStateException(this + " does not reach level " + level + " of " + workload);
    }

    /** Starts one behind the other. */
    static double[] states(double[][] starts) {
        double[] states = new double[State.COLUMNS * starts.length];
        for (int i = 0; i < starts.length; i++) {
            System.arraycopy(starts[i], 0, states, State.COLUMNS * i, 6);
        }
        return states;
    }
}
