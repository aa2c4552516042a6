package org.stillpath.job;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;
import org.stillpath.unit.Decimal;
import org.stillpath.unit.Dimension;
import org.stillpath.unit.Flavour;
import org.stillpath.unit.Kind;
import org.stillpath.unit.Quantity;
import org.stillpath.unit.UnitException;

/**
 * A value of a job file with its place and path. Each reader returns what is asked for or adds one fault and returns a
 * harmless stand-in (NaN, an empty text, an empty list), so that reading goes on and all faults are told at once.
 */
public final class Value {
    private final Node node;
    private final String path;
    private final Problems problems;
    private final boolean placeholder;

    private Value(Node node, String path, Problems problems, boolean placeholder) {
        this.node = node;
        this.path = path;
        this.problems = problems;
        this.placeholder = placeholder;
    }

    /** A value of the tree; {@code path} is its place there, such as {@code train.surfaces[1].at}. */
    public static Value of(Node node, String path, Problems problems) {
        return new Value(node, path, problems, false);
    }

    static Value placeholder(Place place, String path, Problems problems) {
        return new Value(new Node.Scalar(place, "", false), path, problems, true);
    }

    /** Where it starts. */
    public Place place() {
        return node.place();
    }

    /** Path in the job tree. */
    public String path() {
        return path;
    }

    /** The node itself. */
    public Node node() {
        return node;
    }

    /** Whether it is a single value, not a list or a section. */
    public boolean isText() {
        return node instanceof Node.Scalar;
    }

    /** Whether it is a list. */
    public boolean isList() {
        return node instanceof Node.Sequence;
    }

    /** Whether it is a section. */
    public boolean isSection() {
        return node instanceof Node.Mapping;
    }

    /** Whether it stands for a missing value, which has been told already; no reader adds a fault. */
    public boolean isPlaceholder() {
        return placeholder;
    }

    /** The text of a single value; a list or a section is a fault. May be empty if quotes say so. */
    public String text() {
        return scalar("text").map(Node.Scalar::text).orElse("");
    }

    /** One of the allowed words; anything else is a fault that offers the nearest. Empty text after a fault. */
    public String word(String... allowed) {
        List<String> words = List.of(allowed);
        Optional<Node.Scalar> scalar = scalar("one of " + String.join(", ", words));
        if (scalar.isEmpty()) {
            return "";
        }
        String text = scalar.get().text();
        if (words.contains(text)) {
            return text;
        }
        fault(Words.quoted(text) + " is not known here; " + (words.size() == 1 ? "the word is " : "one of ")
                + String.join(", ", words) + (words.size() == 1 ? "" : " is needed")
                + Words.nearest(text, words)
                        .filter(n -> words.size() > 1)
                        .map(n -> "; did you mean \"" + n + "\"?")
                        .orElse(""));
        return "";
    }

    /** A quantity of the kind, in SI units; NaN after a fault. */
    public double quantity(Kind kind) {
        Optional<Quantity> q = read(kind.describe() + ", such as " + kind.example() + ",");
        if (q.isEmpty()) {
            return Double.NaN;
        }
        Optional<String> refusal = kind.refusal(q.get());
        if (refusal.isPresent()) {
            fault(refusal.get());
            return Double.NaN;
        }
        return q.get().value();
    }

    /** A quantity above zero, in SI units; NaN after a fault. */
    public double positive(Kind kind) {
        double v = quantity(kind);
        if (v <= 0) {
            fault(Words.quoted(shown()) + " must be greater than 0, such as " + kind.example());
            return Double.NaN;
        }
        return v;
    }

    /** A quantity that is zero or above, in SI units; NaN after a fault. */
    public double nonNegative(Kind kind) {
        double v = quantity(kind);
        if (v < 0) {
            fault(Words.quoted(shown()) + " must not be negative");
            return Double.NaN;
        }
        return v;
    }

    /** A quantity of whatever dimension; not-a-number without dimension after a fault. */
    public Quantity anyQuantity() {
        return read("a number, with its unit if it has one, such as 1.607 or 0.304 1/mm,")
                .orElseGet(() -> new Quantity(Double.NaN, Dimension.NONE, Flavour.PLAIN, "0"));
    }

    /** {@code true} or {@code false}; false after a fault. {@code yes} and its like are faults that name the word. */
    public boolean flag() {
        Optional<Node.Scalar> scalar = scalar("true or false");
        if (scalar.isEmpty()) {
            return false;
        }
        String text = scalar.get().text();
        String remedy =
                switch (text) {
                    case "true", "True", "TRUE", "false", "False", "FALSE" -> "";
                    case "yes", "Yes", "YES", "on", "On", "ON", "y", "Y" -> "write true";
                    case "no", "No", "NO", "off", "Off", "OFF", "n", "N" -> "write false";
                    default -> "true or false is needed";
                };
        if (!remedy.isEmpty()) {
            fault(Words.quoted(text) + " is not a flag; " + remedy);
            return false;
        }
        return text.charAt(0) == 't' || text.charAt(0) == 'T';
    }

