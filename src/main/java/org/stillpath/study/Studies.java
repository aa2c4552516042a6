package org.stillpath.study;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.stillpath.job.Node;
import org.stillpath.job.Paths;
import org.stillpath.job.Section;
import org.stillpath.job.Sources;
import org.stillpath.job.Value;
import org.stillpath.medium.MediaMemory;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;
import org.stillpath.task.Result;
import org.stillpath.task.ResultPath;
import org.stillpath.task.Task;
import org.stillpath.task.Tasks;

/** The studies by name, and the way from a job with a study to its outcome. Jobs without a study go the same way. */
public final class Studies {
    private static final List<Study> ALL =
            List.of(new SweepStudy(), new BatchStudy(), new BudgetStudy(), new FitStudy());
    private static final String STUDY = "study";
    private static final String FIGURES = "figures";
    private static final int MOST_VARIANTS = 100;
    /** Fewer runs are done before their time is known. */
    private static final int WORTH_GUESSING = 100;
    /** Longest study, seconds. */
    private static final double LONGEST = 30 * 86_400.0;

    private Studies() {}

    /**
     * What a study works with besides the job.
     *
     * @param threads how many runs are done at a time
     * @param store keeps what is done
     * @param progress is told how far it is
     * @param version the program's version: an interrupted study goes on with the same one only
     */
    public record Means(int threads, Store store, Progress progress, String version) {
        /** All cores, nothing kept, nobody told. */
        public static Means plain() {
            return new Means(Runtime.getRuntime().availableProcessors(), Store.none(), Progress.SILENT, "");
        }
    }

    /** Keys that {@code study:} may have. */
    static List<String> keys() {
        return ALL.stream().map(Study::key).toList();
    }

    /** Whether a job has a study. */
    public static boolean isIn(Node.Mapping job) {
        return job.find(STUDY).isPresent();
    }

    /**
     * Reads a job with its study and says what is wrong; computes nothing.
     *
     * @throws ProblemException with all faults, if there are any
     */
    public static void check(Node.Mapping job, Sources sources) {
        Order order = read(job, new RememberedSources(sources, new Fingerprint()));
        order.plan(new MediaMemory());
    }

    /**
     * Runs a job, with its studies where it has some.
     *
     * @param options what is wanted of the nominal result besides the numbers
     * @throws ProblemException with all faults of the job and its study
     */
    public static Outcome run(Node.Mapping job, Sources sources, Tasks.Options options, Means means) {
        if (!isIn(job)) {
            return Outcome.of(Tasks.run(job, sources, options));
        }
        Fingerprint fingerprint = new Fingerprint();
        fingerprint.add(means.version());
        fingerprint.add(job);
        Order order = read(job, new RememberedSources(sources, fingerprint));
        MediaMemory memory = new MediaMemory();
        Nominal nominal = order.plan(memory);
        Result result = nominal.plan().run(options);
        memory.keep(false);
        try (Crew crew = new Crew(means.threads(), means.store(), means.progress())) {
            Bench bench = order.bench(result, memory, crew, options.figures());
            order.ahead(nominal, bench, means);
            // only now: a job at fault leaves nothing behind
            means.store().open(fingerprint.text());
            return order.outcome(nominal, bench);
        }
    }

    private static Order read(Node.Mapping root, Sources sources) {
        Problems problems = new Problems();
        Section study =
                Section.of(root, "", problems).need(STUDY, "{sweep: ..}").section();
        Node.Mapping job = without(root);
        Map<String, Node.Mapping> variants = study.find("variants")
                .map(v -> variants(v.section(), job, problems))
                .orElse(Map.of());
        List<Value> watch = study.find("watch").map(Value::items).orElse(List.of());
        List<ResultPath> watched = new ArrayList<>();
        for (Value v : watch) {
            readPath(v).ifPresent(watched::add);
        }
        Study.Desk desk = new Study.Desk(job, variants, sources, problems);
        List<Planned> plans = new ArrayList<>();
        for (Study s : ALL) {
            study.find(s.key()).ifPresent(v -> plans.add(new Planned(s.key(), s.read(v, desk))));
        }
        study.finish();
        if (plans.isEmpty() && problems.isEmpty()) {
            study.fault("a study needs one of " + String.join(", ", keys()));
        }
        return new Order(job, root, sources, variants, watch, watched, plans, problems);
    }

    /** The path of a result; one that cannot be is a fault. */
    static Optional<ResultPath> readPath(Value v) {
        String text = v.text();
        Optional<ResultPath> path = ResultPath.parse(text);
        if (path.isEmpty() && !text.isEmpty()) {
            v.fault(Words.quoted(text)
                    + " is not the path of a number in a result; one is written like quantities.back-focal-distance or "
                    + "rays[0].position[1]");
        }
        return path;
    }

