package org.stillpath.study;

import java.util.ArrayList;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Set;
import org.stillpath.task.Figure;
import org.stillpath.task.Result;
import org.stillpath.task.Table;

/**
 * A job's result with what its studies found.
 *
 * @param nominal the task's own result at the job's own values
 * @param findings what the studies found; empty for a job without one
 * @param doc the part {@code study} of the result document
 * @param result the nominal result with the studies' answer, tables, figures and warnings added to its own
 */
public record Outcome(Result nominal, List<Finding> findings, Doc.Fields doc, Result result) {
    public Outcome {
        findings = List.copyOf(findings);
    }

    /** A result without a study. */
    public static Outcome of(Result result) {
        return new Outcome(result, List.of(), Doc.Fields.none(), result);
    }

    /** A result with its studies. */
    static Outcome of(Result nominal, List<Finding> findings, Doc.Fields doc) {
        List<Table> tables = new ArrayList<>(nominal.tables());
        List<Figure> figures = new ArrayList<>();
        Set<String> warnings = new LinkedHashSet<>(nominal.warnings());
        boolean accurate = nominal.accuracyReached();
        for (Finding f : findings) {
            f.listings().forEach(l -> tables.add(l.table()));
            figures.addAll(f.figures());
            warnings.addAll(f.warnings());
            accurate &= f.accurate();
        }
        figures.addAll(nominal.figures());
        String headline =
                String.join(". ", findings.stream().map(Finding::headline).toList());
        return new Outcome(
                nominal, findings, doc, nominal.with(headline, tables, figures, List.copyOf(warnings), accurate));
    }

    /** Tables of the studies. */
    public List<Listing> listings() {
        return findings.stream().flatMap(f -> f.listings().stream()).toList();
    }

    /** The answers of the studies, one a sentence; the nominal one for a job without a study. */
    public List<String> headlines() {
        return findings.isEmpty()
                ? List.of(nominal.headline())
                : findings.stream().map(Finding::headline).toList();
    }
}
