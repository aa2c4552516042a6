package org.stillpath.task;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import org.stillpath.unit.Display;

/**
 * What a table of the air leaves open between its rows. A sight is computed twice, the second time with every table joined by
 * another interpolant; the difference of each value is added to its error, and another number of images is told. Chosen
 * against a bound from the table's own differences, which says nothing of images that come and go; it costs a second run of
 * every sight whose air has a table. Whether the asked accuracy was reached is about the computation, and is left as it was.
 */
final class OtherJoining {
    /** Counts and bounds of the search, of which a difference is no error. */
    private static final Set<String> NO_MEASURE = Set.of("image-count", "searched-lowest", "searched-highest");

    private OtherJoining() {}

    /**
     * A result held against that of the same sight through the other joining.
     *
     * @param accuracy asked; differences below it are not told
     */
    static Result held(Result result, Result other, double accuracy) {
        List<String> warnings = new ArrayList<>(result.warnings());
        Map<String, Quantity> quantities = new LinkedHashMap<>();
        result.quantities().forEach((key, q) -> quantities.put(key, widened(key, q, other)));
        int here = result.images().size();
        int there = other.images().size();
        List<ImageRow> images = new ArrayList<>();
        double most = 0;
        if (here != there) {
            warnings.add(
                    "the air's tables leave open what is seen: joined by another interpolant they show " + count(there)
                            + ", not " + here + "; closer rows would decide, and the images' errors do not hold this");
            images.addAll(result.images());
        } else {
            for (int i = 0; i < here; i++) {
                ImageRow row = result.images().get(i);
                Map<String, Double> errors = new LinkedHashMap<>();
                for (Map.Entry<String, Double> e : row.errors().entrySet()) {
                    errors.put(e.getKey(), e.getValue() + difference("images." + i + "." + e.getKey(), result, other));
                }
                images.add(row.withErrors(errors));
                most = Math.max(
                        most, Math.abs(row.launch() - other.images().get(i).launch()));
            }
        }
        List<StarRow> stars = new ArrayList<>();
        for (int i = 0; i < result.stars().size(); i++) {
            StarRow row = result.stars().get(i);
            double off = difference("stars." + i + ".refraction", result, other);
            Map<String, Double> errors = new LinkedHashMap<>(row.errors());
            errors.computeIfPresent("refraction", (key, error) -> error + off);
            stars.add(new StarRow(row.apparentZenith(), row.refraction(), row.top(), row.note(), errors));
            most = Math.max(most, off);
        }
        if (most > accuracy) {
            warnings.add("what the air's tables leave open between their rows moves directions by up to "
                    + Display.in(most, "arcsec", 0.05 * most)
                    + ", told by another interpolant; every error holds the difference");
        }
        List<Table> tables = result.tables().stream()
                .map(t -> t.name().equals("images") ? SightlineTask.table(images) : t)
                .toList();
        return new Result(
                result.task(),
                result.title(),
                images.size() == 1 ? SightlineTask.once(images.get(0)) : result.headline(),
                quantities,
                result.rays(),
                result.paths(),
                images,
                stars,
                tables,
                result.figures(),
                warnings,
                result.cautions(),
                result.accuracyReached());
    }

    private static String count(int images) {
        return images == 0 ? "no image" : images == 1 ? "1 image" : images + " images";
    }

    private static Quantity widened(String key, Quantity q, Result other) {
        if (NO_MEASURE.contains(key)
                || !(q instanceof Quantity.Amount a)
                || !(other.quantities().get(key) instanceof Quantity.Amount b)) {
            return q;
        }
        return new Quantity.Amount(a.value(), a.unit(), a.error() + Math.abs(a.value() - b.value()));
    }

    /** How far two results are apart at a place; 0 where one of them has nothing there. */
    private static double difference(String path, Result a, Result b) {
        Optional<ResultPath> at = ResultPath.parse(path);
        Optional<ResultPath.Found> x = at.flatMap(p -> p.find(a));
        Optional<ResultPath.Found> y = at.flatMap(p -> p.find(b));
        return x.isPresent() && y.isPresent()
                ? Math.abs(x.get().value() - y.get().value())
                : 0;
    }
}
