package org.stillpath.path;

import static org.assertj.core.api.Assertions.assertThat;

import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.Collections;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.TreeMap;
import org.apache.commons.rng.UniformRandomProvider;
import org.apache.commons.rng.simple.RandomSource;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestReporter;
import org.stillpath.geometry.Vector;
import org.stillpath.io.YamlReader;
import org.stillpath.job.Section;
import org.stillpath.job.Sources;
import org.stillpath.medium.EarthChart;
import org.stillpath.medium.Ground;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.MediaReader;
import org.stillpath.medium.Medium;
import org.stillpath.problem.Problems;

/**
 * The error estimates of sights held against the truth: random sights through air of several laws over spheres of several radii
 * and planes, 50 m to 50 km, at the default accuracy, against the same at 1e-13, and that against Bouguer's integral.
 *
 * <p>The system property {@code stillpath.sights} gives the number of sights; 60 where it is not given. Numbers of a run of 1000
 * stand in DEVELOPERS.md.
 */
class SightCalibrationTest {
    private static final int COUNT = Integer.getInteger("stillpath.sights", 60);

    /** True errors over estimates, by value. */
    private final Map<String, List<Double>> ratios = new TreeMap<>();

    /** Estimates over true errors, by value. */
    private final Map<String, List<Double>> sizes = new TreeMap<>();

    private final List<String> worse = new ArrayList<>();
    private final List<Double> bouguer = new ArrayList<>();

    private static String air(UniformRandomProvider random, int law) {
        double warm = 270 + 40 * random.nextDouble();
        String pressure = "pressure: {value: " + (960 + 80 * random.nextDouble()) + " hPa, at-height: 0 m}";
        String index = List.of("ciddor-1996", "iag-1999", "birch-downs-1994").get(random.nextInt(3));
        String humidity = random.nextBoolean() ? ", humidity: 60 %" : "";
        String temperature =
                switch (law) {
                    case 0 -> warm + " K + " + (-12 + 20 * random.nextDouble()) + " K/km*height";
                    case 1 ->
                        warm + " K - 6.5 K/km*height + " + (-6 + 12 * random.nextDouble()) + " K*exp(-height/("
                                + (0.3 + 5 * random.nextDouble()) + " m))";
                    case 2 ->
                        warm + " K - 9.8 K/km*height + " + (-0.8 + 1.6 * random.nextDouble())
                                + " K*log((height + 5 cm)/(1 m))";
                    case 3 ->
                        warm + " K - 6.5 K/km*height + " + (3 * random.nextDouble()) + " K*tanh((height - "
                                + (10 + 40 * random.nextDouble()) + " m)/(" + (3 + 10 * random.nextDouble()) + " m))";
                    default -> "";
                };
        return law == 4
                ? "m: {air: {law: " + index + ", atmosphere: us-1976" + humidity + "}}\n"
                : law == 5
                        ? "m: {index: \"1 + 2.8e-4*exp(-height/(" + (4 + 9 * random.nextDouble()) + " km))\"}\n"
                        : "m: {air: {law: " + index + ", temperature: \"" + temperature + "\", " + pressure + humidity
                                + "}}\n";
    }

    private static Medium read(String yaml) {
        Problems problems = new Problems();
        var node = YamlReader.parse(yaml.getBytes(StandardCharsets.UTF_8), "media.yaml", problems);
        Medium m = MediaReader.read(Optional.of(Section.of(node, "media", problems)), Sources.none(), problems)
                .find("m")
                .orElseThrow();
        assertThat(problems.list()).as(yaml).isEmpty();
        return m;
    }

