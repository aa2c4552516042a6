package org.stillpath.plot;

import java.math.BigDecimal;
import java.util.ArrayList;
import java.util.List;
import org.stillpath.task.SectionFigure.Shading;

/**
 * A shading made ready: over which range colours run, and at which values contours stand.
 *
 * <p>The range is that of the cells where the value varies. A homogeneous medium beside a graded one would otherwise take
 * most of the colours and all contours to its step; it is left unshaded where it lies outside the range. Where nothing
 * varies from cell to cell, but there are steps, the range is the whole.
 */
final class Shade {
    private static final int MOST_LEVELS = 5;
    private static final double PIXELS_PER_POINT = 100.0 / 72;
    private static final int FINEST = 12;

    private final Shading shading;
    private final double[] values;
    private final double low;
    private final double high;
    private final boolean varies;

    Shade(Shading shading) {
        this.shading = shading;
        values = shading.values();
        double[] graded = range(true);
        varies = graded[0] < graded[1];
        double[] all = varies ? graded : range(false);
        low = all[0];
        high = all[1];
        double slack = 0.1 * (high - low);
        for (int r = 0; r < shading.rows(); r++) {
            for (int c = 0; c < shading.columns(); c++) {
                double v = values[r * shading.columns() + c];
                if (varies && isHomogeneous(c, r) && (v < low - slack || v > high + slack)) {
                    values[r * shading.columns() + c] = Double.NaN;
                }
            }
        }
    }

    private double[] range(boolean gradedOnly) {
        double least = Double.POSITIVE_INFINITY;
        double most = Double.NEGATIVE_INFINITY;
        for (int r = 0; r < shading.rows(); r++) {
            for (int c = 0; c < shading.columns(); c++) {
                double v = shading.value(c, r);
                if (Double.isFinite(v) && !(gradedOnly && isHomogeneous(c, r))) {
                    least = Math.min(least, v);
                    most = Math.max(most, v);
                }
            }
        }
        return new double[] {least, most};
    }

    /** Equal to a neighbour both across and up: also true of the cells along the edge of a homogeneous medium. */
    private boolean isHomogeneous(int c, int r) {
        return (isEqual(c, r, c - 1, r) || isEqual(c, r, c + 1, r))
                && (isEqual(c, r, c, r - 1) || isEqual(c, r, c, r + 1));
    }

    private boolean isEqual(int c, int r, int c2, int r2) {
        if (c2 < 0 || r2 < 0 || c2 >= shading.columns() || r2 >= shading.rows()) {
            return false;
        }
        double v = shading.value(c, r);
        return Math.abs(v - shading.value(c2, r2)) <= 1e-13 * Math.abs(v);
    }

    /** Whether there is anything to shade: two different values. */
    boolean isShown() {
        return low < high;
    }

    Shading shading() {
        return shading;
    }

    /** Least value shown, in digits that tell it from the greatest. */
    String lowText() {
        return text(low);
    }

    String highText() {
        return text(high);
    }

    private String text(double v) {
        int decimals = (int) Math.min(Math.max(2 - Math.floor(Math.log10(high - low)), 0), FINEST);
        return Scale.plain(BigDecimal.valueOf(v), decimals);
    }

    /** Three to five round values inside the range; none where the value only steps. */
    List<BigDecimal> levels() {
        List<BigDecimal> levels = new ArrayList<>();
        if (!varies) {
            return levels;
        }
        double range = high - low;
        for (double least = range / 10; ; least *= 1.05) {
            BigDecimal step = Scale.step(least);
            levels.clear();
            BigDecimal start = BigDecimal.valueOf(Math.ceil((low + 0.03 * range) / step.doubleValue()));
            for (BigDecimal k = start; ; k = k.add(BigDecimal.ONE)) {
                BigDecimal level = k.multiply(step);
                if (level.doubleValue() >= high - 0.03 * range) {
                    break;
                }
                levels.add(level.setScale(Math.max(step.scale(), 0)));
            }
            if (levels.size() <= MOST_LEVELS) {
                return levels;
            }
        }
    }

    /** Lines of a level, in points on paper. */
    List<Polyline> contours(double level, View view) {
        int columns = shading.columns();
        int rows = shading.rows();
        double du = (shading.u1() - shading.u0()) / columns;
        double dv = (shading.v1() - shading.v0()) / rows;
        // one more ring at the edges, so that lines reach them: half a cell on, with the cell's value
        double[] x = new double[columns + 2];
        double[] y = new double[rows + 2];
        for (int c = 0; c < x.length; c++) {
            x[c] = view.x(shading.u0() + Math.min(Math.max(c - 0.5, 0), columns) * du);
        }
        for (int r = 0; r < y.length; r++) {
            y[r] = view.y(shading.v0() + Math.min(Math.max(r - 0.5, 0), rows) * dv);
        }
        double[] padded = new double[x.length * y.length];
        for (int r = 0; r < y.length; r++) {
            for (int c = 0; c < x.length; c++) {
                padded[r * x.length + c] = values[
                        Math.min(Math.max(r - 1, 0), rows - 1) * columns + Math.min(Math.max(c - 1, 0), columns - 1)];
            }
        }
        return new Contours(x, y, padded).at(level);
    }

    /** The colours on paper, as far as they lie in the plot. */
    Item.Colours colours(View view, Box plot) {
        double left = Math.max(plot.left(), view.x(shading.u0()));
        double right = Math.max(left + 1e-3, Math.min(plot.right(), view.x(shading.u1())));
        double top = Math.max(plot.top(), view.y(shading.v1()));
        double bottom = Math.max(top + 1e-3, Math.min(plot.bottom(), view.y(shading.v0())));
        int columns = (int) Math.ceil((right - left) * PIXELS_PER_POINT);
        int rows = (int) Math.ceil((bottom - top) * PIXELS_PER_POINT);
        int[] argb = new int[columns * rows];
        double perU = shading.columns() / (shading.u1() - shading.u0());
        double perV = shading.rows() / (shading.v1() - shading.v0());
        for (int j = 0; j < rows; j++) {
            double r = (view.v(top + (j + 0.5) * (bottom - top) / rows) - shading.v0()) * perV - 0.5;
            for (int i = 0; i < columns; i++) {
                double c = (view.u(left + (i + 0.5) * (right - left) / columns) - shading.u0()) * perU - 0.5;
                double v = between(c, r);
                argb[j * columns + i] = Double.isNaN(v) ? 0 : 0xFF000000 | Cividis.pale((v - low) / (high - low));
            }
        }
        return new Item.Colours(left, top, right - left, bottom - top, columns, rows, argb);
    }

    /** Linear between cell centres; at a rim, from the cells on the inside alone, as far as these have the greater weight. */
    private double between(double c, double r) {
        long c0 = (long) Math.floor(c);
        long r0 = (long) Math.floor(r);
        double sum = 0;
        double weights = 0;
        for (int k = 0; k < 4; k++) {
            long ck = c0 + (k & 1);
            long rk = r0 + (k >> 1);
            double v = cell(ck, rk);
            if (!Double.isNaN(v)) {
                double weight = (1 - Math.abs(c - ck)) * (1 - Math.abs(r - rk));
                sum += weight * v;
                weights += weight;
            }
        }
        return weights >= 0.5 ? sum / weights : Double.NaN;
    }

    private double cell(long c, long r) {
        int column = (int) Math.min(Math.max(c, 0), shading.columns() - 1);
        int row = (int) Math.min(Math.max(r, 0), shading.rows() - 1);
        double v = values[row * shading.columns() + column];
        return Double.isFinite(v) ? v : Double.NaN;
    }
}
