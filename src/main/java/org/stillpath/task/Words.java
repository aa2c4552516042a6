package org.stillpath.task;

import java.util.List;
import java.util.Locale;

/** Sentences that several tasks say. */
final class Words {
    /** What can hurt wherever light is sent along a computed path. Common practice, no source. */
    static final List<String> CAUTIONS = List.of(
            "The result says where light goes, not whether it is safe to be there: for laser beams follow IEC 60825-1 and "
                    + "local rules, and never look at the sun or into a beam through optics.");

    /** The same for lenses, where beams are focused and eyes are computed. Common practice, no source. */
    static final List<String> LENS_CAUTIONS = List.of(
            CAUTIONS.get(0),
            "A lens concentrates light: the class of a laser product and the eyewear it needs follow from the standards that "
                    + "apply (IEC 60825-1; EN 207, EN 208 or ANSI Z136.1), never from this result.",
            "Results about eyes are no diagnosis and no prescription.");

    private Words() {}

    /** That the asked accuracy was not reached. */
    static String notReached(double accuracy) {
        return String.format(
                Locale.ROOT,
                "the asked accuracy of %.3g was not reached everywhere; each value's error estimate says how far it can be "
                        + "trusted",
                accuracy);
    }
}
