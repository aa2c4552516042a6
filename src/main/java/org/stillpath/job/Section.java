package org.stillpath.job;

import java.util.ArrayList;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;

/**
 * Reads one mapping of a job file. It remembers every key that was asked for, present or not, so that {@link #finish}
 * can tell which keys nobody knows. A cursor was chosen against binding to records by reflection: it costs no start-up,
 * and the reading code says in the open what it wants. Mutable on purpose; belongs to the reading of one file.
 */
public final class Section {
    private final Node.Mapping node;
    private final String path;
    private final Problems problems;
    /** Stands for a section that is missing or of the wrong sort, which has been told already. */
    private final boolean placeholder;

    private final Set<String> asked = new LinkedHashSet<>();
    private boolean freeKeyed;

    private Section(Node.Mapping node, String path, Problems problems, boolean placeholder) {
        this.node = node;
        this.path = path;
        this.problems = problems;
        this.placeholder = placeholder;
    }

    /** A cursor on a mapping; {@code path} is its place in the job tree, empty for the top. */
    public static Section of(Node.Mapping node, String path, Problems problems) {
        return new Section(node, path, problems, false);
    }

    static Section placeholder(Place place, String path, Problems problems) {
        return new Section(new Node.Mapping(place, List.of()), path, problems, true);
    }

    /** Path in the job tree, such as {@code media.rod}; empty for the top. */
    public String path() {
        return path;
    }

    /** Where the section starts. */
    public Place place() {
        return node.place();
    }

    /** Where faults of this section are collected. */
    public Problems problems() {
        return problems;
    }

    /** The mapping itself. */
    public Node.Mapping node() {
        return node;
    }

    /** Whether it stands for a section that is missing or of the wrong sort; reading it adds no faults. */
    public boolean isPlaceholder() {
        return placeholder;
    }

    /** Whether a key is there; the key counts as known. */
    public boolean has(String key) {
        asked.add(key);
        return node.find(key).isPresent();
    }

    /** The value of a key, if it is there. */
    public Optional<Value> find(String key) {
        asked.add(key);
        return node.find(key).map(n -> Value.of(n, join(key), problems));
    }

    /** The value of a key; its absence is a fault, and then a placeholder whose readers add no further ones. */
    public Value need(String key) {
        return need(key, "");
    }

    /** The same with an example of the value, which the message shows: {@code need("wavelength", "633 nm")}. */
    public Value need(String key, String example) {
        Optional<Value> value = find(key);
        if (value.isPresent()) {
            return value.get();
        }
        if (!placeholder) {
            String where = path.isEmpty() ? "at the top of the file" : "in " + path;
            fault("\"" + key + "\" is missing; add it " + where
                    + (example.isEmpty() ? "" : ", such as \"" + key + ": " + example + "\""));
        }
        return Value.placeholder(place(), join(key), problems);
    }

    /** All keys present, in the order written, for mappings whose keys the user makes up; all count as known. */
    public List<String> names() {
        freeKeyed = true;
        List<String> names = new ArrayList<>(node.entries().size());
        for (Node.Entry e : node.entries()) {
            names.add(e.key());
        }
        return List.copyOf(names);
    }

    /**
     * The value of one of {@link #names}.
     *
     * @throws IllegalArgumentException if it is not one of them
     */
    public Value at(String name) {
        return find(name)
                .orElseThrow(() -> new IllegalArgumentException("no key \"" + name + "\" in section \"" + path + "\""));
    }

    /** Where a key stands; the section's place if it is not there. */
    public Place keyPlace(String key) {
        for (Node.Entry e : node.entries()) {
            if (e.key().equals(key)) {
                return e.keyPlace();
            }
        }
        return place();
    }

    /** Ends the reading: every key that is present but was never asked for is a fault; the nearest known is offered. */
    public void finish() {
        if (freeKeyed || placeholder) {
            return;
        }
        for (Node.Entry e : node.entries()) {
            if (asked.contains(e.key())) {
                continue;
            }
            // a key that is there already is not what was meant
            List<String> open = new ArrayList<>();
            for (String known : asked) {
                if (node.find(known).isEmpty()) {
                    open.add(known);
                }
            }
            String remedy = Words.nearest(e.key(), open).isPresent()
                    ? Words.remedy(e.key(), open)
                    : Words.remedy(e.key(), asked);
            problems.add(e.keyPlace(), path, "unknown key " + Words.quoted(e.key()) + remedy);
        }
    }

    /** Adds a fault at the start of the section. */
    public void fault(String message) {
        problems.add(place(), path, message);
    }

    /** Adds a fault at the value of a key, or at the section's start if the key is not there. */
    public void fault(String key, String message) {
        problems.add(node.find(key).map(Node::place).orElse(place()), join(key), message);
    }

    private String join(String key) {
        return path.isEmpty() ? key : path + "." + key;
    }
}
