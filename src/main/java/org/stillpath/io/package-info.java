/**
 * Floor 8: files and texts. Reading: YAML events to the located job tree, CSV and the shipped media. Writing: the result
 * document as JSON, tables as CSV, files that appear whole or not at all.
 *
 * <p>Nothing here knows what a job means, and nothing here prints.
 */
@NullMarked
package org.stillpath.io;

import org.jspecify.annotations.NullMarked;
