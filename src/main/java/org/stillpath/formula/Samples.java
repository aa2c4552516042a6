package org.stillpath.formula;

/**
 * Values, gradients and Hessians of one scalar function at an array of points: structure of arrays, SI units, derivatives
 * with respect to the Cartesian coordinates in metres. Mutable scratch space, owned by one thread; the arrays are public
 * because the loops that fill and read them are hot.
 *
 * <p>A value that could not be computed (a domain fault, a point outside a table) is {@link Double#NaN}; the field that
 * filled it explains why in words when it is asked for that point.
 */
public final class Samples {
    /** Values, one a point. */
    public final double[] value;
    /** Gradient components, one a point. */
    public final double[] gx;
    /** Gradient components along y. */
    public final double[] gy;
    /** Gradient components along z. */
    public final double[] gz;
    /** Second derivatives with respect to x twice. */
    public final double[] hxx;
    /** Second derivatives with respect to x and y. */
    public final double[] hxy;
    /** Second derivatives with respect to x and z. */
    public final double[] hxz;
    /** Second derivatives with respect to y twice. */
    public final double[] hyy;
    /** Second derivatives with respect to y and z. */
    public final double[] hyz;
    /** Second derivatives with respect to z twice. */
    public final double[] hzz;

    /** Room for {@code capacity} points. */
    public Samples(int capacity) {
        value = new double[capacity];
        gx = new double[capacity];
        gy = new double[capacity];
        gz = new double[capacity];
        hxx = new double[capacity];
        hxy = new double[capacity];
        hxz = new double[capacity];
        hyy = new double[capacity];
        hyz = new double[capacity];
        hzz = new double[capacity];
    }

    /** Room for as many points as another has, whose second derivatives it shares. */
    public Samples(Samples other) {
        int capacity = other.capacity();
        value = new double[capacity];
        gx = new double[capacity];
        gy = new double[capacity];
        gz = new double[capacity];
        hxx = other.hxx;
        hxy = other.hxy;
        hxz = other.hxz;
        hyy = other.hyy;
        hyz = other.hyz;
        hzz = other.hzz;
    }

    /** Makes a point undefined: NaN in all arrays that {@code order} asks for. */
    public void undefine(Order order, int point) {
        value[point] = Double.NaN;
        if (order != Order.VALUE) {
            gx[point] = Double.NaN;
            gy[point] = Double.NaN;
            gz[point] = Double.NaN;
        }
        if (order == Order.HESSIAN) {
            hxx[point] = Double.NaN;
            hxy[point] = Double.NaN;
            hxz[point] = Double.NaN;
            hyy[point] = Double.NaN;
            hyz[point] = Double.NaN;
            hzz[point] = Double.NaN;
        }
    }

    /** Number of points there is room for. */
    public int capacity() {
        return value.length;
    }
}
