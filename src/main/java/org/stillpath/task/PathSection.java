package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.function.ToDoubleFunction;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Level;
import org.stillpath.path.FrontGrid;
import org.stillpath.path.Fronts;
import org.stillpath.path.StationaryPath;
import org.stillpath.ray.Train;

/**
 * The figure {@code paths}: all stationary paths between two points as a section.
 *
 * <p>A section through a train is that of its rays. In one medium everywhere it is the plane that was searched; after a search
 * over a cone, the plane through both points from which the paths go furthest aside, onto which they are projected. A plane
 * across an axis of the job keeps the job's coordinates, any other has one along the chord and one across it.
 */
final class PathSection {
    private static final String QUESTION = "Which ways can light take?";
    private static final int COLUMNS = 240;
    private static final int ROWS = 120;
    /** Beyond this many paths their numbers would hide them. */
    private static final int MOST_NUMBERED = 9;

    private static final double ALONG_AXIS = 1 - 1e-9;
    private static final double MARGIN = 0.15;
    /** A straight path has this much of its medium shown to each side, in parts of its length. */
    private static final double ROOM = 0.1;
    /** Wavefronts of a straight path are shown to this distance at most. */
    private static final double WIDEST = 0.25;

    private final Vector from;
    private final Vector to;
    private final List<StationaryPath> paths;

    PathSection(Vector from, Vector to, List<StationaryPath> paths) {
        this.from = from;
        this.to = to;
        this.paths = List.copyOf(paths);
    }

    /** A plane: what runs to the right and upward on paper, measured from a place. */
    private record Plane(Vector origin, Vector across, Vector up, String acrossName, String upName) {
        double u(Vector q) {
            return q.minus(origin).dot(across);
        }

        double v(Vector q) {
            return q.minus(origin).dot(up);
        }

        Vector at(double u, double v) {
            return origin.plus(u, across).plus(v, up);
        }
    }

    /**
     * Draws the paths.
     *
     * @param normal of the plane that was searched; none after a search over a cone
     * @param fronts optical lengths for wavefronts, if they were computed
     */
    SectionFigure figure(Train train, Optional<Vector> normal, Optional<Fronts> fronts, String answer) {
        if (!train.elements().isEmpty()) {
            return throughTrain(train, answer);
        }
        // the wavefronts of straight paths may stand in another plane than that of the search
        Optional<Vector> across = fronts.map(Fronts::grid).flatMap(PathSection::normal);
        Optional<Vector> drawn = across.or(() -> normal);
        Plane plane = drawn.map(this::plane).orElseGet(this::projection);
        double[] box = box(plane, train.from(), fronts);
        Optional<SectionFigure.Shading> shading =
                box[1] > box[0] && box[3] > box[2] ? shading(train.from(), plane, box) : Optional.empty();
        Optional<SectionFigure.Shading> lines =
                box[3] > box[2] ? fronts.map(f -> levels(f, plane, box)) : Optional.empty();
        return new SectionFigure(
                "paths",
                drawn.isPresent() ? QUESTION : QUESTION + " Seen in projection",
                answer,
                plane.acrossName(),
                plane.upName(),
                shading,
                lines,
                lines(plane::u, plane::v),
                marks(plane::u, plane::v));
    }

    private SectionFigure throughTrain(Train train, String answer) {
        List<double[]> trails = new ArrayList<>();
        paths.forEach(p -> trails.add(p.points()));
        trails.add(new double[] {from.x(), from.y(), from.z(), to.x(), to.y(), to.z()});
        RayFigure.Extent extent = RayFigure.Extent.of(trails, train);
        List<SectionFigure.Line> lines = new ArrayList<>(RayFigure.outlines(train, extent));
        ToDoubleFunction<Vector> u = q -> RayFigure.component(q, extent.across);
        ToDoubleFunction<Vector> v = q -> RayFigure.component(q, extent.up);
        lines.addAll(lines(u, v));
        return new SectionFigure(
                "paths",
                QUESTION,
                answer,
                RayFigure.NAMES[extent.across],
                RayFigure.NAMES[extent.up],
                RayFigure.shading(train, extent),
                lines,
                marks(u, v));
    }

