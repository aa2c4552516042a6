/**
 * Floor 2: formulas, from text to tree to dimension check to exact derivatives.
 *
 * <p>{@link org.stillpath.formula.Formula#parse} reads a formula against the {@link org.stillpath.formula.Names} it may
 * mention; its faults come back together with their offsets. A {@link org.stillpath.formula.Formula} is sampled at arrays
 * of points into {@link org.stillpath.formula.Samples}. On the way the text becomes a tree (sealed records in postfix
 * order, so that no walk recurses), the tree a graph of shared expressions with its derivatives, the graph a list of
 * operations, which is walked at first and compiled to bytecode where that pays. Height, clearance and distance come from a {@link
 * org.stillpath.formula.Chart}.
 *
 * <p>The grammar, in EBNF; blanks may stand between its symbols:
 *
 * <pre>
 * formula    = sum ;
 * sum        = product , { ( "+" | "-" ) , product } ;
 * product    = signed , { ( "*" | "/" ) , signed } ;
 * signed     = ( "-" | "+" ) , signed | power ;
 * power      = atom , [ "^" , signed ] ;
 * atom       = number , [ unit ] | "pi" | name | call | "(" , sum , ")" ;
 * call       = function , "(" , sum , { "," , sum } , ")" ;
 * number     = ( digits , [ "." , [ digits ] ] | "." , digits ) , [ ( "e" | "E" ) , [ "+" | "-" ] , digits ] ;
 * name       = letter , { letter | digit | "_" } ;
 * function   = "sqrt" | "exp" | "log" | "log10" | "sin" | "cos" | "tan" | "asin" | "acos" | "atan" | "sinh" | "cosh"
 *            | "tanh" | "sech" | "erf" | "E1" | "abs"            (* one operand *)
 *            | "atan2"                                           (* two operands *)
 *            | "min" | "max" | "hypot" ;                         (* two operands or more *)
 * unit       = (* the longest run that the unit table reads, see {@link org.stillpath.unit.Units#scan} *) ;
 *
 * conditions = comparison , { "and" , comparison } ;
 * comparison = sum , relation , sum , { relation , sum } ;
 * relation   = "&lt;" | "&lt;=" | ">" | ">=" ;
 * </pre>
 *
 * So a power binds to the right and more tightly than a sign: {@code 2^3^2} is 2^9, {@code -2^2} is -4, {@code 2^-2} is
 * 1/4. A unit stands directly after a number and belongs to it: {@code 0.5 m^2} is half a square metre, {@code 1/2 m} is
 * 1/(2 m). A part behind a slash that is a name here is not a unit: with a value L, {@code 5 m/L} is (5 m)/L. A number in
 * degC is a temperature counted from 273.15 K, its sign belongs to it, and it is added to or compared with temperatures
 * only.
 *
 * <p>Simplification follows the rules of algebra, not of rounding: {@code 0*u} is 0 and {@code u/u} is 1 also where u is
 * undefined.
 */
@NullMarked
package org.stillpath.formula;

import org.jspecify.annotations.NullMarked;
