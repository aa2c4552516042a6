package org.stillpath.io;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import org.jspecify.annotations.Nullable;
import org.stillpath.job.Cells;
import org.stillpath.job.Lattice;
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
 *
 * <p>The nodes of a grid, which may be millions, are read in one pass by {@link #lattice}: cells become numbers where
 * they stand, without a string each. A row's line is not kept; a fault that needs it walks the text again.
 */
final class CsvReader {
    /** Most bytes of a table. */
    static final int MOST_BYTES = 64 << 20;
    /** Most cells of a table. */
    static final int MOST_CELLS = 4_000_000;
    /** Most columns of a table. */
    static final int MOST_COLUMNS = 1_000;

    /** Most bytes of a table that is a grid. */
    static final int MOST_LATTICE_BYTES = 160 << 20;

    private static final List<String> AXES = List.of("x", "y", "z");

    private final String text;
    private final String source;
    private final Problems problems = new Problems();
    private char separator;

    private int pos;
    private int line = 1;
    private int lineStart;

    // the cell read last: its line, where that line and the cell start, where it ends
    private int cellLine;
    private int cellLineStart;
    private int cellStart;
    private int cellEnd;
    /** Its text, if it stands in quotes. */
    private @Nullable String cellQuoted;
    /** Whether it holds a comma; likewise a point. */
    private boolean cellComma;

    private boolean cellPoint;
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

    /**
     * Reads the nodes of a rectilinear grid, one a row, in any order.
     *
     * @param bytes the file
     * @param source its name, for places
     * @param wanted which columns, if that is said
     * @param asked where the job names the file, for faults of {@code wanted}
     * @throws ProblemException with all that is wrong with it
     */
    static Lattice lattice(byte[] bytes, String source, Lattice.Wanted wanted, Place asked) {
        return new CsvReader(FileText.decode(bytes, source), source).lattice(wanted, asked);
    }

    /**
     * Reads a table without judging its rows: every cell stays a text, only decimal commas become points.
     *
     * @param bytes the file
     * @param source its name, for places
     * @throws ProblemException with what is wrong with its header, or if its commas can be read in two ways
     */
    static Cells cells(byte[] bytes, String source) {
        return new CsvReader(FileText.decode(bytes, source), source).cells();
    }

    private Cells cells() {
        Head head = head();
        List<Cells.Header> headers = new ArrayList<>();
        for (int c = 0; c < head.headers().size(); c++) {
            headers.add(new Cells.Header(
                    head.headers().get(c), head.units().get(c), head.places().get(c)));
        }
        Commas commas = new Commas();
        List<Cells.Row> rows = new ArrayList<>();
        long count = 0;
        while (pos < text.length()) {
            if (skipBlankLine()) {
                continue;
            }
            List<String> cells = new ArrayList<>(headers.size());
            List<Integer> columns = new ArrayList<>(headers.size());
            int rowLine = line;
            do {
                cell();
                boolean number = !Double.isNaN(cellNumber());
                if (number) {
                    commas.see();
                }
                cells.add(number ? cellText().replace(',', '.') : cellText());
                columns.add(cellPlace().column());
            } while (!lineEnds);
            count += cells.size();
            if (count > MOST_CELLS) {
                throw fault(cellPlace(), "the limit of cells in a table, " + MOST_CELLS + ", is exceeded");
            }
            rows.add(new Cells.Row(rowLine, cells, columns));
        }
        if (rows.isEmpty()) {
            throw fault(new Place(source, line, 1), "the table has no rows below its header");
        }
        List<String> notes = new ArrayList<>(head.notes());
        commas.judge(notes);
        problems.throwIfAny();
        return new Cells(source, headers, rows, notes);
    }

    private Table table() {
        Head head = head();
        int bodyPos = pos;
        int bodyLine = line;
        List<String> notes = new ArrayList<>(head.notes());
        boolean[] words = new boolean[head.headers().size()];
        int rows = survey(head.headers(), words, notes);
        problems.throwIfAny();

        pos = bodyPos;
        line = bodyLine;
        lineStart = bodyPos;
        return filled(head.headers(), head.units(), words, rows, notes);
    }

    /** What stands before the rows. */
    private record Head(List<String> headers, List<String> units, List<Place> places, List<String> notes) {}

    /** Reads up to the first row. */
    private Head head() {
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
        List<Place> places = new ArrayList<>();
        header(headers, units, places);
        return new Head(headers, units, places, notes);
    }

    private Lattice lattice(Lattice.Wanted wanted, Place asked) {
        Head head = head();
        int[] roles = roles(head, wanted, asked);
        int bodyPos = pos;
        int bodyLine = line;
        List<String> notes = new ArrayList<>(head.notes());
        Commas commas = new Commas();
        LatticeRows rows = new LatticeRows(Math.min(breaks() + 1, Lattice.MOST_NODES));
        int columns = roles.length;
        double[] node = new double[4];
        while (pos < text.length()) {
            if (skipBlankLine()) {
                continue;
            }
            if (rows.count() == Lattice.MOST_NODES) {
                throw fault(
                        new Place(source, line, 1),
                        "the limit of nodes in a grid, " + Lattice.MOST_NODES + ", is exceeded; leave out planes");
            }
            int c = 0;
            do {
                cell();
                if (c < columns && roles[c] >= 0) {
                    double number = cellNumber();
                    if (Double.isNaN(number)) {
                        problems.add(notNumber(head.headers().get(c), rows.count() + 1));
                    } else if (cellComma || cellPoint) {
                        commas.see();
                    }
                    node[roles[c]] = number;
                }
                c++;
            } while (!lineEnds);
            if (c != columns) {
                problems.add(new Place(source, cellLine, 1), "", cellsOf(rows.count() + 1, c, columns));
            }
            rows.add(node);
        }
        if (rows.count() == 0) {
            throw fault(new Place(source, line, 1), "the table has no rows below its header");
        }
        commas.judge(notes);
        problems.throwIfAny();
        return rows.lattice(source, columns(head, roles), notes, row -> {
            pos = bodyPos;
            line = bodyLine;
            lineStart = bodyPos;
            return placeOfRow(row);
        });
    }

    /** Line breaks from here to the end, a line break of two characters counted twice at most. */
    private int breaks() {
        int count = 0;
        for (int i = pos; i < text.length(); i++) {
            count += text.charAt(i) == '\n' || (text.charAt(i) == '\r' && !text.startsWith("\n", i + 1)) ? 1 : 0;
        }
        return count;
    }

    /** Walks from the first row to the given one, counted from 0. */
    private Place placeOfRow(int row) {
        for (int r = -1; pos < text.length(); ) {
            if (skipBlankLine()) {
                continue;
            }
            r++;
            if (r == row) {
                break;
            }
            do {
                cell();
            } while (!lineEnds);
        }
        return new Place(source, line, 1);
    }

    /** By column of the file: 0, 1, 2 for x, y, z, 3 for the value, −1 for what is left out. */
    private int[] roles(Head head, Lattice.Wanted wanted, Place asked) {
        List<String> headers = head.headers();
        if (wanted.array().isPresent()) {
            throw fault(asked, "`array` belongs to VTK files; in " + source + " `columns` says what to take");
        }
        int[] roles = new int[headers.size()];
        Arrays.fill(roles, -1);
        if (!wanted.columns().isEmpty()) {
            for (int k = 0; k < 4; k++) {
                String name = wanted.columns().get(k);
                int c = headers.indexOf(name);
                if (c < 0) {
                    throw fault(asked, source + " has no column " + Words.quoted(name) + Words.remedy(name, headers));
                }
                if (roles[c] >= 0) {
                    throw fault(asked, "`columns` names " + Words.quoted(name) + " twice");
                }
                roles[c] = k;
            }
            return roles;
        }
        Place first = head.places().get(0);
        int left = headers.size();
        for (int k = 0; k < 3; k++) {
            int c = axis(headers, AXES.get(k));
            if (c < 0) {
                throw fault(
                        first,
                        "there is no column " + Words.quoted(AXES.get(k)) + " among " + String.join(", ", headers)
                                + "; a grid needs a header such as \"x [mm],y [mm],z [mm],value\", or `columns: [..]`"
                                + " beside `file` with the headers of x, y, z and the value. Where nothing changes"
                                + " along an axis, give the same values at two places on it");
            }
            roles[c] = k;
            left--;
        }
        if (left != 1) {
            throw fault(
                    first,
                    left == 0
                            ? "there is no column of values beside x, y and z"
                            : "there are " + left + " columns beside x, y and z; `columns: [x, y, z, "
                                    + headers.get(firstFree(roles)) + "]` beside `file` says which to take");
        }
        roles[firstFree(roles)] = 3;
        return roles;
    }

    private static int axis(List<String> headers, String axis) {
        for (int c = 0; c < headers.size(); c++) {
            if (headers.get(c).equalsIgnoreCase(axis)) {
                return c;
            }
        }
        return -1;
    }

    private static int firstFree(int[] roles) {
        int c = 0;
        while (roles[c] >= 0) {
            c++;
        }
        return c;
    }

    /** Headings of x, y, z and the value, without numbers yet. */
    private static List<Lattice.Column> columns(Head head, int[] roles) {
        List<Lattice.Column> columns = new ArrayList<>();
        for (int k = 0; k < 4; k++) {
            int c = 0;
            while (roles[c] != k) {
                c++;
            }
            columns.add(new Lattice.Column(
                    head.headers().get(c), head.units().get(c), head.places().get(c), new double[0]));
        }
        return columns;
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
                    list.add(cellText());
                } else {
                    numberOf.get(c)[r] = cellNumber();
                }
            }
            r++;
        }
        return new Table(source, numberHeaders, numberUnits, numbers, texts, notes);
    }

    private void header(List<String> headers, List<String> units, List<Place> places) {
        int numeric = 0;
        Place start = new Place(source, line, 1);
        do {
            cell();
            String cell = cellText();
            String unit = "";
            String name = cell;
            int open = cell.lastIndexOf('[');
            // digits in brackets are the element of a list, as in rays[0].from[2]
            if (open >= 0
                    && cell.endsWith("]")
                    && !cell.substring(open + 1, cell.length() - 1).matches("[0-9]+")) {
                unit = cell.substring(open + 1, cell.length() - 1).strip();
                name = cell.substring(0, open).strip();
            }
            if (name.isEmpty()) {
                problems.add(cellPlace(), "", "column " + (headers.size() + 1) + " has no header");
            } else if (headers.contains(name)) {
                problems.add(cellPlace(), "", "header " + Words.quoted(name) + " stands here twice");
            }
            numeric += Double.isNaN(cellNumber()) ? 0 : 1;
            places.add(cellPlace());
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
                    if (!Double.isNaN(cellNumber())) {
                        commas.see();
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
                problems.add(new Place(source, cellLine, 1), "", cellsOf(rows, c, columns));
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

    private String cellsOf(int row, int cells, int columns) {
        return "row " + row + " has " + cells + (cells == 1 ? " cell" : " cells") + ", the header " + columns
                + (separator == ',' && cells > columns
                        ? "; decimal commas need semicolons or tabs between the columns"
                        : "");
    }

    private Problem notNumber(String header, int row) {
        String cell = cellText();
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

        /** Looks at the cell read last, a number. */
        void see() {
            if (cellComma) {
                String cell = cellText();
                int at = cell.indexOf(',');
                if (comma == null) {
                    comma = cellPlace();
                    commaCell = cell;
                }
                certain |= separator == ';' || !looksLikeThousands(cell, at);
            } else if (cellPoint && point == null) {
                point = cellPlace();
                pointCell = cellText();
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

    /** A number with a decimal point or one decimal comma; NaN for what is none. */
    private static double number(String s) {
        int comma = s.indexOf(',');
        if (comma < 0) {
            return Decimal.parse(s, 0, s.length());
        }
        return s.indexOf('.') >= 0 || s.indexOf(',', comma + 1) >= 0
                ? Double.NaN
                : Decimal.parse(s.replace(',', '.'), 0, s.length());
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

    /** Steps over one cell and the separator or line break behind it; makes no object of a cell without quotes. */
    private void cell() {
        while (pos < text.length() && text.charAt(pos) == ' ') {
            pos++;
        }
        cellLine = line;
        cellLineStart = lineStart;
        cellStart = pos;
        cellQuoted = null;
        cellComma = false;
        cellPoint = false;
        boolean quoted = pos < text.length() && text.charAt(pos) == '"';
        if (quoted) {
            quotedCell();
        } else {
            char c;
            while (pos < text.length() && (c = text.charAt(pos)) != separator && !isBreak(c)) {
                cellComma |= c == ',';
                cellPoint |= c == '.';
                pos++;
            }
            cellEnd = pos;
            while (cellEnd > cellStart && Character.isWhitespace(text.charAt(cellEnd - 1))) {
                cellEnd--;
            }
            while (cellStart < cellEnd && Character.isWhitespace(text.charAt(cellStart))) {
                cellStart++;
            }
        }
        lineEnds = pos >= text.length() || text.charAt(pos) != separator;
        if (lineEnds) {
            lineBreak();
        } else {
            pos++;
        }
    }

    /** The text of the cell read last. */
    private String cellText() {
        return cellQuoted != null ? cellQuoted : text.substring(cellStart, cellEnd);
    }

    /** The number in the cell read last; NaN if it is none. */
    private double cellNumber() {
        if (cellQuoted == null && !cellComma) {
            return Decimal.parse(text, cellStart, cellEnd);
        }
        return number(cellText());
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
        String inside = b.toString().strip();
        cellQuoted = inside;
        cellComma = inside.indexOf(',') >= 0;
        cellPoint = inside.indexOf('.') >= 0;
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
        return new Place(source, cellLine, 1 + text.codePointCount(cellLineStart, cellStart));
    }

    private static boolean isBreak(char c) {
        return c == '\n' || c == '\r';
    }

    private static ProblemException fault(Place place, String message) {
        return new ProblemException(Problem.input(place, "", message));
    }
}
