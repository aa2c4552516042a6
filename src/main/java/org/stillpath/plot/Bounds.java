package org.stillpath.plot;

/** The least rectangle about points, metres. Mutable while it is being gathered; points that are not finite do not count. */
final class Bounds {
    private double u0;
    private double u1;
    private double v0;
    private double v1;

    Bounds() {
        this(Double.POSITIVE_INFINITY, Double.NEGATIVE_INFINITY, Double.POSITIVE_INFINITY, Double.NEGATIVE_INFINITY);
    }

    Bounds(double u0, double u1, double v0, double v1) {
        this.u0 = u0;
        this.u1 = u1;
        this.v0 = v0;
        this.v1 = v1;
    }

    void add(double[] u, double[] v) {
        for (int i = 0; i < u.length; i++) {
            if (Double.isFinite(u[i]) && Double.isFinite(v[i])) {
                u0 = Math.min(u0, u[i]);
                u1 = Math.max(u1, u[i]);
                v0 = Math.min(v0, v[i]);
                v1 = Math.max(v1, v[i]);
            }
        }
    }

    void addAcross(double[] u) {
        for (double each : u) {
            if (Double.isFinite(each)) {
                u0 = Math.min(u0, each);
                u1 = Math.max(u1, each);
            }
        }
    }

    void add(Bounds o) {
        u0 = Math.min(u0, o.u0);
        u1 = Math.max(u1, o.u1);
        v0 = Math.min(v0, o.v0);
        v1 = Math.max(v1, o.v1);
    }

    /** This, cut to another rectangle grown by a part of its sides on each of them. */
    Bounds within(Bounds o, double part) {
        double du = part * o.acrossSpan();
        double dv = part * o.upSpan();
        return new Bounds(
                Math.max(u0, o.u0 - du), Math.min(u1, o.u1 + du), Math.max(v0, o.v0 - dv), Math.min(v1, o.v1 + dv));
    }

    boolean isComplete() {
        return u0 <= u1 && v0 <= v1;
    }

    double acrossSpan() {
        return u1 - u0;
    }

    double upSpan() {
        return v1 - v0;
    }

    double acrossMiddle() {
        return (u0 + u1) / 2;
    }

    double upMiddle() {
        return (v0 + v1) / 2;
    }
}