    private List<SectionFigure.Mark> marks(ToDoubleFunction<Vector> u, ToDoubleFunction<Vector> v) {
        return List.of(
                new SectionFigure.Mark("from", u.applyAsDouble(from), v.applyAsDouble(from)),
                new SectionFigure.Mark("to", u.applyAsDouble(to), v.applyAsDouble(to)));
    }

    private List<SectionFigure.Line> lines(ToDoubleFunction<Vector> u, ToDoubleFunction<Vector> v) {
        List<SectionFigure.Line> lines = new ArrayList<>();
        boolean numbered = paths.size() > 1 && paths.size() <= MOST_NUMBERED;
        for (int i = 0; i < paths.size(); i++) {
            List<Vector> places = places(paths.get(i));
            if (places.size() > 1) {
                lines.add(new SectionFigure.Line(
                        role(paths.get(i).kind()),
                        numbered ? "path " + i : "",
                        places.stream().mapToDouble(u).toArray(),
                        places.stream().mapToDouble(v).toArray()));
            }
        }
        return lines;
    }

    /** How a path of a kind is drawn. */
    static SectionFigure.Role role(StationaryPath.Kind kind) {
        return switch (kind) {
            case MINIMUM -> SectionFigure.Role.MINIMUM;
            case SADDLE, MAXIMUM -> SectionFigure.Role.SADDLE;
            case DEGENERATE -> SectionFigure.Role.DEGENERATE;
            case NONE -> SectionFigure.Role.RAY;
        };
    }

    private static List<Vector> places(StationaryPath path) {
        double[] p = path.points();
        List<Vector> places = new ArrayList<>();
        for (int i = 0; i + 2 < p.length; i += 3) {
            places.add(new Vector(p[i], p[i + 1], p[i + 2]));
        }
        return places;
    }

    // ---- the plane drawn

    private static Optional<Vector> normal(FrontGrid grid) {
        return grid.axes().size() == 2
                ? Optional.of(grid.axes()
                        .get(0)
                        .direction()
                        .cross(grid.axes().get(1).direction())
                        .unit())
                : Optional.empty();
    }

    private static Vector axis(int i) {
        return new Vector(i == 0 ? 1 : 0, i == 1 ? 1 : 0, i == 2 ? 1 : 0);
    }

    private Plane plane(Vector normal) {
        for (int i = 0; i < 3; i++) {
            if (Math.abs(RayFigure.component(normal, i)) > ALONG_AXIS) {
                return acrossAxis(i);
            }
        }
        return acrossChord(normal.cross(to.minus(from).unit()).unit());
    }

    /** The plane across an axis of the job, in the job's coordinates. */
    private Plane acrossAxis(int i) {
        Vector chord = to.minus(from);
        int first = i == 0 ? 1 : 0;
        int second = i == 2 ? 1 : 2;
        boolean turned = Math.abs(RayFigure.component(chord, first)) > Math.abs(RayFigure.component(chord, second));
        int across = turned ? first : second;
        int up = turned ? second : first;
        double height = RayFigure.component(from, i) + 0.5 * RayFigure.component(chord, i);
        return new Plane(axis(i).times(height), axis(across), axis(up), RayFigure.NAMES[across], RayFigure.NAMES[up]);
    }

    private Plane acrossChord(Vector up) {
        double most = 0;
        for (int i = 0; i < 3; i++) {
            double c = RayFigure.component(up, i);
            most = Math.abs(c) > Math.abs(most) + 1e-9 ? c : most;
        }
        return new Plane(
                from,
                to.minus(from).unit(),
                most < 0 ? up.times(-1) : up,
                "distance along the chord",
                "distance across the chord");
    }

    /** The plane of the chord and of the place, on any path, that is furthest from it. */
    private Plane projection() {
        Vector chord = to.minus(from).unit();
        Vector far = Vector.ZERO;
        for (StationaryPath p : paths) {
            for (Vector q : places(p)) {
                Vector aside = q.minus(from).plus(-q.minus(from).dot(chord), chord);
                far = aside.norm() > far.norm() ? aside : far;
            }
        }
        if (far.norm() == 0) {
            return acrossChord(chord.perpendicular());
        }
        for (int i = 0; i < 3; i++) {
            if (Math.abs(RayFigure.component(chord, i)) > ALONG_AXIS) {
                int one = (i + 1) % 3;
                int two = (i + 2) % 3;
                boolean first = Math.abs(RayFigure.component(far, one)) > Math.abs(RayFigure.component(far, two));
                return acrossAxis(first ? two : one);
            }
        }
        return acrossChord(far.unit());
    }

