package org.stillpath.cli;

import java.io.IOException;
import java.io.OutputStream;
import java.io.PrintStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Comparator;
import java.util.Locale;
import java.util.stream.Stream;

/**
 * Runs the starter jobs once, silently, so that a class-data archive made at exit holds the classes that an ordinary run
 * needs. Started by the launcher, once a machine.
 */
public final class WarmUp {
    private WarmUp() {}

    /** Runs; exits with status 0 if the archive is worth having. */
    public static void main(String[] args) throws IOException {
        Locale.setDefault(Locale.ROOT);
        PrintStream nowhere = new PrintStream(OutputStream.nullOutputStream(), false, StandardCharsets.UTF_8);
        Console console = new Console(nowhere, nowhere);
        Path folder = Files.createTempDirectory("stillpath");
        int status = 0;
        try {
            for (String task : NewCommand.STARTERS) {
                String job = Files.write(folder.resolve(task + ".yaml"), NewCommand.starter(task))
                        .toString();
                status = Math.max(status, Program.run(new String[] {"check", job}, console));
                status = Math.max(status, Program.run(new String[] {"run", job}, console));
                status = Math.max(status, Program.run(new String[] {"run", "--json", job}, console));
            }
            Program.run(new String[] {"run", "--jsno"}, console);
        } finally {
            try (Stream<Path> files = Files.walk(folder)) {
                for (Path file : files.sorted(Comparator.reverseOrder()).toList()) {
                    Files.deleteIfExists(file);
                }
            }
        }
        System.exit(status);
    }
}
