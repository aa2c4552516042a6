package org.stillpath.io;

import java.io.IOException;
import java.io.InputStream;
import java.net.URISyntaxException;
import java.nio.file.Files;
import java.nio.file.InvalidPathException;
import java.nio.file.NoSuchFileException;
import java.nio.file.Path;
import java.security.CodeSource;
import java.util.ArrayList;
import java.util.Collections;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.jar.JarFile;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.stillpath.job.Cells;
import org.stillpath.job.Lattice;
import org.stillpath.job.Node;
import org.stillpath.job.Sounding;
import org.stillpath.job.Sources;
import org.stillpath.job.Table;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;

/**
 * What a job may name: shipped documents, which lie on the class path under {@code media-models}, and the user's own
 * files in the job's folder or below it. Links are followed before it is decided where a file lies, so that a link
 * cannot lead outside; {@code allowOutside} lifts the rule.
 *
 * <p>A name is a file of the user's own if it starts with {@code ./}, {@code ../} or {@code /} or ends in {@code .yaml}
 * or {@code .yml}; any other is a shipped document. Files named in a document are looked for beside that document.
 * Remembers which documents it read, for that; belongs to one job and is not shared between threads.
 */
public final class FileSources implements Sources {
    private static final String SHIPPED = "media-models/";

    /** The job's folder as the user would write it; empty for the current one. */
    private final String folderShown;

    private final Path folder;
    private final boolean allowOutside;
    /** Folder of every document read, by the name that its places carry. */
    private final Map<String, Path> folders = new HashMap<>();

    private FileSources(Path folder, String folderShown, boolean allowOutside) {
        this.folder = folder;
        this.folderShown = folderShown;
        this.allowOutside = allowOutside;
    }

    /**
     * Sources of a job.
     *
     * @param job the job file
     * @param allowOutside whether files outside its folder may be read
     */
    public static FileSources of(Path job, boolean allowOutside) {
        Path parent = job.getParent();
        Path absolute = job.toAbsolutePath().normalize().getParent();
        Path folder = absolute == null ? job.toAbsolutePath() : absolute;
        FileSources sources = new FileSources(folder, parent == null ? "" : parent.toString(), allowOutside);
        // a job that lies in a folder of one's own called media-models is no shipped document
        sources.folders.put(job.toString(), folder);
        return sources;
    }

    @Override
    public Node.Mapping document(String name, Place asked) {
        Problems problems = new Problems();
        Node.Mapping root;
        if (isOwn(name)) {
            Path file = resolve(name, asked);
            String shown = shown(file);
            byte[] bytes = FileText.bytes(file, YamlReader.MOST_BYTES, asked, name);
            Path beside = file.getParent();
            folders.put(shown, beside == null ? folder : beside);
            root = YamlReader.parse(bytes, shown, problems);
        } else {
            root = YamlReader.parse(shippedBytes(name, asked), SHIPPED + name + ".yaml", problems);
        }
        problems.throwIfAny();
        return root;
    }

    @Override
    public Table table(String name, Place asked) {
        Content content = content(name, CsvReader.MOST_BYTES, asked);
        return CsvReader.read(content.bytes(), content.shown());
    }

    @Override
    public Cells cells(String name, Place asked) {
        Content content = content(name, CsvReader.MOST_BYTES, asked);
        return CsvReader.cells(content.bytes(), content.shown());
    }

    /** The format is told by how the file starts, not by its name: a VTK file named .txt is one all the same. */
    @Override
    public Lattice lattice(String name, Lattice.Wanted wanted, Place asked) {
        Content content = content(name, CsvReader.MOST_LATTICE_BYTES, asked);
        if (VtkLegacy.isOne(content.bytes())) {
            return VtkLegacy.read(content.bytes(), content.shown(), wanted, asked);
        }
        if (VtkXml.isOne(content.bytes())) {
            return VtkXml.read(content.bytes(), content.shown(), wanted, asked);
        }
        return CsvReader.lattice(content.bytes(), content.shown(), wanted, asked);
    }

    @Override
    public Sounding sounding(String name, Sounding.Wanted wanted, Place asked) {
        Content content = content(name, CsvReader.MOST_LATTICE_BYTES, asked);
        return IgraReader.read(content.bytes(), content.shown(), wanted, asked);
    }

    /** The bytes of a file and its name as the user would write it. */
    private record Content(byte[] bytes, String shown) {}

    /** A file beside the document that names it, shipped or the user's own. */
    private Content content(String name, int limit, Place asked) {
        if (asked.source().startsWith(SHIPPED) && !folders.containsKey(asked.source())) {
            String beside = asked.source().substring(0, asked.source().lastIndexOf('/') + 1);
            String resource = beside + name;
            byte[] bytes = isPlainName(name) ? resource(resource, limit, asked) : null;
            if (bytes == null) {
                throw new ProblemException(Problem.file(asked, "there is no shipped file " + Words.quoted(resource)));
            }
            return new Content(bytes, resource);
        }
        Path file = resolve(name, asked);
        return new Content(FileText.bytes(file, limit, asked, name), shown(file));
    }

