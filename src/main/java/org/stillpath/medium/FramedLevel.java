package org.stillpath.medium;

import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Vector;

/**
 * A level given in a frame, as a level in the job's coordinates.
 *
 * @param inner the level in the frame's coordinates
 * @param frame where the frame lies in the job
 */
record FramedLevel(Level inner, Frame frame) implements Level {

    /** {@code level} itself where the frame is the job's. */
    static Level of(Level level, Frame frame) {
        return frame.equals(Frame.JOB) ? level : new FramedLevel(level, frame);
    }

    @Override
    public double value(double x, double y, double z, double[] gradient) {
        Vector o = frame.origin();
        double dx = x - o.x();
        double dy = y - o.y();
        double dz = z - o.z();
        if (frame.isShiftOnly()) {
            return inner.value(dx, dy, dz, gradient);
        }
        Vector a = frame.ex();
        Vector b = frame.ey();
        Vector c = frame.ez();
        double value = inner.value(
                dx * a.x() + dy * a.y() + dz * a.z(),
                dx * b.x() + dy * b.y() + dz * b.z(),
                dx * c.x() + dy * c.y() + dz * c.z(),
                gradient);
        double gx = gradient[0];
        double gy = gradient[1];
        double gz = gradient[2];
        gradient[0] = gx * a.x() + gy * b.x() + gz * c.x();
        gradient[1] = gx * a.y() + gy * b.y() + gz * c.y();
        gradient[2] = gx * a.z() + gy * b.z() + gz * c.z();
        return value;
    }

    @Override
    public String describe() {
        return inner.describe();
    }
}
