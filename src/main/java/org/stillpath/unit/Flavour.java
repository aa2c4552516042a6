package org.stillpath.unit;

/** What a quantity is beyond its dimension, where the dimension alone would let a mistake through. */
public enum Flavour {
    /** Nothing beyond its dimension. */
    PLAIN,
    /** Written with a unit of angle: without dimension, yet not any number. */
    ANGLE,
    /** A point on the temperature scale, written in degrees Celsius: not a difference of temperatures. */
    TEMPERATURE_POINT
}
