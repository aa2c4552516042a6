package org.stillpath.medium;

import java.util.Collection;
import java.util.Collections;
import java.util.LinkedHashMap;
import java.util.Map;
import java.util.Optional;
import org.stillpath.job.Value;

/** The media of a job by name; {@code vacuum} and {@code air} are always among them. Immutable. */
public final class Media {
    private final Map<String, Medium> byName;

    private Media(Map<String, Medium> byName) {
        this.byName = Collections.unmodifiableMap(byName);
    }

    /** The media that need no declaration, and the given ones; a given one takes the place of a built-in of its name. */
    public static Media of(Collection<? extends Medium> declared) {
        Map<String, Medium> all = new LinkedHashMap<>();
        for (Medium m : new Medium[] {vacuum(), AirMedium.builtIn()}) {
            all.put(m.name(), m);
        }
        for (Medium m : declared) {
            all.put(m.name(), m);
        }
        return new Media(all);
    }

    /** Nothing but index 1. */
    public static Medium vacuum() {
        return UniformMedium.of("vacuum", 1);
    }

    /** The medium of that name, if there is one. */
    public Optional<Medium> find(String name) {
        return Optional.ofNullable(byName.get(name));
    }

    /** The medium that a value names; an unknown name is a fault that offers the nearest, and stands for vacuum then. */
    public Medium need(Value nameValue) {
        if (nameValue.isPlaceholder()) {
            return vacuum();
        }
        String name = nameValue.text();
        Medium found = byName.get(name);
        if (found != null) {
            return found;
        }
        if (!name.isEmpty()) {
            nameValue.fault("there is no medium " + org.stillpath.problem.Words.quoted(name)
                    + org.stillpath.problem.Words.remedy(name, byName.keySet()));
        }
        return vacuum();
    }

    /** All names, the built-in ones first, then in the order declared. */
    public Collection<String> names() {
        return byName.keySet();
    }

    /** All media, in the order of {@link #names}. */
    public Collection<Medium> all() {
        return byName.values();
    }
}
