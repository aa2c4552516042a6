package org.stillpath.medium;

import java.util.List;
import java.util.Map;
import java.util.concurrent.ConcurrentHashMap;
import org.stillpath.formula.Condition;
import org.stillpath.formula.Formula;
import org.stillpath.formula.FormulaException;
import org.stillpath.formula.Names;
import org.stillpath.unit.Dimension;

/**
 * Formulas that were understood once, by text and by what they may mention. A study that reads the same job many times
 * with other {@code with} values hands one cache to every reading, so that each formula is parsed and differentiated once.
 * May be shared between threads. Faults are not kept.
 */
public final class FormulaCache {
    private record Key(String text, Names names, Dimension dimension) {}

    private final Map<Key, Formula> formulas = new ConcurrentHashMap<>();
    private final Map<Key, List<Condition>> conditions = new ConcurrentHashMap<>();

    /** The formula of a text, as {@link Formula#parse} gives it. */
    Formula formula(String text, Names names, Dimension dimension) throws FormulaException {
        Key key = new Key(text, names, dimension);
        Formula known = formulas.get(key);
        if (known == null) {
            known = Formula.parse(text, names, dimension);
            formulas.put(key, known);
        }
        return known;
    }

    /** The conditions of a text, as {@link Condition#parse} gives them. */
    List<Condition> conditions(String text, Names names) throws FormulaException {
        Key key = new Key(text, names, Dimension.NONE);
        List<Condition> known = conditions.get(key);
        if (known == null) {
            known = Condition.parse(text, names);
            conditions.put(key, known);
        }
        return known;
    }

    /** Number of different formulas and conditions that were parsed. */
    int size() {
        return formulas.size() + conditions.size();
    }
}
