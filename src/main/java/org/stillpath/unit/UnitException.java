package org.stillpath.unit;

/** A text is not a quantity. Checked, because the caller knows the place and must add it. */
public final class UnitException extends Exception {
    private static final long serialVersionUID = 1L;

    private final int offset;

    /** A fault at a character of the text. */
    public UnitException(String message, int offset) {
        super(message);
        this.offset = offset;
    }

    /** Where in the text, in characters from its start. */
    public int offset() {
        return offset;
    }
}
