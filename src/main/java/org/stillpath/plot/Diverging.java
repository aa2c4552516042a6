package org.stillpath.plot;

/**
 * The diverging colours RdBu of Harrower &amp; Brewer (2003), "ColorBrewer.org", The Cartographic Journal 40, 27: eleven
 * classes from blue (below zero) through near white (zero) to red (above), told apart with and without full colour vision;
 * linear between the classes. From memory.
 */
final class Diverging {
    private static final int[] ANCHORS = {
        0x053061, 0x2166AC, 0x4393C3, 0x92C5DE, 0xD1E5F0, 0xF7F7F7, 0xFDDBC7, 0xF4A582, 0xD6604D, 0xB2182B, 0x67001F
    };

    private Diverging() {}

    /** The colour, 0xRRGGBB, for a value from −1 to 1. */
    static int of(double value) {
        return Cividis.between(ANCHORS, 0.5 * (value + 1), 1);
    }
}
