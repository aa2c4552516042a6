package org.stillpath.study;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.stillpath.io.YamlReader;
import org.stillpath.job.Cells;
import org.stillpath.job.Lattice;
import org.stillpath.job.Node;
import org.stillpath.job.Sources;
import org.stillpath.job.Table;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.task.Tasks;

class StudiesTest {
    private static final String ROD = """
            task: lens
            wavelength: 633 nm
            media:
              air0: {index: 1}
              rod: {index: "n0*sqrt(1 - (g*r)^2)", with: {n0: 1.6, g: 0.3 1/mm}}
            train:
              from: air0
              surfaces:
                - {at: 0 mm, into: rod, aperture: 0.9 mm}
                - {at: 2.5 mm, into: air0, aperture: 0.9 mm}
            """;

    private static Node.Mapping read(String yaml) {
        Problems problems = new Problems();
        Node.Mapping job = YamlReader.parse(yaml.getBytes(StandardCharsets.UTF_8), "job.yaml", problems);
        problems.throwIfAny();
        return job;
    }

    private static Outcome run(String study, Studies.Means means) {
        return Studies.run(read(ROD + study), Sources.none(), new Tasks.Options(true), means);
    }

    private static Outcome run(String study) {
        return run(study, Studies.Means.plain());
    }

    private static List<String> faults(String yaml) {
        try {
            Studies.check(read(yaml), Sources.none());
            return List.of();
        } catch (ProblemException e) {
            return e.problems().stream().map(Problem::toString).toList();
        }
    }

    /** A part of a document by keys and places in lists. */
    private static Doc at(Doc doc, Object... path) {
        Doc here = doc;
        for (Object step : path) {
            if (here instanceof Doc.Fields f && step instanceof String key) {
                Doc next = f.values().get(key);
                assertThat(next).as(key).isNotNull();
                here = java.util.Objects.requireNonNull(next);
            } else if (here instanceof Doc.Items items && step instanceof Integer i) {
                here = items.values().get(i);
            } else {
                throw new AssertionError(step + " in " + here);
            }
        }
        return here;
    }

    private static double number(Doc doc, Object... path) {
        Doc found = at(doc, path);
        assertThat(found).isInstanceOf(Doc.Amount.class);
        return ((Doc.Amount) found).value();
    }

    private static double[] numbers(Doc doc, Object... path) {
        Doc found = at(doc, path);
        assertThat(found).isInstanceOf(Doc.Items.class);
        return ((Doc.Items) found)
                .values().stream().mapToDouble(v -> ((Doc.Amount) v).value()).toArray();
    }

    /** Back focal distance of the rod in closed form: cos(g l)/(n0 g sin(g l)), the paraxial constant of such a rod. */
    private static double focus(double n0, double g, double length) {
        return 1 / (n0 * g * Math.tan(g * length));
    }

    @Test
    void sweepsOneInput() {
        Outcome o = run("""
                study:
                  sweep: {media.rod.with.g: {from: 0.28 1/mm, to: 0.32 1/mm, count: 5}}
                  watch: [quantities.back-focal-distance]
                """);
        for (int i = 0; i < 5; i++) {
            double[] in = numbers(o.doc(), "sweep", "rows", i, "inputs");
            double[] out = numbers(o.doc(), "sweep", "rows", i, "results");
            assertThat(in[0]).isCloseTo(280 + 10 * i, within(1e-9));
            assertThat(out[0]).isCloseTo(focus(1.6, in[0], 2.5e-3), within(1e-12));
        }
        assertThat(o.result().figures().get(0).name()).isEqualTo("sweep");
        assertThat(o.listings().get(0).table().columns())
                .containsExactly("media.rod.with.g [1/m]", "quantities.back-focal-distance [m]");
    }

