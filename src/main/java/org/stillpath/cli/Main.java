package org.stillpath.cli;

import java.io.FileDescriptor;
import java.io.FileOutputStream;
import java.io.PrintStream;
import java.nio.charset.StandardCharsets;
import java.util.Locale;

/** Starts the program with the standard streams in UTF-8 and the root locale, whatever the machine says. */
public final class Main {
    private Main() {}

    /** Runs a command line and exits with its status. */
    public static void main(String[] args) {
        Locale.setDefault(Locale.ROOT);
        Console console = new Console(stream(FileDescriptor.out), stream(FileDescriptor.err));
        int status = Program.run(args, console);
        System.exit(Math.max(status, console.finish()));
    }

    private static PrintStream stream(FileDescriptor descriptor) {
        return new PrintStream(new FileOutputStream(descriptor), false, StandardCharsets.UTF_8);
    }
}
