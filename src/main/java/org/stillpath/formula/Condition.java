package org.stillpath.formula;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;

/**
 * A condition on the place, such as {@code r < 1 mm}.
 *
 * @param text the comparison as written
 * @param margin positive where the condition holds, zero on its border; of any dimension
 */
public record Condition(String text, Formula margin) {
    /**
     * Reads comparisons joined by {@code and}: {@code abs(x) < 1.3 mm and z > 0}. Two in a row, as in {@code 0 < z < 5
     * mm}, are two conditions. Whether the border belongs to the region ({@code <=}) makes no difference here.
     *
     * @return at least one condition, in the order written
     * @throws FormulaException with the faults found
     */
    public static List<Condition> parse(String text, Names names) throws FormulaException {
        List<Condition> conditions = new ArrayList<>();
        for (Parser.Comparison c : new Parser(text, names).conditions()) {
            Tree small = c.less() ? c.left() : c.right();
            Tree large = c.less() ? c.right() : c.left();
            DimensionCheck.checkComparison(c.left(), c.right(), c.start());
            Tree margin = Tree.difference(large, small, c.start(), c.end());
            conditions.add(new Condition(text.substring(c.start(), c.end()), Formula.of(margin, Optional.empty())));
        }
        return List.copyOf(conditions);
    }
}
