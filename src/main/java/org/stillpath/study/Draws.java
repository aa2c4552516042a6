package org.stillpath.study;

import org.apache.commons.rng.core.source64.Philox4x64;

/**
 * Random numbers of one sample. The generator is Philox-4x64-10 (Salmon et al. 2011), whose output is a function of a key and
 * a counter: the seed is the key and the sample's number a part of the counter, so that a sample's numbers depend on
 * nothing else, neither on other samples nor on who draws them. Against jumping one sequence this needs no order of the samples
 * at all; it costs some 100 ns to start a sample. Mutable; for one sample.
 */
final class Draws {
    private final Philox4x64 bits;
    private double spare = Double.NaN;

    /**
     * Numbers of a sample.
     *
     * @param seed of the study
     * @param sample number of the sample
     */
    Draws(long seed, long sample) {
        // key (2 words), then the counter, of which the sample takes the third word: 2^128 numbers for each
        bits = new Philox4x64(new long[] {seed, 0x7374696C6C706174L, 0, 0, sample, 0});
    }

    // StrictMath throughout: the same digits on every machine

    /** Uniform between 0 and 1, neither of them drawn. */
    double uniform() {
        return (bits.nextLong() >>> 12) * 0x1p-52 + 0x1p-53;
    }

    /** Uniform between -1 and 1. */
    double symmetric() {
        return 2 * uniform() - 1;
    }

    /** Standard normal, by Box and Muller (1958), as JCGM 101, annex C.4, has it. */
    double normal() {
        if (!Double.isNaN(spare)) {
            double kept = spare;
            spare = Double.NaN;
            return kept;
        }
        double radius = StrictMath.sqrt(-2 * StrictMath.log(uniform()));
        double angle = 2 * Math.PI * uniform();
        spare = radius * StrictMath.sin(angle);
        return radius * StrictMath.cos(angle);
    }

    /** Student's t, by Bailey's polar method (Mathematics of Computation 62 (1994) 779). */
    double student(double degreesOfFreedom) {
        while (true) {
            double u = symmetric();
            double v = symmetric();
            double w = u * u + v * v;
            if (w < 1 && w > 0) {
                return u * StrictMath.sqrt(degreesOfFreedom * (StrictMath.pow(w, -2 / degreesOfFreedom) - 1) / w);
            }
        }
    }
}
