package org.stillpath.io;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
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
import org.stillpath.job.Section;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.MediaReader;
import org.stillpath.medium.Medium;
import org.stillpath.problem.Problem;
import org.stillpath.problem.Problems;
import org.stillpath.task.Result;
import org.stillpath.task.Tasks;

/**
 * Soundings in the layout of IGRA, version 2. Its columns are those of NOAA's format description (igra2-data-format.txt): the
 * header's read in a stored copy of it, the levels' in a reader of another project that repeats the table; what the flags mean
 * is from memory. The station is invented.
 */
class SoundingTest {
    private static final int NONE = -9999;

    @TempDir
    Path folder;

    private Problems problems = new Problems();

    private static String header(String station, int day, int hour, int levels) {
        return String.format(
                Locale.ROOT,
                "#%-11s 2026 07 %02d %02d %02d04 %4d %-8s %-8s %7d %8d\n",
                station,
                day,
                hour,
                hour == 99 ? 99 : hour,
                levels,
                "ncdc-gts",
                "ncdc-gts",
                471250,
                113500);
    }

    private static String level(int pressure, int height, int temperature, int humidity, int depression) {
        return String.format(
                Locale.ROOT,
                "10   120 %6dB%5dB%5dB%5d %5d   270    40\n",
                pressure,
                height,
                temperature,
                humidity,
                depression);
    }

    /** Pressure of the US Standard Atmosphere 1976 below 11 km by its own equation, pascal. */
    private static double standard(double geopotential) {
        return 101325 * Math.pow(288.15 / (288.15 - 6.5e-3 * geopotential), 9.80665 * 28.9644 / (8314.32 * -6.5e-3));
    }

    /** That atmosphere as a sounding, every kilometre: its temperatures there are whole tenths of a degree. */
    private static String standardAscent(List<Integer> withoutHeight) {
        StringBuilder s = new StringBuilder(header("ZZX00099001", 1, 12, 12));
        for (int km = 0; km <= 11; km++) {
            int height = withoutHeight.contains(km) ? NONE : 1000 * km;
            s.append(level((int) Math.rint(standard(1000 * km)), height, 150 - 65 * km, NONE, NONE));
        }
        return s.toString();
    }

    private Optional<Medium> medium(String file, String air) throws IOException {
        Files.writeString(folder.resolve("ascent.txt"), file);
        problems = new Problems();
        String job = folder.resolve("job.yaml").toString();
        var node = YamlReader.parse(
                ("m: {air: {law: iag-1999, " + air + "}}\n").getBytes(StandardCharsets.UTF_8), job, problems);
        return MediaReader.read(
                        Optional.of(Section.of(node, "media", problems)), FileSources.of(Path.of(job), false), problems)
                .find("m");
    }

    private IndexField sound(String file, String air) throws IOException {
        Medium m = medium(file, air).orElseThrow();
        assertThat(problems.list()).isEmpty();
        return m.field(633e-9, Frame.JOB, Chart.FLAT);
    }

    private static double refractivity(IndexField f, double height) {
        Samples s = new Samples(1);
        f.sample(new double[1], new double[1], new double[] {height}, 1, Order.VALUE, s);
        return s.value[0] / (1 + Math.sqrt(1 + s.value[0]));
    }

    @ParameterizedTest
    @ValueSource(booleans = {false, true})
    void theStandardAtmosphereAsAnAscentIsTheStandardAtmosphere(boolean heightsMissing) throws IOException {
        IndexField air = sound(
                standardAscent(heightsMissing ? List.of(1, 4, 5, 10) : List.of()),
                "temperature: {sounding: {file: ascent.txt, interpolate: linear}}");
        IndexField known = sound("", "atmosphere: us-1976");
        for (double h = 0; h < 11_000; h += 137) {
            // geopotential taken for geometric height would be off by 2e-4 at 10 km; a straight line in the one is no
            // straight
            // line in the other, by 4 cm between two levels, and the hypsometric equation leaves some centimetres
            double allowed = heightsMissing ? 2e-5 : 1.5e-6;
            assertThat(refractivity(air, h) / refractivity(known, h) - 1)
                    .as("at %s m", h)
                    .isCloseTo(0, within(allowed));
        }
        Medium m = medium(standardAscent(List.of(1, 4)), "temperature: {sounding: ascent.txt}")
                .orElseThrow();
        assertThat(m.warnings())
                .anyMatch(w -> w.contains("ZZX00099001, 2026-07-01 12 h UTC: 12 levels from 0 mm to 11.019 km"))
                .anyMatch(w -> w.contains("2 of its levels had no height"))
                .anyMatch(w -> w.contains("reports no humidity; dry air"));
    }

