package org.stillpath.study;

import java.util.ArrayList;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import java.util.function.IntFunction;
import org.stillpath.job.Node;
import org.stillpath.task.Result;
import org.stillpath.task.ResultPath;

/** Runs as rows of a table: what sweeps and batches have in common. Mutable; for one thread. */
final class RunTable {
    private static final int MOST_TOLD = 5;

    private final String key;
    private final Bench bench;
    private final Crew.Runs runs;
    private final List<Listing.Column> inputs = new ArrayList<>();

    RunTable(String key, Bench bench, Crew.Runs runs) {
        this.key = key;
        this.bench = bench;
        this.runs = runs;
    }

    /** Adds a column before the results. */
    void input(Listing.Column column) {
        inputs.add(column);
    }

    /** That every run failed is a fault of the job, not a result. */
    void requireSome() {
        if (runs.having(Crew.Runs.FAILED) == runs.count()) {
            throw SweepStudy.nothing(bench, key, runs.fault(0));
        }
    }

    /** What is watched, with the units that the nominal result could not tell. */
    List<Watched> watched(IntFunction<Node.Mapping> job) {
        List<Watched> list = new ArrayList<>();
        for (int k = 0; k < bench.watch().size(); k++) {
            Watched w = bench.watch().get(k);
            int first = firstWith(k);
            if (w.unit().isEmpty() && first >= 0) {
                Optional<ResultPath.Found> found = w.path().find(bench.result(job.apply(first)));
                w = new Watched(w.path(), found.map(ResultPath.Found::unit).orElse(""), w.value(), w.error());
            }
            list.add(w);
        }
        return list;
    }

    private int firstWith(int which) {
        for (int i = 0; i < runs.count(); i++) {
            if (!Double.isNaN(runs.result(i, which))) {
                return i;
            }
        }
        return -1;
    }

    /** Adds results and fault of a run to its row of the document. */
    void finishRow(Doc.Builder row, int number) {
        row.put("results", Doc.Items.numbers(runs.results(number)));
        if (!runs.fault(number).isEmpty()) {
            row.put("fault", runs.fault(number));
        }
    }

    /** The whole table. */
    Listing listing(List<Watched> watch) {
        List<Listing.Column> columns = new ArrayList<>(inputs);
        for (int k = 0; k < watch.size(); k++) {
            Watched w = watch.get(k);
            columns.add(new Listing.Numbers(w.path().text(), w.unitOrOne(), "", runs.column(k), w.error()));
        }
        if (runs.having(Crew.Runs.FAILED) > 0) {
            List<String> faults = new ArrayList<>();
            for (int i = 0; i < runs.count(); i++) {
                faults.add(runs.fault(i));
            }
            columns.add(new Listing.Texts("fault", faults));
        }
        String heading = SweepStudy.capital(key) + (bench.variant().isEmpty() ? "" : ", variant " + bench.variant());
        // the warnings tell faults too, and no line of a terminal is long enough for them
        return new Listing(bench.stem(key), heading, columns, List.of("fault"));
    }

    /**
     * What must be told of the runs.
     *
     * @param said a run for people
     * @param job a run's job
     */
    List<String> warnings(IntFunction<String> said, IntFunction<Node.Mapping> job) {
        List<String> list = new ArrayList<>();
        int failed = runs.having(Crew.Runs.FAILED);
        if (failed > 0) {
            list.add(failed + " of " + runs.count() + " runs could not be computed; the others stand");
            int told = 0;
            for (int i = 0; i < runs.count() && told < MOST_TOLD; i++) {
                if (!runs.fault(i).isEmpty()) {
                    list.add(said.apply(i) + ": " + runs.fault(i));
                    told++;
                }
            }
            if (failed > told) {
                list.add("and " + (failed - told) + " more: see the column \"fault\"");
            }
        }
        for (int k = 0; k < bench.watch().size(); k++) {
            int missing = -failed;
            for (int i = 0; i < runs.count(); i++) {
                missing += Double.isNaN(runs.result(i, k)) ? 1 : 0;
            }
            ResultPath path = bench.watch().get(k).path();
            if (missing == runs.count() - failed) {
                list.add("no run has a result " + path.text() + "; this task gives "
                        + String.join(
                                ", ",
                                ResultPath.quantities(bench.nominal()).stream()
                                        .map(ResultPath::text)
                                        .toList()));
            } else if (missing > 0) {
                list.add(missing + " of " + runs.count() + " runs have no " + path.label());
            }
        }
        int inaccurate = runs.having(Crew.Runs.INACCURATE);
        if (inaccurate > 0) {
            list.add(inaccurate + " of " + runs.count() + " runs did not reach the asked accuracy, the first at "
                    + said.apply(runs.first(Crew.Runs.INACCURATE)));
        }
        int warned = runs.having(Crew.Runs.WARNED);
        if (warned > 0) {
            int first = runs.first(Crew.Runs.WARNED);
            list.add(warned + " of " + runs.count() + " runs warn of what the job's own values do not; the first, "
                    + said.apply(first) + ": " + String.join("; ", anew(bench.result(job.apply(first)))));
        }
        return list;
    }

    private Set<String> anew(Result result) {
        Set<String> list = new LinkedHashSet<>(result.warnings());
        list.removeAll(bench.nominal().warnings());
        return list;
    }
}
