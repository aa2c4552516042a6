package org.stillpath.geometry;

/**
 * Planes, spheres, conicoids of revolution, circular and elliptic cylinders, ellipsoids:
 *
 * <pre>F = z − ½ (cx x² + cy y² + g z²)</pre>
 *
 * <p>A conicoid of revolution with curvature c and conic constant k is cx = cy = c, g = (1 + k) c, which is the sag of ISO
 * 10110-12 freed of its root. Chosen over the sag form because it is defined everywhere, has no edge, and meets a straight
 * line in closed form.
 *
 * @param cx curvature in the xz section, 1/m
 * @param cy curvature in the yz section, 1/m
 * @param g (1 + k) times the curvature, the same in both sections, 1/m
 */
public record Quadric(double cx, double cy, double g) implements Form {
    /** The plane z = 0. */
    public static final Quadric PLANE = new Quadric(0, 0, 0);

    public Quadric {
        if (!(Double.isFinite(cx) && Double.isFinite(cy) && Double.isFinite(g))) {
            throw new IllegalArgumentException("curvatures must be finite: " + cx + ", " + cy + ", " + g);
        }
    }

    @Override
    public void evaluate(double x, double y, double z, double[] out) {
        out[0] = z - 0.5 * (cx * x * x + cy * y * y + g * z * z);
        out[1] = -cx * x;
        out[2] = -cy * y;
        out[3] = 1 - g * z;
        out[4] = -cx;
        out[5] = 0;
        out[6] = 0;
        out[7] = -cy;
        out[8] = 0;
        out[9] = -g;
    }

    @Override
    public boolean onCap(double x, double y, double z) {
        return 1 - g * z >= 0;
    }

    @Override
    public int crossings(double x, double y, double z, double dx, double dy, double dz, double reach, double[] out) {
        double a = -0.5 * (cx * dx * dx + cy * dy * dy + g * dz * dz);
        double b = dz - (cx * x * dx + cy * y * dy + g * z * dz);
        double c = z - 0.5 * (cx * x * x + cy * y * y + g * z * z);
        if (a == 0) {
            if (b == 0) {
                return 0;
            }
            out[0] = -c / b;
            return Double.isFinite(out[0]) ? 1 : 0;
        }
        double discriminant = b * b - 4 * a * c;
        if (!(discriminant >= 0)) {
            return 0;
        }
        // the root without cancellation first, the other by Vieta (Press et al., Numerical Recipes, section 5.6)
        double q = -0.5 * (b + Math.copySign(Math.sqrt(discriminant), b));
        double s1 = q / a;
        double s2 = q == 0 ? 0 : c / q;
        int count = 0;
        if (Double.isFinite(Math.min(s1, s2))) {
            out[count++] = Math.min(s1, s2);
        }
        if (Double.isFinite(Math.max(s1, s2)) && s1 != s2) {
            out[count++] = Math.max(s1, s2);
        }
        return count;
    }

    @Override
    public double sag(double x, double y) {
        double a = cx * x * x + cy * y * y;
        double b = 1 - g * a;
        return b < 0 ? Double.NaN : a / (1 + Math.sqrt(b));
    }

    @Override
    public boolean closed() {
        return (cx != 0 || cy != 0) && (cx == 0 || g / cx > 0) && (cy == 0 || g / cy > 0);
    }

    @Override
    public double curvature() {
        return Math.max(Math.abs(cx), Math.abs(cy));
    }
}
