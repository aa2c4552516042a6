/**
 * Floor 10: the command line. The only place that prints or exits.
 *
 * <p>{@code Program} reads the arguments and gives the exit status: 0 a result was produced, 2 the input is wrong, 3 the
 * asked accuracy could not be reached, 4 a file could not be read or written; of several jobs the worst. A command is one
 * class with a {@code @Command} annotation, named in {@code Program}.
 */
@NullMarked
package org.stillpath.cli;

import org.jspecify.annotations.NullMarked;
