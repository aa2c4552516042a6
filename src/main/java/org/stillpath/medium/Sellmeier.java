package org.stillpath.medium;

import java.util.List;
import java.util.Optional;

/**
 * Sellmeier's dispersion, n² = A + Σ Bᵢ λ²/(λ² − Cᵢ), with its dependence on temperature in one of two published forms:
 * the six constants of the glass catalogues beside it, or coefficients that are polynomials in the temperature themselves
 * (Barnes and Piltch, J. Opt. Soc. Am. 69 (1979) 178; Leviton and Frey, Proc. SPIE 6273 (2006) 62732K).
 *
 * <p>Absolute and relative index are kept apart. Where the constants were measured in air, the index at the temperature
 * they hold for is multiplied by that of air at 20 °C and 101.325 kPa; the six constants give the change of the absolute
 * index and are added after that, with the factor (n² − 1)/(2n) of the catalogue's own index, as they were fitted. The
 * vacuum wavelength is put into the formula as it is; catalogues mean the wavelength in air, which changes the index by
 * less than 1e-5 in the visible.
 *
 * @param constant A as a polynomial in the temperature in kelvin, ascending; 1 for most
 * @param terms strengths and resonances
 * @param temperature for which the constants hold, kelvin
 * @param relativeToAir whether they give the index relative to air
 * @param thermal the six constants, where the temperature is in these
 */
public record Sellmeier(
        List<Double> constant, List<Term> terms, double temperature, boolean relativeToAir, Optional<Thermal> thermal)
        implements SolidLaw {
    public Sellmeier {
        constant = List.copyOf(constant);
        terms = List.copyOf(terms);
        if (constant.isEmpty() || terms.isEmpty()) {
            throw new IllegalArgumentException("a dispersion formula needs a constant and terms");
        }
        if (thermal.isPresent() && (constant.size() > 1 || terms.stream().anyMatch(Term::varies))) {
            throw new IllegalArgumentException("the temperature is either in the terms or in the thermal constants");
        }
    }

    /**
     * One term B λ²/(λ² − C).
     *
     * @param strength B as a polynomial in the temperature in kelvin, ascending
     * @param squared C in m², likewise
     */
    public record Term(List<Double> strength, List<Double> squared) {
        public Term {
            strength = List.copyOf(strength);
            squared = List.copyOf(squared);
        }

        boolean varies() {
            return strength.size() > 1 || squared.size() > 1;
        }
    }

    /**
     * The six constants of the glass catalogues (SCHOTT TIE-19; Hoffmann et al., Proc. SPIE 1266 (1990) 160), about 20 °C:
     * Δn = (n² − 1)/(2n) [D₀ΔT + D₁ΔT² + D₂ΔT³ + (E₀ΔT + E₁ΔT²)/(λ² − λ²_TK)], the change of the absolute index.
     *
     * @param d0 D₀ in 1/K; {@code d1} in 1/K², {@code d2} in 1/K³
     * @param e0 E₀ in m²/K; {@code e1} in m²/K²
     * @param resonance λ_TK in metres; a negative one counts its square negative, as catalogues do
     */
    public record Thermal(double d0, double d1, double d2, double e0, double e1, double resonance) {
        /** The temperature about which the constants are given, kelvin. */
        static final double ABOUT = AirLaw.ZERO_CELSIUS + 20;

        /** The polynomial a₁ΔT + a₂ΔT² + a₃ΔT³ at one wavelength in metres. */
        double[] at(double wavelength) {
            double under = wavelength * wavelength - Math.copySign(resonance * resonance, resonance);
            return new double[] {d0 + e0 / under, d1 + e1 / under, d2};
        }
    }

    @Override
    public boolean varies() {
        return thermal.isPresent() || constant.size() > 1 || terms.stream().anyMatch(Term::varies);
    }

    @Override
    public Slope at(double wavelength) {
        double inAir = relativeToAir ? AirState.laboratory().refractivity(wavelength) : 0;
        if (thermal.isEmpty()) {
            return varies() ? (kelvin, out) -> direct(wavelength, kelvin, inAir, out) : fixed(wavelength, inAir);
        }
        double[] jet = new double[3];
        direct(wavelength, temperature, 0, jet);
        double own = 1 + jet[0];
        // N = N₀ + N_air + N₀ N_air keeps the digits
        double absolute = jet[0] + inAir * own;
        double factor = (own * own - 1) / (2 * own);
        double[] a = thermal.get().at(wavelength);
        double offset = cubic(a, temperature - Thermal.ABOUT);
        return (kelvin, out) -> {
            double t = kelvin - Thermal.ABOUT;
            out[0] = absolute + factor * (cubic(a, t) - offset);
            out[1] = factor * (a[0] + t * (2 * a[1] + 3 * a[2] * t));
            out[2] = factor * (2 * a[1] + 6 * a[2] * t);
        };
    }

    private Slope fixed(double wavelength, double inAir) {
        double[] jet = new double[3];
        direct(wavelength, temperature, inAir, jet);
        return (kelvin, out) -> {
            out[0] = jet[0];
            out[1] = 0;
            out[2] = 0;
        };
    }

    private static double cubic(double[] a, double t) {
        return t * (a[0] + t * (a[1] + t * a[2]));
    }

    /** n − 1 and its derivatives from the formula itself, times the index of air. */
    private void direct(double wavelength, double kelvin, double inAir, double[] out) {
        double l2 = wavelength * wavelength;
        double[] sum = polynomial(constant, kelvin);
        for (Term term : terms) {
            double[] b = polynomial(term.strength, kelvin);
            double[] c = polynomial(term.squared, kelvin);
            // g = 1/(λ² − C): g' = g² C', g'' = g² C'' + 2 g³ C'²
            double g = 1 / (l2 - c[0]);
            double g1 = g * g * c[1];
            double g2 = g * g * c[2] + 2 * g * g1 * c[1];
            sum[0] += l2 * b[0] * g;
            sum[1] += l2 * (b[1] * g + b[0] * g1);
            sum[2] += l2 * (b[2] * g + 2 * b[1] * g1 + b[0] * g2);
        }
        if (!(sum[0] > 0)) {
            out[0] = Double.NaN;
            out[1] = Double.NaN;
            out[2] = Double.NaN;
            return;
        }
        double n = Math.sqrt(sum[0]);
        double n1 = sum[1] / (2 * n);
        double n2 = (sum[2] - 2 * n1 * n1) / (2 * n);
        out[0] = (sum[0] - 1) / (n + 1) + inAir * n;
        out[1] = n1 * (1 + inAir);
        out[2] = n2 * (1 + inAir);
    }

    /** Value, first and second derivative. */
    private static double[] polynomial(List<Double> p, double t) {
        double v = 0;
        double d = 0;
        double dd = 0;
        for (int i = p.size() - 1; i >= 0; i--) {
            dd = dd * t + 2 * d;
            d = d * t + v;
            v = v * t + p.get(i);
        }
        return new double[] {v, d, dd};
    }
}
