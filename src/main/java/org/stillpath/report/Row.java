package org.stillpath.report;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import org.stillpath.task.Quantity;
import org.stillpath.task.Result;
import org.stillpath.unit.Display;

/**
 * One line of the list of quantities.
 *
 * @param name what it is, in words
 * @param value a number as text, or a word
 * @param unit readable unit; empty for pure numbers and words
 * @param error the numerical error as text with its unit; empty where there is none
 */
record Row(String name, String value, String unit, String error) {

    /** Length up to which all numbers of a list are shown. */
    private static final int LONG = 10;

    /**
     * All quantities of a result, one line each; lists give a line for each of their numbers, long ones for those that differ
     * from zero by more than their error.
     */
    static List<Row> of(Result result) {
        List<Row> rows = new ArrayList<>();
        for (Map.Entry<String, Quantity> entry : result.quantities().entrySet()) {
            String name = Labels.of(entry.getKey());
            Quantity quantity = entry.getValue();
            if (quantity instanceof Quantity.Word word) {
                rows.add(new Row(name, Labels.of(word.word()), "", ""));
            } else if (quantity instanceof Quantity.Amount amount) {
                rows.add(number(name, amount.value(), amount.unit(), amount.error()));
            } else if (quantity instanceof Quantity.Amounts amounts) {
                double[] values = amounts.values();
                for (int i = 0; i < values.length; i++) {
                    // of a long list a reader wants what is there
                    if (values.length > LONG && Math.abs(values[i]) <= amounts.error()) {
                        continue;
                    }
                    rows.add(number(name + " " + (i + 1), values[i], amounts.unit(), amounts.error()));
                }
            }
        }
        return rows;
    }

    boolean isWord() {
        return unit.isEmpty() && !value.isEmpty() && Character.isLetter(value.charAt(0));
    }

    private static Row number(String name, double value, String unit, double error) {
        if (!Double.isFinite(value)) {
            return new Row(name, "unknown", "", "");
        }
        // what lies within its own error of zero is zero to a reader, in a unit of ordinary size
        Display.Reading shown = Display.of(Math.abs(value) <= error ? 0 : value, unit, error);
        return new Row(name, shown.number(), shown.unit(), errorText(error, unit));
    }

    private static String errorText(double error, String unit) {
        // an error has one digit that means something
        return error > 0 && Double.isFinite(error)
                ? Display.of(error, unit, error).toString()
                : "";
    }
}
