package org.stillpath.study;

/**
 * What is known of an input about its best estimate, as JCGM 101, 6.4, assigns it: a distribution with mean 0 that is added
 * to the estimate. Widths are half of the whole, in the input's SI unit.
 */
sealed interface Distribution {
    /** Standard uncertainty that enters the linear budget (JCGM 100, 4.2 and 4.3). */
    double standardUncertainty();

    /** Degrees of freedom of that; infinite for all but {@link Student}. */
    default double degreesOfFreedom() {
        return Double.POSITIVE_INFINITY;
    }

    /** One value. */
    double draw(Draws draws);

    /** Its name, for people. */
    String word();

    /**
     * Normal (JCGM 101, 6.4.7).
     *
     * @param standard standard deviation
     */
    record Normal(double standard) implements Distribution {
        @Override
        public double standardUncertainty() {
            return standard;
        }

        @Override
        public double draw(Draws draws) {
            return standard * draws.normal();
        }

        @Override
        public String word() {
            return "normal";
        }
    }

    /**
     * Uniform (JCGM 101, 6.4.2).
     *
     * @param half half-width
     */
    record Uniform(double half) implements Distribution {
        @Override
        public double standardUncertainty() {
            return half / Math.sqrt(3);
        }

        @Override
        public double draw(Draws draws) {
            return half * draws.symmetric();
        }

        @Override
        public String word() {
            return "uniform";
        }
    }

    /**
     * Trapezoidal, symmetric (JCGM 101, 6.4.4); triangular (6.4.5) where {@code inner} is 0.
     *
     * @param outer half-width of the base
     * @param inner half-width of the top
     */
    record Trapezoidal(double outer, double inner) implements Distribution {
        @Override
        public double standardUncertainty() {
            return Math.sqrt((outer * outer + inner * inner) / 6);
        }

        @Override
        public double draw(Draws draws) {
            // the sum of two uniform ones
            return 0.5 * ((outer + inner) * draws.symmetric() + (outer - inner) * draws.symmetric());
        }

        @Override
        public String word() {
            return inner == 0 ? "triangular" : "trapezoidal";
        }
    }

    /**
     * Arc sine, U-shaped (JCGM 101, 6.4.6).
     *
     * @param half half-width
     */
    record Arcsine(double half) implements Distribution {
        @Override
        public double standardUncertainty() {
            return half / Math.sqrt(2);
        }

        @Override
        public double draw(Draws draws) {
            return half * StrictMath.sin(2 * Math.PI * draws.uniform());
        }

        @Override
        public String word() {
            return "arcsine";
        }
    }

    /**
     * Scaled and shifted t (JCGM 101, 6.4.9): a standard uncertainty from few observations.
     *
     * @param standard scale, which is the standard uncertainty of JCGM 100
     * @param degreesOfFreedom above 0
     */
    record Student(double standard, double degreesOfFreedom) implements Distribution {
        @Override
        public double standardUncertainty() {
            return standard;
        }

        @Override
        public double draw(Draws draws) {
            return standard * draws.student(degreesOfFreedom);
        }

        @Override
        public String word() {
            return "Student";
        }
    }
}