    @Test
    void estimatesHold(TestReporter reporter) {
        UniformRandomProvider random = RandomSource.XO_RO_SHI_RO_128_PP.create(20_261_201L);
        int unequal = 0;
        int images = 0;
        for (int i = 0; i < COUNT; i++) {
            String yaml = air(random, i % 6);
            double distance = 50 * Math.pow(1000, random.nextDouble());
            // the mean radius, an ellipsoid's least and greatest, a plane
            double radius = List.of(6_371_000.0, 6_335_439.3, 6_399_593.6, Double.POSITIVE_INFINITY)
                    .get(random.nextInt(4));
            double bulge = Double.isInfinite(radius) ? 0 : distance * distance / (8 * radius);
            double from = 1 + bulge + 0.01 * distance * random.nextDouble();
            double to = 1 + bulge + 0.03 * distance * random.nextDouble();
            EarthChart chart = Double.isInfinite(radius)
                    ? EarthChart.flat(Ground.level(0))
                    : EarthChart.sphere(radius, Ground.level(0));
            Medium m = read(yaml);
            IndexField field = m.field(0.55e-6, m.frame(Vector.ZERO), chart);
            List<Sighting> usual = Sightings.through(field, chart, 1e-9)
                    .find(from, distance, to)
                    .images();
            List<Sighting> fine = Sightings.through(field, chart, 1e-13)
                    .find(from, distance, to)
                    .images();
            String what = String.format(
                    Locale.ROOT, "%s R %.0f: %.3f m over %.3f m to %.3f m", yaml.strip(), radius, from, distance, to);
            if (usual.size() != fine.size()) {
                unequal++;
                worse.add("images " + usual.size() + " and " + fine.size() + ": " + what);
                continue;
            }
            for (int k = 0; k < usual.size(); k++) {
                images++;
                held(usual.get(k), fine.get(k), what);
            }
        }
        List<Double> all = new ArrayList<>();
        ratios.forEach((key, list) -> {
            Collections.sort(list);
            all.addAll(list);
        });
        Collections.sort(all);
        long beyond = all.stream().filter(r -> r > 1).count();
        reporter.publishEntry("sights", report(images, all, beyond));
        assertThat(unequal).as("%s", worse).isZero();
        assertThat(images).isGreaterThan(COUNT / 2);
        // the contract: fewer than one in a thousand. That the estimates are far larger than the errors in the median
        // is known:
        // the errors are roundings, and the rays' own estimates are cautious
        assertThat(beyond).as("%s", worse).isLessThanOrEqualTo(all.size() / 1000);
        // issue 5: 1e-8 m over 5 km, 1e-6 m over 100 km
        assertThat(bouguer).allSatisfy(b -> assertThat(b).isLessThan(1e-8));
    }

    private void held(Sighting a, Sighting b, String what) {
        String at = what + String.format(Locale.ROOT, ", image at %.9f", b.launch());
        compare(
                "launch",
                a.launch(),
                b.launch(),
                a.errors().launch(),
                b.errors().launch(),
                at);
        compare(
                "arrival",
                a.arrival(),
                b.arrival(),
                a.errors().arrival(),
                b.errors().arrival(),
                at);
        compare(
                "excess",
                a.excess(),
                b.excess(),
                a.errors().opticalLength(),
                b.errors().opticalLength(),
                at);
        compare(
                "length",
                a.length(),
                b.length(),
                a.errors().length(),
                b.errors().length(),
                at);
        compare(
                "lowest",
                a.lowest(),
                b.lowest(),
                a.errors().lowest(),
                b.errors().lowest(),
                at);
        compare(
                "lowest-at",
                a.lowestAt(),
                b.lowestAt(),
                a.errors().lowestAt(),
                b.errors().lowestAt(),
                at);
        compare(
                "magnification",
                1,
                b.slope() / a.slope(),
                a.errors().slope(),
                b.errors().slope(),
                at);
        if (!Double.isNaN(b.secondMethod())) {
            double off = Math.abs(b.secondMethod());
            double distance = b.points()[b.points().length - 2];
            double scaled = off / Math.max(1, Math.pow(distance / 5000, 1.54));
            bouguer.add(scaled);
            if (scaled > 1e-8) {
                worse.add(String.format(Locale.ROOT, "Bouguer %.3g m off: %s%n", off, at));
            }
        }
    }

    private void compare(String key, double value, double truth, double error, double other, String what) {
        double off = Math.abs(value - truth);
        // what the finer run does not know itself is not held against the other
        double ratio = Math.max(0, off - other) / Math.max(error, 1e-300);
        sizes.computeIfAbsent(key, k -> new ArrayList<>()).add(error / Math.max(off, 1e-18));
        ratios.computeIfAbsent(key, k -> new ArrayList<>()).add(ratio);
        if (ratio > 1) {
            worse.add(String.format(Locale.ROOT, "%s off by %.3g, told %.3g: %s%n", key, off, error, what));
        }
    }

    private double median(String key) {
        List<Double> list = sizes.getOrDefault(key, new ArrayList<>(List.of(Double.NaN)));
        Collections.sort(list);
        return list.get(list.size() / 2);
    }

    private String report(int images, List<Double> all, long beyond) {
        StringBuilder s = new StringBuilder();
        s.append(String.format(
                Locale.ROOT,
                "%d sights, %d images, %d values; beyond their estimate %d, worst %.3g times it%n",
                COUNT,
                images,
                all.size(),
                beyond,
                all.get(all.size() - 1)));
        ratios.forEach((key, list) -> s.append(String.format(
                Locale.ROOT,
                "%-14s worst %.3g of the estimate; the estimate in the median %.3g times the error; beyond %d%n",
                key,
                list.get(list.size() - 1),
                median(key),
                list.stream().filter(r -> r > 1).count())));
        s.append(String.format(
                Locale.ROOT,
                "Bouguer: worst %.3g m over up to 5 km, as its 1.54th power beyond%n",
                Collections.max(bouguer)));
        return s.toString();
    }
}
