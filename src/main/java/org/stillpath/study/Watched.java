package org.stillpath.study;

import org.stillpath.task.ResultPath;

/**
 * A result that a study watches.
 *
 * @param path where it stands
 * @param unit SI unit symbol; empty where no result told it yet
 * @param value at the nominal inputs; NaN where the nominal result has none
 * @param error numerical error of that value; 0 where unknown
 */
record Watched(ResultPath path, String unit, double value, double error) {
    /** Its unit, 1 where it is not known. */
    String unitOrOne() {
        return unit.isEmpty() ? "1" : unit;
    }
}
