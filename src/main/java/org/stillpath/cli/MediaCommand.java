package org.stillpath.cli;

import java.nio.charset.StandardCharsets;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import java.util.concurrent.Callable;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Vector;
import org.stillpath.io.FileSources;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Level;
import org.stillpath.medium.Material;
import org.stillpath.medium.MaterialReader;
import org.stillpath.medium.Media;
import org.stillpath.medium.Medium;
import org.stillpath.medium.MediumFile;
import org.stillpath.medium.SolidMedium;
import org.stillpath.problem.Place;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.report.PlainText;
import org.stillpath.unit.Display;
import picocli.CommandLine.Command;
import picocli.CommandLine.Parameters;

/** {@code stillpath media [NAME]}: what ships with the program. */
@Command(
        name = "media",
        mixinStandardHelpOptions = true,
        description = {
            "Lists the media that ship with the program; shows one: source, validity, index",
            "at sample points."
        })
final class MediaCommand implements Callable<Integer> {
    /** Vacuum wavelengths of the sample points: the lines F, d and C, a common laser, and the infrared. */
    private static final double[] WAVELENGTHS = {486.13e-9, 587.56e-9, 632.99e-9, 656.27e-9, 1064e-9};

    /** The same for materials, and lines of the infrared. */
    private static final double[] MICROMETRES = {0.48613, 0.58756, 0.63280, 0.65627, 1.064, 1.55, 4, 10.6};

    private static final double SAMPLE_WAVELENGTH = 587.56e-9;

    private final Console console;

    @Parameters(arity = "0..1", paramLabel = "NAME", description = "a medium of the list, such as rods/parabolic")
    private String name = "";

    MediaCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        try {
            String text = name.isEmpty() ? list() : shown();
            console.out().writeBytes(text.getBytes(StandardCharsets.UTF_8));
            return 0;
        } catch (ProblemException e) {
            return console.tell(e.problems());
        }
    }

    private static String list() {
        StringBuilder text = new StringBuilder();
        for (String builtIn : Media.of(List.of()).names()) {
            text.append(builtIn).append('\n');
        }
        for (String shipped : FileSources.shipped()) {
            if (!shipped.startsWith("demo/")) {
                text.append(shipped).append('\n');
            }
        }
        return text.toString();
    }

    private String shown() {
        Optional<Medium> builtIn = Media.of(List.of()).find(name);
        if (builtIn.isPresent()) {
            return shown(builtIn.get(), "", "", List.of());
        }
        Problems problems = new Problems();
        if (name.startsWith(MaterialReader.SHIPPED)) {
            FileSources sources = FileSources.of(Path.of("media.yaml"), false);
            String own = name.substring(MaterialReader.SHIPPED.length());
            MaterialReader.File file = MaterialReader.of(own, sources.document(name, Place.of(name)), problems);
            problems.throwIfAny();
            return shown(own, file);
        }
        MediumFile file = MediumFile.read(name, FileSources.of(Path.of("media.yaml"), false), problems);
        problems.throwIfAny();
        return shown(file.medium(), file.title(), file.note(), file.samples());
    }

    private String shown(Medium medium, String title, String note, List<MediumFile.Sample> samples) {
        StringBuilder text = new StringBuilder(PlainText.of(name)).append('\n');
        if (!title.isEmpty()) {
            text.append(PlainText.wrapped(title, "  ", "  ", 80));
        }
        text.append('\n');
        text.append(PlainText.wrapped(
                medium.source().isEmpty() ? "none given" : medium.source(), "  source:   ", "            ", 80));
        IndexField field = medium.field(SAMPLE_WAVELENGTH, medium.frame(Vector.ZERO));
        List<String> limits = field.limits().stream().map(Level::describe).toList();
        text.append(PlainText.wrapped(
                limits.isEmpty() ? "everywhere" : String.join(" and ", limits), "  valid:    ", "            ", 80));
        if (!note.isEmpty()) {
            text.append(PlainText.wrapped(note, "  note:     ", "            ", 80));
        }
        text.append('\n');
        if (field.uniform()) {
            uniform(medium, text);
        } else if (samples.isEmpty()) {
            varying(field, text);
        } else {
            sampled(medium, samples, text);
        }
        for (String warning : medium.warnings()) {
            text.append(PlainText.wrapped(warning, "warning: ", "         ", 80));
        }
        return text.toString();
    }

    /** A material: what a job writes, ranges, index and thermal slope. */
    private static String shown(String own, MaterialReader.File file) {
        Material m = file.material();
        StringBuilder text = new StringBuilder(PlainText.of(MaterialReader.SHIPPED + own)).append('\n');
        text.append(PlainText.wrapped(m.title(), "  ", "  ", 80)).append('\n');
        text.append(PlainText.wrapped("solid: {material: " + own + "}", "  in a job: ", "            ", 80));
        text.append(PlainText.wrapped(m.source(), "  source:   ", "            ", 80));
        text.append(PlainText.wrapped(
                String.format(
                        Locale.ROOT,
                        "%.4g um to %.4g um, %.4g degC to %.4g degC",
                        1e6 * m.wavelengths().shortest(),
                        1e6 * m.wavelengths().longest(),
                        m.coldest() - 273.15,
                        m.hottest() - 273.15),
                "  range:    ",
                "            ",
                80));
        text.append(PlainText.wrapped(
                String.format(
                        Locale.ROOT,
                        "dn/dT to %.3g %%, expansion %.4g 1/K to %.3g %% (standard uncertainties), Poisson's ratio %.3g",
                        100 * m.uncertainty().slope(),
                        m.elastic().expansion(),
                        100 * m.uncertainty().expansion(),
                        m.elastic().poisson()),
                "  thermal:  ",
                "            ",
                80));
        if (!file.note().isEmpty()) {
            text.append(PlainText.wrapped(file.note(), "  note:     ", "            ", 80));
        }
        text.append("\n  wavelength / um   index at 20 degC, absolute   dn/dT / (1e-6/K)\n");
        double[] jet = new double[3];
        for (double w : MICROMETRES) {
            double metres = 1e-6 * w;
            if (metres >= m.wavelengths().shortest()
                    && metres <= m.wavelengths().longest()) {
                m.law().at(metres).jet(SolidMedium.SIZED_AT, jet);
                text.append(String.format(Locale.ROOT, "  %15.4f   %24.6f   %16.2f\n", w, 1 + jet[0], 1e6 * jet[1]));
            }
        }
        return text.toString();
    }

    /** The index at the file's own sample points: computed, and as the source has it. */
    private static void sampled(Medium medium, List<MediumFile.Sample> samples, StringBuilder text) {
        text.append("  place in the medium's frame / mm        index      source\n");
        for (MediumFile.Sample s : samples) {
            double wavelength = Double.isNaN(s.wavelength()) ? SAMPLE_WAVELENGTH : s.wavelength();
            IndexField field = medium.field(wavelength, medium.frame(Vector.ZERO));
            String place = String.format(
                    Locale.ROOT, "(%.4g, %.4g, %.4g)", 1e3 * s.at().x(), 1e3 * s.at().y(), 1e3 * s.at().z());
            double n = index(field, s.at().x(), s.at().y(), s.at().z());
            text.append(String.format(Locale.ROOT, "  %-34s %.8f  %.8f%n", place, n, s.index())
                    .replace("\r", ""));
        }
    }

    private static void uniform(Medium medium, StringBuilder text) {
        text.append("  wavelength / nm   index\n");
        double[] wavelengths = medium.needsWavelength() ? WAVELENGTHS : new double[] {SAMPLE_WAVELENGTH};
        for (double wavelength : wavelengths) {
            IndexField field = medium.field(wavelength, medium.frame(Vector.ZERO));
            text.append(String.format(Locale.ROOT, "  %15.2f   %.9f%n", wavelength * 1e9, index(field, 0, 0, 0))
                    .replace("\r", ""));
        }
    }

    private static void varying(IndexField field, StringBuilder text) {
        text.append("  index at 587.56 nm, from the origin of the medium's frame\n");
        double extent = extent(field);
        for (int axis = 0; axis < 3; axis++) {
            List<String> cells = new ArrayList<>();
            for (int i = 0; i <= 3; i++) {
                double u = extent * i / 4;
                double n = index(field, axis == 0 ? u : 0, axis == 1 ? u : 0, axis == 2 ? u : 0);
                cells.add(String.format(
                        Locale.ROOT,
                        "%s %s",
                        Display.of(u, "m", 0),
                        Double.isNaN(n) ? "undefined" : String.format(Locale.ROOT, "%.6f", n)));
            }
            text.append("  ")
                    .append("xyz".charAt(axis))
                    .append(":  ")
                    .append(String.join("   ", cells))
                    .append('\n');
        }
    }

    /** Half the way along x that the medium may be used, 1 mm where there is no end to it. */
    private static double extent(IndexField field) {
        double[] gradient = new double[3];
        double inside = 0;
        for (double x = 1e-6; x < 1e3; x *= 1.05) {
            double at = x;
            boolean valid = field.limits().stream().allMatch(limit -> limit.value(at, 0, 0, gradient) > 0)
                    && !Double.isNaN(index(field, x, 0, 0));
            if (!valid) {
                // two digits read better than the exact edge
                double digit = Math.pow(10, Math.floor(Math.log10(inside)) - 1);
                return inside == 0 ? 1e-3 : Math.floor(inside / digit) * digit;
            }
            inside = x;
        }
        return 1e-3;
    }

    private static double index(IndexField field, double x, double y, double z) {
        Samples out = new Samples(1);
        field.sample(new double[] {x}, new double[] {y}, new double[] {z}, 1, Order.VALUE, out);
        return Math.sqrt(1 + out.value[0]);
    }
}
