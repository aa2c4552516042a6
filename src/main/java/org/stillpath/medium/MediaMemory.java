package org.stillpath.medium;

import java.util.Map;
import java.util.Optional;
import java.util.concurrent.ConcurrentHashMap;
import java.util.function.Supplier;
import org.stillpath.job.Node;

/**
 * What readings of jobs that differ in some values only have in common: formulas, and media whose section is the very
 * same piece of the job's tree, as {@link org.stillpath.job.Paths#with} leaves it beside what it replaces.
 *
 * <p>A study hands one memory to all its readings: each formula is parsed, differentiated and compiled once, each table
 * read and joined once. Media are kept by identity and only while {@link #keep} is being told to, that is, during the
 * first reading: a hundred thousand variations of a medium are worth nothing to each other. May be shared between threads.
 */
public final class MediaMemory {
    private static final int MOST = 64;

    private final FormulaCache formulas = new FormulaCache();
    private final Map<Key, Medium> media = new ConcurrentHashMap<>();
    /** What follows from a medium, such as the table of a search, by what it depends on. */
    private final Map<Object, Object> made = new ConcurrentHashMap<>();

    private volatile boolean keeping = true;

    /** A section by identity; its name counts, since messages carry it. */
    private record Key(Node section, String name) {
        @Override
        public boolean equals(Object o) {
            return o instanceof Key k && section == k.section && name.equals(k.name);
        }

        @Override
        public int hashCode() {
            return System.identityHashCode(section) * 31 + name.hashCode();
        }
    }

    /**
     * What has been worked out before for the same key; made where it is not known. Two threads may make the same thing, and
     * either serves.
     *
     * @param key equal where the thing would be the same
     * @param sort what the thing is
     * @param make makes it
     */
    public <T> T once(Object key, Class<T> sort, Supplier<T> make) {
        Object known = made.get(key);
        if (sort.isInstance(known)) {
            return sort.cast(known);
        }
        T fresh = make.get();
        if (made.size() >= MOST) {
            // variations of everything are worth nothing to each other
            made.clear();
        }
        made.put(key, fresh);
        return fresh;
    }

    /** No further media are kept; those known are still found. */
    public void keep(boolean more) {
        keeping = more;
    }

    FormulaCache formulas() {
        return formulas;
    }

    Optional<Medium> find(String name, Node section) {
        return Optional.ofNullable(media.get(new Key(section, name)));
    }

    void add(String name, Node section, Medium medium) {
        if (keeping) {
            media.put(new Key(section, name), medium);
        }
    }
}
