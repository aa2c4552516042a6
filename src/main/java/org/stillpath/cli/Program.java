package org.stillpath.cli;

import java.io.PrintWriter;
import java.nio.charset.StandardCharsets;
import java.util.List;
import java.util.concurrent.Callable;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import picocli.CommandLine;
import picocli.CommandLine.Command;
import picocli.CommandLine.Help.Ansi;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.ParameterException;
import picocli.CommandLine.Spec;
import picocli.CommandLine.UnmatchedArgumentException;

/** The command line as a whole: arguments to exit status. */
@Command(
        name = "stillpath",
        description = {
            "Where light goes when the refractive index is not uniform, and how far each",
            "digit can be trusted."
        },
        versionProvider = Version.class,
        mixinStandardHelpOptions = true,
        footer = {
            "",
            "Exit status: 0 a result was produced, 2 the input is wrong, 3 the asked accuracy",
            "could not be reached, 4 a file could not be read or written; of several jobs the",
            "worst."
        })
final class Program implements Callable<Integer> {
    @Spec
    private CommandSpec spec;

    private Program() {}

    /** Runs a command line; never throws, never exits. */
    static int run(String[] args, Console console) {
        CommandLine line = new CommandLine(new Program())
                .addSubcommand(new RunCommand(console))
                .addSubcommand(new CheckCommand(console))
                .addSubcommand(new NewCommand(console))
                .addSubcommand(new MediaCommand(console))
                .addSubcommand(new CompletionCommand(console));
        line.setExpandAtFiles(false)
                .setUsageHelpWidth(80)
                .setColorScheme(CommandLine.Help.defaultColorScheme(Ansi.OFF))
                .setOut(new PrintWriter(console.out(), false, StandardCharsets.UTF_8))
                .setErr(new PrintWriter(console.err(), false, StandardCharsets.UTF_8))
                .setParameterExceptionHandler((e, given) -> refuse(e, console))
                .setExecutionExceptionHandler((e, command, parsed) -> fail(e, console));
        int status = line.execute(args);
        line.getOut().flush();
        line.getErr().flush();
        return status;
    }

    @Override
    public Integer call() {
        throw new ParameterException(spec.commandLine(), "a command is needed: run, check, new, media or completion");
    }

    private static int refuse(ParameterException e, Console console) {
        StringBuilder message = new StringBuilder("stillpath: " + e.getMessage());
        if (e instanceof UnmatchedArgumentException unmatched) {
            List<String> near = unmatched.getSuggestions();
            if (!near.isEmpty()) {
                message.append("; did you mean ")
                        .append(String.join(" or ", near))
                        .append('?');
            }
        }
        console.say(message.toString());
        console.say("Try: " + e.getCommandLine().getCommandSpec().qualifiedName() + " --help");
        return Problem.Kind.INPUT.exitStatus();
    }

    private static int fail(Exception e, Console console) {
        List<Problem> faults = e instanceof ProblemException wrong ? wrong.problems() : List.of(excuse("stillpath", e));
        return console.tell(faults);
    }

    /**
     * What is left to say when something was thrown that nobody meant to throw: no stack trace ever reaches a user.
     *
     * @param name what was being worked on
     */
    static Problem excuse(String name, Throwable e) {
        Place place = Place.of(name);
        if (e instanceof OutOfMemoryError) {
            return Problem.input(
                    place,
                    "",
                    "memory: the job needs more than the "
                            + Runtime.getRuntime().maxMemory() / (1 << 20)
                            + " MB that Java may use; ask for fewer rays or a smaller grid, or give Java more:"
                            + " JDK_JAVA_OPTIONS=-Xmx8g");
        }
        StackTraceElement[] trace = e.getStackTrace();
        return new Problem(
                Problem.Kind.ACCURACY,
                place,
                "",
                "no result, by a fault of the program and not of the job: "
                        + e.getClass().getSimpleName()
                        + (e.getMessage() == null ? "" : " (" + e.getMessage() + ")")
                        + " at " + (trace.length == 0 ? "an unknown place" : trace[0].toString())
                        + "; please report it together with the job file");
    }
}
