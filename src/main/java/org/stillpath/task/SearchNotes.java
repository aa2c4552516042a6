package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.stream.Collectors;
import org.stillpath.path.PathSearch;
import org.stillpath.path.StationaryPath;
import org.stillpath.ray.Status;

/** What a search between two points says of itself: where it looked, what cut paths off, and whether its counts agree. */
final class SearchNotes {
    private SearchNotes() {}

    /**
     * In words for the warnings of a result.
     *
     * @param what which rays were searched, such as "through the train"; may be empty
     * @param open whether one medium is everywhere: then images come in odd numbers unless something is cut off
     * @param around what stands in the middle of the searched directions
     */
    static List<String> of(PathSearch.Outcome outcome, double halfAngle, String what, boolean open, String around) {
        List<String> notes = new ArrayList<>();
        notes.add(String.format(
                Locale.ROOT,
                "searched were %s within %.4g deg of %s%s, with %d rays (%s samples of the media), each followed over %.0f times "
                        + "the distance of the points to where it first passes the target; paths outside that are not known, and "
                        + "finer detail than its resolution may be missed",
                outcome.planar() ? "directions in one plane" : "directions",
                Math.toDegrees(halfAngle),
                around,
                what.isEmpty() ? "" : ", " + what,
                outcome.shots(),
                String.format(Locale.ROOT, "%,d", outcome.evaluations()).replace(',', ' '),
                PathSearch.REACH));
        edges(outcome, open).ifPresent(notes::add);
        if (outcome.exhausted()) {
            notes.add(
                    "the search stopped at its limit of rays before every part of the cone was looked through to the end: paths "
                            + "may be missing; a smaller \"half-angle\" or \"in: yz\" may help");
        }
        for (int i = 0; i < outcome.paths().size(); i++) {
            StationaryPath p = outcome.paths().get(i);
            if (p.kind() == StationaryPath.Kind.DEGENERATE) {
                notes.add(String.format(
                        Locale.ROOT,
                        "the path of optical length %.9g m is degenerate with %d null %s: the target is an image of the start or lies on a "
                                + "caustic, and one path stands for all that are equally long",
                        p.opticalLength(),
                        p.nullDirections(),
                        p.nullDirections() == 1 ? "direction" : "directions"));
            } else if (p.reducedIndex() != p.morseIndex()) {
                notes.add(String.format(
                        Locale.ROOT,
                        "the Morse index of the path of optical length %.9g m is %d by its conjugate points and %d by its reduced second "
                                + "variation; do not rely on either",
                        p.opticalLength(),
                        p.morseIndex(),
                        p.reducedIndex()));
            }
        }
        return notes;
    }

    /** What rays ran into, and whether images are missing for it. */
    private static Optional<String> edges(PathSearch.Outcome outcome, boolean open) {
        Map<Status, Integer> ended = outcome.ended();
        int sum = outcome.paths().stream()
                .filter(p -> p.kind() != StationaryPath.Kind.DEGENERATE)
                .mapToInt(p -> p.morseIndex() % 2 == 0 ? 1 : -1)
                .sum();
        boolean complete =
                !open || outcome.paths().stream().anyMatch(p -> p.kind() == StationaryPath.Kind.DEGENERATE) || sum == 1;
        if (ended.isEmpty()) {
            return complete
                    ? Optional.empty()
                    : Optional.of(
                            "paths come in odd numbers where nothing stops light (Burke 1981), and these do not add up to one: at "
                                    + "least one more goes outside the searched directions, or the medium does not end");
        }
        String how = ended.entrySet().stream()
                .sorted(Map.Entry.comparingByKey())
                .map(e -> e.getValue() + " " + e.getKey().word())
                .collect(Collectors.joining(", "));
        return Optional.of(
                "of the rays searched these ended before they passed the target: " + how
                        + "; paths that would go there are cut off"
                        + (complete
                                ? ""
                                : ", and the number found does not add up to the odd number of an open medium: an image is cut off"));
    }
}
