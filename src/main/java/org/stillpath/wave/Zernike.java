package org.stillpath.wave;

import java.util.Arrays;
import java.util.stream.IntStream;

/**
 * Zernike's polynomials on the unit disk in the order and with the norm of Noll (J. Opt. Soc. Am. 66 (1976) 207): counted
 * from 1, even numbers with the cosine, odd ones with the sine, each of unit rms over the disk. The angle counts from +x
 * toward +y.
 *
 * <p>Evaluated as r^m·cos mθ or r^m·sin mθ, by complex powers of x + iy, times a polynomial in r²: no angle is taken, so that
 * the centre is a point like any other. The sums of the radial polynomials cancel as the degree grows; up to the degree 13,
 * where this class stops, they keep 11 digits.
 */
public final class Zernike {
    /** Most terms that may be asked for: all up to degree 13. */
    public static final int MOST = 105;

    private final Mode[] modes;
    /** Coefficients of each radial polynomial over r^m by powers of r², norm included. */
    private final double[][] radial;

    /** Places in {@link #modes} by the size of their order. */
    private final int[][] byOrder;

    /**
     * One polynomial.
     *
     * @param number Noll's number, from 1
     * @param degree n, of the radial polynomial
     * @param order m, negative for the sine
     */
    public record Mode(int number, int degree, int order) {
        /** What the aberration is called. */
        public String name() {
            return switch (number) {
                case 1 -> "piston";
                case 2 -> "tilt x";
                case 3 -> "tilt y";
                case 4 -> "focus";
                case 5 -> "oblique astigmatism";
                case 6 -> "astigmatism";
                case 7 -> "coma y";
                case 8 -> "coma x";
                case 9 -> "trefoil y";
                case 10 -> "trefoil x";
                case 11 -> "spherical";
                case 12 -> "secondary astigmatism";
                case 13 -> "oblique secondary astigmatism";
                case 14 -> "quatrefoil";
                case 15 -> "oblique quatrefoil";
                default -> order == 0 ? "spherical, degree " + degree : "degree " + degree + ", order " + order;
            };
        }
    }

    private Zernike(int terms) {
        modes = new Mode[terms];
        radial = new double[terms][];
        for (int j = 1; j <= terms; j++) {
            Mode mode = mode(j);
            modes[j - 1] = mode;
            radial[j - 1] = radial(mode.degree(), Math.abs(mode.order()));
        }
        byOrder = new int[modes[terms - 1].degree() + 1][];
        Arrays.setAll(
                byOrder,
                m -> IntStream.range(0, terms)
                        .filter(j -> Math.abs(modes[j].order()) == m)
                        .toArray());
    }

    /**
     * The first so many polynomials.
     *
     * @param terms from 1 to {@link #MOST}
     */
    public static Zernike of(int terms) {
        if (terms < 1 || terms > MOST) {
            throw new IllegalArgumentException("terms must be from 1 to " + MOST + ": " + terms);
        }
        return new Zernike(terms);
    }

    /** The mode of a number of Noll's, from 1. */
    public static Mode mode(int number) {
        if (number < 1) {
            throw new IllegalArgumentException("number must be at least 1: " + number);
        }
        int n = 0;
        int before = 0;
        while (before + n + 1 < number) {
            before += n + 1;
            n++;
        }
        int place = number - before;
        int m = n % 2 == 0 ? place / 2 * 2 : (place - 1) / 2 * 2 + 1;
        return new Mode(number, n, m == 0 || number % 2 == 0 ? m : -m);
    }

    /** Number of polynomials. */
    public int terms() {
        return modes.length;
    }

    /** The values of all polynomials at a point of the disk, into {@code out}, number 1 first. */
    public void values(double x, double y, double[] out) {
        double s = x * x + y * y;
        double re = 1;
        double im = 0;
        for (int[] places : byOrder) {
            for (int j : places) {
                double[] c = radial[j];
                double sum = c[c.length - 1];
                for (int k = c.length - 2; k >= 0; k--) {
                    sum = sum * s + c[k];
                }
                out[j] = sum * (modes[j].order() < 0 ? im : re);
            }
            double next = re * x - im * y;
            im = re * y + im * x;
            re = next;
        }
    }

    /** R_n^m(r)/r^m by powers of r², times √(n + 1), and √2 where m is not 0. */
    private static double[] radial(int n, int m) {
        int count = (n - m) / 2 + 1;
        double[] c = new double[count];
        double norm = Math.sqrt((n + 1.0) * (m == 0 ? 1 : 2));
        for (int k = 0; k < count; k++) {
            double value = factorial(n - k) / (factorial(k) * factorial((n + m) / 2 - k) * factorial((n - m) / 2 - k));
            c[count - 1 - k] = (k % 2 == 0 ? norm : -norm) * value;
        }
        return c;
    }

    private static double factorial(int n) {
        double f = 1;
        for (int i = 2; i <= n; i++) {
            f *= i;
        }
        return f;
    }
}
