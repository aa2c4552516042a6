package org.stillpath.io;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import org.stillpath.job.Sounding;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Words;

/**
 * Reads one sounding from a file in the layout of the Integrated Global Radiosonde Archive, version 2 (NOAA NCEI, format
 * description {@code igra2-data-format.txt}): fixed columns, a header line that starts with {@code #}, then as many levels as
 * it announces, integers in tenths of a degree and of a per cent, pascal and metres; -9999 is missing, -8888 was removed by
 * quality control. A flag A or B beside a value says which checks against the climate it passed, a blank that none was made:
 * the value counts in each case.
 *
 * <p>Files of a station hold decades. Only headers are read until the wanted sounding is found, so that this costs a pass
 * over the text and little else; all headers are looked at, since more than one that fits would be an accident.
 */
final class IgraReader {
    private static final int MISSING = -9999;
    private static final int REMOVED = -8888;
    /** Columns up to the dew-point depression; what follows is the wind. */
    private static final int LEVEL_WIDTH = 39;

    private static final int HEADER_WIDTH = 36;
    private static final int MOST_LEVELS = 20_000;
    private static final int LISTED = 4;

    private final String source;
    private final String text;
    private int line;
    private int start;
    private int end;

    private IgraReader(String source, String text) {
        this.source = source;
        this.text = text;
    }

    /** A header: which sounding, and how many levels follow it. */
    private record Header(int line, String station, String date, int hour, int levels) {
        boolean fits(Sounding.Wanted wanted) {
            return wanted.station().map(station::equals).orElse(true)
                    && wanted.date().map(date::equals).orElse(true)
                    && (wanted.hour().isEmpty() || wanted.hour().getAsInt() == hour);
        }

        String time() {
            return date + (hour == 99 ? "" : String.format(Locale.ROOT, " %02d h UTC", hour));
        }
    }

    /**
     * The one sounding that is wanted.
     *
     * @param source name of the file as the user would write it
     * @param asked where the job asks for it
     * @throws ProblemException if the file is not in this layout (with its line and column), or none or several soundings fit
     */
    static Sounding read(byte[] bytes, String source, Sounding.Wanted wanted, Place asked) {
        return new IgraReader(source, FileText.decode(bytes, source)).one(wanted, asked);
    }

    private Sounding one(Sounding.Wanted wanted, Place asked) {
        List<String> fitting = new ArrayList<>();
        List<String> others = new ArrayList<>();
        List<Sounding.Level> levels = new ArrayList<>();
        Header taken = new Header(0, "", "", 0, 0);
        int count = 0;
        int fits = 0;
        while (next()) {
            if (blank()) {
                continue;
            }
            Header h = header();
            count++;
            boolean first = h.fits(wanted) && fits++ == 0;
            taken = first ? h : taken;
            List<String> list = h.fits(wanted) ? fitting : others;
            if (list.size() < LISTED) {
                list.add(h.station + " " + h.time());
            }
            for (int i = 0; i < h.levels; i++) {
                if (!next() || text.charAt(start) == '#') {
                    throw fault(
                            1,
                            "the header in line " + h.line + " announces " + h.levels + " levels, and only " + i
                                    + " follow");
                }
                if (first) {
                    levels.add(level());
                }
            }
        }
        if (fits != 1) {
            String which = fits > 1
                    ? fits + " soundings of " + source + " fit (" + listed(fitting, fits)
                            + "); `station`, `date: 2026-07-01` and `hour: 12` choose one"
                    : count == 0
                            ? source + " holds no sounding"
                            : "no sounding of " + source + " fits; it has " + listed(others, count);
            throw new ProblemException(Problem.input(asked, "", which));
        }
        return new Sounding(source, taken.station, taken.time(), levels);
    }

    private static String listed(List<String> some, int all) {
        return String.join(", ", some) + (all > some.size() ? " and " + (all - some.size()) + " more" : "");
    }