    /** What is shown: left, right, lower and upper edge. */
    private double[] box(Plane plane, IndexField field, Optional<Fronts> fronts) {
        double[] box = {
            Math.min(plane.u(from), plane.u(to)), Math.max(plane.u(from), plane.u(to)),
            Math.min(plane.v(from), plane.v(to)), Math.max(plane.v(from), plane.v(to))
        };
        for (StationaryPath p : paths) {
            for (Vector q : places(p)) {
                box[0] = Math.min(box[0], plane.u(q));
                box[1] = Math.max(box[1], plane.u(q));
                box[2] = Math.min(box[2], plane.v(q));
                box[3] = Math.max(box[3], plane.v(q));
            }
        }
        double span = box[1] - box[0];
        double margin = MARGIN * (box[3] - box[2]);
        if (margin < 1e-9 * span && fronts.isPresent()) {
            FrontGrid.Axis side = fronts.get().grid().axes().get(1);
            margin = Math.min(WIDEST * span, 0.5 * side.length());
        } else if (margin < 1e-9 * span && !field.uniform()) {
            margin = ROOM * span;
        }
        box[2] -= margin;
        box[3] += margin;
        return box;
    }

    private static Vector cell(Plane plane, double[] box, int column, int row) {
        return plane.at(
                box[0] + (box[1] - box[0]) * (column + 0.5) / COLUMNS, box[2] + (box[3] - box[2]) * (row + 0.5) / ROWS);
    }

    /** The index where it is defined, if it varies. */
    private static Optional<SectionFigure.Shading> shading(IndexField field, Plane plane, double[] box) {
        if (field.uniform()) {
            return Optional.empty();
        }
        double[] values = new double[COLUMNS * ROWS];
        double[][] q = new double[3][COLUMNS];
        Samples s = new Samples(COLUMNS);
        double[] g = new double[3];
        for (int row = 0; row < ROWS; row++) {
            for (int c = 0; c < COLUMNS; c++) {
                Vector at = cell(plane, box, c, row);
                q[0][c] = at.x();
                q[1][c] = at.y();
                q[2][c] = at.z();
            }
            field.sample(q[0], q[1], q[2], COLUMNS, Order.VALUE, s);
            for (int c = 0; c < COLUMNS; c++) {
                boolean inside = true;
                for (Level l : field.limits()) {
                    inside = inside && l.value(q[0][c], q[1][c], q[2][c], g) >= 0;
                }
                values[row * COLUMNS + c] = inside ? Math.sqrt(1 + s.value[c]) : Double.NaN;
            }
        }
        return Optional.of(new SectionFigure.Shading(
                "refractive index", "1", box[0], box[1], box[2], box[3], COLUMNS, ROWS, values));
    }

    /** Optical lengths in the plane, as far as the grid reaches. */
    private static SectionFigure.Shading levels(Fronts fronts, Plane plane, double[] box) {
        double[] values = new double[COLUMNS * ROWS];
        FrontGrid grid = fronts.grid();
        for (int row = 0; row < ROWS; row++) {
            for (int c = 0; c < COLUMNS; c++) {
                Vector q = cell(plane, box, c, row);
                double[] at = grid.coordinates(q);
                boolean inside = true;
                for (int k = 0; k < at.length; k++) {
                    inside = inside && at[k] >= 0 && at[k] <= grid.axes().get(k).length();
                }
                double value = inside ? fronts.at(q) : Double.NaN;
                values[row * COLUMNS + c] = Double.isFinite(value) ? value : Double.NaN;
            }
        }
        return new SectionFigure.Shading(
                "wavefronts, by optical length from the start",
                "m",
                box[0],
                box[1],
                box[2],
                box[3],
                COLUMNS,
                ROWS,
                values);
    }
}
