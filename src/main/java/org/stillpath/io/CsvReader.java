package org.stillpath.io;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.OptionalDouble;
import org.jspecify.annotations.Nullable;
import org.stillpath.job.Table;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;
import org.stillpath.unit.Decimal;

/**
 * CSV text to a table of numbers: RFC 4180 with its quotes, and what European spreadsheets make of it: a byte-order
 * mark, semicolons or tabs between columns, decimal commas. Whatever departs from the standard is told in the table's
 * notes; whatever could be read in two ways is a fault.
 *
 * <p>The first line names the columns, each with its unit in brackets. A column in which most cells are numbers must
 * hold numbers only: an empty cell, {@code NaN} or a word is a fault with line, column and row. A column with more words
 * than numbers is carried along as words. Lines that start with {@code #} before the header and blank lines are left
 * out. The text is walked twice, once to learn what each column holds and once to fill arrays of the right size; that
 * costs a second pass and saves boxing.
 */
final class CsvReader {
    /** Most bytes of a table. */
    static final int MOST_BYTES = 64 << 20;
    /** Most cells of a table. */
    static final int MOST_CELLS = 4_000_000;
    /** Most columns of a table. */
    static final int MOST_COLUMNS = 1_000;

    private final String text;
    private final String source;
    private final Problems problems = new Problems();
    private char separator;

    private int pos;
    private int line = 1;
    private int lineStart;

    /** The cell read last. */
    private String cell = "";

    private int cellLine;
    private int cellColumn;
    /** Whether the cell read last was the last of its line. */
    private boolean lineEnds;

    private CsvReader(String text, String source) {
        this.text = text;
        this.source = source;
    }

    /**
     * Reads a table.
     *
     * @param bytes the file
     * @param source its name, for places
     * @throws ProblemException with all that is wrong with it
     */
    static Table read(byte[] bytes, String source) {
        return new CsvReader(FileText.decode(bytes, source), source).table();
    }

    private Table table() {
        List<String> notes = new ArrayList<>();
        if (text.startsWith("\ufeff")) {
            pos = 1;
            lineStart = 1;
            notes.add("a byte-order mark was skipped");
        }
        int comments = skipComments();
        if (comments > 0) {
            notes.add(comments + (comments == 1 ? " line" : " lines") + " of comment before the header left out");
        }
        if (pos >= text.length()) {
            throw fault(new Place(source, 1, 1), "the table is empty; a header line and rows of numbers are needed");
        }
        separator = separator();
        if (separator != ',') {
            notes.add((separator == ';' ? "semicolons" : "tabs") + " separate the columns");
        }
        List<String> headers = new ArrayList<>();
        List<String> units = new ArrayList<>();
        header(headers, units);
        int columns = headers.size();
        int bodyPos = pos;
        int bodyLine = line;

        boolean[] words = new boolean[columns];
        int rows = survey(headers, words, notes);
        problems.throwIfAny();

        pos = bodyPos;
        line = bodyLine;
        lineStart = bodyPos;
        return filled(headers, units, words, rows, notes);
    }

    private Table filled(List<String> headers, List<String> units, boolean[] words, int rows, List<String> notes) {
        int columns = headers.size();
        List<double[]> numbers = new ArrayList<>();
        Map<String, List<String>> texts = new LinkedHashMap<>();
        List<String> numberHeaders = new ArrayList<>();
        List<String> numberUnits = new ArrayList<>();
        List<@Nullable List<String>> textOf = new ArrayList<>();
        List<double[]> numberOf = new ArrayList<>();
        for (int c = 0; c < columns; c++) {
            if (words[c]) {
                List<String> list = new ArrayList<>(rows);
                texts.put(headers.get(c), list);
                textOf.add(list);
                numberOf.add(new double[0]);
            } else {
                double[] column = new double[rows];
                numbers.add(column);
                numberHeaders.add(headers.get(c));
                numberUnits.add(units.get(c));
                textOf.add(null);
                numberOf.add(column);
            }
        }
        for (int r = 0; r < rows; ) {
            if (skipBlankLine()) {
                continue;
            }
            for (int c = 0; c < columns; c++) {
                cell();
                @Nullable List<String> list = textOf.get(c);
                if (list != null) {
                    list.add(cell);
                } else {
                    numberOf.get(c)[r] = number(cell).orElse(Double.NaN);
                }
            }
            r++;
        }
        return new Table(source, numberHeaders, numberUnits, numbers, texts, notes);
    }

