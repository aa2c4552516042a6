package org.stillpath.task;

import java.util.concurrent.ConcurrentHashMap;
import java.util.function.Supplier;

/**
 * What is worked out once for all runs that share their media: fields and tables by what they depend on. May be used by several
 * threads at once; two may make the same thing, and either serves.
 */
final class Kept {
    /** A series that varies everything would only fill memory. */
    private static final int MOST = 64;

    private final ConcurrentHashMap<Object, Object> made = new ConcurrentHashMap<>();

    /**
     * The thing of a key.
     *
     * @param key equal where the thing would be the same
     * @param sort what the thing is
     * @param make makes it where it is not known
     */
    <T> T once(Object key, Class<T> sort, Supplier<T> make) {
        Object known = made.get(key);
        if (sort.isInstance(known)) {
            return sort.cast(known);
        }
        T fresh = make.get();
        if (made.size() >= MOST) {
            made.clear();
        }
        made.put(key, fresh);
        return fresh;
    }
}
