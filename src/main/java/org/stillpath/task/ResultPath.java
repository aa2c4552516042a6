package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.stillpath.geometry.Vector;

/**
 * The path of a number in a result document: {@code quantities.back-focal-distance}, {@code rays[0].position[1]}, {@code
 * paths.1.excess}. A list's element is {@code [i]} or {@code .i}, counted from 0. Parsed once, looked up in as many results
 * as wanted, without making the document.
 */
public final class ResultPath {
    /** Lists of a result that hold numbers, by the key that leads to them. */
    private static final List<String> LISTS = List.of("quantities", "rays", "paths", "images", "stars");

    private final String text;
    private final List<String> parts;

    private ResultPath(String text, List<String> parts) {
        this.text = text;
        this.parts = parts;
    }

    /**
     * A number that was found.
     *
     * @param value in SI, finite
     * @param unit SI unit symbol; {@code 1} for a pure number
     * @param error the program's estimate of its numerical error; 0 where it makes none
     */
    public record Found(double value, String unit, double error) {}

    /** The path that a text spells; empty where it does not start at one of {@link #starts}. */
    public static Optional<ResultPath> parse(String text) {
        List<String> parts = new ArrayList<>();
        for (String part : text.strip().replace("]", "").split("[.\\[]", -1)) {
            if (part.isBlank()) {
                return Optional.empty();
            }
            parts.add(part.strip());
        }
        return parts.size() > 1 && LISTS.contains(parts.get(0))
                ? Optional.of(new ResultPath(text, List.copyOf(parts)))
                : Optional.empty();
    }

    /** Words that a path may start with. */
    public static List<String> starts() {
        return LISTS;
    }

    /** As written. */
    public String text() {
        return text;
    }

    /** What the number is, in a few words: {@code back focal distance}, {@code position 1 of ray 0}. */
    public String label() {
        boolean quantity = parts.get(0).equals("quantities");
        String said =
                String.join(" ", parts.subList(quantity ? 1 : 2, parts.size())).replace('-', ' ');
        // rays, images, stars, paths: one of them
        String list = parts.get(0);
        String one = quantity ? "" : list.substring(0, list.length() - 1) + " " + parts.get(1);
        return quantity ? said : said.isEmpty() ? one : said + " of " + one;
    }

    /** A word for names of files: {@code back-focal-distance}. */
    public String stem() {
        List<String> said = parts.get(0).equals("quantities") ? parts.subList(1, parts.size()) : parts;
        return String.join("-", said).replaceAll("[^A-Za-z0-9-]", "");
    }

    /** The number in a result; empty where the result has none there, or where its ray did not arrive. */
    public Optional<Found> find(Result result) {
        return switch (parts.get(0)) {
            case "quantities" -> quantity(result.quantities().get(parts.get(1)));
            case "rays" -> element(result.rays()).flatMap(this::ray);
            case "images" -> element(result.images()).flatMap(this::image);
            case "stars" -> element(result.stars()).flatMap(this::star);
            default -> element(result.paths()).flatMap(this::path);
        };
    }

    /** Paths of all single numbers among a result's quantities, in their order. */
    public static List<ResultPath> quantities(Result result) {
        List<ResultPath> list = new ArrayList<>();
        for (Map.Entry<String, Quantity> e : result.quantities().entrySet()) {
            if (e.getValue() instanceof Quantity.Amount) {
                list.add(new ResultPath("quantities." + e.getKey(), List.of("quantities", e.getKey())));
            }
        }
        return list;
    }

    private <T> Optional<T> element(List<T> list) {
        int i = index(1);
        return i >= 0 && i < list.size() && parts.size() > 2 ? Optional.of(list.get(i)) : Optional.empty();
    }

    private Optional<Found> quantity(@org.jspecify.annotations.Nullable Quantity q) {
        if (q instanceof Quantity.Amount a) {
            boolean whole =
                    parts.size() == 2 || (parts.size() == 3 && parts.get(2).equals("value"));
            return whole ? found(a.value(), a.unit(), a.error()) : Optional.empty();
        }
        if (q instanceof Quantity.Amounts a && parts.size() == 3) {
            double[] values = a.values();
            int i = index(2);
            return i >= 0 && i < values.length ? found(values[i], a.unit(), a.error()) : Optional.empty();
        }
        return Optional.empty();
    }

