package org.stillpath.formula;

import java.util.ArrayList;
import java.util.HashSet;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import java.util.Set;
import org.stillpath.formula.Term.Operator;
import org.stillpath.problem.Words;
import org.stillpath.unit.Decimal;
import org.stillpath.unit.Dimension;
import org.stillpath.unit.Units;

/**
 * Text to tree by recursive descent, one method a rule of the grammar in the package's documentation. The depth of
 * nesting is bounded, so the descent is; everything that may be long (sums, products) is a loop. A fault of syntax ends
 * the parsing, because what follows would be guesswork; unknown names are collected.
 */
final class Parser {
    /** Words that people write for functions and names that are spelled otherwise here. */
    private static final Map<String, String> HINTS = Map.ofEntries(
            Map.entry("ln", "the natural logarithm is written log(..)"),
            Map.entry("lg", "the decimal logarithm is written log10(..)"),
            Map.entry("arcsin", "the arc sine is written asin(..)"),
            Map.entry("arccos", "the arc cosine is written acos(..)"),
            Map.entry("arctan", "the arc tangent is written atan(..)"),
            Map.entry("pow", "a power is written a^b"),
            Map.entry("sqr", "a square is written a^2"),
            Map.entry("e", "the exponential is written exp(..)"),
            Map.entry("lambda", "the vacuum wavelength is written wavelength"));

    private final String text;
    private final Names names;
    private final List<String> with;
    private final Set<String> called = new HashSet<>();
    private final List<FormulaException.Fault> faults = new ArrayList<>();
    private Tree.Builder tree;
    private int pos;
    private int depth;
    /** Where the operand just read starts and ends, its parentheses included. */
    private int start;

    private int end;

    Parser(String text, Names names) throws FormulaException {
        if (text.length() > Formula.LONGEST_TEXT) {
            throw new FormulaException(
                    Formula.LONGEST_TEXT,
                    "the formula has " + text.length() + " characters; at most " + Formula.LONGEST_TEXT
                            + " are read; move parts of it into `with` values");
        }
        this.text = text;
        this.names = names;
        this.with = List.copyOf(names.with().keySet());
        this.tree = new Tree.Builder(text, with);
        findCalls();
    }

    /** The whole text as one formula. */
    Tree formula() throws FormulaException {
        sum();
        if (pos < text.length()) {
            throw unexpected();
        }
        throwIfAny();
        return tree.build();
    }

    /** A comparison of two trees. */
    record Comparison(Tree left, boolean less, Tree right, int start, int end) {}

    /** The whole text as comparisons joined by {@code and}; {@code 0 < a < b} is two of them. */
    List<Comparison> conditions() throws FormulaException {
        List<Comparison> found = new ArrayList<>();
        do {
            Tree left = comparand();
            int leftStart = start;
            Optional<Boolean> less = comparison();
            if (less.isEmpty()) {
                throw pos < text.length()
                        ? unexpected()
                        : new FormulaException(pos, "a condition compares, as in r < 1 mm; `<` or `>` is missing");
            }
            while (less.isPresent()) {
                Tree right = comparand();
                found.add(new Comparison(left, less.get(), right, leftStart, end));
                left = right;
                leftStart = start;
                less = comparison();
            }
        } while (word(Names.AND));
        if (pos < text.length()) {
            throw word("or")
                    ? new FormulaException(pos - 2, "conditions are joined by `and`; there is no `or`")
                    : unexpected();
        }
        throwIfAny();
        return found;
    }

    private Tree comparand() throws FormulaException {
        tree = new Tree.Builder(text, with);
        sum();
        return tree.build();
    }

    private Optional<Boolean> comparison() {
        skipBlanks();
        if (pos < text.length()) {
            char c = text.charAt(pos);
            if (c == '<' || c == '>') {
                pos += pos + 1 < text.length() && text.charAt(pos + 1) == '=' ? 2 : 1;
                return Optional.of(c == '<');
            }
            if (c == '≤' || c == '≥') {
                pos++;
                return Optional.of(c == '≤');
            }
        }
        return Optional.empty();
    }

