package org.stillpath.cli;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.util.concurrent.Callable;
import picocli.AutoComplete;
import picocli.CommandLine.Command;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.Spec;

/**
 * {@code stillpath completion}: prints a script that completes commands, options and file names in bash and zsh. It is
 * made from the commands themselves, so that it cannot fall behind them.
 */
@Command(
        name = "completion",
        mixinStandardHelpOptions = true,
        description = "Prints a completion script for bash and zsh: source <(stillpath completion)")
final class CompletionCommand implements Callable<Integer> {
    private final Console console;

    @Spec
    private CommandSpec spec;

    CompletionCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() throws IOException {
        String script = AutoComplete.bash("stillpath", spec.root().commandLine());
        console.out().write(script.getBytes(StandardCharsets.UTF_8));
        return 0;
    }
}