    @Test
    void sweepsTwoInputsTheFirstSlowest() {
        Outcome o = run("""
                study:
                  sweep:
                    train.surfaces.1.at: {from: 2 mm, to: 3 mm, count: 2}
                    media.rod.with.g: {values: [0.28 1/mm, 0.3 1/mm, 0.31 1/mm]}
                  watch: [quantities.back-focal-distance, quantities.power]
                """);
        double[] lengths = {2e-3, 2e-3, 2e-3, 3e-3, 3e-3, 3e-3};
        double[] g = {280, 300, 310, 280, 300, 310};
        for (int i = 0; i < 6; i++) {
            assertThat(numbers(o.doc(), "sweep", "rows", i, "inputs"))
                    .containsExactly(new double[] {lengths[i], g[i]}, within(1e-12));
            assertThat(numbers(o.doc(), "sweep", "rows", i, "results")[0])
                    .isCloseTo(focus(1.6, g[i], lengths[i]), within(1e-12));
        }
    }

    @Test
    void runsThatFailAreToldAndTheRestStays() {
        Outcome o = run("""
                study:
                  sweep: {"train.surfaces[1].at": {values: [-1 mm, 1 mm, 2 mm]}}
                  watch: [quantities.back-focal-distance]
                """);
        assertThat(numbers(o.doc(), "sweep", "rows", 0, "results")[0]).isNaN();
        assertThat(at(o.doc(), "sweep", "rows", 0, "fault").toString()).contains("put them in order");
        assertThat(numbers(o.doc(), "sweep", "rows", 2, "results")[0]).isCloseTo(focus(1.6, 300, 2e-3), within(1e-12));
        assertThat(o.result().warnings().toString()).contains("1 of 3 runs could not be computed");
    }

    /** Linear propagation in closed form, and the samples near it. */
    @Test
    void budgetOfARod() {
        Outcome o = run("""
                study:
                  budget:
                    inputs:
                      media.rod.with.g: {standard: 0.003 1/mm}
                      media.rod.with.n0: {triangular: 0.004}
                    samples: 5000
                    limits: {quantities.back-focal-distance: {low: 2.2363 mm}}
                  watch: [quantities.back-focal-distance]
                """);
        Doc b = at(o.doc(), "budget", "quantities.back-focal-distance");
        double f = focus(1.6, 300, 2.5e-3);
        double gl = 0.75;
        double byG = -f / 300 - 2.5e-3 / (1.6 * 300 * Math.sin(gl) * Math.sin(gl));
        double byN = -f / 1.6;
        double u = Math.hypot(byG * 3, byN * 0.004 / Math.sqrt(6));
        assertThat(number(b, "value")).isCloseTo(f, within(1e-12));
        assertThat(number(b, "contributions", 0, "sensitivity")).isCloseTo(byG, within(1e-8 * Math.abs(byG)));
        assertThat(number(b, "standard-uncertainty")).isCloseTo(u, within(1e-7 * u));
        assertThat(number(b, "coverage-factor")).isCloseTo(1.959964, within(1e-6));
        assertThat(number(b, "monte-carlo", "standard-uncertainty")).isCloseTo(u, within(0.05 * u));
        assertThat(number(b, "monte-carlo", "yield")).isCloseTo(0.5, within(0.04));
        assertThat(at(b, "monte-carlo", "agrees")).isEqualTo(new Doc.Flag(true));
        assertThat(o.result().figures().stream().map(x -> x.name()))
                .containsExactly("budget-contributions", "budget-histogram", "rays");
    }

    /** A result that is there for some samples only is counted, not averaged away. */
    @Test
    void countsSamplesWithoutTheResult() {
        Outcome o = run("""
                object: {distance: 20 mm, height: 1 mm}
                study:
                  budget:
                    inputs: {"train.surfaces[1].at": {half-width: 2.6 mm}}
                    samples: 2000
                  watch: [quantities.image-distance]
                """);
        Doc mc = at(o.doc(), "budget", "quantities.image-distance", "monte-carlo");
        // lengths from -0.1 mm to 5.1 mm: 1 in 52 is no rod
        long missing = ((Doc.Count) at(mc, "missing")).value();
        assertThat((double) missing / 2000).isCloseTo(1 / 52.0, within(0.01));
        assertThat(at(mc, "agrees")).isEqualTo(new Doc.Flag(false));
        assertThat(o.result().warnings().toString()).contains("could not be computed");
    }

