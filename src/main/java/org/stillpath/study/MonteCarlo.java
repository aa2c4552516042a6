package org.stillpath.study;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;

/**
 * Propagation of distributions by the adaptive Monte Carlo procedure of JCGM 101, 7.9: blocks of M = max(10⁴, 100/(1 − p))
 * samples are added until twice the standard deviation of the mean over blocks is below a numerical tolerance, for the mean,
 * the standard uncertainty and both ends of the coverage interval of every result.
 *
 * <p>The tolerance is δ/5, with δ = ½·10^l for a standard uncertainty c·10^l of the asked number of digits (7.9.2), since the
 * samples also validate the linear budget (8.2). Stopping and validation take the probabilistically symmetric interval
 * (7.7.2), whose ends converge with the square root of the number of samples; those of the shortest one (7.7.3), which is stated beside it,
 * converge with its cube root only and would ask for ten times as many.
 */
final class MonteCarlo {
    private static final int LEAST_BLOCK = 10_000;
    private static final double FINER = 5;

    private MonteCarlo() {}

    /**
     * What is wanted.
     *
     * @param coverage probability p of the intervals
     * @param digits significant digits of the standard uncertainty
     * @param most samples at most
     */
    record Wanted(double coverage, int digits, int most) {
        int block() {
            return Math.min(most, Math.max(LEAST_BLOCK, (int) Math.ceil(100 / (1 - coverage) - 1e-6)));
        }
    }

    /** Samples of a block. */
    @FunctionalInterface
    interface Sampler {
        /**
         * Runs samples.
         *
         * @param block number of the block
         * @param from number of its first sample
         * @param count samples
         */
        Crew.Runs run(int block, int from, int count);
    }

    /**
     * What the samples say of one result.
     *
     * @param samples samples that gave the result
     * @param missing samples without it
     * @param mean of those that gave it; likewise the others
     * @param standardUncertainty standard deviation
     * @param shortest shortest coverage interval
     * @param symmetric probabilistically symmetric one
     * @param stable whether the stopping rule was met
     * @param tolerance δ of the asked digits
     * @param values all values, ascending
     */
    record Summary(
            int samples,
            int missing,
            double mean,
            double standardUncertainty,
            double[] shortest,
            double[] symmetric,
            boolean stable,
            double tolerance,
            double[] values) {

        /** The part of all samples that lies between limits, those without a result outside. */
        double within(double low, double high) {
            int n = 0;
            for (double v : values) {
                n += v >= low && v <= high ? 1 : 0;
            }
            return (double) n / (samples + missing);
        }

        /**
         * Whether the linear budget's interval agrees (JCGM 101, 8.1): both ends within δ. Samples without a result are a
         * disagreement: the linear budget knows nothing of them.
         */
        boolean agrees(LinearBudget linear) {
            double half = linear.expandedUncertainty();
            return linear.isComplete()
                    && missing == 0
                    && Math.abs(linear.value() - half - symmetric[0]) <= tolerance
                    && Math.abs(linear.value() + half - symmetric[1]) <= tolerance;
        }

        /**
         * The widest gap between neighbouring values with at least one in 200 samples on either side, over the standard
         * uncertainty: values in two groups are a jump of the result.
         */
        double gap() {
            int edge = Math.max(1, values.length / 200);
            double widest = 0;
            for (int i = edge; i < values.length - edge; i++) {
                widest = Math.max(widest, values[i] - values[i - 1]);
            }
            return standardUncertainty > 0 ? widest / standardUncertainty : 0;
        }
    }

    /** All results: their summaries and the blocks they came from. */
    record Outcome(List<Summary> summaries, List<Crew.Runs> blocks) {}

    /** Runs until the rule is met or the samples are used up. */
    static Outcome run(Wanted wanted, int width, Sampler sampler) {
        int block = wanted.block();
        List<Crew.Runs> blocks = new ArrayList<>();
        // by result: four figures a block
        List<List<double[]>> figures = new ArrayList<>();
        for (int k = 0; k < width; k++) {
            figures.add(new ArrayList<>());
        }
        boolean stable = false;
        int done = 0;
        while (!stable && done < wanted.most()) {
            int count = Math.min(block, wanted.most() - done);
            if (!blocks.isEmpty() && count < block) {
                break;
            }
            Crew.Runs runs = sampler.run(blocks.size(), done, count);
            blocks.add(runs);
            done += count;
            for (int k = 0; k < width; k++) {
                figures.get(k).add(figures(present(runs.column(k)), wanted.coverage()));
            }
            stable = blocks.size() > 1;
            for (int k = 0; k < width && stable; k++) {
                stable = isStable(figures.get(k), wanted.digits());
            }
        }
        List<Summary> summaries = new ArrayList<>();
        for (int k = 0; k < width; k++) {
            summaries.add(summary(blocks, k, done, wanted, stable));
        }
        return new Outcome(summaries, blocks);
    }

