package org.stillpath.formula;

import java.util.ArrayList;
import java.util.Collections;
import java.util.LinkedHashMap;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import org.stillpath.unit.Dimension;

/**
 * What a formula may mention besides numbers and functions.
 *
 * @param coordinates the built-in coordinates that mean something where the formula stands
 * @param with names that the user gave, with the dimensions of their values, in the order given
 */
public record Names(Set<Coordinate> coordinates, Map<String, Dimension> with) {
    /** x, y, z, r, rho and the wavelength. */
    public static final Set<Coordinate> PLACE = Collections.unmodifiableSet(new LinkedHashSet<>(
            List.of(Coordinate.X, Coordinate.Y, Coordinate.Z, Coordinate.R, Coordinate.RHO, Coordinate.WAVELENGTH)));

    /** {@link #PLACE} and, besides, height, clearance and distance. */
    public static final Set<Coordinate> SIGHT =
            Collections.unmodifiableSet(new LinkedHashSet<>(List.of(Coordinate.values())));

    /**
     * Copies both.
     *
     * @throws IllegalArgumentException if a name of {@code with} is {@linkplain #refusal refused}
     */
    public Names {
        coordinates = Collections.unmodifiableSet(new LinkedHashSet<>(coordinates));
        with = Collections.unmodifiableMap(new LinkedHashMap<>(with));
        for (String name : with.keySet()) {
            Optional<String> refusal = refusal(name);
            if (refusal.isPresent()) {
                throw new IllegalArgumentException(refusal.get());
            }
        }
    }

    /** Names with these coordinates and these values. */
    public static Names of(Set<Coordinate> coordinates, Map<String, Dimension> with) {
        return new Names(coordinates, with);
    }

    /**
     * Why a word cannot be the name of a value; empty if it can. A name starts with a letter and goes on with letters,
     * digits and underscores, and is not a word that formulas already use.
     */
    public static Optional<String> refusal(String name) {
        boolean wellFormed = !name.isEmpty() && isNameStart(name.charAt(0));
        for (int i = 1; i < name.length(); i++) {
            wellFormed &= isNamePart(name.charAt(i));
        }
        if (!wellFormed) {
            return Optional.of(
                    "`" + name + "` cannot be a name; a name is a letter followed by letters, digits and underscores");
        }
        Optional<Coordinate> coordinate = Coordinate.of(name);
        if (coordinate.isPresent()) {
            return Optional.of("`" + name + "` is a coordinate in formulas; choose another name");
        }
        if (Function.of(name).isPresent() || RESERVED.contains(name)) {
            return Optional.of("`" + name + "` already has a meaning in formulas; choose another name");
        }
        return Optional.empty();
    }

    static final String PI = "pi";
    static final String AND = "and";
    private static final Set<String> RESERVED = Set.of(PI, AND);

    /** Every word that a formula with these names may contain, for suggestions. */
    List<String> words() {
        List<String> words = new ArrayList<>(with.keySet());
        for (Coordinate c : coordinates) {
            words.add(c.word());
        }
        for (Function f : Function.values()) {
            words.add(f.word());
        }
        words.add(PI);
        return words;
    }

    static boolean isNameStart(char c) {
        return Character.isLetter(c) || c == '_';
    }

    static boolean isNamePart(char c) {
        return Character.isLetterOrDigit(c) || c == '_';
    }
}
