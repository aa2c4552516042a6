package org.stillpath.plot;

import java.util.Locale;

/** The colours of the house theme: four neutrals, and the set of Okabe &amp; Ito (2008), "Color universal design". */
enum Ink {
    INK(0x222222, true),
    GREY(0x5A5A5A, true),
    LIGHT(0xB0B0B0, true),
    PAPER(0xFFFFFF, true),
    BLUE(0x0072B2, false),
    VERMILLION(0xD55E00, false),
    GREEN(0x009E73, false),
    SKY(0x56B4E9, false),
    ORANGE(0xE69F00, false),
    PURPLE(0xCC79A7, false);

    private final int rgb;
    private final boolean neutral;

    Ink(int rgb, boolean neutral) {
        this.rgb = rgb;
        this.neutral = neutral;
    }

    /** The colour as 0xRRGGBB. */
    int rgb() {
        return rgb;
    }

    /** Whether a dark page may turn it about. */
    boolean isNeutral() {
        return neutral;
    }

    /** The colour as SVG writes it. */
    String hex() {
        return String.format(Locale.ROOT, "#%06X", rgb);
    }

    /** The name in class attributes. */
    String word() {
        return name().toLowerCase(Locale.ROOT);
    }
}
