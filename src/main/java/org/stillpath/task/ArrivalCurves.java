package org.stillpath.task;

import java.math.BigDecimal;
import java.math.RoundingMode;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import java.util.stream.Collectors;
import org.stillpath.geometry.Vector;
import org.stillpath.path.PathSearch.Sample;
import org.stillpath.path.StationaryPath;
import org.stillpath.unit.Display;

/**
 * The figure {@code arrival}: by what each ray of a search in a plane misses the target, over its launch angle. Its zeros are
 * the stationary paths.
 *
 * <p>A search spans degrees and misses as much as the points are apart, while images lie within a milliradian and a metre. So
 * there are up to three panels: all that was searched, with misses logarithmic away from zero where they must be; the
 * neighbourhood of all paths, where that is a small part of it; and of the closest ones, where these stand close together even
 * there. Chosen over one picture with both axes logarithmic, which cannot part images that are close to each other but not to
 * zero angle.
 */
final class ArrivalCurves {
    /** Beyond this many the title tells only between which angles they lie. */
    private static final int MOST_NAMED = 3;

    /** A neighbourhood has its own panel where it is less than this part of the one before. */
    private static final double ZOOM = 0.4;
    /** Roots closer to each other than this part of a panel have a panel of their own. */
    private static final double CLOSE = 1.0 / 30;

    private static final double AROUND = 0.35;
    /** A linear axis is enough where what happens between the roots is more than this part of it. */
    private static final double READABLE = 0.05;

    private static final double DECADES = 1e-6;
    /** The zero line keeps this part of the axis from its ends. */
    private static final double LEAST_ROOM = 0.15;
    /** A step that is this much steeper than both its neighbours is a jump. */
    private static final double STEEPER = 30;

    private final double halfAngle;
    /** A path whose launch is farther from the plane, rad, is none of its roots. */
    private static final double IN_PLANE = 1e-6;

    private final Vector axis;
    private final Vector side;
    private final String axisName;
    private final String toward;
    private final List<Branch> branches = new ArrayList<>();
    private final List<Root> roots = new ArrayList<>();

    /** Samples of one passage, with NaN at gaps. */
    private record Branch(String label, double[] angle, double[] miss) {
        /** Between two samples, linearly; NaN in a gap. */
        double at(double a) {
            for (int i = 1; i < angle.length; i++) {
                if (a >= angle[i - 1] && a <= angle[i]) {
                    double h = angle[i] - angle[i - 1];
                    return h == 0 ? miss[i] : miss[i - 1] + (miss[i] - miss[i - 1]) * ((a - angle[i - 1]) / h);
                }
            }
            return Double.NaN;
        }

        /** Widens a range of misses by those at angles strictly between two; a range that holds zero at least. */
        void widen(double[] range, double low, double high) {
            for (int i = 0; i < angle.length; i++) {
                if (angle[i] > low && angle[i] < high && Double.isFinite(miss[i])) {
                    range[0] = Math.min(range[0], miss[i]);
                    range[1] = Math.max(range[1], miss[i]);
                }
            }
        }
    }

    private record Root(double angle, StationaryPath.Kind kind, Branch branch) {}

    /**
     * Starts a figure.
     *
     * @param halfAngle to which the search went on both sides, rad
     * @param axis unit direction from which angles are counted
     * @param axisName what that is
     * @param normal unit normal of the plane searched; angles are drawn positive toward a positive axis of the job
     */
    ArrivalCurves(double halfAngle, Vector axis, String axisName, Vector normal) {
        this.halfAngle = halfAngle;
        this.axis = axis;
        this.axisName = axisName;
        Vector turn = normal.cross(axis);
        int most = 0;
        for (int i = 1; i < 3; i++) {
            if (Math.abs(RayFigure.component(turn, i)) > Math.abs(RayFigure.component(turn, most)) + 1e-9) {
                most = i;
            }
        }
        this.side = RayFigure.component(turn, most) < 0 ? turn.times(-1) : turn;
        this.toward = "+" + RayFigure.NAMES[most];
    }

    /**
     * Adds what one search found.
     *
     * @param name what was searched, where there were several; may be empty
     * @param samples its rays, with angles positive toward normal × axis
     * @param normal unit normal of its plane
     */
    void add(String name, List<Sample> samples, List<StationaryPath> paths, Vector normal) {
        List<Branch> added = new ArrayList<>();
        Vector own = normal.cross(axis);
        double sign = own.dot(side) < 0 ? -1 : 1;
        int last = samples.stream().mapToInt(Sample::passage).max().orElse(0);
        for (int passage = 1; passage <= last; passage++) {
            int wanted = passage;
            List<Sample> some = samples.stream()
                    .filter(s -> s.passage() == wanted)
                    .map(s -> new Sample(sign * s.angle(), wanted, s.miss()))
                    .sorted(Comparator.comparingDouble(Sample::angle))
                    .toList();
            if (some.stream().anyMatch(s -> Double.isFinite(s.miss()))) {
                String label = ordinal(passage) + " passage of the target";
                added.add(branch(name.isEmpty() ? label : label + ", " + name, some));
            }
        }
        for (StationaryPath p : paths) {
            if (Math.abs(p.launch().dot(normal)) > IN_PLANE) {
                continue;
            }
            double angle = sign * Math.atan2(p.launch().dot(own), p.launch().dot(axis));
            // the passage is the one whose curve is nearest to zero there
            added.stream()
                    .min(Comparator.comparingDouble(b -> size(b.at(angle))))
                    .ifPresent(b -> roots.add(new Root(angle, p.kind(), b)));
        }
        branches.addAll(added);
    }

