package org.stillpath.formula;

import java.util.ArrayList;
import java.util.List;
import java.util.function.Supplier;

/**
 * Scratch of an object that several threads use at once: one value a thread, made when the thread first asks. Values live as
 * long as the object.
 *
 * <p>Chosen against {@link ThreadLocal}, whose entries lie in the thread and outlive what they belong to: a study that makes
 * and drops a hundred thousand media leaves a thread's map so full that looking up an entry cost a fifth of the study. Here a
 * look-up is a walk over the few threads that have asked; what a thread that has ended held is dropped when another asks first.
 */
public final class PerThread<T> {
    /** A thread and what it holds. */
    private record Held<T>(Thread thread, T value) {}

    private final Supplier<T> make;
    private volatile List<Held<T>> known = List.of();

    private PerThread(Supplier<T> make) {
        this.make = make;
    }

    /** Scratch that {@code make} makes. */
    public static <T> PerThread<T> of(Supplier<T> make) {
        return new PerThread<>(make);
    }

    /** The value of the thread that asks. */
    @SuppressWarnings("ReferenceEquality") // a thread is itself alone
    public T get() {
        Thread me = Thread.currentThread();
        List<Held<T>> now = known;
        for (int i = 0; i < now.size(); i++) {
            Held<T> held = now.get(i);
            if (held.thread == me) {
                return held.value;
            }
        }
        return add(me);
    }

    private synchronized T add(Thread me) {
        Held<T> fresh = new Held<>(me, make.get());
        List<Held<T>> more = new ArrayList<>();
        for (Held<T> held : known) {
            if (held.thread.isAlive()) {
                more.add(held);
            }
        }
        more.add(fresh);
        known = List.copyOf(more);
        return fresh.value;
    }
}
