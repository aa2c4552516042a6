package org.stillpath.task;

import java.util.Arrays;

/** One named value of a result: a number with its unit and error estimate, a list of numbers, or a word. */
public sealed interface Quantity {
    /**
     * A finite number.
     *
     * @param value in SI
     * @param unit SI unit symbol: {@code m}, {@code 1/m}, {@code rad}, {@code s}; {@code 1} for a pure number
     * @param error the program's own estimate of the numerical error of {@code value}, in the same unit; how far the
     *     digits can be trusted, not the physics
     */
    record Amount(double value, String unit, double error) implements Quantity {
        public Amount {
            if (!Double.isFinite(value) || !(error >= 0)) {
                throw new IllegalArgumentException("value must be finite, error not negative: " + value + ", " + error);
            }
        }
    }

    /**
     * Several numbers of one kind, such as one a wavelength.
     *
     * @param values in SI
     * @param unit SI unit symbol
     * @param error error estimate that holds for each of them
     */
    record Amounts(double[] values, String unit, double error) implements Quantity {
        public Amounts {
            values = values.clone();
        }

        /** The values (a copy). */
        @Override
        public double[] values() {
            return values.clone();
        }

        @Override
        public boolean equals(Object o) {
            return o instanceof Amounts n && Arrays.equals(values, n.values) && unit.equals(n.unit) && error == n.error;
        }

        @Override
        public int hashCode() {
            return 31 * Arrays.hashCode(values) + unit.hashCode();
        }

        @Override
        public String toString() {
            return "Amounts[" + Arrays.toString(values) + " " + unit + " ± " + error + "]";
        }
    }

    /**
     * A word, such as {@code virtual} or {@code at-infinity}.
     *
     * @param word one of the words of the task's documentation
     */
    record Word(String word) implements Quantity {}
}