    private boolean word(String wanted) {
        skipBlanks();
        if (nameAt(pos).equals(wanted)) {
            pos += wanted.length();
            return true;
        }
        return false;
    }

    private void throwIfAny() throws FormulaException {
        if (!faults.isEmpty()) {
            throw new FormulaException(faults);
        }
    }

    private int sum() throws FormulaException {
        int left = product();
        int from = start;
        while (true) {
            Operator operator = take('+') ? Operator.PLUS : take('-') ? Operator.MINUS : Operator.POWER;
            if (operator == Operator.POWER) {
                start = from;
                return left;
            }
            int right = product();
            left = binary(operator, left, right, from);
        }
    }

    private int product() throws FormulaException {
        int left = signed();
        int from = start;
        while (true) {
            Operator operator = take('*') ? Operator.TIMES : take('/') ? Operator.OVER : Operator.POWER;
            if (operator == Operator.POWER) {
                start = from;
                return left;
            }
            int right = signed();
            left = binary(operator, left, right, from);
        }
    }

    private int signed() throws FormulaException {
        skipBlanks();
        int from = pos;
        if (take('-')) {
            if (isTemperaturePoint()) {
                return number(from, "-");
            }
            deeper(from);
            int operand = signed();
            depth--;
            start = from;
            return tree.add(new Term.Negative(operand), from, end, tree.size(operand) + 1);
        }
        if (take('+')) {
            deeper(from);
            int operand = signed();
            depth--;
            start = from;
            return operand;
        }
        return power();
    }

    private int power() throws FormulaException {
        int base = atom();
        int from = start;
        skipBlanks();
        int caret = pos;
        if (!take('^')) {
            return base;
        }
        deeper(caret);
        int exponent = signed();
        depth--;
        return binary(Operator.POWER, base, exponent, from);
    }

    private int binary(Operator operator, int left, int right, int from) {
        start = from;
        return tree.add(new Term.Binary(operator, left, right), from, end, tree.size(left) + tree.size(right) + 1);
    }

    private int atom() throws FormulaException {
        skipBlanks();
        if (pos >= text.length()) {
            throw new FormulaException(
                    pos,
                    text.isBlank() ? "the formula is empty" : "the formula ends where a number or a name is needed");
        }
        char c = text.charAt(pos);
        if (c == '(') {
            int from = pos;
            pos++;
            deeper(from);
            int inner = sum();
            depth--;
            close(from);
            start = from;
            end = pos;
            return inner;
        }
        if ((c >= '0' && c <= '9') || c == '.') {
            return number(pos, "");
        }
        if (Names.isNameStart(c)) {
            return name();
        }
        throw unexpected();
    }

    /** Whether a number in degC comes next: its minus sign belongs to it, since -20 degC is not minus 293.15 K. */
    private boolean isTemperaturePoint() {
        skipBlanks();
        int i = Decimal.end(text, pos);
        boolean digits = i > pos && text.charAt(pos) != '-' && text.charAt(pos) != '+';
        while (i < text.length() && Character.isWhitespace(text.charAt(i))) {
            i++;
        }
        return digits
                && Units.scan(text, i, this::isName)
                        .filter(s -> s.unit().offset() != 0)
                        .isPresent();
    }

