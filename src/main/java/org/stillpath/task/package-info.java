/** Floor 6: the tasks; a job as data in, a result as data out. */
@NullMarked
package org.stillpath.task;

import org.jspecify.annotations.NullMarked;