    /** A whole number from {@code min} to {@code max}; {@code min} after a fault. */
    public int count(int min, int max) {
        String wanted = "a whole number from " + min + " to " + max;
        Optional<Node.Scalar> scalar = scalar(wanted);
        if (scalar.isEmpty()) {
            return min;
        }
        String text = scalar.get().text();
        double v = Decimal.parse(text).orElse(Double.NaN);
        if (!(v >= min && v <= max && v == Math.rint(v))) {
            fault(Words.quoted(text) + " does not do; " + wanted + " is needed");
            return min;
        }
        return (int) v;
    }

    /** A pure number; NaN after a fault. */
    public double number() {
        return quantity(Kind.NUMBER);
    }

    /** A point, three lengths in metres; three NaN after a fault. */
    public double[] point() {
        return triple(Kind.LENGTH, "a point, three lengths such as [0 mm, 0.2 mm, -10 mm],");
    }

    /** A direction: three pure numbers, made a unit vector; three NaN after a fault, a zero vector among them. */
    public double[] direction() {
        double[] d = triple(Kind.NUMBER, "a direction, three numbers such as [0, 0, 1],");
        double largest = Math.max(Math.abs(d[0]), Math.max(Math.abs(d[1]), Math.abs(d[2])));
        if (largest == 0) {
            fault("a zero vector has no direction; one such as [0, 0, 1] is needed");
            return new double[] {Double.NaN, Double.NaN, Double.NaN};
        }
        double x = d[0] / largest;
        double y = d[1] / largest;
        double z = d[2] / largest;
        double norm = Math.sqrt(x * x + y * y + z * z);
        return new double[] {x / norm, y / norm, z / norm};
    }

    /** The elements of a list; a value that is not a list is a fault. */
    public List<Value> items() {
        return list("a list, in brackets,");
    }

    /** A section; a value that is not one is a fault and gives an empty section that adds no further ones. */
    public Section section() {
        if (placeholder) {
            return Section.placeholder(place(), path, problems);
        }
        if (node instanceof Node.Mapping mapping) {
            return Section.of(mapping, path, problems);
        }
        wrongSort("a section, with keys and values,");
        return Section.placeholder(place(), path, problems);
    }

    /** Adds a fault at this value. */
    public void fault(String message) {
        if (!placeholder) {
            problems.add(place(), path, message);
        }
    }

    /** Adds a fault at a character of this value's text. */
    public void fault(int offset, String message) {
        if (!placeholder) {
            problems.add(textPlace(offset), path, message);
        }
    }

    /**
     * The place of a character of the text: right for plain and quoted values of one line without escapes; the start of
     * the value for others.
     */
    public Place textPlace(int offset) {
        if (!(node instanceof Node.Scalar scalar) || scalar.text().indexOf('\n') >= 0) {
            return place();
        }
        int within = Math.max(0, Math.min(offset, scalar.text().length()));
        return place().plusColumns(scalar.text().codePointCount(0, within) + (scalar.quoted() ? 1 : 0));
    }

    private double[] triple(Kind kind, String wanted) {
        double[] v = {Double.NaN, Double.NaN, Double.NaN};
        if (placeholder) {
            return v;
        }
        if (node instanceof Node.Sequence s && s.items().size() != 3) {
            fault(wanted + " is needed, not " + counted(s.items().size(), "value"));
            return v;
        }
        List<Value> items = list(wanted);
        for (int i = 0; i < items.size(); i++) {
            v[i] = items.get(i).quantity(kind);
        }
        return v;
    }

    private List<Value> list(String wanted) {
        if (placeholder) {
            return List.of();
        }
        if (!(node instanceof Node.Sequence sequence)) {
            wrongSort(wanted);
            return List.of();
        }
        List<Value> values = new ArrayList<>(sequence.items().size());
        for (int i = 0; i < sequence.items().size(); i++) {
            values.add(Value.of(sequence.items().get(i), path + "[" + i + "]", problems));
        }
        return List.copyOf(values);
    }

    private Optional<Quantity> read(String wanted) {
        Optional<Node.Scalar> scalar = scalar(wanted);
        if (scalar.isEmpty()) {
            return Optional.empty();
        }
        try {
            return Optional.of(Quantity.parse(scalar.get().text()));
        } catch (UnitException e) {
            String message = String.valueOf(e.getMessage());
            boolean notNumber = Decimal.end(scalar.get().text().strip(), 0) == 0;
            fault(e.offset(), notNumber ? message + "; " + wanted + " is needed" : message);
            return Optional.empty();
        }
    }

    /** The scalar, if it is one that has a text. */
    private Optional<Node.Scalar> scalar(String wanted) {
        if (placeholder) {
            return Optional.empty();
        }
        if (node instanceof Node.Scalar scalar
                && (scalar.quoted() || !scalar.text().isEmpty())) {
            return Optional.of(scalar);
        }
        wrongSort(wanted);
        return Optional.empty();
    }

    private void wrongSort(String wanted) {
        String there;
        if (node instanceof Node.Sequence s) {
            there = "a list of " + counted(s.items().size(), "value") + " stands here";
        } else if (node instanceof Node.Mapping) {
            there = "a section stands here";
        } else if (shown().isEmpty()) {
            there = "there is no value";
        } else {
            there = Words.quoted(shown()) + " stands here";
        }
        fault(there + "; " + wanted + " is needed");
    }

    private static String counted(int n, String noun) {
        return n + " " + noun + (n == 1 ? "" : "s");
    }

    private String shown() {
        return node instanceof Node.Scalar s ? s.text() : "";
    }
}
