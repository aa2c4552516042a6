package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;
import org.stillpath.path.Arrival;
import org.stillpath.path.Eikonal;
import org.stillpath.path.FrontGrid;
import org.stillpath.path.Fronts;
import org.stillpath.path.PathSearch;
import org.stillpath.path.StationaryPath;
import org.stillpath.unit.Display;

/**
 * The least optical length on a grid, a second opinion on the first of the paths that a search found.
 *
 * <p>The grid lies in the plane that was searched, or round both points where the search was over a cone. Its cells were chosen
 * for the time, not for an accuracy: in a plane {@value #PLANE_CELLS} from point to point, in space {@value #SPACE_CELLS}, each
 * some 1 s of a short job on a shared machine. What that gives is told by the solver's own estimate.
 */
final class FirstArrival {
    private static final int PLANE_CELLS = 256;
    private static final int SPACE_CELLS = 64;

    /** Below this a path is as good as straight and spans no plane. */
    private static final double STRAIGHT = 1e-9;

    private final Arrival arrival;

    private FirstArrival(Arrival arrival) {
        this.arrival = arrival;
    }

    /**
     * Marches from one point to the other.
     *
     * @param searched where the paths were looked for, and what was found
     */
    static FirstArrival of(IndexField field, Vector from, Vector to, PathSearch.Outcome searched) {
        FrontGrid grid = searched.planar()
                ? across(from, to, searched)
                        .map(e -> FrontGrid.planeAround(field, from, to, e, PLANE_CELLS))
                        .orElseGet(() -> FrontGrid.planeAround(field, from, to, PLANE_CELLS))
                : FrontGrid.boxAround(field, from, to, SPACE_CELLS);
        return new FirstArrival(Eikonal.arrival(field, from, to, grid));
    }

    /** A direction across the chord in the plane searched; none where any plane will do, since every path is straight. */
    private static Optional<Vector> across(Vector from, Vector to, PathSearch.Outcome searched) {
        Vector chord = to.minus(from).unit();
        boolean bent = searched.paths().isEmpty()
                || searched.paths().stream()
                        .anyMatch(p -> p.launch().cross(chord).norm() > STRAIGHT);
        return searched.normal().filter(n -> bent).map(n -> n.cross(chord));
    }

    /** Optical lengths on the grid, for their level lines; none where nothing arrived. */
    Optional<Fronts> fronts() {
        return arrival instanceof Arrival.Reached r ? Optional.of(r.fronts()) : Optional.empty();
    }

    /** The quantity {@code first-arrival-grid}; none where nothing arrived. */
    Optional<Quantity> quantity() {
        return arrival instanceof Arrival.Reached r
                ? Optional.of(new Quantity.Amount(r.opticalLength(), "m", r.error()))
                : Optional.empty();
    }

    /**
     * What makes it doubtful, or the search.
     *
     * @param paths found by the search, by optical length
     */
    List<String> warnings(List<StationaryPath> paths) {
        if (arrival instanceof Arrival.Reached r) {
            return warnings(r, paths);
        }
        String reason = ((Arrival.Unreached) arrival).reason().strip();
        return List.of("on the grid of wavefronts no light arrives: " + reason.replaceAll("\\.$", ""));
    }

    private static List<String> warnings(Arrival.Reached r, List<StationaryPath> paths) {
        List<String> list = new ArrayList<>();
        if (r.course() == Arrival.Course.EDGE) {
            list.add("on the grid of wavefronts the first light passes the edge of the grid; a way further out may be "
                    + "shorter than \"first-arrival-grid\"");
        } else if (r.course() == Arrival.Course.WALL) {
            list.add("on the grid of wavefronts the first light passes along the edge of the medium, where "
                    + "\"first-arrival-grid\" is known less well");
        }
        if (Double.isInfinite(r.error())) {
            list.add("the error of \"first-arrival-grid\" is not known: coarser grids find no way to the target");
        }
        String grid = Display.of(r.opticalLength(), "m", r.error()).toString();
        if (paths.isEmpty()) {
            list.add("the search found no path, but on the grid of wavefronts light arrives after " + grid + "; "
                    + missed(r.course()));
            return list;
        }
        StationaryPath first = paths.get(0);
        double more = first.opticalLength() - r.opticalLength();
        double doubt = r.error() + first.errors()[0];
        if (Math.abs(more) > doubt) {
            list.add(String.format(
                    Locale.ROOT,
                    "the first path found is %s %s than the first arrival on the grid of wavefronts, %s, more than both "
                            + "errors (%s) explain: %s",
                    Display.of(Math.abs(more), "m", 0.1 * Math.abs(more)),
                    more > 0 ? "longer" : "shorter",
                    grid,
                    Display.of(doubt, "m", 0.1 * doubt),
                    more > 0
                            ? missed(r.course())
                            : "the grid may be too coarse for this medium; the path is the more accurate"));
        }
        return list;
    }

    /** What a first arrival may be that the search knows nothing of. */
    private static String missed(Arrival.Course course) {
        return switch (course) {
            case FREE -> "the search may have missed a shorter way; search a wider cone, or from another direction";
            case WALL ->
                "it may be a way along the edge of the medium, which is not stationary, or one that the search has "
                        + "missed";
            case EDGE ->
                "the edge of the grid may make it longer than it is; the search may have missed it, in a wider cone "
                        + "or from another direction";
        };
    }
}
