package org.stillpath.cli;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.ByteArrayOutputStream;
import java.io.PrintStream;
import java.nio.charset.StandardCharsets;
import org.junit.jupiter.api.Test;

/** The completion script knows the commands and their options. */
class CompletionTest {
    @Test
    void knowsEveryCommandAndItsOptions() {
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        PrintStream stream = new PrintStream(out, false, StandardCharsets.UTF_8);
        Console console = new Console(stream, stream);
        assertThat(Program.run(new String[] {"completion"}, console)).isZero();
        console.out().flush();
        assertThat(out.toString(StandardCharsets.UTF_8))
                .startsWith("#!/usr/bin/env bash")
                .contains("run", "check", "new", "media", "completion", "--json", "--out", "--set", "--quiet")
                .contains("complete -F _complete_stillpath");
    }
}
