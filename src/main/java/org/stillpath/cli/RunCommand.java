package org.stillpath.cli;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.concurrent.Callable;
import org.stillpath.io.Checkpoint;
import org.stillpath.io.ResultJson;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Words;
import org.stillpath.report.PlainText;
import org.stillpath.report.TextReport;
import org.stillpath.study.Outcome;
import org.stillpath.study.Progress;
import org.stillpath.study.Store;
import org.stillpath.study.Studies;
import org.stillpath.task.Tasks;
import picocli.CommandLine.Command;
import picocli.CommandLine.Option;
import picocli.CommandLine.Parameters;

/** {@code stillpath run JOB.yaml...}: computes jobs and tells their results. */
@Command(name = "run", mixinStandardHelpOptions = true, description = "Computes jobs and tells their results.")
final class RunCommand implements Callable<Integer> {
    private final Console console;
    /** Which job took which folder of results. */
    private final Map<String, String> folders = new HashMap<>();

    @Parameters(arity = "1..*", paramLabel = "JOB.yaml", description = "job files")
    private List<String> jobs = List.of();

    @Option(names = "--json", description = "print the result document alone, one line a job")
    private boolean json;

    @Option(
            names = "--out",
            paramLabel = "DIR",
            description = {
                "also write result.json, tables as CSV, figures as SVG and PNG, and",
                "report.html into DIR; of several jobs, each into DIR/<job name>"
            })
    private String out = "";

    @Option(
            names = "--set",
            paramLabel = "PATH=VALUE",
            description = "override one value of the file, as in media.rod.with.g=\"0.31 1/mm\"; may be repeated")
    private List<String> settings = new ArrayList<>();

    @Option(names = "--quiet", description = "no summary, only faults")
    private boolean quiet;

    @Option(names = "--allow-outside", description = "let jobs name files outside their own folder")
    private boolean allowOutside;

    RunCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() throws IOException {
        int status = 0;
        for (int i = 0; i < jobs.size(); i++) {
            if (!json && !quiet && jobs.size() > 1) {
                console.out().print((i > 0 ? "\n" : "") + PlainText.of(jobs.get(i)) + "\n");
            }
            status = Math.max(status, run(jobs.get(i)));
            console.out().flush();
        }
        return status;
    }

    private int run(String name) throws IOException {
        try {
            Job job = Job.read(name, settings, allowOutside);
            claimFolder(job, name);
            Outcome outcome;
            Optional<OutputFolder> folder = Optional.empty();
            if (out.isEmpty()) {
                outcome = compute(job, Store.none());
            } else {
                Thread stopped = new Thread(() -> console.say(
                        "stopped; the runs that were done are kept in " + out + ", and the same command goes on"));
                try (Checkpoint checkpoint = Checkpoint.in(folder(job))) {
                    if (Studies.isIn(job.file().root())) {
                        Runtime.getRuntime().addShutdownHook(stopped);
                    }
                    outcome = compute(job, checkpoint);
                    folder = Optional.of(write(job, outcome));
                    checkpoint.finish();
                } finally {
                    forget(stopped);
                }
            }
            tell(outcome, folder);
            if (!outcome.result().accuracyReached()) {
                console.say(name + ": the asked accuracy was not reached; the error beside each value tells how far its"
                        + " digits can be trusted");
                return Problem.Kind.ACCURACY.exitStatus();
            }
            return 0;
        } catch (ProblemException e) {
            return fail(name, e.problems());
        } catch (RuntimeException | OutOfMemoryError | StackOverflowError e) {
            return fail(name, List.of(Program.excuse(name, e)));
        }
    }

    private Outcome compute(Job job, Store store) {
        return job.work((root, sources) -> {
                    if (!job.isSound()) {
                        CheckCommand.check(root, sources);
                        return Optional.<Outcome>empty();
                    }
                    Tasks.Options options = new Tasks.Options(!out.isEmpty());
                    int threads = Runtime.getRuntime().availableProcessors();
                    try (ProgressBar bar = new ProgressBar(console.err())) {
                        Progress progress = ProgressBar.isTerminal() && !quiet ? bar : Progress.SILENT;
                        Studies.Means means = new Studies.Means(threads, store, progress, Version.text());
                        return Optional.of(Studies.run(root, sources, options, means));
                    }
                })
                .orElseThrow();
    }

    private static void forget(Thread hook) {
        try {
            Runtime.getRuntime().removeShutdownHook(hook);
        } catch (IllegalStateException e) {
            // the program is being stopped, and the hook has its say
        }
    }

    private Path folder(Job job) {
        Path folder = Job.path(out);
        return jobs.size() > 1 ? folder.resolve(job.name()) : folder;
    }

    private int fail(String name, List<Problem> faults) throws IOException {
        if (json) {
            ResultJson.writeFaults(name, faults, console.out());
        }
        return console.tell(faults);
    }

    private OutputFolder write(Job job, Outcome outcome) {
        OutputFolder written = new OutputFolder(folder(job));
        written.write(outcome, job.file(), settings);
        return written;
    }

    private void tell(Outcome outcome, Optional<OutputFolder> folder) throws IOException {
        if (json) {
            ResultJson.writeLine(
                    outcome,
                    Version.text(),
                    folder.map(OutputFolder::tables).orElse(List.of()),
                    folder.map(OutputFolder::figures).orElse(List.of()),
                    console.out());
        } else if (!quiet) {
            console.out().write(TextReport.of(outcome).getBytes(StandardCharsets.UTF_8));
            if (folder.isPresent()) {
                console.out().print(PlainText.wrapped("\n" + folder.get().summary(), "", "  ", 80));
            }
        }
    }

    /** With {@code --out}, two jobs of one name would overwrite one another. */
    private void claimFolder(Job job, String file) {
        String before = folders.putIfAbsent(job.name(), file);
        if (before != null && !out.isEmpty() && jobs.size() > 1) {
            throw new ProblemException(Problem.input(
                    Place.of(file),
                    "",
                    "its results would go into the folder " + Words.quoted(job.name()) + ", where those of "
                            + Words.quoted(before) + " are; run it alone, or rename it"));
        }
    }
}
