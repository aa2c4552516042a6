package org.stillpath.problem;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.List;
import org.junit.jupiter.api.Test;

class WordsTest {
    @Test
    void offersWhatWasMeant() {
        List<String> known = List.of("aperture", "radius", "at", "K", "km");
        assertThat(Words.nearest("apperture", known)).contains("aperture");
        assertThat(Words.nearest("aprethure", known)).contains("aperture");
        assertThat(Words.nearest("Radius", known)).contains("radius");
        assertThat(Words.nearest("Kk", known)).contains("K");
        assertThat(Words.nearest("conic", known)).isEmpty();
        assertThat(Words.nearest("x", known)).isEmpty();
        assertThat(Words.nearest("", known)).isEmpty();
        assertThat(Words.remedy("conic", List.of())).isEmpty();
    }

    /** Distances worked by hand: one replacement, one swap, one letter too many. */
    @Test
    void countsSlips() {
        assertThat(Words.distance("gap", "gas")).isEqualTo(1);
        assertThat(Words.distance("nigth", "night")).isEqualTo(1);
        assertThat(Words.distance("lenss", "lens")).isEqualTo(1);
        assertThat(Words.distance("", "abc")).isEqualTo(3);
        assertThat(Words.distance("kitten", "sitting")).isEqualTo(3);
    }

    @Test
    void quotesSafely() {
        assertThat(Words.quoted("a\n\tb\u001b[31m\u202e")).isEqualTo("\"a\\n\\tb\\u001B[31m\\u202E\"");
        assertThat(Words.quoted("x".repeat(100))).hasSize(63).endsWith("…\"");
    }
}
