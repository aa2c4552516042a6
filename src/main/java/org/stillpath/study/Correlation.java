package org.stillpath.study;

/**
 * Coefficients between inputs and how to draw them: x = L z with L Lᵀ the matrix of coefficients, lower triangular (JCGM 101,
 * 6.4.8 and annex C.5). A matrix that is only just singular, coefficients of ±1 among it, is as good.
 */
final class Correlation {
    private static final double ROUNDING = 1e-12;

    private final double[][] coefficients;
    private final double[][] lower;
    private final boolean sound;

    /** @param coefficients symmetric, 1 on the diagonal */
    Correlation(double[][] coefficients) {
        int n = coefficients.length;
        this.coefficients = new double[n][];
        this.lower = new double[n][n];
        boolean possible = true;
        for (int i = 0; i < n; i++) {
            this.coefficients[i] = coefficients[i].clone();
            for (int j = 0; j <= i; j++) {
                double sum = coefficients[i][j];
                for (int k = 0; k < j; k++) {
                    sum -= lower[i][k] * lower[j][k];
                }
                if (i == j) {
                    possible &= sum >= -ROUNDING;
                    lower[i][i] = sum > ROUNDING ? Math.sqrt(sum) : 0;
                } else if (lower[j][j] > 0) {
                    lower[i][j] = sum / lower[j][j];
                } else {
                    possible &= Math.abs(sum) <= 1e-9;
                }
            }
        }
        this.sound = possible;
    }

    /** None at all. */
    static Correlation none(int n) {
        double[][] unit = new double[n][n];
        for (int i = 0; i < n; i++) {
            unit[i][i] = 1;
        }
        return new Correlation(unit);
    }

    /** Whether variables with these coefficients can exist. */
    boolean isSound() {
        return sound;
    }

    double[][] coefficients() {
        double[][] copy = new double[coefficients.length][];
        for (int i = 0; i < copy.length; i++) {
            copy[i] = coefficients[i].clone();
        }
        return copy;
    }

    /** Whether an input is correlated with any other. */
    boolean touches(int input) {
        for (int j = 0; j < coefficients.length; j++) {
            if (j != input && coefficients[input][j] != 0) {
                return true;
            }
        }
        return false;
    }

    /** The inputs of a sample, as departures from their estimates. */
    double[] draw(Distribution[] inputs, Draws draws) {
        int n = inputs.length;
        double[] z = new double[n];
        double[] x = new double[n];
        for (int i = 0; i < n; i++) {
            if (touches(i)) {
                z[i] = draws.normal();
            } else {
                x[i] = inputs[i].draw(draws);
            }
        }
        for (int i = 0; i < n; i++) {
            if (touches(i)) {
                double sum = 0;
                for (int k = 0; k <= i; k++) {
                    sum += lower[i][k] * z[k];
                }
                x[i] = inputs[i].standardUncertainty() * sum;
            }
        }
        return x;
    }
}
