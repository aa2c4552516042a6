package org.stillpath.problem;

import java.util.Collection;
import java.util.Locale;
import java.util.Optional;
import org.jspecify.annotations.Nullable;

/**
 * The two things every message needs: a value quoted safely, and the word that was probably meant.
 *
 * <p>Nearness is the edit distance with neighbouring letters swapped counted once (Damerau 1964, restricted form), which
 * catches the slips people make at a keyboard. It costs the product of both lengths and runs only when something is
 * already wrong.
 */
public final class Words {
    /** More of a value than this is never quoted. */
    private static final int QUOTE_LIMIT = 60;

    private Words() {}

    /**
     * The known word nearest to {@code word}, if one is near enough to have been meant: at most one slip in three
     * letters, capitals not counted. Capitals, then the order given, decide between equally near ones.
     */
    public static Optional<String> nearest(String word, Collection<String> known) {
        String given = shorten(word, QUOTE_LIMIT).toLowerCase(Locale.ROOT);
        @Nullable String best = null;
        // capitals decide between words that are equally near without them
        int least = 1000 * (Math.max(1, given.length() / 3) + 1);
        for (String candidate : known) {
            int d = distance(given, candidate.toLowerCase(Locale.ROOT));
            int rank = 1000 * d + Math.min(999, distance(word.length() > 200 ? given : word, candidate));
            if (rank < least && d < Math.max(given.length(), candidate.length())) {
                least = rank;
                best = candidate;
            }
        }
        return Optional.ofNullable(best);
    }

    /**
     * {@code ; did you mean "aperture"?}, or, where nothing is near, {@code ; known here: at, gap, lens}. Empty where
     * nothing is known.
     */
    public static String remedy(String word, Collection<String> known) {
        Optional<String> near = nearest(word, known);
        if (near.isPresent()) {
            return "; did you mean \"" + near.get() + "\"?";
        }
        return known.isEmpty() ? "" : "; known here: " + shorten(String.join(", ", known), 400);
    }

    /** A value in double quotes, cut to a sensible length, control characters made visible. */
    public static String quoted(String value) {
        String cut = shorten(value, QUOTE_LIMIT);
        StringBuilder b = new StringBuilder(cut.length() + 2).append('"');
        for (int i = 0; i < cut.length(); i++) {
            char c = cut.charAt(i);
            if (c == '\n') {
                b.append("\\n");
            } else if (c == '\t') {
                b.append("\\t");
            } else if (Character.isISOControl(c)
                    || c == '\u2028'
                    || c == '\u2029'
                    || Character.getType(c) == Character.FORMAT) {
                b.append(String.format(Locale.ROOT, "\\u%04X", (int) c));
            } else {
                b.append(c);
            }
        }
        return b.append('"').toString();
    }

    private static String shorten(String text, int limit) {
        if (text.codePointCount(0, text.length()) <= limit) {
            return text;
        }
        return text.substring(0, text.offsetByCodePoints(0, limit)) + "…";
    }

    /** Restricted Damerau-Levenshtein distance in UTF-16 units. */
    static int distance(String a, String b) {
        int[] before = new int[b.length() + 1];
        int[] last = new int[b.length() + 1];
        int[] row = new int[b.length() + 1];
        for (int j = 0; j <= b.length(); j++) {
            last[j] = j;
        }
        for (int i = 1; i <= a.length(); i++) {
            row[0] = i;
            for (int j = 1; j <= b.length(); j++) {
                int replace = last[j - 1] + (a.charAt(i - 1) == b.charAt(j - 1) ? 0 : 1);
                int d = Math.min(replace, Math.min(last[j], row[j - 1]) + 1);
                if (i > 1 && j > 1 && a.charAt(i - 1) == b.charAt(j - 2) && a.charAt(i - 2) == b.charAt(j - 1)) {
                    d = Math.min(d, before[j - 2] + 1);
                }
                row[j] = d;
            }
            int[] free = before;
            before = last;
            last = row;
            row = free;
        }
        return last[b.length()];
    }
}
