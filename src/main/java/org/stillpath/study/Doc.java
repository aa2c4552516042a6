package org.stillpath.study;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collections;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;

/**
 * What a study found, as the tree that its part of the result document is: whoever writes documents needs to know nothing of
 * studies, and a new study nothing of writing.
 */
public sealed interface Doc {
    /**
     * A number in SI. One that is not finite is left out of sections, and null in lists.
     *
     * @param value the number
     */
    record Amount(double value) implements Doc {}

    /**
     * A whole number.
     *
     * @param value the number
     */
    record Count(long value) implements Doc {}

    /**
     * A text.
     *
     * @param value the text
     */
    record Text(String value) implements Doc {}

    /**
     * True or false.
     *
     * @param value which
     */
    record Flag(boolean value) implements Doc {}

    /**
     * A list.
     *
     * @param values its elements
     */
    record Items(List<Doc> values) implements Doc {
        public Items {
            values = List.copyOf(values);
        }

        /** A list of numbers in SI. */
        static Items numbers(double... numbers) {
            return new Items(
                    Arrays.stream(numbers).mapToObj(v -> (Doc) new Amount(v)).toList());
        }

        /** A list of texts. */
        static Items texts(List<String> texts) {
            return new Items(texts.stream().map(t -> (Doc) new Text(t)).toList());
        }
    }

    /**
     * A section.
     *
     * @param values by key, in the order in which they are written
     */
    record Fields(Map<String, Doc> values) implements Doc {
        public Fields {
            values = Collections.unmodifiableMap(new LinkedHashMap<>(values));
        }

        /** A section with nothing in it. */
        public static Fields none() {
            return new Fields(Map.of());
        }
    }

    /** Puts a section together. Mutable; for one thread. */
    final class Builder {
        private final Map<String, Doc> values = new LinkedHashMap<>();

        Builder put(String key, Doc value) {
            values.put(key, value);
            return this;
        }

        /** A number; left out where it is not finite. */
        Builder put(String key, double value) {
            if (Double.isFinite(value)) {
                values.put(key, new Amount(value));
            }
            return this;
        }

        Builder put(String key, String value) {
            return put(key, new Text(value));
        }

        Fields build() {
            return new Fields(values);
        }
    }

    /** The rows of a table of runs, made one by one. */
    static List<Doc> list() {
        return new ArrayList<>();
    }
}
