/** Floor 2: the located, unit-resolved tree of a job file. */
@NullMarked
package org.stillpath.job;

import org.jspecify.annotations.NullMarked;
