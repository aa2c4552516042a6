package org.stillpath.task.survey;

/**
 * A reduction by the ray through the air, beside the textbook's.
 *
 * @param key its name in a result, such as {@code height-difference}
 * @param exact through the air, SI
 * @param error estimated numerical error of it
 * @param classical by the formula, SI; NaN where there is none
 * @param unit SI unit symbol
 * @param formula the formula in words
 */
public record Reduced(String key, double exact, double error, double classical, String unit, String formula) {
    /** What the formula leaves out: exact less classical. */
    public double difference() {
        return exact - classical;
    }
}
