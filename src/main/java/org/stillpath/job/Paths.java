package org.stillpath.job;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;

/**
 * Finds and replaces values of a job tree by path: {@code media.rod.with.g}, {@code train.surfaces[1].at}, {@code
 * train.surfaces.1.at}. A numeric element is the index of a list, from 0, or a key of a mapping. A key that itself holds
 * dots, as in a study's sections, is matched whole; the longest matching key wins.
 */
public final class Paths {
    private Paths() {}

    /** The value at a path, if there is one. */
    public static Optional<Node> find(Node.Mapping root, String path) {
        Node node = root;
        String rest = path;
        while (!rest.isEmpty()) {
            if (node instanceof Node.Mapping mapping) {
                String key = key(mapping, rest);
                Optional<Node> next = mapping.find(key);
                if (next.isEmpty()) {
                    return Optional.empty();
                }
                node = next.get();
                rest = after(rest, key.length());
            } else if (node instanceof Node.Sequence sequence) {
                String element = element(rest);
                int index = index(element);
                if (index < 0 || index >= sequence.items().size()) {
                    return Optional.empty();
                }
                node = sequence.items().get(index);
                rest = after(rest, element.length());
            } else {
                return Optional.empty();
            }
        }
        return path.isEmpty() ? Optional.empty() : Optional.of(node);
    }

    /**
     * The tree with one value replaced, or added where its last mapping lacks the key; sections on the way that are
     * missing are added too. A path that leads through a single value or to a missing element of a list is a fault, and
     * then the tree comes back unchanged.
     *
     * @param root the tree, left as it is
     * @param path where the value goes
     * @param value the value; its places say where it was given
     * @param place where the path was given
     * @param problems collects the fault
     */
    public static Node.Mapping with(Node.Mapping root, String path, Node value, Place place, Problems problems) {
        if (!isSound(path)) {
            problems.add(
                    place,
                    "",
                    Words.quoted(path)
                            + " is not a path; one is written like media.rod.with.g or train.surfaces[1].at");
            return root;
        }
        @Nullable Node changed = replaced(root, "", path, value, place, problems);
        return changed instanceof Node.Mapping mapping ? mapping : root;
    }

    private static @Nullable Node replaced(
            Node node, String done, String rest, Node value, Place place, Problems problems) {
        if (rest.isEmpty()) {
            return value;
        }
        if (node instanceof Node.Mapping mapping) {
            String key = key(mapping, rest);
            Node old = mapping.find(key).orElse(new Node.Mapping(place, List.of()));
            String left = after(rest, key.length());
            @Nullable Node next = replaced(old, join(done, key), left, value, place, problems);
            if (next == null) {
                return null;
            }
            List<Node.Entry> entries = new ArrayList<>(mapping.entries());
            for (int i = 0; i < entries.size(); i++) {
                if (entries.get(i).key().equals(key)) {
                    entries.set(i, new Node.Entry(key, entries.get(i).keyPlace(), next));
                    return new Node.Mapping(mapping.place(), entries);
                }
            }
            entries.add(new Node.Entry(key, place, next));
            return new Node.Mapping(mapping.place(), entries);
        }
        if (node instanceof Node.Sequence sequence) {
            String element = element(rest);
            int index = index(element);
            int size = sequence.items().size();
            if (index < 0 || index >= size) {
                problems.add(
                        place,
                        "",
                        done + " is a list of " + size + (size == 1 ? " element" : " elements")
                                + (size == 0 ? "" : ", counted from 0 to " + (size - 1)) + "; there is no "
                                + Words.quoted(element) + " in it");
                return null;
            }
            @Nullable Node next = replaced(
                    sequence.items().get(index),
                    done + "[" + index + "]",
                    after(rest, element.length()),
                    value,
                    place,
                    problems);
            if (next == null) {
                return null;
            }
            List<Node> items = new ArrayList<>(sequence.items());
            items.set(index, next);
            return new Node.Sequence(sequence.place(), items);
        }
        String there = node instanceof Node.Scalar s ? s.text() : "";
        problems.add(
                place,
                "",
                "the path leads through " + done + ", which is the single value " + Words.quoted(there) + " and has no "
                        + Words.quoted(element(rest)));
        return null;
    }

    /** The longest key of the mapping that the rest of the path starts with; its first element if there is none. */
    private static String key(Node.Mapping mapping, String rest) {
        String best = "";
        for (Node.Entry e : mapping.entries()) {
            String key = e.key();
            boolean whole = rest.length() == key.length()
                    || (rest.length() > key.length()
                            && (rest.charAt(key.length()) == '.' || rest.charAt(key.length()) == '['));
            if (key.length() > best.length() && whole && rest.startsWith(key)) {
                best = key;
            }
        }
        return best.isEmpty() ? element(rest) : best;
    }

    /** First element of a path, brackets included. */
    private static String element(String rest) {
        int i = rest.startsWith("[") ? 1 : 0;
        while (i < rest.length() && rest.charAt(i) != '.' && rest.charAt(i) != '[') {
            i++;
        }
        return rest.substring(0, i);
    }

    private static String after(String rest, int length) {
        return length < rest.length() && rest.charAt(length) == '.'
                ? rest.substring(length + 1)
                : rest.substring(length);
    }

    /** Index that an element names, bare or in brackets; -1 if none. */
    private static int index(String element) {
        String digits =
                element.startsWith("[") && element.endsWith("]") ? element.substring(1, element.length() - 1) : element;
        if (digits.isEmpty() || digits.length() > 9) {
            return -1;
        }
        for (int i = 0; i < digits.length(); i++) {
            if (digits.charAt(i) < '0' || digits.charAt(i) > '9') {
                return -1;
            }
        }
        return Integer.parseInt(digits);
    }

    private static boolean isSound(String path) {
        String rest = path;
        if (path.isEmpty() || path.startsWith("[") || path.endsWith(".")) {
            return false;
        }
        while (!rest.isEmpty()) {
            String element = element(rest);
            if (element.isEmpty() || (element.startsWith("[") && index(element) < 0)) {
                return false;
            }
            rest = after(rest, element.length());
        }
        return true;
    }

    private static String join(String done, String key) {
        return done.isEmpty() ? key : done + "." + key;
    }
}