    private static double size(double miss) {
        return Double.isNaN(miss) ? Double.POSITIVE_INFINITY : Math.abs(miss);
    }

    private static String ordinal(int n) {
        return switch (n) {
            case 1 -> "1st";
            case 2 -> "2nd";
            case 3 -> "3rd";
            default -> n + "th";
        };
    }

    /** The samples, cut at jumps: a ray that just passes an edge and one that just does not are no neighbours. */
    private static Branch branch(String label, List<Sample> samples) {
        int n = samples.size();
        double spread = 0;
        for (Sample s : samples) {
            spread = Math.abs(s.miss()) > spread ? Math.abs(s.miss()) : spread;
        }
        List<double[]> points = new ArrayList<>();
        for (int i = 0; i < n; i++) {
            if (i > 0) {
                double jump =
                        Math.abs(samples.get(i).miss() - samples.get(i - 1).miss());
                double slope = slope(samples, i);
                if (jump > 0.02 * spread
                        && slope > STEEPER * slope(samples, i - 1)
                        && slope > STEEPER * slope(samples, i + 1)) {
                    points.add(new double[] {samples.get(i).angle(), Double.NaN});
                }
            }
            points.add(new double[] {samples.get(i).angle(), samples.get(i).miss()});
        }
        return new Branch(
                label,
                points.stream().mapToDouble(p -> p[0]).toArray(),
                points.stream().mapToDouble(p -> p[1]).toArray());
    }

    /** Steepness of the step to sample i; 0 where there is none. */
    private static double slope(List<Sample> samples, int i) {
        if (i < 1 || i >= samples.size()) {
            return 0;
        }
        double s = Math.abs(samples.get(i).miss() - samples.get(i - 1).miss())
                / (samples.get(i).angle() - samples.get(i - 1).angle());
        return s > 0 ? s : 0;
    }

    /** The figure; none where no ray arrived anywhere. */
    Optional<CurveFigure> figure() {
        if (branches.isEmpty()) {
            return Optional.empty();
        }
        roots.sort((a, b) -> Double.compare(a.angle(), b.angle()));
        List<double[]> ranges = new ArrayList<>();
        ranges.add(new double[] {-halfAngle, halfAngle});
        List<Root> near = roots;
        while (near.size() > 1 && ranges.size() < 3) {
            double[] before = ranges.get(ranges.size() - 1);
            double[] range = around(near);
            if (range[1] - range[0] < ZOOM * (before[1] - before[0])) {
                ranges.add(range);
            }
            double[] now = ranges.get(ranges.size() - 1);
            List<Root> closest = closest(near);
            if (closest.size() == near.size() || width(closest) > CLOSE * (now[1] - now[0])) {
                break;
            }
            near = closest;
        }
        List<CurveFigure.Panel> panels = new ArrayList<>();
        for (int i = 0; i < ranges.size(); i++) {
            panels.add(panel(i, ranges));
        }
        return Optional.of(new CurveFigure("arrival", "Which launch angles reach the target?", answer(), panels));
    }

    private static double width(List<Root> near) {
        return near.get(near.size() - 1).angle() - near.get(0).angle();
    }

    private static double[] around(List<Root> near) {
        double pad = AROUND * Math.max(width(near), 1e-9);
        return new double[] {
            near.get(0).angle() - pad, near.get(near.size() - 1).angle() + pad
        };
    }

    /** The two roots that are closest to each other, and those that are hardly further from them. */
    private static List<Root> closest(List<Root> near) {
        int at = 1;
        for (int i = 2; i < near.size(); i++) {
            if (gap(near, i) < gap(near, at)) {
                at = i;
            }
        }
        double most = 8 * gap(near, at);
        int first = at - 1;
        int last = at;
        while (first > 0 && gap(near, first) <= most) {
            first--;
        }
        while (last + 1 < near.size() && gap(near, last + 1) <= most) {
            last++;
        }
        return near.subList(first, last + 1);
    }

    private static double gap(List<Root> near, int i) {
        return near.get(i).angle() - near.get(i - 1).angle();
    }

