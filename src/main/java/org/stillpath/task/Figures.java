package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.job.Section;
import org.stillpath.job.Value;

/**
 * The figures that a job asks for.
 *
 * @param names their names, each once
 */
record Figures(List<String> names) {
    Figures {
        names = List.copyOf(names);
    }

    /**
     * Reads {@code figures}.
     *
     * @param job the job, for faults
     * @param scene has the values
     * @param known figures that the task can draw
     * @param usual figures that it draws unless the job says otherwise
     */
    static Figures read(Section job, Scene scene, List<String> known, List<String> usual) {
        if (scene.figures().isEmpty()) {
            return new Figures(usual);
        }
        List<String> names = new ArrayList<>();
        for (Value v : scene.figures().get()) {
            String name = v.word(known.toArray(String[]::new));
            if (!name.isEmpty() && !names.contains(name)) {
                names.add(name);
            }
        }
        return new Figures(names);
    }
}
