package org.stillpath.problem;

import java.util.Collection;
import java.util.Locale;
import java.util.Optional;

/**
 * Finds the known word that a mistyped one was probably meant to be, for the "did you mean" of a message.
 *
 * <p>The distance is that of Damerau and Levenshtein restricted to neighbouring swaps: insertions, deletions,
 * replacements and swaps of neighbours count one each (Damerau, Comm. ACM 7 (1964) 171; Levenshtein, Sov. Phys. Dokl. 10
 * (1966) 707). Case does not count, so that {@code R} finds {@code r}. A word is offered only if no more than a third of
 * its letters (and at least one) differ; a wrong suggestion costs the reader more than none. The cost is the product of
 * the two lengths for each known word; words longer than {@value #LONGEST} code units are not compared.
 */
public final class Nearest {
    /** Longest word that is compared. */
    public static final int LONGEST = 64;

    private Nearest() {}

    /**
     * The known word nearest to {@code word}, the first in the collection's order where several are equally near.
     *
     * @return the nearest word; empty if none is near enough
     */
    public static Optional<String> of(String word, Collection<String> known) {
        if (word.isEmpty() || word.length() > LONGEST) {
            return Optional.empty();
        }
        String wanted = word.toLowerCase(Locale.ROOT);
        Optional<String> best = Optional.empty();
        int bestDistance = Integer.MAX_VALUE;
        for (String candidate : known) {
            int longest = Math.max(word.length(), candidate.length());
            if (candidate.length() > LONGEST) {
                continue;
            }
            int distance = distance(wanted, candidate.toLowerCase(Locale.ROOT));
            if (distance < bestDistance && distance < longest && distance <= Math.max(1, longest / 3)) {
                best = Optional.of(candidate);
                bestDistance = distance;
            }
        }
        return best;
    }

    /** Fewest insertions, deletions, replacements and swaps of neighbours that turn one word into the other. */
    static int distance(String a, String b) {
        int[] beforeLast = new int[b.length() + 1];
        int[] last = new int[b.length() + 1];
        int[] row = new int[b.length() + 1];
        for (int j = 0; j <= b.length(); j++) {
            last[j] = j;
        }
        for (int i = 1; i <= a.length(); i++) {
            row[0] = i;
            for (int j = 1; j <= b.length(); j++) {
                int replace = last[j - 1] + (a.charAt(i - 1) == b.charAt(j - 1) ? 0 : 1);
                row[j] = Math.min(replace, 1 + Math.min(last[j], row[j - 1]));
                if (i > 1 && j > 1 && a.charAt(i - 1) == b.charAt(j - 2) && a.charAt(i - 2) == b.charAt(j - 1)) {
                    row[j] = Math.min(row[j], 1 + beforeLast[j - 2]);
                }
            }
            int[] free = beforeLast;
            beforeLast = last;
            last = row;
            row = free;
        }
        return last[b.length()];
    }
}