    /** Goes to the next line; false at the end of the text. */
    private boolean next() {
        int from = line == 0 ? 0 : end + 1;
        if (from >= text.length()) {
            return false;
        }
        line++;
        start = from;
        int at = text.indexOf('\n', from);
        end = at < 0 ? text.length() : at;
        return true;
    }

    /** Length of the line without what ends it. */
    private int width() {
        return end - start - (end > start && text.charAt(end - 1) == '\r' ? 1 : 0);
    }

    private boolean blank() {
        return text.substring(start, start + width()).isBlank();
    }

    private Header header() {
        if (text.charAt(start) != '#') {
            throw fault(
                    1,
                    "a header is needed here, a line that starts with #; this is not the layout of the radiosonde archive "
                            + "IGRA, version 2");
        }
        wide(HEADER_WIDTH, "a header");
        int year = number(14, 17, "the year");
        int month = number(19, 20, "the month");
        int day = number(22, 23, "the day");
        int hour = number(25, 26, "the hour");
        int levels = number(33, 36, "the number of levels");
        check(month >= 1 && month <= 12, 19, month + " is no month");
        check(day >= 1 && day <= 31, 22, day + " is no day");
        check((hour >= 0 && hour <= 23) || hour == 99, 25, hour + " is no hour; 0 to 23, or 99 where it is missing");
        check(levels >= 0 && levels <= MOST_LEVELS, 33, levels + " is no number of levels");
        return new Header(
                line, cells(2, 12), String.format(Locale.ROOT, "%04d-%02d-%02d", year, month, day), hour, levels);
    }

    private Sounding.Level level() {
        wide(LEVEL_WIDTH, "a level");
        int type = number(1, 1, "the level's type");
        check(type >= 1 && type <= 3, 1, type + " is no type of level; 1, 2 or 3");
        for (int flag : new int[] {16, 22, 28}) {
            String f = cells(flag, flag);
            check(f.isEmpty() || f.equals("A") || f.equals("B"), flag, Words.quoted(f) + " is no flag; blank, A or B");
        }
        return new Sounding.Level(
                value(17, 21, 1, "geopotential height", -1000, 60_000),
                value(10, 15, 1, "pressure", 1, 110_000),
                value(23, 27, 0.1, "temperature", -120, 65) + 273.15,
                value(29, 33, 1e-3, "relative humidity", 0, 1),
                value(35, 39, 0.1, "dew-point depression", 0, 100),
                line);
    }

    /** A measured value in the unit of the file times {@code unit}; NaN where it is missing or was removed. */
    private double value(int from, int to, double unit, String what, double least, double most) {
        int n = number(from, to, "the " + what);
        if (n == MISSING || n == REMOVED) {
            return Double.NaN;
        }
        double v = unit == 1 ? n : unit == 0.1 ? n / 10.0 : n / 1000.0;
        check(v >= least && v <= most, from, cells(from, to) + " is no " + what + " in the unit of this layout");
        return v;
    }

    private int number(int from, int to, String what) {
        String s = cells(from, to);
        int n = 0;
        boolean sound = s.length() <= 6 && s.matches("-?\\d+");
        if (sound) {
            n = Integer.parseInt(s);
        }
        check(
                sound,
                from,
                what + " stands in columns " + from + " to " + to + " as a whole number, not " + Words.quoted(s));
        return n;
    }

    private String cells(int from, int to) {
        return text.substring(start + from - 1, start + to).strip();
    }

    private void wide(int columns, String what) {
        check(
                width() >= columns,
                Math.max(1, width()),
                what + " has at least " + columns + " columns; this line ends after " + width());
    }

    private void check(boolean sound, int column, String message) {
        if (!sound) {
            throw fault(column, message);
        }
    }

    private ProblemException fault(int column, String message) {
        return new ProblemException(Problem.input(new Place(source, line, column), "", message));
    }
}
