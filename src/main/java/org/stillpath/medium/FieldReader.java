package org.stillpath.medium;

import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.stillpath.formula.Formula;
import org.stillpath.formula.FormulaException;
import org.stillpath.formula.Names;
import org.stillpath.job.Value;
import org.stillpath.problem.Words;
import org.stillpath.unit.Kind;

/** Reads a quantity that may vary from place to place: a number with its unit, a formula, a profile or a grid. */
final class FieldReader {
    private final TableReader tables;
    private final FormulaCache cache;
    private final Names names;
    private final Map<String, Double> with;
    /** Whether all values of names could be read; formulas would only look wrong otherwise. */
    private final boolean sound;

    FieldReader(TableReader tables, FormulaCache cache, Names names, Map<String, Double> with, boolean sound) {
        this.tables = tables;
        this.cache = cache;
        this.names = names;
        this.with = with;
        this.sound = sound;
    }

    /**
     * Reads a quantity.
     *
     * @param kind what it is
     * @param usual how the values of a profile are joined where nothing is said
     * @param notes receives what was told about reading a file
     * @return empty after a fault
     */
    Optional<ScalarField> field(Value v, Kind kind, Interpolation usual, List<String> notes) {
        if (v.isPlaceholder()) {
            return Optional.empty();
        }
        if (v.isList()) {
            v.fault(kind.describe() + ", a formula, or a section such as {profile: {along: height, ..}} is needed, "
                    + "not a list");
            return Optional.empty();
        }
        if (v.isSection()) {
            Optional<TableReader.Read> read = tables.tabulated(v, kind, 0, usual);
            read.ifPresent(r -> notes.addAll(r.notes()));
            return read.map(TableReader.Read::field);
        }
        String text = v.text();
        if (text.isEmpty()) {
            v.fault(kind.describe() + " or a formula is needed, such as " + kind.example());
            return Optional.empty();
        }
        if (MediaReader.isQuantity(text, names.with().keySet())) {
            double q = v.quantity(kind);
            if (!kind.equals(Kind.NUMBER) && q <= 0) {
                v.fault(Words.quoted(text) + " does not do; " + kind.describe() + " above 0 is needed"
                        + (kind.equals(Kind.TEMPERATURE) ? ", in K or degC" : ""));
                return Optional.empty();
            }
            return Double.isNaN(q) ? Optional.empty() : Optional.of(new Constant(q));
        }
        if (!sound) {
            return Optional.empty();
        }
        try {
            Formula formula = cache.formula(text, names, kind.dimension());
            return Optional.of(FormulaField.of(formula, with));
        } catch (FormulaException e) {
            e.faults().forEach(f -> v.fault(f.offset(), f.message()));
            return Optional.empty();
        }
    }
}
