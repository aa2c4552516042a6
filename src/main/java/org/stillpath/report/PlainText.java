package org.stillpath.report;

/** Text that came from a file, made safe and tidy for a terminal. */
public final class PlainText {
    private PlainText() {}

    /**
     * The text with every control character and every invisible mark that reorders text replaced by a blank, so that no
     * title or file name can move the cursor, colour the screen or hide what stands there.
     */
    public static String of(String text) {
        StringBuilder plain = new StringBuilder(text.length());
        text.codePoints().map(c -> harmless(c) ? c : ' ').forEach(plain::appendCodePoint);
        return plain.toString();
    }

    /**
     * The text broken at blanks into lines.
     *
     * @param first what the first line starts with
     * @param next what the further lines start with
     * @param width columns that no line exceeds, unless a single word does
     */
    public static String wrapped(String text, String first, String next, int width) {
        StringBuilder all = new StringBuilder();
        StringBuilder line = new StringBuilder(first);
        boolean empty = true;
        for (String word : of(text).strip().split(" +", -1)) {
            if (!empty && columns(line) + 1 + columns(word) > width) {
                all.append(line).append('\n');
                line = new StringBuilder(next);
                empty = true;
            }
            line.append(empty ? "" : " ").append(word);
            empty = false;
        }
        return all.append(line).append('\n').toString();
    }

    static int columns(CharSequence text) {
        return Character.codePointCount(text, 0, text.length());
    }

    private static boolean harmless(int c) {
        int type = Character.getType(c);
        return type != Character.CONTROL
                && type != Character.FORMAT
                && type != Character.LINE_SEPARATOR
                && type != Character.PARAGRAPH_SEPARATOR
                && type != Character.SURROGATE;
    }
}
