package org.stillpath.io;

import org.stillpath.job.Node;
import org.stillpath.job.Paths;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;

/**
 * One {@code --set PATH=VALUE}: a value of the job file, replaced before it is read.
 *
 * @param path where the value goes, such as {@code media.rod.with.g}
 * @param value the value; all its places are {@code --set PATH}
 */
public record Setting(String path, Node value) {
    /**
     * Reads {@code media.rod.with.g=0.31 1/mm}; the value is YAML, so {@code x=[1, 2]} is a list.
     *
     * @param text the option's argument
     * @param problems collects faults after which reading could go on
     * @throws ProblemException if there is no {@code =} or no path, or the value is not sound YAML
     */
    public static Setting parse(String text, Problems problems) {
        int equals = text.indexOf('=');
        String path = equals < 0 ? "" : text.substring(0, equals).strip();
        if (path.isEmpty()) {
            throw new ProblemException(Problem.input(
                    Place.of("--set"),
                    "",
                    Words.quoted(text) + " does not read as PATH=VALUE, such as media.rod.with.g=\"0.31 1/mm\""));
        }
        return new Setting(path, YamlReader.value(text.substring(equals + 1), place(path), problems));
    }

    /** The tree with this value in it; a path that leads nowhere is a fault and leaves the tree as it is. */
    public Node.Mapping applyTo(Node.Mapping root, Problems problems) {
        return Paths.with(root, path, value, place(path), problems);
    }

    private static Place place(String path) {
        return Place.of("--set " + path);
    }
}