    /** Where a clipped ray ended is no value of where it arrives. */
    @Test
    void aClippedRayGivesNoResult() {
        Outcome o = Studies.run(read("""
                        task: trace
                        train: {from: vacuum, surfaces: [{at: 0 mm, action: stop, aperture: 1 mm}]}
                        rays: [{from: [0, 0.5 mm, -5 mm], direction: [0, 0, 1]}]
                        stop-at: {z: 10 mm}
                        study:
                          sweep: {rays.0.from.1: {from: 0 mm, to: 2 mm, count: 5}}
                          watch: [rays.0.position.1]
                        """), Sources.none(), new Tasks.Options(false), Studies.Means.plain());
        double[] wanted = {0, 0.5e-3, 1e-3, Double.NaN, Double.NaN};
        for (int i = 0; i < 5; i++) {
            double got = numbers(o.doc(), "sweep", "rows", i, "results")[0];
            if (i != 2) {
                // the third ray grazes the rim
                assertThat(Double.valueOf(got)).isEqualTo(Double.valueOf(wanted[i]));
            }
        }
        assertThat(o.result().warnings().toString()).contains("have no position 1 of ray 0");
    }

    private static final String HOT_ROAD = """
            task: sightline
            wavelength: 550 nm
            media:
              field:
                air:
                  law: iag-1999
                  temperature: T0 + gamma*height + dTs*exp(-height/delta)
                  pressure: {value: 1013.25 hPa, at-height: 0 m, hydrostatic: standard}
                  humidity: 0 %
                with: {T0: 293.15 K, gamma: -0.0098 K/m, dTs: 20 K, delta: 0.1 m}
            through: field
            ground: {height: 0 m}
            from: {height: 1.5 m}
            to: {distance: 400 m, height: 0.1 m}
            study:
              budget:
                inputs: {to.height: {standard: 0.02 m}}
                samples: 150
              watch: ["images[0].launch-elevation"]
            """;

    /**
     * Over a hot road the two images of a target meet where it stands on the caustic, some 8 cm above the road, and there are
     * none below: there the samples contradict the linear budget, and it is said how many have no image. Well above it
     * they agree.
     */
    @Test
    void aSightNearACausticContradictsItsLinearBudget() {
        Outcome near = Studies.run(read(HOT_ROAD), Sources.none(), new Tasks.Options(false), Studies.Means.plain());
        Doc mc = at(near.doc(), "budget", "images[0].launch-elevation", "monte-carlo");
        assertThat(at(mc, "agrees")).isEqualTo(new Doc.Flag(false));
        long missing = ((Doc.Count) at(mc, "missing")).value();
        assertThat(missing).isBetween(5L, 60L);
        assertThat(near.result().warnings())
                .anyMatch(w -> w.startsWith("in " + missing + " of 150 samples") && w.contains("there is no"))
                .anyMatch(w -> w.contains("the linear budget") && w.contains("is not valid here"));
    }

    private static final String LINES = """
            task: sightline
            wavelength: 850 nm
            media:
              field:
                air:
                  law: ciddor-1996
                  temperature: T0 - lapse*height
                  pressure: {value: 1013.25 hPa, at-height: 0 m}
                  humidity: 50 %%
                with: {T0: 288.15 K, lapse: %s}
            through: field
            from: {height: 20 m}
            to: {distance: 3 km, height: 35 m}
            """;