    @Test
    void theEndsGetHeightsFromTheirPressuresToo() throws IOException {
        IndexField air = sound(
                standardAscent(List.of(0, 1, 10, 11)),
                "temperature: {sounding: {file: ascent.txt, interpolate: linear}}");
        IndexField known = sound("", "atmosphere: us-1976");
        for (double h : new double[] {5, 900, 5000, 9500, 10_900}) {
            assertThat(refractivity(air, h) / refractivity(known, h) - 1).isCloseTo(0, within(3e-5));
        }
    }

    @Test
    void humidityIsReportedOrFollowsFromTheDewPoint() throws IOException {
        // 50 % at 20 degC is a dew point of 9.255 degC by Magnus' formula, WMO-No. 8 (published formula, recomputed)
        String ascent = header("ZZX00099001", 1, 12, 3) + level(100_000, 100, 200, 500, NONE);
        String relative = ascent + level(99_000, 188, 200, 500, NONE) + level(90_000, 1030, 120, NONE, NONE);
        String depression = ascent + level(99_000, 188, 200, NONE, 107) + level(90_000, 1030, 120, NONE, NONE);
        // dry below, so that the vapour does not change the pressure above it
        String job = "temperature: {sounding: {file: ascent.txt}}, "
                + "pressure: {value: 1000 hPa, at-height: 100 m, hydrostatic: standard}";
        double a = refractivity(sound(relative, job), 188);
        double b = refractivity(sound(depression, job), 188);
        double dry = refractivity(sound(relative, job + ", humidity: 0 %"), 188);
        assertThat(a).isLessThan(dry - 2e-7);
        // 0.045 degC of the dew point, 0.3 % of the vapour
        assertThat(b).isCloseTo(a, within(0.004 * (dry - a)));
        // above the last humidity the air is dry from the next level on
        assertThat(refractivity(sound(relative, job), 1030))
                .isCloseTo(refractivity(sound(relative, job + ", humidity: 0 %"), 1030), within(5e-10));
    }

    @Test
    void missingAndRemovedValuesAreLeftOut() throws IOException {
        String file = header("ZZX00099001", 1, 12, 6)
                + level(100_000, 100, 200, NONE, NONE)
                + level(95_000, 540, -8888, -8888, -8888)
                + "30   500  -9999   700 -9999 -9999 -9999   250   110\n"
                + level(90_000, NONE, 120, NONE, NONE)
                + level(89_000, 1130, 130, NONE, NONE).replace('\n', '\r') + "\n"
                + level(80_000, 2010, 60, NONE, NONE);
        Medium m = medium(file, "temperature: {sounding: {file: ascent.txt, date: 2026-07-01}}")
                .orElseThrow();
        assertThat(problems.list()).isEmpty();
        assertThat(m.warnings())
                .anyMatch(w -> w.contains("4 levels from 100 m to 2.011 km"))
                .anyMatch(w -> w.contains("2 of its levels are left out"));
    }

    @Test
    void pressureOfOnesOwnAndWhatIsOff() throws IOException {
        String wrong = standardAscent(List.of()).replace("  54020B", "  52020B");
        Medium m = medium(wrong, "temperature: {sounding: {file: ascent.txt}}").orElseThrow();
        assertThat(m.warnings()).anyMatch(w -> w.contains("at height 5.004 km is 3.7 % off"));
        double usual =
                refractivity(sound(standardAscent(List.of()), "temperature: {sounding: {file: ascent.txt}}"), 50);
        double own = refractivity(
                sound(
                        standardAscent(List.of()),
                        "temperature: {sounding: {file: ascent.txt}}, pressure: {value: 1003.25 hPa, at-height: 0 m}"),
                50);
        assertThat(own / usual).isCloseTo(1003.25 / 1013.25, within(1e-6));
    }

    /** The job that ships as an example, with an invented ascent. */
    @Test
    void aSightThroughAnAscent() {
        JobFile file = JobFile.read(Path.of("media-models/demo/valley.yaml"), problems);
        Result r = Tasks.run(file.root(), file.sources(false), new Tasks.Options(false));
        assertThat(r.images()).hasSize(1);
        // the inversion beside it: more than the usual 0.13, and what 0.1 degC and 20 m of an ascent leave open
        assertThat(r.images().get(0).coefficient().orElseThrow()).isBetween(0.15, 0.35);
        assertThat(r.images().get(0).errors().getOrDefault("refraction-coefficient", 0.0))
                .isBetween(0.01, 0.3);
        assertThat(r.warnings()).anyMatch(w -> w.contains("it cannot tell")).anyMatch(w -> w.contains("interpolant"));
        assertThat(r.accuracyReached()).isTrue();
    }

