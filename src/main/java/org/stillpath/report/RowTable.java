package org.stillpath.report;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import org.stillpath.study.Listing;
import org.stillpath.task.ImageRow;
import org.stillpath.task.PathRow;
import org.stillpath.task.RayRow;
import org.stillpath.task.StarRow;
import org.stillpath.unit.Display;

/**
 * Traced rays, or paths, as a table for people; units in the headers.
 *
 * @param headers column headers
 * @param rows cells by rows, numbers padded on the left so that their points stand in one line
 * @param left how many rays were left out at the end
 * @param notes why rays ended early, one line a ray
 */
record RowTable(List<String> headers, List<List<String>> rows, int left, List<String> notes) {

    /** The first {@code most} rows of a study's table. */
    static RowTable listing(Listing all, int most) {
        int count = Math.min(all.rows(), most);
        List<String> headers = new ArrayList<>();
        List<List<String>> columns = new ArrayList<>();
        for (Listing.Column c : all.columns()) {
            if (c instanceof Listing.Numbers n) {
                double[] errors = new double[count];
                java.util.Arrays.fill(errors, n.error());
                double[] values = java.util.Arrays.copyOf(n.values(), count);
                Column.Cells cells = n.shown().isEmpty()
                        ? Column.of(values, errors, n.unit())
                        : Column.in(values, errors, n.shown());
                headers.add(name(c.name()) + (cells.unit().isEmpty() ? "" : " / " + cells.unit()));
                columns.add(Column.aligned(cells.texts()));
            } else if (c instanceof Listing.Mixed m) {
                double[] values = m.values();
                double[] errors = m.errors();
                List<String> numbers = new ArrayList<>();
                List<String> units = new ArrayList<>();
                for (int i = 0; i < count; i++) {
                    if (Double.isNaN(values[i])) {
                        numbers.add("");
                        units.add("");
                        continue;
                    }
                    // what lies within its own error of zero is zero to a reader
                    double value = Math.abs(values[i]) <= errors[i] ? 0 : values[i];
                    String shown = m.shown().get(i);
                    Display.Reading r = shown.isEmpty()
                            ? Display.of(value, m.units().get(i), errors[i])
                            : Display.in(value, shown, errors[i]);
                    numbers.add(r.number());
                    units.add(r.unit());
                }
                List<String> aligned = Column.aligned(numbers);
                List<String> cells = new ArrayList<>();
                int width = aligned.stream().mapToInt(PlainText::columns).max().orElse(0);
                for (int i = 0; i < count; i++) {
                    String gap = " ".repeat(width - PlainText.columns(aligned.get(i)));
                    cells.add((aligned.get(i) + gap + " " + units.get(i)).stripTrailing());
                }
                headers.add(name(c.name()));
                columns.add(cells);
            } else if (c instanceof Listing.Texts t) {
                headers.add(name(c.name()));
                columns.add(
                        t.cells().subList(0, count).stream().map(PlainText::of).toList());
            }
        }
        List<List<String>> rows = new ArrayList<>();
        for (int i = 0; i < count; i++) {
            int row = i;
            rows.add(columns.stream().map(c -> c.get(row)).toList());
        }
        return new RowTable(headers, rows, all.rows() - count, List.of());
    }

    /** A path of an input or a result, as short as it is still plain. */
    private static String name(String path) {
        return path.startsWith("quantities.") ? Labels.of(path.substring("quantities.".length())) : path;
    }

    /** The first {@code most} paths: number, kind, optical length, excess over the first, direction at the start. */
    static RowTable paths(List<PathRow> all, int most) {
        List<PathRow> paths = all.subList(0, Math.min(all.size(), most));
        int count = paths.size();
        double[] opticals = new double[count];
        double[] excesses = new double[count];
        double[] errors = new double[count];
        double[] directions = new double[3 * count];
        double[] angles = new double[count];
        for (int i = 0; i < count; i++) {
            PathRow path = paths.get(i);
            opticals[i] = path.opticalLength();
            excesses[i] = path.excess();
            errors[i] = path.errors().getOrDefault("optical-length", 0.0);
            directions[3 * i] = path.launch().x();
            directions[3 * i + 1] = path.launch().y();
            directions[3 * i + 2] = path.launch().z();
            angles[i] = 1e-6;
        }
        Column.Cells optical = Column.of(opticals, errors, "m");
        Column.Cells excess = Column.of(excesses, errors, "m");
        Column.Cells direction = Column.of(directions, angles, "1");
        List<String> lengths = Column.aligned(optical.texts());
        List<String> longer = Column.aligned(excess.texts());
        List<List<String>> rows = new ArrayList<>();
        for (int i = 0; i < count; i++) {
            PathRow path = paths.get(i);
            String launch = String.join(", ", direction.texts().subList(3 * i, 3 * i + 3));
            rows.add(List.of(
                    String.valueOf(i),
                    path.kind(),
                    String.valueOf(path.morseIndex()),
                    lengths.get(i),
                    longer.get(i),
                    "(" + launch + ")"));
        }
        return new RowTable(
                List.of("path", "kind", "index", "optical / " + optical.unit(), "excess / " + excess.unit(), "launch"),
                rows,
                all.size() - count,
                List.of());
    }