    private Optional<Found> ray(RayRow r) {
        String key = parts.get(2);
        if (!r.status().equals("arrived")) {
            // where a clipped ray ended is another thing than where it would have arrived
            return Optional.empty();
        }
        double error = r.errors().getOrDefault(key, 0.0);
        return switch (key) {
            case "position" -> component(r.position(), "m", error);
            case "direction" -> component(r.direction(), "1", error);
            case "optical-length" -> plain(r.opticalLength(), "m", error);
            case "length" -> plain(r.length(), "m", error);
            case "travel-time" -> plain(r.travelTime(), "s", error);
            case "index" -> plain(r.index(), "1", error);
            case "transfer" -> transfer(r.transfer());
            default -> Optional.empty();
        };
    }

    private Optional<Found> image(ImageRow i) {
        String key = parts.get(2);
        double error = i.errors().getOrDefault(key, 0.0);
        return switch (key) {
            case "launch-elevation" -> plain(i.launch(), "rad", error);
            case "arrival-elevation" -> plain(i.arrival(), "rad", error);
            case "back-elevation" -> plain(-i.arrival(), "rad", error);
            case "refraction-at-from" -> plain(i.refractionAtFrom(), "rad", error);
            case "refraction-at-to" -> plain(i.refractionAtTo(), "rad", error);
            case "apparent-displacement" -> plain(i.displacement(), "m", error);
            case "refraction-coefficient" -> plain(i.coefficient().orElse(Double.NaN), "1", error);
            case "optical-length" -> plain(i.opticalLength(), "m", error);
            case "optical-excess" -> plain(i.excess(), "m", error);
            case "length" -> plain(i.length(), "m", error);
            case "lowest-clearance" -> plain(i.lowest(), "m", error);
            case "lowest-clearance-at" -> plain(i.lowestAt(), "m", error);
            case "vertical-magnification" -> plain(i.magnification(), "1", error);
            default -> Optional.empty();
        };
    }

    private Optional<Found> star(StarRow s) {
        String key = parts.get(2);
        return switch (key) {
            case "apparent-zenith" -> plain(s.apparentZenith(), "rad", 0);
            case "refraction" ->
                plain(s.refraction().orElse(Double.NaN), "rad", s.errors().getOrDefault(key, 0.0));
            default -> Optional.empty();
        };
    }

    private Optional<Found> path(PathRow p) {
        String key = parts.get(2);
        double error = p.errors().getOrDefault(key, 0.0);
        return switch (key) {
            case "optical-length" -> plain(p.opticalLength(), "m", error);
            case "excess" -> plain(p.excess(), "m", p.errors().getOrDefault("optical-length", 0.0));
            case "length" -> plain(p.length(), "m", error);
            case "travel-time" -> plain(p.travelTime(), "s", error);
            case "launch-direction" -> component(p.launch(), "1", error);
            case "arrival-direction" -> component(p.arrival(), "1", error);
            case "morse-index" -> plain(p.morseIndex(), "1", 0);
            case "residual" -> plain(p.residual(), "m", 0);
            default -> Optional.empty();
        };
    }

    private Optional<Found> plain(double value, String unit, double error) {
        return parts.size() == 3 ? found(value, unit, error) : Optional.empty();
    }

    private Optional<Found> component(Vector v, String unit, double error) {
        int i = parts.size() == 4 ? index(3) : -1;
        return i >= 0 && i < 3 ? found(i == 0 ? v.x() : i == 1 ? v.y() : v.z(), unit, error) : Optional.empty();
    }

    private Optional<Found> transfer(double[][] m) {
        int i = parts.size() == 5 ? index(3) : -1;
        int j = parts.size() == 5 ? index(4) : -1;
        if (i < 0 || j < 0 || i >= m.length || j >= m[i].length) {
            return Optional.empty();
        }
        return found(m[i][j], i < 2 == j < 2 ? "1" : i < 2 ? "m" : "1/m", 0);
    }

    private static Optional<Found> found(double value, String unit, double error) {
        return Double.isFinite(value) ? Optional.of(new Found(value, unit, error)) : Optional.empty();
    }

    private int index(int part) {
        String digits = parts.get(part);
        if (digits.isEmpty() || digits.length() > 9 || !digits.chars().allMatch(c -> c >= '0' && c <= '9')) {
            return -1;
        }
        return Integer.parseInt(digits);
    }
}
