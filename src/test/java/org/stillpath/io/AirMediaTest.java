package org.stillpath.io;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Order;
import org.stillpath.formula.Samples;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Vector;
import org.stillpath.job.Section;
import org.stillpath.medium.AirLaw;
import org.stillpath.medium.AirState;
import org.stillpath.medium.Beyond;
import org.stillpath.medium.EarthChart;
import org.stillpath.medium.Ground;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Interpolation;
import org.stillpath.medium.MediaReader;
import org.stillpath.medium.Medium;
import org.stillpath.medium.Seam;
import org.stillpath.medium.Spline;
import org.stillpath.problem.Problem;
import org.stillpath.problem.Problems;

/** Air of a job: what is read, the fields that follow, and what is told of faults. */
class AirMediaTest {
    private static final double R = 6371e3;
    private static final String LAPSE =
            "temperature: 288.15 K - 6.5 K/km * height, pressure: {value: 1013.25 hPa, at-height: 0 m}";

    @TempDir
    Path folder;

    private Problems problems = new Problems();

    private Medium medium(String air) {
        return read("m: {air: {" + air + "}}\n");
    }

    private Medium read(String yaml) {
        problems = new Problems();
        String job = folder.resolve("job.yaml").toString();
        var node = YamlReader.parse(yaml.getBytes(StandardCharsets.UTF_8), job, problems);
        return MediaReader.read(
                        Optional.of(Section.of(node, "media", problems)), FileSources.of(Path.of(job), false), problems)
                .find("m")
                .orElseThrow();
    }

    private IndexField sound(String air, Chart chart) {
        Medium m = medium(air);
        assertThat(problems.list()).isEmpty();
        return m.field(633e-9, Frame.JOB, chart);
    }

    private static Samples sample(IndexField f, double x, double y, double z) {
        Samples s = new Samples(1);
        f.sample(new double[] {x}, new double[] {y}, new double[] {z}, 1, Order.HESSIAN, s);
        return s;
    }

    private static double refractivity(IndexField f, double x, double z) {
        double excess = sample(f, x, 0, z).value[0];
        return excess / (1 + Math.sqrt(1 + excess));
    }