    /**
     * The first {@code most} images: how each is seen, its elevation and refraction, k, its vertical magnification and least
     * clearance. Angles in arc seconds and minutes, which is how a survey speaks; files carry radians.
     */
    static RowTable images(List<ImageRow> all, int most) {
        List<ImageRow> images = all.subList(0, Math.min(all.size(), most));
        List<String> elevations = new ArrayList<>();
        List<String> refractions = new ArrayList<>();
        List<String> coefficients = new ArrayList<>();
        List<String> magnifications = new ArrayList<>();
        List<String> clearances = new ArrayList<>();
        List<String> notes = new ArrayList<>();
        for (int i = 0; i < images.size(); i++) {
            ImageRow image = images.get(i);
            elevations.add(fixed(Math.toDegrees(image.launch()) * 60, 4));
            refractions.add(fixed(Math.toDegrees(image.refractionAtFrom()) * 3600, 2));
            coefficients.add(
                    image.coefficient().isPresent() ? fixed(image.coefficient().getAsDouble(), 3) : "");
            magnifications.add(fixed(image.magnification(), 4));
            clearances.add(fixed(image.lowest(), 3));
            notes.add("image " + i + ": lowest over the ground at " + Display.of(image.lowestAt(), "m", 1)
                    + (image.remark().isEmpty() ? "" : "; k: " + image.remark()));
        }
        List<String> e = Column.aligned(elevations);
        List<String> r = Column.aligned(refractions);
        List<String> k = Column.aligned(coefficients);
        List<String> m = Column.aligned(magnifications);
        List<String> c = Column.aligned(clearances);
        List<List<String>> rows = new ArrayList<>();
        for (int i = 0; i < images.size(); i++) {
            rows.add(List.of(
                    String.valueOf(i), images.get(i).orientation(), e.get(i), r.get(i), k.get(i), m.get(i), c.get(i)));
        }
        return new RowTable(
                List.of("image", "seen", "elevation / '", "refraction / \"", "k", "magnified", "clearance / m"),
                rows,
                all.size() - images.size(),
                notes);
    }

    /** The first {@code most} stars: apparent zenith distance and refraction. */
    static RowTable stars(List<StarRow> all, int most) {
        List<StarRow> stars = all.subList(0, Math.min(all.size(), most));
        List<String> zeniths = new ArrayList<>();
        List<String> refractions = new ArrayList<>();
        List<String> notes = new ArrayList<>();
        for (StarRow star : stars) {
            zeniths.add(fixed(Math.toDegrees(star.apparentZenith()), 4));
            refractions.add(
                    star.refraction().isPresent()
                            ? fixed(Math.toDegrees(star.refraction().getAsDouble()) * 3600, 3)
                            : "");
            if (!star.note().isEmpty()) {
                notes.add("at " + fixed(Math.toDegrees(star.apparentZenith()), 4) + " deg: " + star.note());
            }
        }
        List<String> z = Column.aligned(zeniths);
        List<String> r = Column.aligned(refractions);
        List<List<String>> rows = new ArrayList<>();
        for (int i = 0; i < stars.size(); i++) {
            rows.add(List.of(z.get(i), r.get(i)));
        }
        return new RowTable(
                List.of("apparent zenith / deg", "refraction / \""), rows, all.size() - stars.size(), notes);
    }

    private static String fixed(double value, int decimals) {
        String text = String.format(Locale.ROOT, "%." + decimals + "f", value);
        return text.matches("-0(\\.0*)?") ? text.substring(1) : text;
    }

    /** The first {@code most} rays: number, status, where it ended, optical length. */
    static RowTable rays(List<RayRow> all, int most) {
        List<RayRow> rays = all.subList(0, Math.min(all.size(), most));
        int count = rays.size();
        double[] positions = new double[3 * count];
        double[] positionErrors = new double[count];
        double[] opticals = new double[count];
        double[] opticalErrors = new double[count];
        for (int i = 0; i < count; i++) {
            RayRow ray = rays.get(i);
            positions[3 * i] = ray.position().x();
            positions[3 * i + 1] = ray.position().y();
            positions[3 * i + 2] = ray.position().z();
            opticals[i] = ray.opticalLength();
            positionErrors[i] = ray.errors().getOrDefault("position", 0.0);
            opticalErrors[i] = ray.errors().getOrDefault("optical-length", 0.0);
        }
        Column.Cells position = Column.of(positions, positionErrors, "m");
        Column.Cells optical = Column.of(opticals, opticalErrors, "m");
        List<List<String>> axes = new ArrayList<>();
        for (int axis = 0; axis < 3; axis++) {
            List<String> numbers = new ArrayList<>();
            for (int i = 0; i < count; i++) {
                numbers.add(position.texts().get(3 * i + axis));
            }
            axes.add(Column.aligned(numbers));
        }
        List<String> lengths = Column.aligned(optical.texts());
        List<List<String>> rows = new ArrayList<>();
        List<String> notes = new ArrayList<>();
        for (int i = 0; i < count; i++) {
            RayRow ray = rays.get(i);
            rows.add(List.of(
                    String.valueOf(i),
                    Labels.of(ray.status()),
                    axes.get(0).get(i),
                    axes.get(1).get(i),
                    axes.get(2).get(i),
                    lengths.get(i)));
            if (!ray.note().isEmpty()) {
                notes.add("ray " + i + ": " + ray.note());
            }
        }
        String unit = " / " + position.unit();
        return new RowTable(
                List.of("ray", "status", "x" + unit, "y" + unit, "z" + unit, "optical length / " + optical.unit()),
                rows,
                all.size() - count,
                notes);
    }
}
