package org.stillpath.study;

/**
 * The law of propagation of uncertainty (JCGM 100, 5.1 and 5.2), degrees of freedom after Welch and Satterthwaite (G.4.1),
 * and the expanded uncertainty (6.2 and G.3).
 *
 * @param value the result at the best estimates
 * @param standardUncertainty combined standard uncertainty
 * @param degreesOfFreedom effective ones; may be infinite
 * @param coverageFactor quantile of Student's distribution for the coverage
 * @param slopes sensitivities, by input
 * @param contributions |sensitivity| × standard uncertainty, by input
 */
record LinearBudget(
        double value,
        double standardUncertainty,
        double degreesOfFreedom,
        double coverageFactor,
        Slopes.Slope[] slopes,
        double[] contributions) {

    double expandedUncertainty() {
        return coverageFactor * standardUncertainty;
    }

    /** Whether every sensitivity could be found. */
    boolean isComplete() {
        return Double.isFinite(standardUncertainty);
    }

    /**
     * Combines.
     *
     * @param value the result at the best estimates
     * @param slopes by input
     * @param inputs their distributions
     * @param correlation coefficients, symmetric, 1 on the diagonal
     * @param coverage probability of the expanded uncertainty
     */
    static LinearBudget of(
            double value, Slopes.Slope[] slopes, Distribution[] inputs, double[][] correlation, double coverage) {
        int n = inputs.length;
        double[] signed = new double[n];
        double[] contributions = new double[n];
        for (int i = 0; i < n; i++) {
            signed[i] = slopes[i].value() * inputs[i].standardUncertainty();
            contributions[i] = Math.abs(signed[i]);
        }
        // a scale of its own keeps squares and fourth powers in range
        double scale = 0;
        for (double c : contributions) {
            scale = Math.max(scale, c);
        }
        double sum = 0;
        double below = 0;
        for (int i = 0; i < n; i++) {
            for (int j = 0; j < n; j++) {
                sum += scale > 0 ? signed[i] / scale * (signed[j] / scale) * correlation[i][j] : 0;
            }
            double part = scale > 0 ? contributions[i] / scale : 0;
            below += Math.pow(part, 4) / inputs[i].degreesOfFreedom();
        }
        boolean known = true;
        for (double c : contributions) {
            known &= !Double.isNaN(c);
        }
        double u = known ? scale * Math.sqrt(Math.max(sum, 0)) : Double.NaN;
        double nu = below > 0 ? sum * sum / below : Double.POSITIVE_INFINITY;
        double k = Quantiles.student(0.5 * (1 + coverage), nu);
        return new LinearBudget(value, u, nu, k, slopes, contributions);
    }
}