    @ParameterizedTest
    @ValueSource(
            strings = {
                LAPSE,
                LAPSE + ", humidity: 60 %",
                LAPSE + ", humidity: {vapour-pressure: 12 hPa*exp(-height/(2 km))}",
                LAPSE + ", humidity: {dew-point: 8 degC - 3 K/km*height}, law: radio-p453",
                LAPSE + ", humidity: 60 %, law: radio-p453",
                LAPSE + ", humidity: 60 %, law: iag-1999",
                LAPSE + ", humidity: 60 %, law: birch-downs-1994",
                "atmosphere: us-1976",
                "atmosphere: us-1976, humidity: 0.5*exp(-clearance/(3 km))",
                "temperature: 300 K + 3 K*exp(-clearance/(50 m)) + distance/(1 km)*0.1 K, pressure: 1 bar*exp(-height/(8 km)), humidity: 70 % - 1 %*z/(1 km)",
                "temperature: {profile: {along: height, at: [-1 km, 0 m, 20 m, 300 m, 3 km], value: [290 K, 15 degC, 17 degC, 14 degC, 270 K]}}, pressure: {value: 1000 hPa, at-height: 20 m}, humidity: {profile: {along: height, at: [-1 km, 20 m, 100 m, 3 km], value: [80 %, 70 %, 30 %, 20 %]}}",
                "temperature: {profile: {along: clearance, at: [-1 km, 20 m, 300 m, 3 km], value: [290 K, 290 K, 287 K, 270 K], interpolate: spline}}, pressure: 1000 hPa",
                "temperature: 288.15 K - 6.5 K/km * height, pressure: {value: 1013.25 hPa, at-height: 0 m, hydrostatic: standard}, humidity: 50 %*exp(-x/(10 km))"
            })
    void derivativesAreExact(String air) {
        Ground hills = Ground.profile(Spline.of(
                new double[] {-1e3, 0, 4e3, 9e3, 60e3},
                new double[] {3, 0, 40, -12, 25},
                Interpolation.SPLINE,
                Beyond.HOLD));
        for (Chart chart :
                new Chart[] {Chart.FLAT, EarthChart.sphere(R, hills), EarthChart.flat(Ground.slope(0, 0.01))}) {
            IndexField f = sound(air.replace("1 bar", "1000 hPa"), chart);
            double[] at = {2500, 40, 61};
            double h = 0.25;
            double k = 1 / (2 * h);
            double[] px = {at[0], at[0] + h, at[0] - h, at[0], at[0], at[0], at[0]};
            double[] py = {at[1], at[1], at[1], at[1] + h, at[1] - h, at[1], at[1]};
            double[] pz = {at[2], at[2], at[2], at[2], at[2], at[2] + h, at[2] - h};
            Samples s = new Samples(7);
            f.sample(px, py, pz, 7, Order.HESSIAN, s);
            // rounding of 1e-19 in N over the step; h² of third derivatives, about 1e-8/(50 m)² · N
            double t = 5e-12;
            assertThat(s.gx[0]).as("x").isCloseTo(0.5 * k * (s.value[1] - s.value[2]), within(t));
            assertThat(s.gy[0]).as("y").isCloseTo(0.5 * k * (s.value[3] - s.value[4]), within(t));
            assertThat(s.gz[0]).as("z").isCloseTo(0.5 * k * (s.value[5] - s.value[6]), within(t));
            double u = 3e-13;
            assertThat(s.hxx[0]).as("xx").isCloseTo(k * (s.gx[1] - s.gx[2]), within(u));
            assertThat(s.hxy[0]).as("xy").isCloseTo(k * (s.gy[1] - s.gy[2]), within(u));
            assertThat(s.hxz[0]).as("xz").isCloseTo(k * (s.gz[1] - s.gz[2]), within(u));
            assertThat(s.hyy[0]).as("yy").isCloseTo(k * (s.gy[3] - s.gy[4]), within(u));
            assertThat(s.hyz[0]).as("yz").isCloseTo(k * (s.gz[3] - s.gz[4]), within(u));
            assertThat(s.hzz[0]).as("zz").isCloseTo(k * (s.gz[5] - s.gz[6]), within(u));
            // the smooth piece is the field where it holds
            List<Seam> seams = f.seams();
            int[] cells = new int[seams.size()];
            for (int i = 0; i < cells.length; i++) {
                cells[i] = seams.get(i).cell(seams.get(i).coordinate().value(at[0], at[1], at[2], new double[3]));
            }
            Samples piece = sample(f.piece(cells), at[0], at[1], at[2]);
            assertThat(piece.value[0]).isEqualTo(s.value[0]);
            assertThat(piece.hzz[0]).isEqualTo(s.hzz[0]);
        }
    }

    @Test
    void theStateGoesThroughTheLaw() {
        IndexField f = sound("law: iag-1999, temperature: 20 degC, pressure: 980 hPa, humidity: 50 %", Chart.FLAT);
        assertThat(f.uniform()).isTrue();
        AirLaw iag = AirLaw.of("iag-1999", 0).orElseThrow();
        double e = 0.5 * iag.saturation().pressure(293.15, 98e3);
        double expected = new AirState(iag, 293.15, 98e3, e).refractivity(633e-9);
        assertThat(refractivity(f, 0, 0)).isCloseTo(expected, within(1e-18));
        IndexField dew = sound(
                "law: iag-1999, temperature: 20 degC, pressure: 980 hPa, humidity: {dew-point: 9.255174598981 degC}",
                Chart.FLAT);
        // dew point of half saturation at 20 degC, inverse of WMO-No. 8's formula (recomputed)
        assertThat(refractivity(dew, 0, 0)).isCloseTo(expected, within(1e-17));
        Medium m = medium("law: iag-1999, temperature: 20 degC, pressure: 980 hPa, humidity: 50 %");
        double group = new AirState(iag, 293.15, 98e3, e).groupRefractivity(850e-9);
        assertThat(refractivity(m.groupField(850e-9, Frame.JOB, Chart.FLAT).orElseThrow(), 0, 0))
                .isCloseTo(group, within(1e-18));
    }

