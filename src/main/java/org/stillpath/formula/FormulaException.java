package org.stillpath.formula;

import java.util.List;
import java.util.stream.Collectors;

/** A formula that cannot be understood: all its faults at once. Checked, because the text is a user's. */
public final class FormulaException extends Exception {
    private static final long serialVersionUID = 1L;

    private final transient List<Fault> faults;

    /**
     * One fault.
     *
     * @param offset where in the formula's text it stands, in UTF-16 code units from 0
     * @param message what is wrong, quoting the part of the formula, with the remedy where there is one
     */
    public record Fault(int offset, String message) {}

    FormulaException(List<Fault> faults) {
        super(faults.stream().map(Fault::message).collect(Collectors.joining("\n")));
        if (faults.isEmpty()) {
            throw new IllegalArgumentException("faults must not be empty");
        }
        this.faults = List.copyOf(faults);
    }

    FormulaException(int offset, String message) {
        this(List.of(new Fault(offset, message)));
    }

    /** The faults, at least one, in the order of their offsets. */
    public List<Fault> faults() {
        return faults;
    }
}
