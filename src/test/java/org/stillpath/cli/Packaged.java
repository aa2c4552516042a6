package org.stillpath.cli;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Objects;
import java.util.concurrent.TimeUnit;

/** The packaged program, run as a process. */
final class Packaged {
    private static final int SECONDS = 120;

    private Packaged() {}

    /**
     * How a run ended.
     *
     * @param status exit status
     * @param out standard output
     * @param err standard error
     */
    record Ended(int status, String out, String err) {
        /** The lines of standard error. */
        List<String> messages() {
            return err.lines().toList();
        }
    }

    /** Runs the launcher in a folder. */
    static Ended run(Path folder, String... arguments) throws IOException, InterruptedException {
        List<String> command = new ArrayList<>();
        command.add(Objects.requireNonNull(System.getProperty("stillpath.launcher"), "stillpath.launcher"));
        command.addAll(List.of(arguments));
        return run(folder, command);
    }

    /** Runs any command in a folder. */
    static Ended run(Path folder, List<String> command) throws IOException, InterruptedException {
        Path out = Files.createTempFile("out", ".txt");
        Path err = Files.createTempFile("err", ".txt");
        try {
            Process process = new ProcessBuilder(command)
                    .directory(folder.toFile())
                    .redirectInput(
                            ProcessBuilder.Redirect.from(Path.of("/dev/null").toFile()))
                    .redirectOutput(out.toFile())
                    .redirectError(err.toFile())
                    .start();
            if (!process.waitFor(SECONDS, TimeUnit.SECONDS)) {
                process.destroyForcibly();
                throw new AssertionError("not ended after " + SECONDS + " s: " + command);
            }
            return new Ended(
                    process.exitValue(),
                    Files.readString(out, StandardCharsets.UTF_8),
                    Files.readString(err, StandardCharsets.UTF_8));
        } finally {
            Files.delete(out);
            Files.delete(err);
        }
    }
}