    @Test
    void theRefractionCoefficientIsTheOneComputedElsewhere() throws IOException {
        for (Map<String, String> row : coefficients()) {
            IndexField f = read("m: {air: {law: iag-1999, temperature: T0 + g*height, pressure: {value: " + row.get("p")
                            + " hPa, at-height: 0 m, hydrostatic: standard}}, with: {T0: " + row.get("t") + " K, g: "
                            + row.get("slope") + " K/m}}\n")
                    .field(550e-9, Frame.JOB, EarthChart.sphere(R, Ground.level(0)));
            Samples s = sample(f, 0, 0, 0);
            // n dn/dh over n² is (dn/dh)/n
            double k = -R * s.gz[0] / (1 + s.value[0]);
            assertThat(k)
                    .as(row.get("id"))
                    .isCloseTo(
                            Double.parseDouble(row.get("expected")), within(Double.parseDouble(row.get("tolerance"))));
        }
    }

    private static List<Map<String, String>> coefficients() throws IOException {
        try (var in = Medium.class.getResourceAsStream("refraction-coefficient.csv")) {
            List<String> lines = new String(in == null ? new byte[0] : in.readAllBytes(), StandardCharsets.UTF_8)
                    .lines()
                    .filter(l -> !l.startsWith("#"))
                    .toList();
            List<String> header = List.of(lines.get(0).split(",", -1));
            return lines.stream()
                    .skip(1)
                    .map(l -> List.of(l.split(",", -1)))
                    .map(cells -> Map.of(
                            "id", cells.get(header.indexOf("id")),
                            "p", cells.get(header.indexOf("p")),
                            "t", cells.get(header.indexOf("t")),
                            "slope", cells.get(header.indexOf("slope")),
                            "expected", cells.get(header.indexOf("expected")),
                            "tolerance", cells.get(header.indexOf("tolerance"))))
                    .toList();
        }
    }

    @Test
    void seamsOfTwoTablesAreMergedAndLayersAreSeams() {
        IndexField f = sound(
                "temperature: {profile: {along: height, at: [0 m, 20 m, 300 m], value: [15 degC, 17 degC, 14 degC]}}, "
                        + "pressure: {value: 1000 hPa, at-height: 20 m}, "
                        + "humidity: {profile: {along: height, at: [0 m, 100 m, 300 m], value: [80 %, 30 %, 20 %]}}",
                EarthChart.sphere(R, Ground.level(0)));
        assertThat(f.seams())
                .singleElement()
                .satisfies(s -> assertThat(s.knots()).containsExactly(0, 20, 100, 300));
        // the tables' edges and the pressure's
        assertThat(f.limits()).hasSize(6);
        assertThat(f.limits().get(1).describe()).isEqualTo("height < 300 m, the edge of the table");
        IndexField us = sound("atmosphere: us-1976", EarthChart.sphere(R, Ground.level(0)));
        assertThat(us.seams()).singleElement().satisfies(s -> {
            assertThat(s.count()).isEqualTo(6);
            // 11 km of geopotential height: US Standard Atmosphere 1976, table I gives 11019 m (from memory)
            assertThat(s.knot(0)).isCloseTo(11019, within(0.5));
        });
        assertThat(us.limits()).hasSize(2);
        assertThat(us.limits().get(1).describe()).startsWith("height < 86");
        double n = refractivity(us, 0, 85e3);
        assertThat(n).isBetween(1e-9, 3e-9);
    }

    @Test
    void aLinearTableHasItsKinkOnTheSeamAndSmoothPiecesBesideIt() {
        IndexField f = sound(
                "law: iag-1999, temperature: {profile: {along: height, at: [0 m, 18 m, 24 m, 300 m], "
                        + "value: [283.15 K, 283.033 K, 287.033 K, 285.239 K], interpolate: linear}}, "
                        + "pressure: {value: 1013.25 hPa, at-height: 0 m, hydrostatic: standard}",
                Chart.FLAT);
        IndexField piece = f.piece(new int[] {1});
        // the piece goes on smoothly: its gradient at the knot is that from below on both sides
        double below = sample(piece, 0, 0, 18 - 1e-6).gz[0];
        double above = sample(piece, 0, 0, 18 + 1e-6).gz[0];
        assertThat(above).isCloseTo(below, within(1e-13));
        assertThat(sample(f, 0, 0, 18 + 1e-6).gz[0] - below).isLessThan(-1e-8);
        double h = 1e-3;
        double slope = (sample(piece, 0, 0, 19 + h).value[0] - sample(piece, 0, 0, 19 - h).value[0]) / (4 * h);
        assertThat(sample(piece, 0, 0, 19).gz[0]).isCloseTo(slope, within(1e-12));
    }