    private int number(int from, String sign) throws FormulaException {
        int numberEnd = Decimal.end(text, pos);
        if (numberEnd == pos) {
            throw unexpected();
        }
        String digits = sign + text.substring(pos, numberEnd);
        pos = numberEnd;
        end = pos;
        skipBlanks();
        int unitStart = pos;
        Optional<Units.Scan> scan = Units.scan(text, pos, this::isName);
        double value;
        Dimension dimension = Dimension.NONE;
        boolean bare = scan.isEmpty();
        boolean point = false;
        if (scan.isPresent()) {
            pos = scan.get().end();
            end = pos;
            if (unitStart == numberEnd && !"%°'\"′″".contains(text.substring(unitStart, unitStart + 1))) {
                faults.add(new FormulaException.Fault(
                        from,
                        "`" + text.substring(from, pos) + "`: a blank is needed between a number and its unit: "
                                + digits + " " + text.substring(unitStart, pos)));
            }
            value = scan.get().unit().toSi(digits);
            dimension = scan.get().unit().dimension();
            point = scan.get().unit().offset() != 0;
        } else {
            value = Double.parseDouble(digits);
            if (pos < text.length() && (Names.isNameStart(text.charAt(pos)) || text.charAt(pos) == '°')) {
                throw afterNumber(from, digits);
            }
        }
        if (!Double.isFinite(value)) {
            throw new FormulaException(from, "`" + text.substring(from, end) + "` is beyond the range of numbers");
        }
        start = from;
        return tree.add(new Term.Constant(value, dimension, bare, point), from, end, 1);
    }

    private FormulaException afterNumber(int from, String digits) {
        String word = nameAt(pos);
        if (word.equals(Names.AND) || word.equals("or")) {
            return unexpected();
        }
        if (isName(word) || Function.of(word).isPresent()) {
            return new FormulaException(
                    pos,
                    "`" + text.substring(from, pos + word.length()) + "`: a product is written with *: " + digits + "*"
                            + word);
        }
        if (word.isEmpty()) {
            return unexpected();
        }
        String hint = Words.nearest(word, Units.symbols())
                .map(s -> "; did you mean `" + digits + " " + s + "`?")
                .orElse("; a product is written with *");
        return new FormulaException(pos, "`" + word + "` is neither a unit nor a known name" + hint);
    }

    private int name() throws FormulaException {
        int from = pos;
        String word = nameAt(pos);
        pos += word.length();
        end = pos;
        start = from;
        Optional<Function> function = Function.of(word);
        if (function.isPresent()) {
            return call(function.get(), from);
        }
        if (word.equals(Names.PI)) {
            return tree.add(new Term.Constant(Math.PI, Dimension.NONE, true, false), from, end, 1);
        }
        int index = with.indexOf(word);
        if (index >= 0) {
            Dimension dimension = Objects.requireNonNull(names.with().get(word));
            return tree.add(new Term.Argument(index, dimension), from, end, 1);
        }
        Optional<Coordinate> coordinate = Coordinate.of(word);
        if (coordinate.isPresent()) {
            if (!names.coordinates().contains(coordinate.get())) {
                faults.add(new FormulaException.Fault(
                        from,
                        "`" + word + "` has no meaning here"
                                + (coordinate.get().charted() ? "; it is known along a sightline only" : "")));
            }
            return tree.add(new Term.Position(coordinate.get()), from, end, 1);
        }
        faults.add(new FormulaException.Fault(from, unknown(word)));
        if (pos < text.length() && text.charAt(pos) == '(') {
            throw new FormulaException(faults);
        }
        return tree.add(new Term.Unknown(), from, end, 1);
    }

    private String unknown(String word) {
        String hint = HINTS.get(word);
        if (hint == null) {
            hint = Words.nearest(word, names.words())
                    .map(n -> "did you mean `" + n + "`?")
                    .orElse(
                            pos < text.length() && text.charAt(pos) == '('
                                    ? "no function has this name"
                                    : "give its value under `with`");
        }
        return "unknown name `" + word + "`; " + hint;
    }

    private int call(Function function, int from) throws FormulaException {
        skipBlanks();
        int open = pos;
        if (!take('(')) {
            throw new FormulaException(
                    from,
                    "`" + function.word() + "` is a function; its operand stands in parentheses: " + function.word()
                            + "(..)");
        }
        deeper(open);
        int count = 1;
        int result = sum();
        List<Integer> pairs = new ArrayList<>();
        while (take(',')) {
            count++;
            int next = sum();
            if (count <= function.most()) {
                result = tree.add(
                        new Term.Pair(function, result, next), from, end, tree.size(result) + tree.size(next) + 1);
                pairs.add(result);
            }
        }
        depth--;
        close(open);
        end = pos;
        start = from;
        if (count < function.fewest() || count > function.most()) {
            String wanted = function.fewest() == function.most()
                    ? (function.most() == 1 ? "one operand" : "two operands")
                    : "two operands or more";
            throw new FormulaException(
                    from,
                    "`" + text.substring(from, pos) + "`: " + function.word() + " needs " + wanted + ", not " + count
                            + (function.most() == 1 ? "; is the comma a decimal comma?" : ""));
        }
        if (function.most() == 1) {
            return tree.add(new Term.Call(function, result), from, end, tree.size(result) + 1);
        }
        for (int pair : pairs) {
            tree.setEnd(pair, end);
        }
        return result;
    }

