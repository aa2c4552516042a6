package org.stillpath.job;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.ArrayList;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.Problems;
import org.stillpath.unit.Kind;

class SectionTest {
    private final Problems problems = new Problems();

    /** A section of one key a line: {@code key, value, key, value ...}; values are texts or nodes. */
    private Section section(Object... keysAndValues) {
        List<Node.Entry> entries = new ArrayList<>();
        for (int i = 0; i < keysAndValues.length; i += 2) {
            String key = (String) keysAndValues[i];
            Place place = new Place("job.yaml", i / 2 + 1, key.length() + 3);
            Node value = keysAndValues[i + 1] instanceof Node n
                    ? n
                    : new Node.Scalar(place, (String) keysAndValues[i + 1], false);
            entries.add(new Node.Entry(key, new Place("job.yaml", i / 2 + 1, 1), value));
        }
        return Section.of(new Node.Mapping(new Place("job.yaml", 1, 1), entries), "", problems);
    }

    private static Node list(String... texts) {
        List<Node> items = new ArrayList<>();
        for (String text : texts) {
            items.add(new Node.Scalar(new Place("job.yaml", 1, 10 * items.size() + 10), text, false));
        }
        return new Node.Sequence(new Place("job.yaml", 1, 9), items);
    }

    private List<String> faults() {
        return problems.list().stream().map(Problem::toString).toList();
    }

    @Test
    void offersTheNearestKey() {
        Section s = section("apperture", "1 mm", "at", "0 mm", "zzz", "1", "yes", "1");
        s.find("at");
        s.find("aperture");
        s.find("radius");
        s.finish();
        assertThat(faults())
                .containsExactly(
                        "job.yaml:1:1: unknown key \"apperture\"; did you mean \"aperture\"?",
                        "job.yaml:3:1: unknown key \"zzz\"; known here: at, aperture, radius",
                        "job.yaml:4:1: unknown key \"yes\"; known here: at, aperture, radius");
    }

    @Test
    void freeKeysAreAllKnown() {
        Section s = section("rod", "1", "block", "2");
        assertThat(s.names()).containsExactly("rod", "block");
        assertThat(s.at("block").text()).isEqualTo("2");
        s.finish();
        assertThat(faults()).isEmpty();
    }

    @Test
    void aMissingKeyIsToldOnceAndHarmless() {
        Section s = section("a", "1");
        Value v = s.need("wavelength", "633 nm");
        assertThat(v.isPlaceholder()).isTrue();
        assertThat(v.quantity(Kind.LENGTH)).isNaN();
        assertThat(v.positive(Kind.LENGTH)).isNaN();
        assertThat(v.items()).isEmpty();
        assertThat(v.text()).isEmpty();
        assertThat(v.point()).containsOnly(Double.NaN);
        assertThat(v.section().need("deeper").section().need("still").flag()).isFalse();
        v.section().finish();
        assertThat(faults())
                .containsExactly("job.yaml:1:1: \"wavelength\" is missing;"
                        + " add it at the top of the file, such as \"wavelength: 633 nm\"");
    }

    @Test
    void readsValues() {
        Section s = section(
                "length",
                "0.9 mm",
                "zero",
                "0",
                "flag",
                "true",
                "count",
                "21",
                "point",
                list("0", "0.2 mm", "-10 mm"),
                "direction",
                list("0", "3", "4"),
                "word",
                "trace",
                "with",
                "0.304 1/mm");
        assertThat(s.need("length").positive(Kind.LENGTH)).isEqualTo(9e-4);
        for (Kind kind : List.of(Kind.LENGTH, Kind.ANGLE, Kind.PRESSURE, Kind.TIME, Kind.NUMBER, Kind.INVERSE_LENGTH)) {
            assertThat(s.need("zero").quantity(kind)).isZero();
        }
        assertThat(s.need("flag").flag()).isTrue();
        assertThat(s.need("count").count(1, 100)).isEqualTo(21);
        assertThat(s.need("point").point()).containsExactly(0, 2e-4, -0.01);
        assertThat(s.need("direction").direction()).containsExactly(0, 0.6, 0.8);
        assertThat(s.need("word").word("lens", "trace")).isEqualTo("trace");
        assertThat(s.need("with").anyQuantity().value()).isEqualTo(304);
        s.finish();
        assertThat(faults()).isEmpty();
    }

