package org.stillpath.plot;

/**
 * The colour map cividis of Nuñez, Anderton &amp; Renslow (2018), "Optimizing colormaps with consideration for color vision
 * deficiency", PLoS ONE 13(7) e0199239: even in lightness, read alike with and without full colour vision. Every 15th of
 * the 256 published colours, linear between them (within 11 of 255 of the table, which paling turns to 4); paled, so that dark lines stand out.
 */
final class Cividis {
    private static final int[] ANCHORS = {
        0x00224E, 0x002D68, 0x163770, 0x2E416D, 0x3F4C6C, 0x4E566C, 0x5C616E, 0x696B71, 0x767676, 0x838179, 0x928C78,
        0xA09875, 0xAFA471, 0xBFB06B, 0xCFBD62, 0xDFCA57, 0xF0D846, 0xFEE838
    };

    /** Share of the map's colour; the rest is white. */
    private static final double STRENGTH = 0.36;

    private Cividis() {}

    /** The pale colour, 0xRRGGBB, for a value from 0 (low) to 1 (high). */
    static int pale(double value) {
        return between(ANCHORS, value, STRENGTH);
    }

    /** Between anchors of a map, linear in red, green and blue, with a share of the colour; the rest is white. */
    static int between(int[] anchors, double value, double strength) {
        double t = Math.min(Math.max(value, 0), 1) * (anchors.length - 1);
        int i = Math.min((int) t, anchors.length - 2);
        int rgb = 0;
        for (int shift = 16; shift >= 0; shift -= 8) {
            double low = (anchors[i] >> shift) & 0xFF;
            double high = (anchors[i + 1] >> shift) & 0xFF;
            double mixed = low + (t - i) * (high - low);
            rgb |= (int) Math.round(255 + strength * (mixed - 255)) << shift;
        }
        return rgb;
    }
}
