package org.stillpath.io;

import java.nio.file.Path;
import java.util.List;
import org.stillpath.job.Node;
import org.stillpath.problem.Place;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;

/**
 * A job file as a located tree, before anything is known of its meaning.
 *
 * @param path the file, as the user named it
 * @param root its top mapping
 */
public record JobFile(Path path, Node.Mapping root) {
    /**
     * Reads a job or media file.
     *
     * @param path the file; its name in messages is the one given here
     * @param problems collects the faults after which reading could go on, such as a key that stands twice
     * @throws ProblemException if it cannot be read (kind FILE), or is empty, binary or not sound YAML (kind INPUT)
     */
    public static JobFile read(Path path, Problems problems) {
        String shown = path.toString();
        byte[] bytes = FileText.bytes(path, YamlReader.MOST_BYTES, Place.of(shown), shown);
        return new JobFile(path, YamlReader.parse(bytes, shown, problems));
    }

    /**
     * The same file with the values of {@code --set} options in it, applied in order.
     *
     * @param settings texts {@code PATH=VALUE}
     * @param problems collects what is wrong with them
     */
    public JobFile with(List<String> settings, Problems problems) {
        Node.Mapping changed = root;
        for (String text : settings) {
            try {
                changed = Setting.parse(text, problems).applyTo(changed, problems);
            } catch (ProblemException e) {
                e.problems().forEach(problems::add);
            }
        }
        return new JobFile(path, changed);
    }

    /** The file's name without its folder and its ending: the job's name. */
    public String name() {
        Path last = path.getFileName();
        String name = last == null ? "job" : last.toString();
        int dot = name.lastIndexOf('.');
        return dot > 0 ? name.substring(0, dot) : name;
    }

    /** What the job may name: shipped media, and files in its own folder or below. */
    public FileSources sources(boolean allowOutside) {
        return FileSources.of(path, allowOutside);
    }
}
