package org.stillpath.medium;

import java.util.concurrent.atomic.AtomicReferenceArray;
import java.util.function.Supplier;
import org.jspecify.annotations.Nullable;

/**
 * Room to work in for whoever samples a field, lent out and given back. Against a {@link ThreadLocal} a field, which leaves an
 * entry with every thread that ever sampled it, this is gone with its field: a study makes fields by the hundred thousand, and
 * their entries cost a tenth of it. Threads look in places of their own; one that finds its place empty makes what it needs.
 *
 * @param <T> the room, mutable
 */
final class Spare<T> {
    private static final int PLACES = 8;
    /** References that share a line of the processor's cache. */
    private static final int APART = 16;

    private final Supplier<T> maker;
    private final AtomicReferenceArray<@Nullable T> idle = new AtomicReferenceArray<>(PLACES * APART);

    Spare(Supplier<T> maker) {
        this.maker = maker;
    }

    /** Room that nobody else has until it is given back; one that is not given back is no harm. */
    T take() {
        T room = idle.getAndSet(place(), null);
        return room == null ? maker.get() : room;
    }

    /** Gives back what was taken. */
    void give(T room) {
        idle.set(place(), room);
    }

    private static int place() {
        return (int) (Thread.currentThread().getId() % PLACES) * APART;
    }
}