    /** Zenith angles observed at both ends of three lines give the lapse of temperature; observed here: those of 8.2 K/km. */
    @Test
    void fitsTheLapseFromReciprocalZenithAngles() {
        StringBuilder match = new StringBuilder();
        StringBuilder variants = new StringBuilder();
        String[] lines = {"3 km", "5 km", "8 km"};
        for (int i = 0; i < lines.length; i++) {
            String job = LINES.formatted("8.2 K/km").replace("3 km", lines[i]);
            org.stillpath.task.ImageRow image = Tasks.run(read(job), Sources.none(), new Tasks.Options(false))
                    .images()
                    .get(0);
            // k = 503 p/T² (0.0343 + dT/dh), p in hPa (geodesists' usual formula, from memory)
            assertThat(image.coefficient().orElseThrow())
                    .isCloseTo(503 * 1013.25 / (288.15 * 288.15) * (0.0343 - 0.0082), within(0.006));
            variants.append("    line")
                    .append(i)
                    .append(": {to.distance: ")
                    .append(lines[i])
                    .append("}\n");
            double[] both = {image.launch(), -image.arrival()};
            String[] names = {"launch-elevation", "back-elevation"};
            for (int k = 0; k < 2; k++) {
                match.append("      - {variant: line%d, result: \"images[0].%s\", value: %s rad, standard: 1 arcsec}\n"
                        .formatted(i, names[k], both[k]));
            }
        }
        Outcome o = Studies.run(
                read(LINES.formatted("6.5 K/km") + "study:\n  fit:\n    unknowns:\n"
                        + "      media.field.with.lapse: {start: 6.5 K/km, low: -20 K/km, high: 30 K/km}\n"
                        + "    match:\n" + match + "    starts: 1\n  variants:\n" + variants),
                Sources.none(),
                new Tasks.Options(false),
                Studies.Means.plain());
        String unknown = "media.field.with.lapse";
        assertThat(number(o.doc(), "fit", "unknowns", unknown, "value")).isCloseTo(8.2e-3, within(1e-8));
        // both refraction angles of a line of length S are k S/(2R): six of them, each known to 1 arcsec, give by the
        // formula
        double slope = 503 * 1013.25 / (288.15 * 288.15) / (2 * 6371e3) * Math.sqrt(2 * (9e6 + 25e6 + 64e6));
        double u = Math.PI / 648_000 / slope;
        assertThat(number(o.doc(), "fit", "unknowns", unknown, "standard-uncertainty"))
                .isCloseTo(u, within(0.02 * u));
        assertThat(at(o.doc(), "fit", "degrees-of-freedom")).isEqualTo(new Doc.Count(5));
    }

    private static final String FIT = """
            study:
              fit:
                unknowns:
                  media.rod.with.g: {start: 0.3 1/mm, low: 0.2 1/mm, high: 0.4 1/mm}
                  media.rod.with.n0: {start: 1.6, low: 1.4, high: 1.8}
                match:
                  - {variant: short, result: quantities.back-focal-distance, value: %s mm, standard: 1 um}
                  - {variant: middle, result: quantities.back-focal-distance, value: %s mm, standard: 1 um}
                  - {variant: long, result: quantities.back-focal-distance, value: %s mm, standard: 1 um}
              variants:
                short: {train.surfaces.1.at: 1.5 mm}
                middle: {train.surfaces.1.at: 2.5 mm}
                long: {train.surfaces.1.at: 3.5 mm}
            """;

    @Test
    void fitsARodOfThreeLengths() {
        Outcome o = run(FIT.formatted(
                1e3 * focus(1.592, 312.7, 1.5e-3),
                1e3 * focus(1.592, 312.7, 2.5e-3),
                1e3 * focus(1.592, 312.7, 3.5e-3)));
        assertThat(number(o.doc(), "fit", "unknowns", "media.rod.with.g", "value"))
                .isCloseTo(312.7, within(1e-5));
        assertThat(number(o.doc(), "fit", "unknowns", "media.rod.with.n0", "value"))
                .isCloseTo(1.592, within(1e-7));
        assertThat(number(o.doc(), "fit", "unknowns", "media.rod.with.n0", "standard-uncertainty"))
                .isPositive();
        assertThat(at(o.doc(), "fit", "degrees-of-freedom")).isEqualTo(new Doc.Count(1));
        assertThat(o.result().warnings()).isEmpty();
    }