    private CurveFigure.Panel panel(int number, List<double[]> ranges) {
        double low = ranges.get(number)[0];
        double high = ranges.get(number)[1];
        List<Root> inside = roots.stream()
                .filter(r -> r.angle() >= low && r.angle() <= high)
                .toList();
        double[] near = between(inside, low, high);
        double[] shown = near;
        double linear = 0;
        if (number == 0) {
            shown = new double[2];
            for (Branch b : branches) {
                b.widen(shown, low - 1, high + 1);
            }
            double most = Math.max(-shown[0], shown[1]);
            double size = Math.max(-near[0], near[1]);
            if (inside.size() > 1 && size < READABLE * most) {
                linear = Math.pow(10, Math.floor(Math.log10(Math.max(size / 3, DECADES * most))));
            }
        }
        double[] up = withRoom(shown, number == 0 ? 0.05 : 0.5, linear);
        boolean rest = inside.size() == roots.size();
        String title = ranges.size() == 1
                ? ""
                : number == 0 ? "all angles searched" : rest ? "near all paths" : "near the closest paths";
        List<CurveFigure.Point> points = roots.stream()
                .filter(r -> r.angle() >= low && r.angle() <= high)
                .map(r -> new CurveFigure.Point(PathSection.role(r.kind()), r.angle(), 0))
                .toList();
        return new CurveFigure.Panel(
                title,
                new CurveFigure.Axis("launch angle toward " + toward, CurveFigure.Measure.ANGLE, low, high, 0),
                new CurveFigure.Axis("miss", CurveFigure.Measure.LENGTH, up[0], up[1], linear),
                branches.stream()
                        .map(b -> new CurveFigure.Curve(b.label(), b.angle(), b.miss()))
                        .toList(),
                points);
    }

    /** Some room at both ends, so that the zero line stands off the rims. */
    private static double[] withRoom(double[] range, double room, double linear) {
        double most = Math.max(-range[0], range[1]);
        if (!(most > 0)) {
            return new double[] {-1, 1};
        }
        if (linear > 0) {
            // a rim on a logarithmic axis is a factor
            double least = 3 * linear;
            return new double[] {Math.min(1.5 * range[0], -least), Math.max(1.5 * range[1], least)};
        }
        double pad = Math.max(room, LEAST_ROOM) * most;
        return new double[] {
            range[0] < -LEAST_ROOM * most ? range[0] - room * most : range[0] - pad,
            range[1] > LEAST_ROOM * most ? range[1] + room * most : range[1] + pad
        };
    }

    /** What misses there are between the roots of one branch; where none has two, at the rims of the range. */
    private static double[] between(List<Root> inside, double low, double high) {
        double[] range = new double[2];
        double rim = Double.POSITIVE_INFINITY;
        for (Root r : inside) {
            for (Root s : inside) {
                if (r.branch().label().equals(s.branch().label()) && s.angle() > r.angle()) {
                    r.branch().widen(range, r.angle(), s.angle());
                }
            }
            for (double a : new double[] {low, high}) {
                double miss = Math.abs(r.branch().at(a));
                rim = miss > 0 && miss < rim ? miss : rim;
            }
        }
        return range[1] > range[0] || Double.isInfinite(rim) ? range : new double[] {-rim, rim};
    }

    // ---- in words

    private String answer() {
        if (roots.isEmpty()) {
            return nearest();
        }
        boolean degrees = roots.stream().anyMatch(r -> Math.abs(r.angle()) >= Math.toRadians(1));
        String unit = degrees ? "deg" : "mrad";
        double size = degrees ? Math.PI / 180 : 1e-3;
        double gap = Double.POSITIVE_INFINITY;
        for (int i = 1; i < roots.size(); i++) {
            gap = Math.min(gap, gap(roots, i) / size);
        }
        // digits that tell the closest two apart
        int decimals =
                (int) Math.max(2, Math.min(9, Double.isFinite(gap) && gap > 0 ? 1 - Math.floor(Math.log10(gap)) : 2));
        List<String> angles = roots.stream()
                .map(r -> BigDecimal.valueOf(r.angle() / size)
                        .setScale(decimals, RoundingMode.HALF_EVEN)
                        .toPlainString()
                        .replaceAll("^-(0\\.0*)$", "$1"))
                .toList();
        if (roots.size() == 1) {
            return "One launch angle reaches the target, " + angles.get(0) + " " + unit + " from " + axisName
                    + " toward " + toward;
        }
        if (roots.size() > MOST_NAMED) {
            return String.format(
                    Locale.ROOT,
                    "%d launch angles reach the target, from %s to %s %s from %s toward %s",
                    roots.size(),
                    angles.get(0),
                    angles.get(angles.size() - 1),
                    unit,
                    axisName,
                    toward);
        }
        return String.format(
                Locale.ROOT,
                "%d launch angles reach the target: %s and %s %s from %s toward %s",
                roots.size(),
                angles.subList(0, angles.size() - 1).stream().collect(Collectors.joining(", ")),
                angles.get(angles.size() - 1),
                unit,
                axisName,
                toward);
    }

    private String nearest() {
        double least = Double.POSITIVE_INFINITY;
        double at = 0;
        for (Branch b : branches) {
            for (int i = 0; i < b.angle().length; i++) {
                if (Math.abs(b.miss()[i]) < least) {
                    least = Math.abs(b.miss()[i]);
                    at = b.angle()[i];
                }
            }
        }
        return String.format(
                Locale.ROOT,
                "No launch angle searched reaches the target; the nearest ray, at %.3g deg, misses it by %s",
                Math.toDegrees(at),
                Display.of(least, "m", 0.1 * least));
    }
}