    /** δ = ½·10^l of a standard uncertainty c·10^l, c a whole number of so many digits (JCGM 101, 7.9.2). */
    static double tolerance(double u, int digits) {
        if (!(u > 0) || Double.isInfinite(u)) {
            return 0;
        }
        int leading = (int) Math.floor(Math.log10(u));
        // 9.96 to two digits is 10, of the next decade
        if (Math.rint(u / Math.pow(10, leading - digits + 1)) >= Math.pow(10, digits)) {
            leading++;
        }
        return 0.5 * Math.pow(10, leading - digits + 1);
    }

    private static boolean isStable(List<double[]> blocks, int digits) {
        int h = blocks.size();
        double u = 0;
        for (double[] b : blocks) {
            u += b[1] / h;
        }
        double delta = tolerance(u, digits) / FINER;
        for (int i = 0; i < 4; i++) {
            double mean = 0;
            for (double[] b : blocks) {
                mean += b[i] / h;
            }
            double sum = 0;
            for (double[] b : blocks) {
                sum += (b[i] - mean) * (b[i] - mean);
            }
            double s = Math.sqrt(sum / ((double) h * (h - 1)));
            if (!(2 * s <= delta)) {
                return false;
            }
        }
        return true;
    }

    /** Mean, standard deviation and symmetric interval of sorted values. */
    private static double[] figures(double[] sorted, double coverage) {
        double[] both = moments(sorted);
        double[] ends = symmetric(sorted, coverage);
        return new double[] {both[0], both[1], ends[0], ends[1]};
    }

    private static Summary summary(List<Crew.Runs> blocks, int which, int done, Wanted wanted, boolean stable) {
        double[] all = new double[done];
        int n = 0;
        for (Crew.Runs runs : blocks) {
            for (int i = 0; i < runs.count(); i++) {
                all[n++] = runs.result(i, which);
            }
        }
        double[] sorted = present(all);
        double[] both = moments(sorted);
        return new Summary(
                sorted.length,
                done - sorted.length,
                both[0],
                both[1],
                shortest(sorted, wanted.coverage()),
                symmetric(sorted, wanted.coverage()),
                stable,
                tolerance(both[1], wanted.digits()),
                sorted);
    }

    /** Those that are there, ascending. */
    private static double[] present(double[] values) {
        double[] sorted = Arrays.stream(values).filter(v -> !Double.isNaN(v)).toArray();
        Arrays.sort(sorted);
        return sorted;
    }

    /** Mean and standard deviation, about the middle value so that no digits are lost. */
    private static double[] moments(double[] sorted) {
        int n = sorted.length;
        if (n == 0) {
            return new double[] {Double.NaN, Double.NaN};
        }
        double middle = sorted[n / 2];
        double sum = 0;
        for (double v : sorted) {
            sum += v - middle;
        }
        double mean = sum / n;
        double squares = 0;
        for (double v : sorted) {
            squares += (v - middle - mean) * (v - middle - mean);
        }
        return new double[] {middle + mean, n > 1 ? Math.sqrt(squares / (n - 1)) : 0};
    }

    /** JCGM 101, 7.7.2. */
    static double[] symmetric(double[] sorted, double coverage) {
        int n = sorted.length;
        if (n < 2) {
            return new double[] {Double.NaN, Double.NaN};
        }
        int q = Math.min(n - 1, (int) Math.round(coverage * n));
        int r = Math.max(1, (n - q + 1) / 2);
        return new double[] {sorted[r - 1], sorted[Math.min(n, r + q) - 1]};
    }

    /** JCGM 101, 7.7.3. */
    static double[] shortest(double[] sorted, double coverage) {
        int n = sorted.length;
        if (n < 2) {
            return new double[] {Double.NaN, Double.NaN};
        }
        int q = Math.min(n - 1, (int) Math.round(coverage * n));
        int best = 0;
        for (int r = 0; r + q < n; r++) {
            if (sorted[r + q] - sorted[r] < sorted[best + q] - sorted[best]) {
                best = r;
            }
        }
        return new double[] {sorted[best], sorted[best + q]};
    }
}