    @Test
    void saysThatUnknownsCannotBeToldApart() {
        Outcome o = run("""
                study:
                  fit:
                    unknowns:
                      train.surfaces[0].at: {start: 0.1 mm, low: -1 mm, high: 1 mm}
                      train.surfaces[1].at: {start: 2.4 mm, low: 2 mm, high: 3 mm}
                    match:
                      quantities.back-focal-distance: {value: 2.2 mm, standard: 1 um}
                      quantities.power: {value: 330 1/m, standard: 0.1 1/m}
                    starts: 1
                """);
        assertThat(o.result().warnings().toString())
                .contains("train.surfaces[0].at and train.surfaces[1].at cannot be told apart");
    }

    /** The rod length for collimation: light from its face leaves it parallel at a quarter of its pitch, g l = π/2. */
    @Test
    void findsTheLengthForCollimation() {
        Outcome o = run("""
                study:
                  fit:
                    unknowns: {"train.surfaces[1].at": {start: 4 mm, low: 3 mm, high: 7 mm}}
                    match: {quantities.back-focal-distance: {value: 0 mm}}
                """);
        assertThat(number(o.doc(), "fit", "unknowns", "train.surfaces[1].at", "value"))
                .isCloseTo(Math.PI / 2 / 300, within(1e-9));
    }

    @Test
    void digitsDoNotDependOnThreads() {
        String study = """
                study:
                  sweep: {media.rod.with.g: {from: 0.28 1/mm, to: 0.32 1/mm, count: 41}}
                  budget:
                    inputs: {media.rod.with.g: {standard: 0.003 1/mm}, media.rod.with.n0: {half-width: 0.002}}
                    samples: 600
                  watch: [quantities.back-focal-distance, quantities.power]
                """;
        Doc one = run(study, new Studies.Means(1, Store.none(), Progress.SILENT, ""))
                .doc();
        Doc four = run(study, new Studies.Means(4, Store.none(), Progress.SILENT, ""))
                .doc();
        assertThat(four).isEqualTo(one);
    }

    @Test
    void saysHowLongItWillTakeBeforeItBegins() {
        List<String> told = new ArrayList<>();
        Progress progress = new Progress() {
            @Override
            public void ahead(long runs, double seconds) {
                assertThat(seconds).isBetween(1e-6, 600.0);
                told.add(runs + " ahead");
            }

            @Override
            public void at(String stage, long done, long total) {
                told.add(stage + " " + done + " of " + total);
            }
        };
        run("""
                study:
                  budget: {inputs: {media.rod.with.g: {standard: 0.003 1/mm}}, samples: 400}
                  watch: [quantities.power]
                """, new Studies.Means(1, Store.none(), progress, ""));
        assertThat(told).startsWith("408 ahead", "sensitivities 0 of 8");
        assertThat(told).endsWith("samples 400 of 400");
    }

    /** Keeps parts in memory and fails after some of them, as a killed process would. */
    private static final class Fragile implements Store {
        private final Map<String, List<Part>> kept = new HashMap<>();
        private final List<String> opened = new ArrayList<>();
        private int left;

        @Override
        public void open(String fingerprint) {
            opened.add(fingerprint);
        }

        @Override
        public List<Part> parts(String stage) {
            return List.copyOf(kept.getOrDefault(stage, List.of()));
        }

        @Override
        public void add(String stage, Part part) {
            if (left-- <= 0) {
                throw new IllegalStateException("killed");
            }
            kept.computeIfAbsent(stage, s -> new ArrayList<>()).add(part);
        }
    }