    /** The job as the task reads it: its own figures and no study. */
    private static Node.Mapping without(Node.Mapping root) {
        List<Node.Entry> entries = new ArrayList<>();
        for (Node.Entry e : root.entries()) {
            if (e.key().equals(STUDY)) {
                continue;
            }
            if (e.key().equals(FIGURES) && e.value() instanceof Node.Sequence s) {
                List<Node> own = s.items().stream()
                        .filter(n -> !(n instanceof Node.Scalar c && keys().contains(c.text())))
                        .toList();
                entries.add(new Node.Entry(e.key(), e.keyPlace(), new Node.Sequence(s.place(), own)));
            } else {
                entries.add(e);
            }
        }
        return new Node.Mapping(root.place(), entries);
    }

    private static Map<String, Node.Mapping> variants(Section section, Node.Mapping job, Problems problems) {
        Map<String, Node.Mapping> variants = new LinkedHashMap<>();
        List<String> names = section.names();
        if (names.size() > MOST_VARIANTS) {
            section.fault("the limit of variants, " + MOST_VARIANTS + ", is exceeded");
            return variants;
        }
        for (String name : names) {
            Section overrides = section.at(name).section();
            Node.Mapping tree = job;
            for (String path : overrides.names()) {
                tree = Paths.with(tree, path, overrides.at(path).node(), overrides.keyPlace(path), problems);
            }
            variants.put(name, tree);
        }
        return variants;
    }

    /** A study that the job asks for. */
    private record Planned(String key, Study.Plan plan) {}

    /** The nominal job, ready to run, and whether a row of a batch had to stand in for it. */
    private record Nominal(Task.Plan plan, Node.Mapping tree, boolean substituted) {}

