package org.stillpath.job;

import java.util.List;
import java.util.Optional;
import org.stillpath.problem.Place;

/** A located node of a job file: a mapping, a sequence or a scalar, before anything is known of its meaning. */
public sealed interface Node {
    /** Where the node starts. */
    Place place();

    /**
     * Keys with values, in the order written; no key twice.
     *
     * @param place where it starts
     * @param entries the entries
     */
    record Mapping(Place place, List<Entry> entries) implements Node {
        public Mapping {
            entries = List.copyOf(entries);
        }

        /** The value of a key, if it is there. */
        public Optional<Node> find(String key) {
            for (Entry e : entries) {
                if (e.key().equals(key)) {
                    return Optional.of(e.value());
                }
            }
            return Optional.empty();
        }
    }

    /**
     * One entry of a mapping.
     *
     * @param key its key
     * @param keyPlace where the key stands
     * @param value its value
     */
    record Entry(String key, Place keyPlace, Node value) {}

    /**
     * A list.
     *
     * @param place where it starts
     * @param items its elements
     */
    record Sequence(Place place, List<Node> items) implements Node {
        public Sequence {
            items = List.copyOf(items);
        }
    }

    /**
     * A scalar as text; what it means is decided by who reads it.
     *
     * @param place where it starts
     * @param text the text, quotes removed
     * @param quoted whether it stood in quotes or as a block
     */
    record Scalar(Place place, String text, boolean quoted) implements Node {}
}
