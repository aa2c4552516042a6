package org.stillpath.formula;

import java.util.ArrayList;
import java.util.List;
import org.jspecify.annotations.Nullable;

/**
 * A parsed formula: its terms in postfix order, so that the operands of a term stand before it, the terms of every
 * subtree are neighbours, and the last term is the whole.
 *
 * @param text the whole text that was parsed
 * @param terms the terms
 * @param starts for each term, where its text starts
 * @param ends for each term, where its text ends
 * @param sizes for each term, how many terms its subtree has, itself included
 * @param arguments names of the values that may be mentioned, by {@link Term.Argument#index()}
 */
record Tree(
        String text,
        List<Term> terms,
        List<Integer> starts,
        List<Integer> ends,
        List<Integer> sizes,
        List<String> arguments) {
    Tree {
        terms = List.copyOf(terms);
        starts = List.copyOf(starts);
        ends = List.copyOf(ends);
        sizes = List.copyOf(sizes);
        arguments = List.copyOf(arguments);
    }

    int size() {
        return terms.size();
    }

    int root() {
        return terms.size() - 1;
    }

    /** The text of a term, without parentheses around it. */
    String text(int term) {
        return text.substring(starts.get(term), ends.get(term));
    }

    /** The text of the whole, which is less than {@link #text()} if this is a part of another tree. */
    String rootText() {
        return text(root());
    }

    /** The subtree of a term as a tree of its own. */
    Tree part(int term) {
        Builder b = new Builder(text, arguments);
        b.copy(this, term);
        return b.build();
    }

    /**
     * What stands for a term: another term below it, or itself.
     *
     * @param term the term that is kept
     * @param negated whether with the other sign
     */
    record Choice(int term, boolean negated) {}

    /** This tree with some terms replaced by terms below them; {@code choices} is null where a term stays. */
    Tree choosing(@Nullable Choice[] choices) {
        boolean[] kept = new boolean[size()];
        kept[root()] = true;
        for (int i = root(); i >= 0; i--) {
            if (kept[i]) {
                Choice choice = choices[i];
                if (choice != null && choice.term() != i) {
                    kept[choice.term()] = true;
                } else {
                    for (int o : operands(terms.get(i))) {
                        kept[o] = true;
                    }
                }
            }
        }
        Builder b = new Builder(text, arguments);
        int[] at = new int[size()];
        for (int i = 0; i < size(); i++) {
            if (!kept[i]) {
                continue;
            }
            Choice choice = choices[i];
            if (choice == null || choice.term() == i) {
                int size = 1;
                for (int o : operands(terms.get(i))) {
                    size += b.size(at[o]);
                }
                at[i] = b.add(moved(terms.get(i), at), starts.get(i), ends.get(i), size);
            } else if (choice.negated()) {
                int operand = at[choice.term()];
                at[i] = b.add(new Term.Negative(operand), starts.get(i), ends.get(i), 1 + b.size(operand));
            } else {
                at[i] = at[choice.term()];
            }
        }
        return b.build();
    }

    private static int[] operands(Term term) {
        if (term instanceof Term.Negative t) {
            return new int[] {t.operand()};
        } else if (term instanceof Term.Binary t) {
            return new int[] {t.left(), t.right()};
        } else if (term instanceof Term.Call t) {
            return new int[] {t.operand()};
        } else if (term instanceof Term.Pair t) {
            return new int[] {t.left(), t.right()};
        }
        return new int[0];
    }

    /** A term whose operands have moved to other places. */
    private static Term moved(Term term, int[] at) {
        if (term instanceof Term.Negative t) {
            return new Term.Negative(at[t.operand()]);
        } else if (term instanceof Term.Binary t) {
            return new Term.Binary(t.operator(), at[t.left()], at[t.right()]);
        } else if (term instanceof Term.Call t) {
            return new Term.Call(t.function(), at[t.operand()]);
        } else if (term instanceof Term.Pair t) {
            return new Term.Pair(t.function(), at[t.left()], at[t.right()]);
        }
        return term;
    }

    /** The difference of two trees over the same text, with the given part of it as its own text. */
    static Tree difference(Tree left, Tree right, int start, int end) {
        Builder b = new Builder(left.text, left.arguments);
        int l = b.copy(left, left.root());
        int r = b.copy(right, right.root());
        b.add(new Term.Binary(Term.Operator.MINUS, l, r), start, end, left.size() + right.size() + 1);
        return b.build();
    }

    /** Collects terms in postfix order. */
    static final class Builder {
        private final String text;
        private final List<String> arguments;
        private final List<Term> terms = new ArrayList<>();
        private final List<Integer> starts = new ArrayList<>();
        private final List<Integer> ends = new ArrayList<>();
        private final List<Integer> sizes = new ArrayList<>();

        Builder(String text, List<String> arguments) {
            this.text = text;
            this.arguments = arguments;
        }

        int add(Term term, int start, int end, int size) {
            terms.add(term);
            starts.add(start);
            ends.add(end);
            sizes.add(size);
            return terms.size() - 1;
        }

        int size(int term) {
            return sizes.get(term);
        }

        /** Moves the end of a term's text. */
        void setEnd(int term, int end) {
            ends.set(term, end);
        }

        int copy(Tree from, int root) {
            int first = root - from.sizes.get(root) + 1;
            int shift = terms.size() - first;
            int[] at = new int[root + 1];
            for (int i = first; i <= root; i++) {
                at[i] = i + shift;
                add(moved(from.terms.get(i), at), from.starts.get(i), from.ends.get(i), from.sizes.get(i));
            }
            return root + shift;
        }

        Tree build() {
            return new Tree(text, terms, starts, ends, sizes, arguments);
        }
    }
}