    private void header(List<String> headers, List<String> units) {
        int numeric = 0;
        Place start = new Place(source, line, 1);
        do {
            cell();
            String unit = "";
            String name = cell;
            int open = cell.lastIndexOf('[');
            if (open >= 0 && cell.endsWith("]")) {
                unit = cell.substring(open + 1, cell.length() - 1).strip();
                name = cell.substring(0, open).strip();
            }
            if (name.isEmpty()) {
                problems.add(cellPlace(), "", "column " + (headers.size() + 1) + " has no header");
            } else if (headers.contains(name)) {
                problems.add(cellPlace(), "", "header " + Words.quoted(name) + " stands here twice");
            }
            numeric += number(cell).isPresent() ? 1 : 0;
            headers.add(name);
            units.add(unit);
            if (headers.size() > MOST_COLUMNS) {
                throw fault(cellPlace(), "the limit of columns in a table, " + MOST_COLUMNS + ", is exceeded");
            }
        } while (!lineEnds);
        if (numeric == headers.size()) {
            throw fault(start, "a header line must stand before the numbers, such as \"height [m],n\"");
        }
        problems.throwIfAny();
    }

    /** Walks all rows: counts them, tells columns of words from columns of numbers, and finds what is wrong. */
    private int survey(List<String> headers, boolean[] words, List<String> notes) {
        int columns = headers.size();
        int[] numbers = new int[columns];
        List<List<Problem>> bad = new ArrayList<>();
        int[] others = new int[columns];
        for (int c = 0; c < columns; c++) {
            bad.add(new ArrayList<>());
        }
        Commas commas = new Commas();
        int rows = 0;
        while (pos < text.length()) {
            if (skipBlankLine()) {
                continue;
            }
            rows++;
            int c = 0;
            do {
                cell();
                if (c < columns) {
                    commas.see();
                    if (number(cell).isPresent()) {
                        numbers[c]++;
                    } else {
                        others[c]++;
                        if (bad.get(c).size() < Problems.LIMIT) {
                            bad.get(c).add(notNumber(headers.get(c), rows));
                        }
                    }
                }
                c++;
            } while (!lineEnds);
            if (c != columns) {
                problems.add(
                        new Place(source, cellLine, 1),
                        "",
                        "row " + rows + " has " + c + (c == 1 ? " cell" : " cells") + ", the header " + columns
                                + (separator == ',' && c > columns
                                        ? "; decimal commas need semicolons or tabs between the columns"
                                        : ""));
            }
            if ((long) rows * columns > MOST_CELLS) {
                throw fault(cellPlace(), "the limit of cells in a table, " + MOST_CELLS + ", is exceeded");
            }
        }
        for (int c = 0; c < columns; c++) {
            words[c] = others[c] > numbers[c];
            if (!words[c]) {
                bad.get(c).forEach(problems::add);
            }
        }
        if (rows == 0) {
            throw fault(new Place(source, line, 1), "the table has no rows below its header");
        }
        commas.judge(notes);
        return rows;
    }

    private Problem notNumber(String header, int row) {
        String what;
        if (cell.isEmpty()) {
            what = "the cell is empty; a number is needed";
        } else if (cell.indexOf(',') >= 0 && cell.indexOf('.') >= 0) {
            what = Words.quoted(cell) + " is not a number; groups of thousands are not understood";
        } else {
            what = Words.quoted(cell) + " is not a number that can be computed with";
        }
        return Problem.input(cellPlace(), "", "column " + Words.quoted(header) + ", row " + row + ": " + what);
    }

    /** Decides whether commas within cells can only be decimal commas. */
    private final class Commas {
        private @Nullable Place comma;
        private String commaCell = "";
        private @Nullable Place point;
        private String pointCell = "";
        private boolean certain;

        void see() {
            int at = cell.indexOf(',');
            if (number(cell).isEmpty()) {
                return;
            }
            if (at >= 0) {
                if (comma == null) {
                    comma = cellPlace();
                    commaCell = cell;
                }
                certain |= separator == ';' || !looksLikeThousands(cell, at);
            } else if (cell.indexOf('.') >= 0 && point == null) {
                point = cellPlace();
                pointCell = cell;
            }
        }

        void judge(List<String> notes) {
            Place c = comma;
            if (c == null) {
                return;
            }
            if (point != null) {
                problems.add(
                        c,
                        "",
                        "decimal commas and decimal points are mixed: " + Words.quoted(commaCell) + " here, "
                                + Words.quoted(pointCell) + " at line " + point.line() + ", column " + point.column());
            } else if (!certain) {
                problems.add(
                        c,
                        "",
                        Words.quoted(commaCell) + " may be a decimal comma or a group of thousands;"
                                + " write decimal points, or semicolons between the columns");
            } else {
                notes.add("decimal commas were read as decimal points, first " + Words.quoted(commaCell) + " in line "
                        + c.line());
            }
        }