    @Test
    void anInterruptedStudyGoesOnToTheSameDigits() {
        String study = """
                study:
                  sweep: {media.rod.with.g: {from: 0.28 1/mm, to: 0.32 1/mm, count: 41}}
                  budget:
                    inputs: {media.rod.with.g: {standard: 0.003 1/mm}}
                    samples: 500
                  fit:
                    unknowns: {media.rod.with.g: {start: 0.3 1/mm, low: 0.2 1/mm, high: 0.4 1/mm}}
                    match: {quantities.back-focal-distance: {value: 2.1 mm, standard: 1 um}}
                    starts: 2
                  watch: [quantities.back-focal-distance]
                """;
        Doc whole = run(study).doc();
        Fragile store = new Fragile();
        int interruptions = 0;
        while (true) {
            store.left = 7;
            try {
                Outcome o = run(study, new Studies.Means(2, store, Progress.SILENT, ""));
                assertThat(o.doc()).isEqualTo(whole);
                break;
            } catch (IllegalStateException e) {
                interruptions++;
            }
        }
        assertThat(interruptions).isGreaterThan(2);
        assertThat(store.opened.stream().distinct()).hasSize(1);
    }

    @Test
    void anotherJobHasAnotherFingerprint() {
        Fragile store = new Fragile();
        store.left = 1000;
        Studies.Means means = new Studies.Means(1, store, Progress.SILENT, "1");
        String study = """
                study:
                  sweep: {media.rod.with.g: {from: 0.28 1/mm, to: 0.32 1/mm, count: 3}}
                """;
        run(study, means);
        run("# a comment\n" + study, means);
        run(study.replace("0.32", "0.33"), means);
        run(study, new Studies.Means(1, store, Progress.SILENT, "2"));
        assertThat(store.opened.get(1)).isEqualTo(store.opened.get(0));
        assertThat(store.opened.subList(1, 4)).doesNotHaveDuplicates();
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            value = {
                "sweep: {media.rod.with.g: {from: 0.28 mm, to: 0.3 1/mm, count: 3}} | job.yaml:12:36 | an inverse length is needed",
                "sweep: {media.rod.index: {from: 1, to: 2, count: 3}}               | job.yaml:12:11 | is given under \"with\"",
                "sweep: {media.rod: {from: 1, to: 2, count: 3}}                     | job.yaml:12:11 | name one value in it",
                "sweep: {media.rod.with.g: {from: 0.28 1/mm, count: 3}}             | job.yaml:12:29 | \"to\" is missing",
                "sweep: {media.rod.with.g: {from: 0.28 1/mm, to: 1 1/mm, count: 1}} | job.yaml:12:66 | a whole number from 2",
                "sweep: {}                                                          | job.yaml:12:10 | one or two, such as",
                "sweeps: {}                                                         | job.yaml:12:3  | did you mean \"sweep\"",
                "watch: [power], sweep: {media.rod.with.n0: {from: 1.5, to: 2, count: 3}} | job.yaml:12:11 | not the path of a number",
                "budget: {inputs: {media.rod.with.g: {standard: 1}}}                | job.yaml:12:50 | an inverse length is needed",
                "budget: {inputs: {media.rod.with.g: {}}}                           | job.yaml:12:39 | half-width",
                "budget: {inputs: {media.rod.with.g: {standard: 1 1/mm, half-width: 1 1/mm}}} | job.yaml:12:39 | only one is needed",
                "budget: {inputs: {media.rod.with.q: {standard: 1 1/mm}}}           | job.yaml:12:21 | write the best estimate there",
                "budget: {inputs: {media.rod.with.n0: {standard: 1e-3}}, coverage: 2} | job.yaml:12:69 | up to 99.99 %",
                "budget: {inputs: {media.rod.with.n0: {trapezoidal: [1e-3, 2e-3]}}} | job.yaml:12:54 | the base comes first",
                "budget: {inputs: {media.rod.with.n0: {half-width: 1e-3}}, correlation: [[media.rod.with.n0, g, 1]]} | job.yaml:12:76 | joint normal",
                "fit: {unknowns: {media.rod.with.n0: {start: 3, low: 1, high: 2}}, match: {quantities.power: {value: 300 1/m}}} | job.yaml:12:47 | lies outside the bounds",
                "fit: {unknowns: {media.rod.with.n0: {start: 1.5}, media.rod.with.g: {start: 1 1/mm}}, match: {quantities.power: {value: 300 1/m}}} | job.yaml:12:96 | 2 unknowns need at least as many values",
                "fit: {unknowns: {media.rod.with.n0: {start: 1.5}}, match: [{variant: x, result: quantities.power, value: 300 1/m}]} | job.yaml:12:72 | there is no variant \"x\"",
                "batch: {file: rods.csv}                                            | job.yaml:12:17 | no files are at hand",
            })
    void tellsWhatIsWrong(String study, String place, String message) {
        List<String> faults = faults(ROD + "study:\n  " + study.trim().replace("], sweep", "]\n  sweep") + "\n");
        assertThat(faults).isNotEmpty();
        assertThat(faults.get(0)).contains(message.trim());
        assertThat(faults.get(0)).startsWith(place.trim() + ":");
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            value = {
                "watch: [quantities.bak-focal-distance], sweep: {media.rod.with.n0: {from: 1.5, to: 2, count: 3}} | job.yaml:12:11 | did you mean \"quantities.back-focal-distance\"",
                "watch: [rays.0.length], budget: {inputs: {media.rod.with.n0: {standard: 1e-3}}} | job.yaml:13:21 | it has no uncertainty either",
                "watch: [quantities.power], budget: {inputs: {media.rod.with.n0: {standard: 1e-3}}, limits: {quantities.power: {low: 3 mm}}} | job.yaml:13:92 | an inverse length is needed",
                "watch: [quantities.power], budget: {inputs: {media.rod.with.n0: {standard: 1e-3}}, limits: {quantities.pover: {low: 3 1/m}}} | job.yaml:13:68 | did you mean \"quantities.power\"",
                "watch: [quantities.power], fit: {unknowns: {media.rod.with.n0: {start: 1.5}}, match: {quantities.power: {value: 3 mm}}} | job.yaml:13:88 | an inverse length is needed"
            })
    void tellsWhatDoesNotFitTheResult(String study, String place, String message) {
        String yaml = ROD + "study:\n  " + study.trim().replaceFirst("\\], (?=[a-z])", "]\n  ") + "\n";
        assertThatThrownBy(
                        () -> Studies.run(read(yaml), Sources.none(), new Tasks.Options(false), Studies.Means.plain()))
                .isInstanceOfSatisfying(ProblemException.class, e -> {
                    assertThat(e.problems()).hasSize(1);
                    assertThat(e.problems().get(0).toString())
                            .startsWith(place.trim() + ":")
                            .contains(message.trim());
                });
    }

