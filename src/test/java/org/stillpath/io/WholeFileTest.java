package org.stillpath.io;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

class WholeFileTest {
    @TempDir
    Path folder;

    @Test
    void writesAndReplaces() throws IOException {
        Path file = folder.resolve("result.json");
        WholeFile.write(file, "first µ");
        WholeFile.write(file, "second");
        assertThat(file).hasContent("second");
        assertThat(names()).containsExactly("result.json");
    }

    @Test
    void aFailureLeavesTheOldFileAndNothingElse() throws IOException {
        Path file = folder.resolve("result.json");
        WholeFile.write(file, "old");
        assertThatThrownBy(() -> WholeFile.write(file, out -> {
                    out.write(new byte[100_000]);
                    throw new IOException("disk full");
                }))
                .hasMessage("disk full");
        assertThat(file).hasContent("old");
        assertThat(names()).containsExactly("result.json");
    }

    @Test
    void thereIsNothingToSeeWhileAFileIsWritten() throws IOException {
        Path file = folder.resolve("a.csv");
        WholeFile.write(file, out -> {
            out.write(1);
            out.flush();
            assertThat(file).doesNotExist();
        });
        assertThat(file).exists();
    }

    private Stream<String> names() throws IOException {
        try (Stream<Path> list = Files.list(folder)) {
            return list.map(p -> p.getFileName().toString()).toList().stream();
        }
    }
}
