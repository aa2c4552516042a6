package org.stillpath.report;

import com.samskivert.mustache.Mustache;
import com.samskivert.mustache.Template;
import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import org.stillpath.job.Node;
import org.stillpath.plot.Picture;
import org.stillpath.study.Listing;
import org.stillpath.study.Outcome;
import org.stillpath.task.Result;

/**
 * A result as one self-contained page: the answer, the pictures, the numbers, how they were got, the inputs. No script, no
 * font, no reference to anything outside the file; every text from a job is escaped.
 *
 * <p>The page's layout is a template without logic ({@code page.mustache}) beside its style sheet, so that neither is
 * hidden in code.
 */
public final class HtmlReport {
    private static final char FIGURE_SPACE = '\u2007';
    private static final char MINUS = '\u2212';

    private HtmlReport() {}

    /**
     * Where a result came from.
     *
     * @param version the program's version
     * @param name the job file's name
     * @param text the job file as it stands
     * @param tree the job as it was run, overrides included
     * @param overrides what was given on the command line, {@code path=value}
     */
    public record Origin(String version, String name, String text, Node.Mapping tree, List<String> overrides) {
        public Origin {
            overrides = List.copyOf(overrides);
        }
    }

    /**
     * The page as text, to be written in UTF-8.
     *
     * @param outcome what was found
     * @param pictures its figures, drawn
     * @param origin where it came from
     */
    public static String of(Outcome outcome, List<Picture> pictures, Origin origin) {
        Result result = outcome.result();
        Template template = Mustache.compiler().emptyStringIsFalse(true).compile(resource("page.mustache"));
        List<Row> rows = Row.of(result);
        return template.execute(Map.ofEntries(
                Map.entry("style", resource("page.css")),
                Map.entry("version", origin.version()),
                Map.entry("heading", result.title().isBlank() ? Labels.of(result.task()) : tidy(result.title())),
                Map.entry("answer", tidy(result.headline())),
                Map.entry(
                        "warnings",
                        result.warnings().stream().map(HtmlReport::tidy).toList()),
                Map.entry("hasCautions", !result.cautions().isEmpty()),
                Map.entry(
                        "cautions",
                        result.cautions().stream().map(HtmlReport::tidy).toList()),
                Map.entry(
                        "figures",
                        pictures.stream()
                                .map(p -> Map.of("svg", p.svg(), "caption", p.description()))
                                .toList()),
                Map.entry("hasQuantities", !rows.isEmpty()),
                Map.entry("quantities", quantities(rows)),
                Map.entry(
                        "nominal",
                        outcome.findings().isEmpty()
                                ? ""
                                : tidy(outcome.nominal().headline())),
                Map.entry("tables", tables(outcome)),
                Map.entry("methods", Methods.of(outcome)),
                Map.entry("conventions", Methods.conventions(result.task())),
                Map.entry("inputs", inputs(origin.tree())),
                Map.entry(
                        "overrides",
                        origin.overrides().stream().map(HtmlReport::tidy).toList()),
                Map.entry("jobName", tidy(origin.name())),
                Map.entry("jobText", origin.text().lines().map(HtmlReport::tidy).reduce("", (a, b) -> a + b + "\n"))));
    }

    private static List<Map<String, String>> quantities(List<Row> rows) {
        List<String> numbers = Column.aligned(
                rows.stream().map(r -> r.isWord() ? "" : r.value()).toList());
        List<Map<String, String>> shown = new ArrayList<>();
        for (int i = 0; i < rows.size(); i++) {
            Row row = rows.get(i);
            shown.add(Map.of(
                    "name", row.name(),
                    "value", row.isWord() ? row.value() : typeset(numbers.get(i)),
                    "unit", row.unit(),
                    "error", typeset(row.error())));
        }
        return shown;
    }

    private static List<Map<String, Object>> tables(Outcome outcome) {
        Result result = outcome.result();
        List<Map<String, Object>> tables = new ArrayList<>();
        for (Listing listing : outcome.listings()) {
            tables.add(table(tidy(listing.heading()), "rows", listing.name(), RowTable.listing(listing, 200)));
        }
        if (!result.rays().isEmpty()) {
            tables.add(table("Rays", "rays", "rays", RowTable.rays(result.rays(), 200)));
        }
        if (!result.paths().isEmpty()) {
            tables.add(table("Paths", "paths", "paths", RowTable.paths(result.paths(), 200)));
        }
        if (!result.images().isEmpty()) {
            tables.add(table("Images", "images", "images", RowTable.images(result.images(), 200)));
        }
        if (!result.stars().isEmpty()) {
            tables.add(table("Stars", "stars", "stars", RowTable.stars(result.stars(), 200)));
        }
        return tables;
    }

    private static Map<String, Object> table(String heading, String what, String file, RowTable table) {
        List<Map<String, Object>> rows = table.rows().stream()
                .map(cells -> Map.<String, Object>of(
                        "cells", cells.stream().map(HtmlReport::typeset).toList()))
                .toList();
        return Map.of(
                "heading",
                heading,
                "columns",
                table.headers(),
                "rows",
                rows,
                "more",
                table.left() == 0
                        ? ""
                        : "And " + table.left() + " more " + what + ": see " + file + ".csv or result.json.",
                "notes",
                table.notes().stream().map(HtmlReport::tidy).toList());
    }

    private static List<Map<String, String>> inputs(Node.Mapping tree) {
        List<Map<String, String>> leaves = new ArrayList<>();
        collect("", tree, leaves);
        return leaves;
    }

    private static void collect(String path, Node node, List<Map<String, String>> leaves) {
        if (node instanceof Node.Mapping mapping) {
            for (Node.Entry entry : mapping.entries()) {
                collect(path.isEmpty() ? entry.key() : path + "." + entry.key(), entry.value(), leaves);
            }
        } else if (node instanceof Node.Sequence sequence && !allScalars(sequence)) {
            for (int i = 0; i < sequence.items().size(); i++) {
                collect(path + "[" + i + "]", sequence.items().get(i), leaves);
            }
        } else {
            leaves.add(Map.of("path", tidy(path), "value", tidy(text(node))));
        }
    }

    private static boolean allScalars(Node.Sequence sequence) {
        return sequence.items().stream().allMatch(Node.Scalar.class::isInstance);
    }

    private static String text(Node node) {
        if (node instanceof Node.Scalar scalar) {
            return scalar.text();
        }
        if (node instanceof Node.Sequence sequence) {
            return String.join(
                    ", ", sequence.items().stream().map(HtmlReport::text).toList());
        }
        return "";
    }

    /** Numbers with a real minus sign, padded by blanks as wide as a digit. */
    private static String typeset(String number) {
        String padded = number.replace(' ', FIGURE_SPACE);
        return padded.matches("\\u2007*-?\\d.*") ? padded.replace('-', MINUS) : number;
    }

    private static String tidy(String text) {
        return PlainText.of(text);
    }

    private static String resource(String name) {
        try (InputStream in = HtmlReport.class.getResourceAsStream(name)) {
            if (in == null) {
                throw new IllegalStateException(name + " is missing from the jar");
            }
            return new String(in.readAllBytes(), StandardCharsets.UTF_8);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }
}