        private boolean looksLikeThousands(String number, int at) {
            int digits = Decimal.end(number, 0);
            String whole = number.substring(0, Math.min(at, digits));
            return number.length() - at == 4 && !whole.replace("-", "").startsWith("0") && whole.length() <= 4;
        }
    }

    /** A number with a decimal point or one decimal comma. */
    private OptionalDouble number(String s) {
        int comma = s.indexOf(',');
        if (comma < 0) {
            return Decimal.parse(s);
        }
        return s.indexOf('.') >= 0 || s.indexOf(',', comma + 1) >= 0
                ? OptionalDouble.empty()
                : Decimal.parse(s.replace(',', '.'));
    }

    /** The separator of the header line: a semicolon or a tab where there is one outside quotes, else the comma. */
    private char separator() {
        boolean quoted = false;
        boolean tab = false;
        for (int i = pos; i < text.length(); i++) {
            char c = text.charAt(i);
            if (c == '"') {
                quoted = !quoted;
            } else if (!quoted && c == ';') {
                return ';';
            } else if (!quoted && (c == '\n' || c == '\r')) {
                break;
            }
            tab |= !quoted && c == '\t';
        }
        return tab ? '\t' : ',';
    }

    private int skipComments() {
        int comments = 0;
        while (pos < text.length()) {
            if (skipBlankLine()) {
                continue;
            }
            if (text.charAt(pos) != '#') {
                break;
            }
            while (pos < text.length() && !isBreak(text.charAt(pos))) {
                pos++;
            }
            lineBreak();
            comments++;
        }
        return comments;
    }

    private boolean skipBlankLine() {
        int i = pos;
        while (i < text.length() && (text.charAt(i) == ' ' || (text.charAt(i) == '\t' && separator != '\t'))) {
            i++;
        }
        if (i < text.length() && !isBreak(text.charAt(i))) {
            return false;
        }
        pos = i;
        lineBreak();
        return true;
    }

    /** Reads one cell and the separator or line break behind it. */
    private void cell() {
        while (pos < text.length() && text.charAt(pos) == ' ') {
            pos++;
        }
        cellLine = line;
        cellColumn = 1 + text.codePointCount(lineStart, pos);
        boolean quoted = pos < text.length() && text.charAt(pos) == '"';
        if (quoted) {
            quotedCell();
        } else {
            int start = pos;
            while (pos < text.length() && text.charAt(pos) != separator && !isBreak(text.charAt(pos))) {
                pos++;
            }
            cell = text.substring(start, pos).strip();
        }
        lineEnds = pos >= text.length() || text.charAt(pos) != separator;
        if (lineEnds) {
            lineBreak();
        } else {
            pos++;
        }
    }

    private void quotedCell() {
        Place start = cellPlace();
        StringBuilder b = new StringBuilder();
        pos++;
        while (true) {
            if (pos >= text.length()) {
                throw fault(start, "a quote is opened here and not closed");
            }
            char c = text.charAt(pos);
            if (c == '"') {
                if (pos + 1 < text.length() && text.charAt(pos + 1) == '"') {
                    b.append('"');
                    pos += 2;
                    continue;
                }
                pos++;
                break;
            }
            b.append(c);
            if (isBreak(c)) {
                lineBreak();
            } else {
                pos++;
            }
        }
        while (pos < text.length() && text.charAt(pos) == ' ') {
            pos++;
        }
        if (pos < text.length() && text.charAt(pos) != separator && !isBreak(text.charAt(pos))) {
            throw fault(start, "after a quoted cell only a separator or the line's end may stand");
        }
        cell = b.toString().strip();
    }

    /** Steps over a line break, LF, CR or both, if there is one. */
    private void lineBreak() {
        if (pos < text.length()) {
            if (text.charAt(pos) == '\r' && pos + 1 < text.length() && text.charAt(pos + 1) == '\n') {
                pos++;
            }
            pos++;
            line++;
            lineStart = pos;
        }
    }

    private Place cellPlace() {
        return new Place(source, cellLine, cellColumn);
    }

    private static boolean isBreak(char c) {
        return c == '\n' || c == '\r';
    }

    private static ProblemException fault(Place place, String message) {
        return new ProblemException(Problem.input(place, "", message));
    }
}