    @Test
    void saysWhatIsWrong() {
        Section s = section(
                "transfer", "yes",
                "direct", "off",
                "g", "0.31 mm",
                "bad", "5 mmm",
                "g2", "0.31",
                "task", "lense",
                "count", "2.5",
                "empty", "",
                "aperture", "-1 mm",
                "dT", "5 degC",
                "word", "abc");
        s.need("transfer").flag();
        s.need("direct").flag();
        s.need("g").quantity(Kind.INVERSE_LENGTH);
        s.need("bad").quantity(Kind.LENGTH);
        s.need("g2").quantity(Kind.INVERSE_LENGTH);
        s.need("task").word("trace", "lens");
        s.need("count").count(1, 1000);
        s.need("empty").quantity(Kind.LENGTH);
        s.need("aperture").positive(Kind.LENGTH);
        s.need("dT").quantity(Kind.TEMPERATURE_DIFFERENCE);
        s.need("word").quantity(Kind.LENGTH);
        s.need("g").items();
        s.need("g").section();
        assertThat(faults())
                .containsExactly(
                        "job.yaml:1:11: transfer: \"yes\" is not a flag; write true",
                        "job.yaml:2:9: direct: \"off\" is not a flag; write false",
                        "job.yaml:3:4: g: \"0.31 mm\" is a length; an inverse length is needed, such as 0.31 1/mm",
                        "job.yaml:3:4: g: \"0.31 mm\" stands here; a list, in brackets, is needed",
                        "job.yaml:3:4: g: \"0.31 mm\" stands here; a section, with keys and values, is needed",
                        "job.yaml:4:8: bad: \"mmm\" is not a unit known here; did you mean mm?",
                        "job.yaml:5:5: g2: \"0.31\" has no unit; an inverse length is needed, such as 0.31 1/mm",
                        "job.yaml:6:7: task: \"lense\" is not known here; one of trace, lens is needed;"
                                + " did you mean \"lens\"?",
                        "job.yaml:7:8: count: \"2.5\" does not do; a whole number from 1 to 1000 is needed",
                        "job.yaml:8:8: empty: there is no value; a length, such as 5 mm, is needed",
                        "job.yaml:9:11: aperture: \"-1 mm\" must be greater than 0, such as 5 mm",
                        "job.yaml:10:5: dT: \"5 degC\" is a point on the temperature scale;"
                                + " a temperature difference is needed, such as 5 K",
                        "job.yaml:11:7: word: \"abc\" does not start with a number;"
                                + " a length, such as 5 mm, is needed");
    }

    @Test
    void saysWhatIsWrongWithPointsAndDirections() {
        Section s = section("a", list("0", "1"), "b", list("0", "0", "0"), "c", list("1", "2 mm", "0"), "d", "1 mm");
        s.need("a").point();
        assertThat(s.need("b").direction()).containsOnly(Double.NaN);
        s.need("c").direction();
        s.need("d").point();
        assertThat(faults())
                .containsExactlyInAnyOrder(
                        "job.yaml:1:9: a: a point, three lengths such as [0 mm, 0.2 mm, -10 mm], is needed, not 2 values",
                        "job.yaml:1:9: b: a zero vector has no direction; one such as [0, 0, 1] is needed",
                        "job.yaml:1:20: c[1]: \"2 mm\" is a length; a pure number is needed, such as 2",
                        "job.yaml:4:4: d: \"1 mm\" stands here; a point, three lengths such as"
                                + " [0 mm, 0.2 mm, -10 mm], is needed");
    }

    @Test
    void findsThePlaceOfACharacter() {
        Place place = new Place("job.yaml", 2, 8);
        assertThat(Value.of(new Node.Scalar(place, "µ + x", false), "a", problems)
                        .textPlace(4))
                .isEqualTo(new Place("job.yaml", 2, 12));
        assertThat(Value.of(new Node.Scalar(place, "µ + x", true), "a", problems)
                        .textPlace(4))
                .isEqualTo(new Place("job.yaml", 2, 13));
        assertThat(Value.of(new Node.Scalar(place, "a\nb", true), "a", problems).textPlace(2))
                .isEqualTo(place);
    }

    @Test
    void pathsMatchKeysWithDots() {
        Node inner = new Node.Mapping(
                new Place("job.yaml", 1, 1),
                List.of(new Node.Entry(
                        "count", new Place("job.yaml", 1, 1), new Node.Scalar(Place.of("x"), "41", false))));
        Section s = section("media.rod[0].g", inner, "media", "1");
        Node.Mapping changed = Paths.with(
                s.node(), "media.rod[0].g.count", new Node.Scalar(Place.of("x"), "5", false), Place.of("x"), problems);
        assertThat(Paths.find(changed, "media.rod[0].g.count"))
                .hasValueSatisfying(n -> assertThat(((Node.Scalar) n).text()).isEqualTo("5"));
        assertThat(Paths.find(changed, "media.nothing")).isEmpty();
        assertThat(faults()).isEmpty();
    }
}
