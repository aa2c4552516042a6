package org.stillpath.cli;

import java.io.PrintStream;
import java.util.List;
import org.stillpath.problem.Problem;
import org.stillpath.report.PlainText;

/**
 * Standard output for answers, standard error for faults.
 *
 * @param out UTF-8, flushed by {@link #finish}
 * @param err UTF-8
 */
record Console(PrintStream out, PrintStream err) {

    /** Tells faults, one a line, and gives the exit status that the worst of them asks for. */
    int tell(List<Problem> faults) {
        int status = 0;
        for (Problem fault : faults) {
            say(fault.toString());
            status = Math.max(status, fault.kind().exitStatus());
        }
        return status;
    }

    /** Says one line on standard error. */
    void say(String line) {
        err.print(PlainText.of(line) + "\n");
        err.flush();
    }

    /** Flushes everything; gives 0, or the status of a file that could not be written. */
    int finish() {
        boolean failed = out.checkError();
        if (failed) {
            say("stillpath: standard output could not be written");
        }
        err.flush();
        return failed ? Problem.Kind.FILE.exitStatus() : 0;
    }
}
