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
    private final FormulaCache formulas = new FormulaCache();
    private final Map<Key, Medium> media = new ConcurrentHashMap<>();
    private final Map<Object, Object> made = new ConcurrentHashMap<>();
    private volatile boolean keeping = true;

    /** Things worked out beyond this number are only worth their memory to a series that varies little. */
    private static final int MOST_MADE = 64;

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

    /** No further media are kept; those known are still found. */
    public void keep(boolean more) {
        keeping = more;
    }

    /**
     * What is worked out once for all readings that agree in a key: fields and tables that follow from a medium.
     *
     * @param key equal where the thing would be the same
     * @param sort what the thing is
     * @param make makes it where it is not known; two threads may both make it, and either serves
     */
    public <T> T once(Object key, Class<T> sort, Supplier<T> make) {
        Object known = made.get(key);
        if (sort.isInstance(known)) {
            return sort.cast(known);
        }
        T fresh = make.get();
        if (made.size() >= MOST_MADE) {
            made.clear();
        }
        made.put(key, fresh);
        return fresh;
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
