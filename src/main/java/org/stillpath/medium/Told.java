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

    /** A temperature in kelvin as degrees Celsius: {@code 20 degC}. */
    static String celsius(double kelvin) {
        return Display.of(Math.round((kelvin - AirLaw.ZERO_CELSIUS) * 1e3) / 1e3, "1", 0) + " degC";
    }

    /** A pressure in pascal as hectopascal: {@code 1013.25 hPa}. */
    static String pressure(double pascal) {
        double hPa = pascal / 100;
        // five decimals below the first digit are more than any barometer shows
        double digit = hPa == 0 ? 1 : Math.pow(10, 5 - Math.floor(Math.log10(Math.abs(hPa))));
        return number(Double.isFinite(hPa) ? Math.rint(hPa * digit) / digit : hPa) + " hPa";
    }

    /** A plain number. */
    static String number(double value) {
        return Display.of(value, "1", 0).toString();
    }
}
