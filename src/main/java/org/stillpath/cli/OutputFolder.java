package org.stillpath.cli;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.AccessDeniedException;
import java.nio.file.FileAlreadyExistsException;
import java.nio.file.Files;
import java.nio.file.NoSuchFileException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import org.stillpath.io.JobFile;
import org.stillpath.io.ResultJson;
import org.stillpath.io.TableCsv;
import org.stillpath.io.WholeFile;
import org.stillpath.plot.Picture;
import org.stillpath.plot.Pictures;
import org.stillpath.plot.Width;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.report.HtmlReport;
import org.stillpath.study.Outcome;
import org.stillpath.task.Figure;
import org.stillpath.task.Result;
import org.stillpath.task.Table;

/**
 * The folder that {@code --out} names. Every file in it is whole; {@code result.json} comes last, so that where it stands
 * everything it names stands too.
 */
final class OutputFolder {
    private final Path folder;
    private final List<String> tables = new ArrayList<>();
    private final List<String> figures = new ArrayList<>();

    OutputFolder(Path folder) {
        this.folder = folder;
    }

    /** Names of the CSV files written. */
    List<String> tables() {
        return List.copyOf(tables);
    }

    /** Names of the SVG files written; a PNG of the same name stands beside each. */
    List<String> figures() {
        return List.copyOf(figures);
    }

    /** One sentence on what was written. */
    String summary() {
        List<String> names = new ArrayList<>(List.of("report.html", "result.json"));
        names.addAll(tables);
        for (String figure : figures) {
            names.add(figure);
            names.add(png(figure));
        }
        return "Written to " + folder + ": " + String.join(", ", names);
    }

    /**
     * Writes everything.
     *
     * @throws ProblemException of kind FILE, if something cannot be written
     */
    void write(Outcome outcome, JobFile job, List<String> settings) {
        Result result = outcome.result();
        try {
            Files.createDirectories(folder);
            for (Table table : result.tables()) {
                String name = table.name() + ".csv";
                WholeFile.write(folder.resolve(name), TableCsv.toText(table));
                tables.add(name);
            }
            List<Picture> pictures = new ArrayList<>();
            for (Figure figure : result.figures()) {
                Picture picture = Pictures.of(figure, Width.FULL);
                String name = figure.name() + ".svg";
                WholeFile.write(folder.resolve(name), picture.svg());
                byte[] png = picture.png();
                WholeFile.write(folder.resolve(png(name)), stream -> stream.write(png));
                pictures.add(picture);
                figures.add(name);
            }
            String text = new String(Files.readAllBytes(job.path()), StandardCharsets.UTF_8);
            WholeFile.write(
                    folder.resolve("report.html"),
                    HtmlReport.of(
                            outcome,
                            pictures,
                            new HtmlReport.Origin(Version.text(), job.path().toString(), text, job.root(), settings)));
            WholeFile.write(
                    folder.resolve("result.json"),
                    stream -> ResultJson.writeIndented(outcome, Version.text(), tables, figures, stream));
        } catch (IOException e) {
            throw new ProblemException(Problem.file(Place.of("--out " + folder), reason(e)));
        }
    }

    private static String png(String svg) {
        return svg.substring(0, svg.length() - "svg".length()) + "png";
    }

    private static String reason(IOException e) {
        String name = e.getMessage() == null ? "a file" : e.getMessage();
        if (e instanceof AccessDeniedException) {
            return name + " may not be written: access is denied";
        }
        if (e instanceof FileAlreadyExistsException) {
            return name + " is a file, not a folder; name another folder";
        }
        if (e instanceof NoSuchFileException) {
            return name + " is not there";
        }
        return "writing failed: " + name;
    }
}
