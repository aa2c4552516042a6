package org.stillpath.formula;

import java.util.Optional;

/** The functions that a formula may call. */
enum Function {
    SQRT("sqrt", 1, 1, "square root"),
    EXP("exp", 1, 1, "exponential"),
    LOG("log", 1, 1, "logarithm"),
    LOG10("log10", 1, 1, "decimal logarithm"),
    SIN("sin", 1, 1, "sine"),
    COS("cos", 1, 1, "cosine"),
    TAN("tan", 1, 1, "tangent"),
    ASIN("asin", 1, 1, "arc sine"),
    ACOS("acos", 1, 1, "arc cosine"),
    ATAN("atan", 1, 1, "arc tangent"),
    ATAN2("atan2", 2, 2, "arc tangent"),
    SINH("sinh", 1, 1, "hyperbolic sine"),
    COSH("cosh", 1, 1, "hyperbolic cosine"),
    TANH("tanh", 1, 1, "hyperbolic tangent"),
    SECH("sech", 1, 1, "hyperbolic secant"),
    ERF("erf", 1, 1, "error function"),
    E1("E1", 1, 1, "exponential integral"),
    ABS("abs", 1, 1, "absolute value"),
    MIN("min", 2, Integer.MAX_VALUE, "minimum"),
    MAX("max", 2, Integer.MAX_VALUE, "maximum"),
    HYPOT("hypot", 2, Integer.MAX_VALUE, "root of the sum of squares");

    private final String word;
    private final int fewest;
    private final int most;
    private final String description;

    Function(String word, int fewest, int most, String description) {
        this.word = word;
        this.fewest = fewest;
        this.most = most;
        this.description = description;
    }

    String word() {
        return word;
    }

    int fewest() {
        return fewest;
    }

    int most() {
        return most;
    }

    /** The function's name in words, without an article. */
    String description() {
        return description;
    }

    /** Whether the result and the operands all have one dimension, whichever it is. */
    boolean keepsDimension() {
        return this == ABS || this == MIN || this == MAX || this == HYPOT;
    }

    static Optional<Function> of(String word) {
        for (Function f : values()) {
            if (f.word.equals(word)) {
                return Optional.of(f);
            }
        }
        return Optional.empty();
    }

    /** The value for one operand; NaN or infinite outside the domain. */
    double apply(double a) {
        return switch (this) {
            case SQRT -> Math.sqrt(a);
            case EXP -> Math.exp(a);
            case LOG -> Math.log(a);
            case LOG10 -> Math.log10(a);
            case SIN -> Math.sin(a);
            case COS -> Math.cos(a);
            case TAN -> Math.tan(a);
            case ASIN -> Math.asin(a);
            case ACOS -> Math.acos(a);
            case ATAN -> Math.atan(a);
            case SINH -> Math.sinh(a);
            case COSH -> Math.cosh(a);
            case TANH -> Math.tanh(a);
            case SECH -> Special.sech(a);
            case ERF -> Special.erf(a);
            case E1 -> Special.e1(a);
            case ABS -> Math.abs(a);
            default -> throw new IllegalArgumentException(word + " needs two operands");
        };
    }

    /** The value for two operands. */
    double apply(double a, double b) {
        return switch (this) {
            case ATAN2 -> Math.atan2(a, b);
            case MIN -> Math.min(a, b);
            case MAX -> Math.max(a, b);
            case HYPOT -> Math.sqrt(a * a + b * b);
            default -> throw new IllegalArgumentException(word + " needs one operand");
        };
    }
}