    /** Everything that a job's study asks for. */
    private record Order(
            Node.Mapping job,
            Node.Mapping root,
            Sources sources,
            Map<String, Node.Mapping> variants,
            List<Value> watchValues,
            List<ResultPath> watch,
            List<Planned> plans,
            Problems problems) {

        /** Reads the job and its variants; throws with all that is wrong, the study's faults included. */
        Nominal plan(MediaMemory memory) {
            Optional<Nominal> nominal = Optional.empty();
            try {
                nominal = Optional.of(new Nominal(Tasks.read(job, sources, memory), job, false));
            } catch (ProblemException e) {
                nominal = substitute(memory);
                if (nominal.isEmpty()) {
                    e.problems().forEach(problems::add);
                }
            }
            if (nominal.isPresent()) {
                for (Node.Mapping variant : variants.values()) {
                    try {
                        Tasks.read(variant, sources, memory);
                    } catch (ProblemException e) {
                        e.problems().forEach(problems::add);
                    }
                }
            }
            problems.throwIfAny();
            return nominal.orElseThrow();
        }

        private Optional<Nominal> substitute(MediaMemory memory) {
            if (!problems.isEmpty()) {
                return Optional.empty();
            }
            for (Planned p : plans) {
                Optional<Node.Mapping> tree = p.plan().substitute();
                if (tree.isPresent()) {
                    try {
                        return Optional.of(new Nominal(Tasks.read(tree.get(), sources, memory), tree.get(), true));
                    } catch (ProblemException e) {
                        // the job's own faults tell more
                        return Optional.empty();
                    }
                }
            }
            return Optional.empty();
        }

        /** The bench for the job itself; throws with what is wrong with the study in the light of the nominal result. */
        Bench bench(Result result, MediaMemory memory, Crew crew, boolean drawn) {
            Problems wrong = new Problems();
            List<Watched> watched = watched(result, wrong);
            List<String> figures = drawn ? figures() : List.of();
            Bench bench = new Bench("", job, sources, memory, crew, result, watched, figures);
            for (Planned p : plans) {
                p.plan().bind(bench, wrong);
            }
            wrong.throwIfAny();
            return bench;
        }

        /** Says how long it will take at most; throws where that is more than anybody waits. */
        void ahead(Nominal nominal, Bench bench, Means means) {
            long runs = 0;
            for (Planned p : plans) {
                runs += p.plan().runs() * (p.plan().isForEachVariant() ? 1 + variants.size() : 1);
            }
            if (runs < WORTH_GUESSING) {
                return;
            }
            double seconds = runs * bench.secondsARun(nominal.tree()) / means.threads();
            if (seconds > LONGEST) {
                throw new ProblemException(Problem.input(
                        root.find(STUDY).map(Node::place).orElse(root.place()),
                        STUDY,
                        "time: " + runs + " runs would take about " + Math.round(seconds / 86_400) + " days on "
                                + means.threads() + (means.threads() == 1 ? " core" : " cores") + ", and the limit is "
                                + Math.round(LONGEST / 86_400) + " days; ask for fewer runs"));
            }
            means.progress().ahead(runs, seconds);
        }

        Outcome outcome(Nominal nominal, Bench bench) {
            Result result = bench.nominal();
            List<Finding> findings = new ArrayList<>();
            Doc.Builder doc = new Doc.Builder();
            for (Planned p : plans) {
                Finding f = p.plan().run(bench);
                findings.add(nominal.substituted() ? substituted(f) : f);
                doc.put(f.key(), f.doc());
            }
            Doc.Builder others = new Doc.Builder();
            for (Map.Entry<String, Node.Mapping> variant : variants.entrySet()) {
                Doc.Builder own = new Doc.Builder();
                boolean any = false;
                for (Planned p : plans) {
                    if (p.plan().isForEachVariant()) {
                        any = true;
                        Finding f = p.plan().run(variantBench(variant, bench));
                        findings.add(f);
                        own.put(f.key(), f.doc());
                    }
                }
                if (any) {
                    others.put(variant.getKey(), own.build());
                }
            }
            Doc.Fields all = others.build();
            if (!all.values().isEmpty()) {
                doc.put("variants", all);
            }
            return Outcome.of(result, findings, doc.build());
        }

        private Bench variantBench(Map.Entry<String, Node.Mapping> variant, Bench bench) {
            Result result = bench.result(variant.getValue());
            return new Bench(
                    variant.getKey(),
                    variant.getValue(),
                    sources,
                    bench.memory(),
                    bench.crew(),
                    result,
                    watched(result, new Problems()),
                    bench.figures());
        }

        private static Finding substituted(Finding f) {
            List<String> warnings = new ArrayList<>();
            warnings.add("the job alone cannot be run; the result beside the study is that of its first sound row");
            warnings.addAll(f.warnings());
            return new Finding(f.key(), f.headline(), f.doc(), f.listings(), f.figures(), warnings, f.accurate());
        }

        /** What is watched, with its units; all single quantities where the job does not say. */
        private List<Watched> watched(Result result, Problems wrong) {
            List<Watched> list = new ArrayList<>();
            List<ResultPath> paths = watch.isEmpty() ? ResultPath.quantities(result) : watch;
            for (int i = 0; i < paths.size(); i++) {
                ResultPath path = paths.get(i);
                Optional<ResultPath.Found> found = path.find(result);
                if (found.isEmpty() && !watch.isEmpty()) {
                    near(path, result)
                            .ifPresent(n -> watchValueOf(path)
                                    .ifPresent(v -> wrong.add(
                                            v.place(),
                                            v.path(),
                                            "this job has no result " + Words.quoted(path.text()) + n)));
                }
                list.add(found.map(f -> new Watched(path, f.unit(), f.value(), f.error()))
                        .orElseGet(() -> new Watched(path, "", Double.NaN, 0)));
            }
            if (list.isEmpty() && plans.stream().anyMatch(p -> !p.key().equals("fit"))) {
                wrong.add(
                        root.find(STUDY).map(Node::place).orElse(root.place()),
                        STUDY,
                        "\"watch\" is missing, and this task has no quantities; add the results to watch, such as "
                                + "watch: [rays[0].position[1]]");
            }
            return list;
        }

        private Optional<Value> watchValueOf(ResultPath path) {
            return watchValues.stream()
                    .filter(v -> v.isText() && v.text().equals(path.text()))
                    .findFirst();
        }

        /** The study's own figures that are wanted: all, unless the job says which. */
        private List<String> figures() {
            Optional<Node> named = root.find(FIGURES);
            if (named.isEmpty() || !(named.get() instanceof Node.Sequence s)) {
                return keys();
            }
            return s.items().stream()
                    .filter(Node.Scalar.class::isInstance)
                    .map(n -> ((Node.Scalar) n).text())
                    .filter(keys()::contains)
                    .toList();
        }
    }

    /** The result that was probably meant by a path that leads to none, as the end of a message. */
    static Optional<String> near(ResultPath path, Result result) {
        List<String> known =
                ResultPath.quantities(result).stream().map(ResultPath::text).toList();
        return Words.nearest(path.text(), known).map(n -> "; did you mean \"" + n + "\"?");
    }
}