    @Test
    void aTurnedFrameOverAnEarthKeepsTheEarthsHeights() {
        Medium m = read("m: {air: {" + LAPSE + "}, origin: [10 m, 0 m, 500 m], axis: [1, 0, 0]}\n");
        EarthChart earth = EarthChart.sphere(R, Ground.level(0));
        IndexField turned = m.field(633e-9, m.frame(Vector.ZERO), earth);
        IndexField plain = sound(LAPSE, earth);
        Samples a = sample(turned, 3000, 20, 70);
        Samples b = sample(plain, 3000, 20, 70);
        assertThat(a.value[0]).isCloseTo(b.value[0], within(1e-15));
        assertThat(a.gz[0]).isCloseTo(b.gz[0], within(1e-18));
        assertThat(a.hxx[0]).isCloseTo(b.hxx[0], within(1e-20));
        // without an earth, height is z of the medium's own frame
        IndexField own = m.field(633e-9, m.frame(Vector.ZERO));
        assertThat(sample(own, 110, 0, 0).value[0]).isCloseTo(sample(plain, 0, 0, 100).value[0], within(1e-15));
    }

    @Test
    void formulasAndRegionsOfOtherMediaKnowTheHeightToo() {
        Medium m = read("m: {index: 1 + nu*exp(-height/H), with: {nu: 0.00027, H: 8500 m}, valid: height < 100 m}\n");
        assertThat(problems.list()).isEmpty();
        IndexField f = m.field(Double.NaN, Frame.JOB, EarthChart.sphere(R, Ground.level(0)));
        double h = 2e3 * 2e3 / (2 * R) + 50;
        assertThat(refractivity(f, 2e3, 50)).isCloseTo(0.00027 * Math.exp(-h / 8500), within(1e-12));
        assertThat(f.limits().get(0).value(2e3, 0, 50, new double[3])).isCloseTo(100 - h, within(1e-3));
        IndexField profile = read("m: {index: {profile: {along: height, at: [0 m, 100 m], value: [1.0003, 1.0002]}}}\n")
                .field(Double.NaN, Frame.JOB);
        assertThat(refractivity(profile, 0, 50)).isCloseTo(0.00025, within(1e-15));
    }

    @Test
    void saysWhyAStateIsUndefined() {
        IndexField f = sound(LAPSE, Chart.FLAT);
        assertThat(f.explain(0, 0, 50e3)).contains("height = 50 km", "hydrostatic pressure");
        IndexField cold = sound("temperature: 10 K - 1 K/m*z, pressure: 1000 hPa", Chart.FLAT);
        assertThat(cold.explain(0, 0, 11)).contains("temperature is -1 K");
        IndexField wet = sound("temperature: 300 K, pressure: 1000 hPa, humidity: 1 - z/(1 m)", Chart.FLAT);
        assertThat(wet.explain(0, 0, 2)).contains("vapour pressure is -");
        assertThat(wet.explain(0, 0, 0.5)).isEmpty();
    }

