package org.stillpath.cli;

import java.io.IOException;
import java.io.InputStream;
import java.util.List;
import java.util.concurrent.Callable;
import org.stillpath.problem.Problem;
import org.stillpath.problem.Words;
import picocli.CommandLine.Command;
import picocli.CommandLine.Parameters;

/** {@code stillpath new TASK}: prints a commented starter job. */
@Command(name = "new", mixinStandardHelpOptions = true, description = "Prints a commented starter job of a task.")
final class NewCommand implements Callable<Integer> {
    static final List<String> STARTERS = List.of("trace", "between", "lens", "sightline", "window");

    private final Console console;

    @Parameters(paramLabel = "TASK", description = "trace, between, lens, sightline or window")
    private String task = "";

    NewCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() throws IOException {
        if (STARTERS.contains(task)) {
            console.out().write(starter(task));
            return 0;
        }
        console.say("stillpath: new: there is no task " + Words.quoted(task) + Words.remedy(task, STARTERS));
        return Problem.Kind.INPUT.exitStatus();
    }

    static byte[] starter(String task) throws IOException {
        try (InputStream in = NewCommand.class.getResourceAsStream("new/" + task + ".yaml")) {
            if (in == null) {
                throw new IllegalStateException("starter " + task + ".yaml is missing from the jar");
            }
            return in.readAllBytes();
        }
    }
}