    @Test
    void temperatureDifferencesAreInKelvin() {
        List<String> faults = faults("""
                task: lens
                media: {warm: {air: {law: ciddor-1996, temperature: 20 degC, pressure: 1013 hPa, humidity: 0}}}
                train: {from: warm, surfaces: [{at: 0 mm, lens: 50 mm}]}
                study: {budget: {inputs: {media.warm.air.temperature: {standard: 1 degC}}}}
                """);
        assertThat(faults).hasSize(1);
        assertThat(faults.get(0)).startsWith("job.yaml:4:66: ").contains("a temperature difference is needed");
    }

    /** Angles of a file after every manner of writing; the same value to the last digit. */
    @Test
    void readsSexagesimalAngles() {
        assertThat(BatchStudy.sexagesimal("89 45 12.3")).contains("89°45'12.3\"");
        assertThat(BatchStudy.sexagesimal("89-45-12.3")).contains("89°45'12.3\"");
        assertThat(BatchStudy.sexagesimal("89:45:12.3")).contains("89°45'12.3\"");
        assertThat(BatchStudy.sexagesimal("89.45123")).contains("89°45'12.3\"");
        assertThat(BatchStudy.sexagesimal("-0 05 00")).contains("-0°05'00\"");
        assertThat(BatchStudy.sexagesimal("89°45'12.3\"")).contains("89°45'12.3\"");
        assertThat(BatchStudy.sexagesimal("89 45")).contains("89°45'");
        assertThat(BatchStudy.sexagesimal("eighty")).isEmpty();
    }

