package org.stillpath.study;

import java.util.ArrayList;
import java.util.BitSet;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import java.util.concurrent.CancellationException;
import java.util.concurrent.ExecutionException;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import org.jspecify.annotations.Nullable;

/**
 * Does numbered runs on several threads. A run's outcome depends on its number alone and stands at its place, so that the
 * digits depend neither on the number of threads nor on who was faster. Runs are handed out in chunks of about a quarter of
 * a second, which are stored as they are done: an interruption loses the chunks in flight and no more.
 */
final class Crew implements AutoCloseable {
    private static final double CHUNK_SECONDS = 0.25;
    private static final int LARGEST_CHUNK = 2000;

    private final int threads;
    private final Store store;
    private final Progress progress;
    private final ExecutorService pool;

    /** One run by its number. May be called from any thread. */
    @FunctionalInterface
    interface Work {
        Run run(int number);
    }

    /**
     * A crew.
     *
     * @param threads how many work at a time
     */
    Crew(int threads, Store store, Progress progress) {
        if (threads < 1) {
            throw new IllegalArgumentException("threads must be at least 1: " + threads);
        }
        this.threads = threads;
        this.store = store;
        this.progress = progress;
        this.pool = Executors.newFixedThreadPool(threads, task -> {
            // a stack for deep formulas, as the main thread has; daemons, so that nothing outlives the program
            Thread t = new Thread(null, task, "study", 16L << 20);
            t.setDaemon(true);
            return t;
        });
    }

    /**
     * Does runs 0 to {@code count} − 1, those excepted that the store has.
     *
     * @param stage name of the stage; the same study asks for the same stages
     * @param said the stage for people
     * @param width numbers a run
     * @param shown runs done before and runs in all, for the progress: a stage may be one of several
     */
    Runs run(String stage, String said, int count, int width, long[] shown, Work work) {
        Stage s = new Stage(stage, said, new Runs(count, width), shown, work);
        for (Store.Part part : store.parts(stage)) {
            s.take(part);
        }
        s.show();
        List<Future<?>> hands = new ArrayList<>();
        int needed = Math.min(threads, count - s.done);
        for (int i = 0; i < needed; i++) {
            hands.add(pool.submit(s::work));
        }
        @Nullable Throwable failure = null;
        for (Future<?> hand : hands) {
            try {
                hand.get();
            } catch (ExecutionException e) {
                failure = failure == null ? e.getCause() : failure;
                s.stop();
            } catch (InterruptedException e) {
                s.stop();
                Thread.currentThread().interrupt();
                throw new CancellationException("interrupted");
            }
        }
        if (failure instanceof RuntimeException e) {
            throw e;
        } else if (failure instanceof Error e) {
            throw e;
        }
        return s.runs;
    }

    @Override
    public void close() {
        pool.shutdownNow();
    }

    /** One stage: what is done, and what is handed out. */
    private final class Stage {
        private final String name;
        private final String said;
        private final Runs runs;
        private final long[] shown;
        private final Work work;
        private final BitSet given = new BitSet();
        private int next;
        private int done;
        private boolean stopped;
        private double seconds;
        private long timed;

        Stage(String name, String said, Runs runs, long[] shown, Work work) {
            this.name = name;
            this.said = said;
            this.runs = runs;
            this.shown = shown;
            this.work = work;
        }

        void take(Store.Part part) {
            int n = part.flags().length;
            if (part.width() != runs.width() || part.from() < 0 || part.from() + n > runs.count()) {
                throw new IllegalArgumentException("a part of another stage: " + name + " from " + part.from());
            }
            runs.put(part);
            done += n - given.get(part.from(), part.from() + n).cardinality();
            given.set(part.from(), part.from() + n);
        }

        synchronized void stop() {
            stopped = true;
        }

