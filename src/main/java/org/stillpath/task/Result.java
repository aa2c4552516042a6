package org.stillpath.task;

import java.util.Collections;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;

/**
 * What a task found, in SI, as data.
 *
 * @param task name of the task
 * @param title the job's title; empty where it has none
 * @param headline the answer as one plain sentence for people, with units and digits that the accuracy supports
 * @param quantities named values in the order in which they should be read
 * @param rays traced rays in the order given; empty for tasks without rays
 * @param paths stationary paths by optical length; empty for tasks without paths
 * @param images images of a sighted target, the highest first; empty for tasks without them
 * @param stars stars in the order given; empty for tasks without them
 * @param tables further tables, written as CSV
 * @param figures figures as data; empty where none was asked for
 * @param warnings what makes the result doubtful or was assumed, in words
 * @param cautions what can hurt, in words
 * @param accuracyReached whether every error estimate is within the asked accuracy; if not, the exit status is 3
 */
public record Result(
        String task,
        String title,
        String headline,
        Map<String, Quantity> quantities,
        List<RayRow> rays,
        List<PathRow> paths,
        List<ImageRow> images,
        List<StarRow> stars,
        List<Table> tables,
        List<Figure> figures,
        List<String> warnings,
        List<String> cautions,
        boolean accuracyReached) {

    /** A result without images and stars. */
    public Result(
            String task,
            String title,
            String headline,
            Map<String, Quantity> quantities,
            List<RayRow> rays,
            List<PathRow> paths,
            List<Table> tables,
            List<Figure> figures,
            List<String> warnings,
            List<String> cautions,
            boolean accuracyReached) {
        this(
                task,
                title,
                headline,
                quantities,
                rays,
                paths,
                List.of(),
                List.of(),
                tables,
                figures,
                warnings,
                cautions,
                accuracyReached);
    }

    /** A result without paths, images and stars. */
    public Result(
            String task,
            String title,
            String headline,
            Map<String, Quantity> quantities,
            List<RayRow> rays,
            List<Table> tables,
            List<Figure> figures,
            List<String> warnings,
            List<String> cautions,
            boolean accuracyReached) {
        this(task, title, headline, quantities, rays, List.of(), tables, figures, warnings, cautions, accuracyReached);
    }

    public Result {
        quantities = Collections.unmodifiableMap(new LinkedHashMap<>(quantities));
        rays = List.copyOf(rays);
        paths = List.copyOf(paths);
        images = List.copyOf(images);
        stars = List.copyOf(stars);
        tables = List.copyOf(tables);
        figures = List.copyOf(figures);
        warnings = List.copyOf(warnings);
        cautions = List.copyOf(cautions);
    }

    /** The same result under another headline, with other tables, figures and warnings: what a study makes of it. */
    public Result with(
            String otherHeadline,
            List<Table> otherTables,
            List<Figure> otherFigures,
            List<String> otherWarnings,
            boolean accurate) {
        return new Result(
                task,
                title,
                otherHeadline,
                quantities,
                rays,
                paths,
                otherTables,
                otherFigures,
                otherWarnings,
                cautions,
                accurate);
    }
}