    private void close(int open) throws FormulaException {
        if (!take(')')) {
            if (pos >= text.length()) {
                throw new FormulaException(open, "the parenthesis opened here is not closed");
            }
            throw unexpected();
        }
    }

    private void deeper(int offset) throws FormulaException {
        depth++;
        if (depth > Formula.DEEPEST_NESTING) {
            throw new FormulaException(
                    offset, "the formula is nested more than " + Formula.DEEPEST_NESTING + " levels deep here");
        }
    }

    private FormulaException unexpected() {
        skipBlanks();
        if (pos >= text.length()) {
            return new FormulaException(pos, "the formula ends too early");
        }
        int point = text.codePointAt(pos);
        String c = Character.toString(point);
        String word = nameAt(pos);
        if (!word.isEmpty()) {
            return new FormulaException(
                    pos, "an operator is missing before `" + word + "`; a product is written with *");
        }
        String remedy =
                switch (c) {
                    case "*" -> pos > 0 && text.charAt(pos - 1) == '*' ? "a power is written with ^" : "";
                    case "×", "·", "⋅", "∙" -> "a product is written with *";
                    case "÷", ":" -> "a quotient is written with /";
                    case "²", "³", "⁴" -> "a power is written with ^";
                    case "−", "–" -> "a minus is written with -";
                    case "√" -> "a square root is written sqrt(..)";
                    case "," -> "a decimal point is written with . and only functions of two operands have commas";
                    case "[", "{" -> "parentheses are written with ( and )";
                    case "=", "!", "&", "|" -> "a formula has no comparisons; `valid` has < and > and `and`";
                    case "<", ">", "≤", "≥" -> "a formula has no comparisons; `valid` has";
                    case ")" -> "no parenthesis is open here";
                    case "(" -> "an operator is missing before it";
                    default -> point >= '0' && point <= '9' ? "an operator is missing before it" : "";
                };
        return new FormulaException(pos, "unexpected `" + c + "`" + (remedy.isEmpty() ? "" : "; " + remedy));
    }

    private boolean take(char c) {
        skipBlanks();
        if (pos < text.length() && text.charAt(pos) == c) {
            pos++;
            return true;
        }
        return false;
    }

    private void skipBlanks() {
        while (pos < text.length() && (Character.isWhitespace(text.charAt(pos)) || text.charAt(pos) == '\u00a0')) {
            pos++;
        }
    }

    /** The name that starts at {@code from}; empty if none does. */
    private String nameAt(int from) {
        if (from >= text.length() || !Names.isNameStart(text.charAt(from))) {
            return "";
        }
        int last = from + 1;
        while (last < text.length() && Names.isNamePart(text.charAt(last))) {
            last++;
        }
        return text.substring(from, last);
    }

    /** Functions are names, for the reading of units, where they are called: {@code min} is also a minute. */
    private void findCalls() {
        for (int i = 0; i < text.length(); i++) {
            String word = nameAt(i);
            if (!word.isEmpty()) {
                i += word.length() - 1;
                if (i + 1 < text.length() && text.charAt(i + 1) == '(') {
                    called.add(word);
                }
            }
        }
    }

    private boolean isName(String word) {
        return with.contains(word)
                || word.equals(Names.PI)
                || Coordinate.of(word).isPresent()
                || (called.contains(word) && Function.of(word).isPresent());
    }
}
