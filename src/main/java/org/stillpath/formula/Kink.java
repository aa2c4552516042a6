package org.stillpath.formula;

/**
 * Where a formula switches between two branches, so that a derivative jumps: at the zeros of {@code difference}.
 *
 * @param difference a − b for a minimum or maximum of a and b, u for |u|; of any dimension. Its {@linkplain
 *     Formula#arguments() arguments} are those of the formula it stands in, in the same order.
 */
public record Kink(Formula difference) {}
