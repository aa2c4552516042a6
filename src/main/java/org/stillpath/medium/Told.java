package org.stillpath.medium;

import org.stillpath.unit.Display;

/** Numbers in messages: exact as far as they are shown, without an error of their own. */
final class Told {
    private Told() {}

    /** A length in metres in the unit that reads best; millimetres down to 0.01 mm, as tables have them: {@code 0.4 mm}. */
    static String length(double metres) {
        double size = Math.abs(metres);
        if (size >= 1e-5 && size < 1) {
            return Display.in(metres, "mm", 0).toString();
        }
        return Display.of(metres, "m", 0).toString();
    }

    /** A wavelength in metres as nanometres: {@code 633 nm}. */
    static String wavelength(double metres) {
        return Display.in(metres, "nm", 0).toString();
    }

    /** A plain number. */
    static String number(double value) {
        return Display.of(value, "1", 0).toString();
    }
}
