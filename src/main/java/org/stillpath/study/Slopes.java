package org.stillpath.study;

/**
 * Derivatives of results by inputs, from central differences at shrinking steps extrapolated to step 0 (Richardson; the best
 * entry of the table is chosen by its own error estimate, Ridders 1982). Against derivatives carried through every task this
 * knows nothing of the task, works for any input that a path can name, and costs eight runs an input; the estimate of its
 * error takes in the numerical error of the results.
 */
final class Slopes {
    /** Steps, each half of the one before. */
    static final int STEPS = 4;
    /** Runs an input. */
    static final int RUNS = 2 * STEPS;

    private Slopes() {}

    /**
     * A derivative.
     *
     * @param value NaN where no two runs about the point gave results
     * @param error how far it can be trusted
     */
    record Slope(double value, double error) {}

    /**
     * Where run {@code number} of an input stands.
     *
     * @param number 0 to {@link #RUNS} − 1
     * @param step the longest step
     * @return what is added to the input
     */
    static double offset(int number, double step) {
        double h = step / (1 << (number / 2));
        return number % 2 == 0 ? h : -h;
    }

    /**
     * The derivative.
     *
     * @param results of the runs in the order of their numbers; NaN where there was none
     * @param step the longest step
     * @param noise numerical error of a result
     */
    static Slope of(double[] results, double step, double noise) {
        double[] before = new double[STEPS];
        double best = Double.NaN;
        double least = Double.POSITIVE_INFINITY;
        int first = -1;
        for (int k = 0; k < STEPS; k++) {
            double h = step / (1 << k);
            double d = (results[2 * k] - results[2 * k + 1]) / (2 * h);
            if (Double.isNaN(d)) {
                // an edge at this step: the table starts anew below it
                first = -1;
                continue;
            }
            double rounding = noise / h;
            double[] row = new double[STEPS];
            if (first < 0) {
                first = k;
                row[0] = d;
                if (Double.isNaN(best)) {
                    best = d;
                }
                before = row;
                continue;
            }
            row[0] = d;
            double power = 4;
            for (int m = 1; m <= k - first; m++) {
                row[m] = row[m - 1] + (row[m - 1] - before[m - 1]) / (power - 1);
                double error = Math.max(Math.abs(row[m] - row[m - 1]), Math.abs(row[m] - before[m - 1])) + 2 * rounding;
                if (error < least) {
                    least = error;
                    best = row[m];
                }
                power *= 4;
            }
            before = row;
        }
        return new Slope(best, Double.isInfinite(least) ? Math.abs(best) : least);
    }
}