    @ParameterizedTest
    @CsvSource(delimiter = '|', textBlock = """
            law: edlen, LAPSE                                                   | 1:16: media.m.air.law: | ciddor-1996
            temperature: 20 degC                                                | media.m.air | pressure
            pressure: 1 bar                                                     | media.m.air | temperature
            temperature: 20, pressure: 1013 hPa                                 | 1:24: media.m.air.temperature: | "20" has no unit; a temperature is needed
            temperature: 20 degC, pressure: 1013                                | 1:43: media.m.air.pressure: | a pressure is needed
            temperature: 20 m*height, pressure: 1013 hPa                        | 1:24: media.m.air.temperature: | temperature
            temperature: 288 K - 6.5 K/km*hight, pressure: 1013 hPa             | 1:41: media.m.air.temperature: | height
            temperature: 288 K + x/(1 m)*1 K, pressure: {value: 1013 hPa, at-height: 0 m} | media.m.air.pressure: | `height` alone
            LAPSE, humidity: 50                                                 | media.m.air.humidity: | write 50 %
            LAPSE, humidity: 120 %                                              | media.m.air.humidity: | between 0 % and 100 %
            LAPSE, humidity: {wet: 3 degC}                                      | media.m.air.humidity: | dew-point
            LAPSE, humidity: 50 %*x/(1 m)                                       | media.m.air.pressure: | hydrostatic: standard
            LAPSE, humidity: {dew-point: 9 degC, vapour-pressure: 3 hPa}        | media.m.air.humidity.dew-point: | one is enough
            LAPSE, co2: 420                                                     | media.m.air.co2: | 420 ppm
            LAPSE, atmosphere: us-1976                                          | media.m.air.temperature: | leave one of them out
            atmosphere: us-1962                                                 | media.m.air.atmosphere: | us-1976
            LAPSE, windy: true                                                  | media.m.air: | unknown key "windy"
            temperature: 288 K, pressure: {value: 1013 hPa}                     | media.m.air.pressure | at-height
            temperature: 288 K, pressure: {value: 1013 hPa, at-height: 0 m, hydrostatic: wet} | media.m.air.pressure.hydrostatic: | full, standard
            temperature: 288 K - 6.5 K/km*height, pressure: {value: 10 hPa, at-height: 60 km} | media.m.air.pressure.at-height: | no pressure follows
            temperature: 288 K, pressure: {value: 10 hPa, at-height: 600 km}    | media.m.air.pressure.at-height: | 120 km
            temperature: -20 K, pressure: 1013 hPa                              | media.m.air.temperature: | above 0
            temperature: [1, 2], pressure: 1013 hPa                             | media.m.air.temperature: | not a list
            temperature: {profile: {along: hight, at: [0 m, 1 m], value: [1 K, 2 K]}}, pressure: 1013 hPa | media.m.air.temperature.profile.along: | height
            """)
    void tellsFaults(String air, String place, String words) {
        medium(air.replace("LAPSE", LAPSE));
        assertThat(problems.list()).isNotEmpty();
        assertThat(problems.list().stream().map(Problem::toString).toList()).anySatisfy(m -> {
            assertThat(m).contains(place);
            assertThat(m).contains(words);
        });
    }

    @Test
    void oneGiverIsEnough() {
        read("m: {index: 1.5, air: {temperature: 288 K, pressure: 1013 hPa}}\n");
        assertThat(problems.list()).singleElement().asString().contains("cannot stand together");
    }

    @Test
    void tellsWhatIsDoubtful() {
        assertThat(medium(LAPSE).warnings()).isEmpty();
        assertThat(medium("temperature: 288 K, pressure: {value: 1013 hPa, at-height: 900 m}")
                        .warnings())
                .anySatisfy(w -> assertThat(w).contains("reduced to sea level", "909.7"));
        assertThat(medium("temperature: 20 K, pressure: 1013 hPa").warnings())
                .anySatisfy(w -> assertThat(w).contains("no weather"));
        assertThat(medium("law: iag-1999, co2: 420 ppm, temperature: 288 K, pressure: 1013 hPa")
                        .warnings())
                .singleElement()
                .asString()
                .contains("375 ppm");
        assertThat(medium("atmosphere: us-1976").warnings())
                .anySatisfy(w -> assertThat(w).contains("pressure", "at height 11.019", "800 hPa to 1200 hPa"));
        assertThat(medium("temperature: 288 K, pressure: 1013 hPa").warningsAt(3e-6))
                .singleElement()
                .asString()
                .contains("3000 nm");
    }

    @Test
    void readsTablesFromFiles() throws IOException {
        Files.writeString(
                folder.resolve("mast.csv"), "height [m],T [degC],RH [%]\n0,21,60\n2,19,55\n10,18.2,50\n60,17.6,48\n");
        IndexField f = sound(
                "temperature: {profile: {along: height, file: mast.csv, columns: [height, T]}}, "
                        + "pressure: {value: 1000 hPa, at-height: 2 m}, "
                        + "humidity: {profile: {along: height, file: mast.csv, columns: [height, RH]}}",
                Chart.FLAT);
        AirLaw law = AirLaw.of("ciddor-1996", 420e-6).orElseThrow();
        double e = 0.55 * law.saturation().pressure(292.15, 1e5);
        assertThat(refractivity(f, 0, 2))
                .isCloseTo(new AirState(law, 292.15, 1e5, e).refractivity(633e-9), within(1e-15));
    }
}
