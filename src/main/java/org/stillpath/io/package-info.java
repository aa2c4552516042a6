/**
 * Floor 8: files in and files out. Job files and media documents come in as YAML 1.2 events and leave as {@link
 * org.stillpath.job.Node} trees that know where every value stands; tables come in as CSV. Everything that comes from a
 * file is bounded before memory is taken for it, and the bound is told when it is met.
 */
@NullMarked
package org.stillpath.io;

import org.jspecify.annotations.NullMarked;