        /** The next runs that nobody has: first, and behind the last; empty when there are none. */
        synchronized int[] claim() {
            next = given.nextClearBit(next);
            if (stopped || next >= runs.count()) {
                return new int[0];
            }
            double each = timed == 0 ? CHUNK_SECONDS : seconds / timed;
            int size = (int) Math.max(1, Math.min(LARGEST_CHUNK, CHUNK_SECONDS / Math.max(each, 1e-9)));
            size = Math.max(1, Math.min(size, (runs.count() - next) / (2 * threads)));
            int end = Math.min(runs.count(), next + size);
            int taken = given.nextSetBit(next);
            end = taken >= 0 ? Math.min(end, taken) : end;
            given.set(next, end);
            return new int[] {next, end};
        }

        void work() {
            int[] range = claim();
            while (range.length > 0) {
                long start = System.nanoTime();
                Runs part = new Runs(range[1] - range[0], runs.width());
                for (int i = range[0]; i < range[1]; i++) {
                    if (Thread.currentThread().isInterrupted()) {
                        return;
                    }
                    part.put(i - range[0], work.run(i));
                }
                finish(range[0], part, (System.nanoTime() - start) * 1e-9);
                range = claim();
            }
        }

        synchronized void finish(int from, Runs part, double time) {
            Store.Part kept = part.part(from);
            runs.put(kept);
            store.add(name, kept);
            done += part.count();
            seconds += time;
            timed += part.count();
            show();
        }

        void show() {
            progress.at(said, shown[0] + done, shown[1]);
        }
    }

    /**
     * What a run gave.
     *
     * @param results numbers, NaN where there is none
     * @param flags bits of {@link Runs}
     * @param fault what went wrong; empty where nothing did
     */
    record Run(double[] results, int flags, String fault) {}

    /** Runs by their number. Filled by one thread at a time. */
    static final class Runs {
        /** The job could not be run. */
        static final int FAILED = 1;
        /** The asked accuracy was not reached. */
        static final int INACCURATE = 2;
        /** There were warnings that the nominal run does not have. */
        static final int WARNED = 4;

        private final int width;
        private final double[] results;
        private final byte[] flags;
        private final Map<Integer, String> faults = new TreeMap<>();

        Runs(int count, int width) {
            this.width = width;
            this.results = new double[Math.multiplyExact(count, width)];
            this.flags = new byte[count];
        }

        int count() {
            return flags.length;
        }

        int width() {
            return width;
        }

        void put(int number, Run run) {
            System.arraycopy(run.results(), 0, results, number * width, width);
            flags[number] = (byte) run.flags();
            if (!run.fault().isEmpty()) {
                faults.put(number, run.fault());
            }
        }

        void put(Store.Part part) {
            System.arraycopy(part.results(), 0, results, part.from() * width, part.results().length);
            System.arraycopy(part.flags(), 0, flags, part.from(), part.flags().length);
            faults.putAll(part.faults());
        }

        Store.Part part(int from) {
            Map<Integer, String> shifted = new TreeMap<>();
            faults.forEach((i, text) -> shifted.put(i + from, text));
            return new Store.Part(from, width, results, flags, shifted);
        }

        double result(int number, int which) {
            return results[number * width + which];
        }

        double[] results(int number) {
            double[] row = new double[width];
            System.arraycopy(results, number * width, row, 0, width);
            return row;
        }

        /** One result of all runs. */
        double[] column(int which) {
            double[] column = new double[count()];
            for (int i = 0; i < column.length; i++) {
                column[i] = result(i, which);
            }
            return column;
        }

        String fault(int number) {
            return faults.getOrDefault(number, "");
        }

        /** How many runs have a flag. */
        int having(int flag) {
            int n = 0;
            for (byte f : flags) {
                n += (f & flag) != 0 ? 1 : 0;
            }
            return n;
        }

        /** The first run that has a flag; -1 if none. */
        int first(int flag) {
            for (int i = 0; i < flags.length; i++) {
                if ((flags[i] & flag) != 0) {
                    return i;
                }
            }
            return -1;
        }
    }
}
