package org.stillpath.io;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Arrays;
import java.util.Map;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.stillpath.problem.ProblemException;
import org.stillpath.study.Store;

class CheckpointTest {
    private static final Store.Part FIRST =
            new Store.Part(0, 2, new double[] {1, Double.NaN, 3, -0.0}, new byte[] {0, 1}, Map.of(1, "späßig"));
    private static final Store.Part SECOND = new Store.Part(5, 2, new double[] {7, 8}, new byte[] {2}, Map.of());

    private static void write(Path folder) {
        try (Checkpoint c = Checkpoint.in(folder)) {
            c.open("abc");
            assertThat(c.parts("sweep")).isEmpty();
            c.add("sweep", FIRST);
            c.add("sweep", SECOND);
            c.add("other", SECOND);
        }
    }

    @Test
    void givesBackWhatWasKept(@TempDir Path folder) throws IOException {
        write(folder);
        try (Checkpoint c = Checkpoint.in(folder)) {
            c.open("abc");
            assertThat(c.parts("sweep")).containsExactly(FIRST, SECOND);
            assertThat(c.parts("other")).containsExactly(SECOND);
            assertThat(c.found()).isEqualTo(4);
            c.finish();
        }
        assertThat(folder.resolve(Checkpoint.NAME)).doesNotExist();
    }

    /** A job at fault, or one that was stopped before its first run, leaves nothing that refuses the next. */
    @Test
    void leavesNothingWhereNothingWasKept(@TempDir Path folder) throws IOException {
        try (Checkpoint c = Checkpoint.in(folder)) {
            c.open("abc");
        }
        assertThat(folder.resolve(Checkpoint.NAME)).doesNotExist();
        Files.writeString(folder.resolve(Checkpoint.NAME), "stillpath study 1\nab\n");
        try (Checkpoint c = Checkpoint.in(folder)) {
            c.open("xyz");
            c.add("sweep", FIRST);
        }
        try (Checkpoint c = Checkpoint.in(folder)) {
            c.open("xyz");
            assertThat(c.parts("sweep")).containsExactly(FIRST);
        }
    }

    /** Cut at every byte, as a process killed while writing leaves it: whole records stay, and more can be added. */
    @Test
    void survivesBeingCutAnywhere(@TempDir Path folder) throws IOException {
        write(folder);
        Path file = folder.resolve(Checkpoint.NAME);
        byte[] whole = Files.readAllBytes(file);
        for (int length = 0; length <= whole.length; length++) {
            Files.write(file, Arrays.copyOf(whole, length));
            int before;
            try (Checkpoint c = Checkpoint.in(folder)) {
                c.open("abc");
                before = c.parts("sweep").size();
                assertThat(c.parts("sweep")).isSubsetOf(FIRST, SECOND);
                c.add("more", FIRST);
            }
            try (Checkpoint c = Checkpoint.in(folder)) {
                c.open("abc");
                assertThat(c.parts("sweep")).hasSize(before);
                assertThat(c.parts("more")).containsExactly(FIRST);
            }
        }
    }

    /** A byte that went wrong takes its record and those behind it along, never a wrong number. */
    @Test
    void findsDamage(@TempDir Path folder) throws IOException {
        write(folder);
        Path file = folder.resolve(Checkpoint.NAME);
        byte[] whole = Files.readAllBytes(file);
        byte[] damaged = whole.clone();
        damaged[whole.length - 5] ^= 1;
        Files.write(file, damaged);
        try (Checkpoint c = Checkpoint.in(folder)) {
            c.open("abc");
            assertThat(c.parts("sweep")).containsExactly(FIRST, SECOND);
            assertThat(c.parts("other")).isEmpty();
        }
    }

    @Test
    void refusesAnotherStudyAndASecondProcess(@TempDir Path folder) {
        write(folder);
        assertThatThrownBy(() -> {
                    try (Checkpoint c = Checkpoint.in(folder)) {
                        c.open("xyz");
                    }
                })
                .isInstanceOf(ProblemException.class)
                .hasMessageContaining("unfinished study of another job")
                .hasMessageContaining(Checkpoint.NAME);
        try (Checkpoint c = Checkpoint.in(folder);
                Checkpoint d = Checkpoint.in(folder)) {
            c.open("abc");
            assertThatThrownBy(() -> d.open("abc")).hasMessageContaining("being worked on by another process");
        }
    }
}
