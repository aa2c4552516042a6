package org.stillpath.formula;

/** How many derivatives of a function are wanted; each includes the ones before it. */
public enum Order {
    /** The value alone. */
    VALUE,
    /** Value and gradient. */
    GRADIENT,
    /** Value, gradient and Hessian. */
    HESSIAN
}
