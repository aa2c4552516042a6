package org.stillpath.task;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.io.IOException;
import java.io.InputStream;
import java.nio.charset.StandardCharsets;
import java.util.Objects;
import java.util.stream.Stream;
import org.junit.jupiter.api.DynamicTest;
import org.junit.jupiter.api.TestFactory;

/** Every row of published-lens.csv, through the task as a job would run it. */
class PublishedLensTest {
    @TestFactory
    Stream<DynamicTest> agreesWithTheSource() throws IOException {
        return lines().map(row -> row.split(" \\| "))
                .map(cells ->
                        DynamicTest.dynamicTest(cells[0] + " " + cells[2] + " = " + cells[3], () -> check(cells)));
    }

    private static void check(String[] cells) {
        String job = "task: lens\nwavelength: 587.56 nm\naccuracy: 1e-12\n" + cells[1].replace("; ", "\n");
        Quantity found = Jobs.run(job).quantities().get(cells[2]);
        double tolerance = Double.parseDouble(cells[4]);
        if (tolerance == 0) {
            assertThat(found).as(cells[5]).isEqualTo(new Quantity.Word(cells[3]));
            return;
        }
        assertThat(found).as(cells[5]).isInstanceOf(Quantity.Amount.class);
        Quantity.Amount amount = (Quantity.Amount) Objects.requireNonNull(found);
        assertThat(amount.value()).as(cells[5]).isCloseTo(Double.parseDouble(cells[3]), within(tolerance));
    }

    private static Stream<String> lines() throws IOException {
        try (InputStream in =
                Objects.requireNonNull(PublishedLensTest.class.getResourceAsStream("published-lens.csv"))) {
            return new String(in.readAllBytes(), StandardCharsets.UTF_8)
                    .lines()
                    .filter(l -> !l.startsWith("#") && !l.isBlank());
        }
    }
}
