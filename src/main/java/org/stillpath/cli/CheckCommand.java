package org.stillpath.cli;

import java.util.ArrayList;
import java.util.List;
import java.util.Set;
import java.util.concurrent.Callable;
import org.stillpath.job.Node;
import org.stillpath.job.Sources;
import org.stillpath.medium.MaterialReader;
import org.stillpath.medium.MediumFile;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.report.PlainText;
import org.stillpath.study.Studies;
import org.stillpath.task.Tasks;
import picocli.CommandLine.Command;
import picocli.CommandLine.Option;
import picocli.CommandLine.Parameters;

/** {@code stillpath check FILE.yaml...}: says what is wrong with job and medium files, and where; computes nothing. */
@Command(
        name = "check",
        mixinStandardHelpOptions = true,
        description = "Reads job and medium files and says what is wrong and where; computes nothing.")
final class CheckCommand implements Callable<Integer> {
    /** Keys that a job has and a medium has not. */
    private static final Set<String> JOB_KEYS = Set.of("task", "train", "through", "rays", "media", "study");

    /** Keys that say what a medium is; `from` also starts a path in a job. */
    private static final Set<String> MEDIUM_KEYS = Set.of("index", "air", "solid", "from");

    private final Console console;

    @Parameters(arity = "1..*", paramLabel = "FILE.yaml", description = "job, medium or material files")
    private List<String> files = List.of();

    @Option(
            names = "--set",
            paramLabel = "PATH=VALUE",
            description = "override one value of the file, as for run; may be repeated")
    private List<String> settings = new ArrayList<>();

    @Option(names = "--allow-outside", description = "let files name files outside their own folder")
    private boolean allowOutside;

    CheckCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        int status = 0;
        for (String name : files) {
            status = Math.max(status, check(name));
        }
        return status;
    }

    private int check(String name) {
        try {
            Job job = Job.read(name, settings, allowOutside);
            boolean material = MaterialReader.isOne(job.file().root());
            boolean medium = !material && isMedium(job.file().root());
            job.work((root, sources) -> {
                if (material) {
                    Problems problems = new Problems();
                    MaterialReader.of(job.name(), root, problems);
                    problems.throwIfAny();
                } else if (medium) {
                    Problems problems = new Problems();
                    MediumFile.of(job.name(), root, sources, problems);
                    problems.throwIfAny();
                } else {
                    check(root, sources);
                }
                return root;
            });
            console.out()
                    .print(PlainText.of(name) + ": sound " + (material ? "material" : medium ? "medium" : "job")
                            + "\n");
            return 0;
        } catch (ProblemException e) {
            return console.tell(e.problems());
        } catch (RuntimeException | StackOverflowError e) {
            return console.tell(List.of(Program.excuse(name, e)));
        }
    }

    /** Says what is wrong with a job. */
    static void check(Node.Mapping root, Sources sources) {
        if (Studies.isIn(root)) {
            Studies.check(root, sources);
        } else {
            Tasks.check(root, sources);
        }
    }

    /** Whether a file holds a medium rather than a job. */
    private static boolean isMedium(Node.Mapping root) {
        return JOB_KEYS.stream().noneMatch(key -> root.find(key).isPresent())
                && MEDIUM_KEYS.stream().anyMatch(key -> root.find(key).isPresent());
    }
}
