package org.stillpath.cli;

import java.io.PrintStream;
import java.util.Locale;
import org.stillpath.study.Progress;

/**
 * A progress bar on one line of a terminal's standard error, with the time that remains at the rate so far; before that, how
 * long it will all take at most. Shown after a second of work at the earliest and a few times a second at most; wiped away
 * at the end.
 */
final class ProgressBar implements Progress, AutoCloseable {
    private static final long FIRST = 1_000_000_000L;
    private static final long EACH = 200_000_000L;
    /** Shorter work is not announced, seconds. */
    private static final double WORTH_TELLING = 2;

    private static final int CELLS = 30;
    private static final int WIDTH = 79;

    private final PrintStream err;
    private final long start = System.nanoTime();
    private long last = Long.MIN_VALUE;
    private String stage = "";
    private long stageStart;
    private long stageDone;
    private boolean shown;

    ProgressBar(PrintStream err) {
        this.err = err;
    }

    /** Whether standard error is a terminal: the launcher asks the shell, since Java cannot. */
    static boolean isTerminal() {
        return Boolean.getBoolean("stillpath.terminal");
    }

    @Override
    public synchronized void ahead(long runs, double seconds) {
        if (seconds > WORTH_TELLING) {
            shown = true;
            err.print("\r" + padded(runs + " runs, about " + time(seconds) + " at most"));
            err.flush();
        }
    }

    @Override
    public synchronized void at(String name, long done, long total) {
        long now = System.nanoTime();
        if (!name.equals(stage)) {
            stage = name;
            stageStart = now;
            stageDone = done;
        }
        if (now - start < FIRST || (last != Long.MIN_VALUE && now - last < EACH)) {
            return;
        }
        last = now;
        shown = true;
        err.print("\r" + padded(line(done, total, (now - stageStart) * 1e-9)));
        err.flush();
    }

    private String line(long done, long total, double seconds) {
        if (total <= 0) {
            return stage + ": " + done + " runs";
        }
        double part = Math.min(1, (double) done / total);
        int full = (int) (CELLS * part);
        String bar = "#".repeat(full) + ".".repeat(CELLS - full);
        String rest = "";
        if (done > stageDone) {
            rest = ", " + time(seconds * (total - done) / (done - stageDone)) + " left at most";
        }
        return stage + " [" + bar + "] " + done + " of " + total + rest;
    }

    private static String time(double seconds) {
        long s = Math.round(seconds);
        return s < 60
                ? s + " s"
                : s < 3600
                        ? String.format(Locale.ROOT, "%d:%02d min", s / 60, s % 60)
                        : String.format(Locale.ROOT, "%d:%02d h", s / 3600, s / 60 % 60);
    }

    private static String padded(String text) {
        String cut = text.length() > WIDTH ? text.substring(0, WIDTH) : text;
        return cut + " ".repeat(WIDTH - cut.length());
    }

    @Override
    public synchronized void close() {
        if (shown) {
            err.print("\r" + " ".repeat(WIDTH) + "\r");
            err.flush();
        }
    }
}
