package org.stillpath.unit;

import java.util.Optional;
import org.stillpath.problem.Words;

/**
 * What an input wants: a dimension, a flavour and words to ask for it.
 *
 * @param dimension dimension of the value
 * @param flavour angles need a unit of angle; a plain temperature is a difference, a point may be given in degrees Celsius
 * @param words with an article, such as {@code an inverse length}
 * @param number a typical number, for examples
 * @param unit a typical unit, for examples; empty for pure numbers
 */
public record Kind(Dimension dimension, Flavour flavour, String words, String number, String unit) {
    /** A pure number; percent and parts per million are understood. */
    public static final Kind NUMBER = new Kind(Dimension.NONE, Flavour.PLAIN, "a pure number", "1.5", "");
    /** A length. */
    public static final Kind LENGTH = new Kind(Dimension.LENGTH, Flavour.PLAIN, "a length", "5", "mm");
    /** A plane angle; a unit is needed. */
    public static final Kind ANGLE = new Kind(Dimension.NONE, Flavour.ANGLE, "an angle", "2", "deg");
    /** An inverse length: a curvature, a gradient constant, a power in dioptres. */
    public static final Kind INVERSE_LENGTH =
            new Kind(Dimension.LENGTH.power(-1, 1), Flavour.PLAIN, "an inverse length", "0.31", "1/mm");
    /** A point on the temperature scale. */
    public static final Kind TEMPERATURE =
            new Kind(Dimension.TEMPERATURE, Flavour.TEMPERATURE_POINT, "a temperature", "20", "degC");
    /** A difference of temperatures: an uncertainty, a step, a rise. Degrees Celsius are a fault. */
    public static final Kind TEMPERATURE_DIFFERENCE =
            new Kind(Dimension.TEMPERATURE, Flavour.PLAIN, "a temperature difference", "15", "K");
    /** A pressure. */
    public static final Kind PRESSURE =
            new Kind(Dimension.whole(-1, 1, -2, 0), Flavour.PLAIN, "a pressure", "1013.25", "hPa");
    /** A time. */
    public static final Kind TIME = new Kind(Dimension.TIME, Flavour.PLAIN, "a time", "10", "ns");

    /** The kind of a dimension: the constant where there is one; a temperature is a point. */
    public static Kind of(Dimension dimension) {
        if (dimension.isNone()) {
            return NUMBER;
        }
        for (Kind kind : new Kind[] {LENGTH, INVERSE_LENGTH, TEMPERATURE, PRESSURE, TIME}) {
            if (kind.dimension.equals(dimension)) {
                return kind;
            }
        }
        return new Kind(dimension, Flavour.PLAIN, dimension.describe(), "1", dimension.symbol());
    }

    /** In words, with an article: {@code a length}. */
    public String describe() {
        return words;
    }

    /** A value of this kind as one would write it: {@code 0.31 1/mm}. */
    public String example() {
        return example(number);
    }

    /** The same with a number of the user's own. */
    public String example(String ownNumber) {
        return unit.isEmpty() ? ownNumber : ownNumber + " " + unit;
    }

    /**
     * Why a quantity is not of this kind, with the remedy; empty if it is. A bare 0 is of every kind.
     *
     * @param quantity what was written
     */
    public Optional<String> refusal(Quantity quantity) {
        if (quantity.isBare() && quantity.value() == 0) {
            return Optional.empty();
        }
        boolean sameDimension = quantity.dimension().equals(dimension);
        boolean fits = sameDimension
                && switch (quantity.flavour()) {
                    case PLAIN -> flavour != Flavour.ANGLE;
                    case ANGLE -> flavour == Flavour.ANGLE;
                    case TEMPERATURE_POINT -> flavour == Flavour.TEMPERATURE_POINT;
                };
        if (fits) {
            return Optional.empty();
        }
        String what = quantity.isBare() ? "has no unit" : "is " + quantity.describe();
        return Optional.of(Words.quoted(quantity.text()) + " " + what + "; " + words + " is needed, such as "
                + example(quantity.numberText()));
    }
}