    private static Outcome batch(String head, String... rows) {
        List<Cells.Header> headers = new ArrayList<>();
        for (String h : head.split(",", -1)) {
            int open = h.indexOf(" [");
            headers.add(new Cells.Header(
                    open < 0 ? h : h.substring(0, open),
                    open < 0 ? "" : h.substring(open + 2, h.length() - 1),
                    new Place("t.csv", 1, 1)));
        }
        List<Cells.Row> lines = new ArrayList<>();
        for (String row : rows) {
            List<String> cells = List.of(row.split(",", -1));
            lines.add(new Cells.Row(
                    lines.size() + 2, cells, cells.stream().map(c -> 5).toList()));
        }
        Sources files = new Sources() {
            @Override
            public Node.Mapping document(String name, Place asked) {
                return Sources.none().document(name, asked);
            }

            @Override
            public Table table(String name, Place asked) {
                return Sources.none().table(name, asked);
            }

            @Override
            public Cells cells(String name, Place asked) {
                return new Cells("t.csv", headers, lines, List.of());
            }

            @Override
            public Lattice lattice(String name, Lattice.Wanted wanted, Place asked) {
                return Sources.none().lattice(name, wanted, asked);
            }
        };
        String study = "study: {batch: {file: t.csv}, watch: [quantities.back-focal-distance]}\n";
        return Studies.run(read(ROD + study), files, new Tasks.Options(false), Studies.Means.plain());
    }

    @Test
    void batchTellsFaultsByRow() {
        Outcome o = batch(
                "rod,media.rod.with.g [1/mm],train.surfaces[1].at [mm]",
                "A,0.31,2.5",
                "B,,2.5",
                "C,0.31,long",
                "D,0.32",
                "E,0.32,-2.5",
                "F,0.31,2.6");
        double[] wanted = {
            focus(1.6, 310, 2.5e-3), Double.NaN, Double.NaN, Double.NaN, Double.NaN, focus(1.6, 310, 2.6e-3)
        };
        String[] faults = {
            "",
            "t.csv:3:5: media.rod.with.g: the cell is empty",
            "\"long\" is not a number in mm",
            "t.csv:5:1: the row has" + " 2 cells",
            "put them in order",
            ""
        };
        for (int i = 0; i < wanted.length; i++) {
            double got = numbers(o.doc(), "batch", "rows", i, "results")[0];
            if (Double.isNaN(wanted[i])) {
                assertThat(got).isNaN();
                assertThat(((Doc.Text) at(o.doc(), "batch", "rows", i, "fault")).value())
                        .contains(faults[i]);
            } else {
                assertThat(got).isCloseTo(wanted[i], within(1e-12));
            }
            assertThat(at(o.doc(), "batch", "rows", i, "carried", 0))
                    .isEqualTo(new Doc.Text("ABCDEF".substring(i, i + 1)));
        }
        assertThat(o.headlines().get(0)).isEqualTo("2 of 6 rows of t.csv were computed");
        assertThat(o.listings().get(0).table().columns())
                .containsExactly(
                        "rod",
                        "media.rod.with.g [1/mm]",
                        "train.surfaces[1].at [mm]",
                        "quantities.back-focal-distance [m]",
                        "fault");
    }

    @Test
    void batchNeedsAnInputColumn() {
        assertThatThrownBy(() -> batch("rod,lengthh [mm]", "A,3"))
                .hasMessageContaining("no column whose header is an input of this job");
        assertThatThrownBy(() -> batch("media.rod.with.g [1/mmm]", "3"))
                .hasMessageContaining("is not a unit known here");
    }
}
