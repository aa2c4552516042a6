package org.stillpath.formula;

/** Operations of a {@link Graph} and of a {@link Program}. */
enum Op {
    // values from outside
    /** A number. */
    CONSTANT,
    /** A `with` value; the index says which. */
    ARGUMENT,
    /** The vacuum wavelength. */
    WAVELENGTH,
    /** The point's coordinates. */
    X,
    Y,
    Z,
    /** One component of a charted coordinate; the index is {@link Coordinate#slot()} · 10 + component as in {@link Samples}. */
    CHART,

    // in graphs only; programs have them lowered to the rest
    /** x² + y², a coordinate of its own so that formulas even in r are smooth on the axis. */
    SQUARE_R,
    /** x² + y² + z², likewise. */
    SQUARE_RHO,
    /** A constant or invariant times a term that is neither. */
    SCALE,
    /** Product of whole powers. */
    PRODUCT,
    /** Product of two that is kept as it is, so that its parts stay shared. */
    TIMES,
    /** Root of a sum of squares: 0 where all of them are, with a direction elsewhere. */
    NORM,

    ADD,
    SUBTRACT,
    MULTIPLY,
    NEGATE,
    RECIPROCAL,
    RECIPROCAL_OR_ZERO,
    UNLESS_ZERO,
    IF_LESS,
    POWER,
    SQRT,
    EXP,
    LOG,
    LOG10,
    SIN,
    COS,
    TAN,
    ASIN,
    ACOS,
    ATAN,
    ATAN2,
    SINH,
    COSH,
    TANH,
    SECH,
    ERF,
    E1,
    ABS,
    SIGN,
    MIN,
    MAX;

    /** The value of an operation of up to four operands; leaves and graph-only operations have none. */
    double apply(double a, double b, double c, double d) {
        return switch (this) {
            case ADD -> a + b;
            case SUBTRACT -> a - b;
            case MULTIPLY, SCALE, TIMES -> a * b;
            case NEGATE -> -a;
            case RECIPROCAL -> 1 / a;
            case RECIPROCAL_OR_ZERO -> Special.reciprocalOrZero(a);
            case UNLESS_ZERO -> Special.unlessZero(a, b, c);
            case IF_LESS -> Special.ifLess(a, b, c, d);
            case POWER -> Math.pow(a, b);
            case SQRT, NORM -> Math.sqrt(a);
            case EXP -> Math.exp(a);
            case LOG -> Math.log(a);
            case LOG10 -> Math.log10(a);
            case SIN -> Math.sin(a);
            case COS -> Math.cos(a);
            case TAN -> Math.tan(a);
            case ASIN -> Math.asin(a);
            case ACOS -> Math.acos(a);
            case ATAN -> Math.atan(a);
            case ATAN2 -> Math.atan2(a, b);
            case SINH -> Math.sinh(a);
            case COSH -> Math.cosh(a);
            case TANH -> Math.tanh(a);
            case SECH -> Special.sech(a);
            case ERF -> Special.erf(a);
            case E1 -> Special.e1(a);
            case ABS -> Math.abs(a);
            case SIGN -> Math.signum(a);
            case MIN -> Math.min(a, b);
            case MAX -> Math.max(a, b);
            default -> throw new IllegalArgumentException("no value: " + this);
        };
    }
}