    /**
     * A file that a job names, for readers of other formats.
     *
     * @param name as the job has it
     * @param asked where the job has it
     * @return the file, links followed; it exists
     * @throws ProblemException if there is no such file, it lies outside, or is not a plain file
     */
    public Path resolve(String name, Place asked) {
        Path base = folders.getOrDefault(asked.source(), folder);
        try {
            Path real = base.resolve(name).toRealPath();
            if (!allowOutside && !real.startsWith(folder.toRealPath())) {
                throw new ProblemException(Problem.input(
                        asked,
                        "",
                        Words.quoted(name) + " lies outside the job's folder; move it there, or give --allow-outside"));
            }
            if (!Files.isRegularFile(real)) {
                throw new ProblemException(Problem.file(asked, Words.quoted(name) + " is not a plain file"));
            }
            return real;
        } catch (NoSuchFileException e) {
            throw new ProblemException(Problem.file(
                    asked,
                    "there is no file " + Words.quoted(name) + near(base, name) + "; it is looked for in "
                            + Words.quoted(shownFolder(base))));
        } catch (InvalidPathException e) {
            throw new ProblemException(Problem.input(asked, "", Words.quoted(name) + " is not the name of a file"));
        } catch (IOException | SecurityException e) {
            throw new ProblemException(Problem.file(asked, Words.quoted(name) + " cannot be read"));
        }
    }

    /** Names of all shipped documents, in alphabetical order: {@code materials/fused-silica}, {@code rods/parabolic}. */
    public static List<String> shipped() {
        List<String> names = new ArrayList<>();
        try {
            CodeSource code = FileSources.class.getProtectionDomain().getCodeSource();
            if (code == null) {
                return List.of();
            }
            Path origin = Path.of(code.getLocation().toURI());
            if (Files.isDirectory(origin)) {
                Path top = origin.resolve(SHIPPED);
                if (Files.isDirectory(top)) {
                    try (Stream<Path> files = Files.walk(top)) {
                        files.forEach(
                                f -> add(names, top.relativize(f).toString().replace('\\', '/')));
                    }
                }
            } else {
                try (JarFile jar = new JarFile(origin.toFile())) {
                    jar.stream()
                            .filter(e -> e.getName().startsWith(SHIPPED))
                            .forEach(e -> add(names, e.getName().substring(SHIPPED.length())));
                }
            }
        } catch (IOException | URISyntaxException | SecurityException e) {
            // the list only helps people; documents are still found by name
            return List.of();
        }
        Collections.sort(names);
        return List.copyOf(names);
    }

    private static void add(List<String> names, String file) {
        if (file.endsWith(".yaml")) {
            names.add(file.substring(0, file.length() - ".yaml".length()));
        }
    }

    private static byte[] shippedBytes(String name, Place asked) {
        byte[] bytes = isPlainName(name) ? resource(SHIPPED + name + ".yaml", YamlReader.MOST_BYTES, asked) : null;
        if (bytes == null) {
            throw new ProblemException(Problem.input(
                    asked,
                    "",
                    Words.quoted(name) + " is not a shipped document" + Words.remedy(name, shipped())
                            + "; a file of one's own is written ./NAME.yaml"));
        }
        return bytes;
    }

    private static byte @Nullable [] resource(String resource, int limit, Place asked) {
        try (InputStream in = FileSources.class.getClassLoader().getResourceAsStream(resource)) {
            return in == null ? null : FileText.bytes(in, limit, asked, resource);
        } catch (IOException e) {
            throw new ProblemException(Problem.file(asked, Words.quoted(resource) + " cannot be read"));
        }
    }

    private static boolean isOwn(String name) {
        return name.startsWith(".") || name.startsWith("/") || name.endsWith(".yaml") || name.endsWith(".yml");
    }

    /** Lower-case path of words, so that a name cannot climb out of the shipped folder. */
    private static boolean isPlainName(String name) {
        return !name.isEmpty() && !name.contains("..") && !name.contains("\\") && !name.startsWith("/");
    }

    private String shown(Path file) {
        try {
            Path real = folder.toRealPath();
            if (file.startsWith(real)) {
                Path relative = real.relativize(file);
                return folderShown.isEmpty()
                        ? relative.toString()
                        : Path.of(folderShown).resolve(relative).toString();
            }
        } catch (IOException e) {
            // fall through to the full name
        }
        return file.toString();
    }

    private String shownFolder(Path base) {
        if (base.equals(folder)) {
            return folderShown.isEmpty() ? "." : folderShown;
        }
        return shown(base);
    }

    private String near(Path base, String name) {
        Path wanted = base.resolve(name);
        Path beside = wanted.getParent();
        Path last = wanted.getFileName();
        if (beside == null || last == null || !Files.isDirectory(beside)) {
            return "";
        }
        List<String> there = new ArrayList<>();
        try {
            // names of files outside are none of the message's business
            if (!allowOutside && !beside.toRealPath().startsWith(folder.toRealPath())) {
                return "";
            }
        } catch (IOException e) {
            return "";
        }
        try (Stream<Path> files = Files.list(beside)) {
            files.limit(1000).forEach(f -> there.add(String.valueOf(f.getFileName())));
        } catch (IOException e) {
            return "";
        }
        return Words.nearest(last.toString(), there)
                .map(n -> " (there is " + Words.quoted(n) + ")")
                .orElse("");
    }
}