    private static final String TWO = header("ZZX00099001", 1, 0, 2)
            + level(100_000, 100, 200, NONE, NONE)
            + level(90_000, 990, 140, NONE, NONE)
            + header("ZZX00099001", 1, 12, 2)
            + level(100_000, 100, 240, NONE, NONE)
            + level(90_000, 1000, 170, NONE, NONE);

    @Test
    void oneOfSeveralIsChosenByStationDateAndHour() throws IOException {
        String other = TWO + header("ZZX00099002", 1, 12, 1) + level(100_000, 100, 240, NONE, NONE);
        double night = refractivity(sound(other, "temperature: {sounding: {file: ascent.txt, hour: 0}}"), 100);
        double noon = refractivity(
                sound(
                        other,
                        "temperature: {sounding: {file: ascent.txt, station: ZZX00099001, date: 2026-07-01, hour: 12}}"),
                100);
        assertThat(noon / night).isCloseTo(293.15 / 297.15, within(1e-6));
    }

    @ParameterizedTest
    @CsvSource(delimiter = '|', textBlock = """
            {file: ascent.txt}                        | job.yaml:1:57: media.m.air.temperature.sounding.file: | 2 soundings of
            {file: ascent.txt, hour: 6}               | job.yaml:1:57: | no sounding of
            {file: ascent.txt, date: 1 July}          | job.yaml:1:75: media.m.air.temperature.sounding.date: | 2026-07-01
            {file: ascent.txt, hour: 24}              | sounding.hour: | 23
            {file: ascend.txt}                        | job.yaml:1:57: | there is "ascent.txt"
            {file: ascent.txt, hour: 0, day: 1}       | job.yaml:1:78: | unknown key "day"; known here: file, station, date
            {hour: 0}                                 | sounding: | "file" is missing
            """)
    void whatAJobSaysWrongIsTold(String sounding, String place, String words) throws IOException {
        medium(TWO, "temperature: {sounding: " + sounding + "}");
        assertThat(problems.list().stream().map(Problem::toString).toList())
                .anySatisfy(m -> assertThat(m).contains(place).contains(words));
    }

    @Test
    void whatAFileHasWrongIsToldByLineAndColumn() throws IOException {
        String good = TWO;
        List<String[]> wrong = new ArrayList<>();
        wrong.add(new String[] {
            good.replace("#ZZX00099001 2026 07 01 12", " ZZX00099001 2026 07 01 12"), "ascent.txt:4:1: ", "IGRA"
        });
        wrong.add(
                new String[] {good.replaceFirst("2026 07 01 12", "2026 13 01 12"), "ascent.txt:4:19: ", "13 is no month"
                });
        wrong.add(new String[] {
            good.replaceFirst("1204    2", "1204    3"), "ascent.txt:6:", "announces 3 levels, and only 2"
        });
        wrong.add(new String[] {
            good.replaceFirst("0004    2", "0004    3"), "ascent.txt:4:1: ", "line 1 announces 3 levels"
        });
        wrong.add(new String[] {good.replaceFirst("  240B", "  2x0B"), "ascent.txt:5:23: ", "columns 23 to 27"});
        wrong.add(new String[] {good.replaceFirst("  240B", " 2400B"), "ascent.txt:5:23: ", "no temperature"});
        wrong.add(new String[] {good.replaceFirst("  240B", "  240Q"), "ascent.txt:5:28: ", "is no flag"});
        wrong.add(new String[] {
            good.replace("240B-9999 -9999   270    40", "240B-9999"), "ascent.txt:5:", "at least 39 columns"
        });
        wrong.add(new String[] {"station,height\n1,2\n", "ascent.txt:1:1: ", "IGRA"});
        for (String[] w : wrong) {
            medium(w[0], "temperature: {sounding: {file: ascent.txt, hour: 12}}");
            assertThat(problems.list().stream().map(Problem::toString).toList())
                    .as(w[2])
                    .anySatisfy(m -> assertThat(m).contains(w[1]).contains(w[2]));
        }
        medium("", "temperature: {sounding: ascent.txt}");
        assertThat(problems.list()).singleElement().asString().contains("holds no sounding");
        medium(
                header("ZZX00099001", 1, 12, 1) + level(100_000, 100, 240, NONE, NONE),
                "temperature: {sounding: ascent.txt}");
        assertThat(problems.list()).singleElement().asString().contains("1 level with both");
        medium(
                TWO.replace("100000B", " -9999B").replace(" 90000B", " -9999B"),
                "temperature: {sounding: {file: ascent.txt, hour: 0}}");
        assertThat(problems.list()).singleElement().asString().contains("give `pressure`");
    }
}
