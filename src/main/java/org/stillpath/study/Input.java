package org.stillpath.study;

import java.util.Optional;
import org.stillpath.job.Node;
import org.stillpath.job.Paths;
import org.stillpath.job.Value;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;
import org.stillpath.unit.Dimension;
import org.stillpath.unit.Display;
import org.stillpath.unit.Flavour;
import org.stillpath.unit.Kind;
import org.stillpath.unit.Quantity;
import org.stillpath.unit.UnitException;
import org.stillpath.unit.Units;

/**
 * A numeric input of a job that a study varies.
 *
 * @param path its path, as the job wrote it
 * @param place where the study names it; faults of its values are told there
 * @param kind what it is
 * @param unit SI unit symbol in which values are set: {@code rad} for angles, {@code 1} for pure numbers
 * @param shown unit that the job used, for people; empty where there was none
 * @param nominal its value in the job, SI; NaN where the job has none
 */
record Input(String path, Place place, Kind kind, String unit, String shown, double nominal) {
    private static final Kind KELVIN =
            new Kind(Dimension.TEMPERATURE, Flavour.PLAIN, "a temperature in K, as the job has it,", "293.15", "K");

    /**
     * Finds an input of a job.
     *
     * @param job the job
     * @param path its path
     * @param place where the study names it
     * @param sample a value that the study gives it, which tells its kind where the job has none or a bare 0
     * @param problems collects what is wrong
     * @return empty after a fault
     */
    static Optional<Input> find(Node.Mapping job, String path, Place place, Value sample, Problems problems) {
        Optional<Node> node = Paths.find(job, path);
        if (node.isPresent() && !(node.get() instanceof Node.Scalar)) {
            problems.add(
                    place, "study", Words.quoted(path) + " is a section or a list of the job; name one value in it");
            return Optional.empty();
        }
        Optional<Quantity> nominal = Optional.empty();
        if (node.isPresent() && node.get() instanceof Node.Scalar scalar) {
            try {
                nominal = Optional.of(Quantity.parse(scalar.text()));
            } catch (UnitException e) {
                problems.add(
                        place,
                        "study",
                        "the job has " + Words.quoted(scalar.text()) + " at " + path
                                + ", which is not a number; what is to " + "vary in a formula is given under \"with\"");
                return Optional.empty();
            }
        }
        // a bare 0 is of any kind, so that only the study's own value tells
        Quantity telling = nominal.filter(q -> !(q.isBare() && q.value() == 0)).orElseGet(sample::anyQuantity);
        if (Double.isNaN(telling.value())) {
            return Optional.empty();
        }
        Kind kind = kind(telling);
        String unit = kind.flavour() == Flavour.ANGLE
                ? "rad"
                : telling.dimension().isNone() ? "1" : telling.dimension().symbol();
        return Optional.of(new Input(
                path,
                place,
                kind,
                unit,
                shown(telling),
                nominal.map(Quantity::value).orElse(Double.NaN)));
    }

    private static Kind kind(Quantity q) {
        return switch (q.flavour()) {
            case ANGLE -> Kind.ANGLE;
            case TEMPERATURE_POINT -> Kind.TEMPERATURE;
            case PLAIN -> q.dimension().equals(Dimension.TEMPERATURE) ? KELVIN : Kind.of(q.dimension());
        };
    }

    /** What a difference of two values is: of temperatures never in degrees Celsius. */
    Kind difference() {
        return kind.dimension().equals(Dimension.TEMPERATURE) ? Kind.TEMPERATURE_DIFFERENCE : kind;
    }

    private static String shown(Quantity q) {
        String text = q.text().substring(q.numberText().length()).strip();
        if (text.isEmpty()) {
            return "";
        }
        return Units.parse(text).isPresent() ? text : q.flavour() == Flavour.ANGLE ? "deg" : "";
    }

    /** Unit of differences for people: that of the values, and kelvin where those are in degrees Celsius. */
    String shownDifference() {
        return kind.flavour() == Flavour.TEMPERATURE_POINT ? "K" : shown;
    }

    /** Whether the job has a value here. */
    boolean isGiven() {
        return !Double.isNaN(nominal);
    }

    /** A value as a node of the job's tree; reading it gives the very same double. */
    Node node(double si) {
        String number = Double.toString(si);
        return new Node.Scalar(place, unit.equals("1") ? number : number + " " + unit, false);
    }

    /** A value for people, in the unit that the job used. */
    String say(double si) {
        return shown.isEmpty()
                ? Display.of(si, unit, 0).toString()
                : Display.in(si, shown, 0).toString();
    }

    /** Its path, spelt in one way: two inputs with the same key are the same. */
    String key() {
        return path.replace("]", "").replace('[', '.');
    }
}
