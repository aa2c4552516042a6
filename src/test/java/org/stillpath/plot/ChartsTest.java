package org.stillpath.plot;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.Arguments;
import org.junit.jupiter.params.provider.MethodSource;
import org.stillpath.task.BarFigure;
import org.stillpath.task.ChartFigure;
import org.stillpath.task.ChartFigure.Axis;
import org.stillpath.task.ChartFigure.Series;
import org.stillpath.task.ChartFigure.Style;
import org.stillpath.task.Figure;
import org.stillpath.task.MapFigure;
import org.stillpath.task.Points;
import org.stillpath.task.SpotFigure;
import org.stillpath.task.WavefrontFigure;

/** Charts, maps and bars at both widths: nothing overlaps, nothing leaves the paper, the same bytes each time. */
class ChartsTest {
    private static final String LONG = "media.some-rather-long-name.with.another-rather-long-name-of-a-coefficient";

    static List<Figure> all() {
        double[] x = new double[41];
        double[] wave = new double[41];
        double[] broken = new double[41];
        for (int i = 0; i < x.length; i++) {
            x[i] = 280 + i;
            wave[i] = 2e-3 + 1e-5 * Math.sin(0.3 * i);
            broken[i] = i > 15 && i < 20 ? Double.NaN : 1e-12 * i;
        }
        double[] edges = new double[21];
        double[] parts = new double[20];
        for (int i = 0; i < 20; i++) {
            edges[i] = 1e-3 * i;
            parts[i] = 0.1 * Math.exp(-0.05 * (i - 10) * (i - 10));
        }
        edges[20] = 20e-3;
        Axis g = new Axis("media.rod.with.g", "1/m", "1/mm");
        Axis focus = new Axis("back focal distance", "m", "");
        Axis none = new Axis("magnification", "1", "");
        double[] map = new double[12];
        Arrays.setAll(map, i -> i == 5 ? Double.NaN : -0.1 + 0.02 * i);
        List<BarFigure.Bar> bars = new ArrayList<>();
        for (int i = 0; i < 9; i++) {
            bars.add(new BarFigure.Bar(i == 3 ? LONG : "input " + i, (i - 4) * 1e-6, (i - 4) + ".1 µm, 12 %"));
        }
        return List.of(
                new ChartFigure(
                        "sweep",
                        "How it goes",
                        "Back focal distance between -2 mm and 3 mm",
                        g,
                        focus,
                        List.of(
                                new Series(Style.MARKS, "the job's value", new double[] {300}, new double[1]),
                                new Series(Style.CURVE, "", x, wave))),
                new ChartFigure("broken", "Q", "A", g, none, List.of(new Series(Style.CURVE, "with a gap", x, broken))),
                new ChartFigure(
                        "flat",
                        "Q",
                        "A",
                        g,
                        new Axis(LONG + " " + LONG, "m", ""),
                        List.of(new Series(Style.CURVE, "", new double[] {1, 2}, new double[] {5, 5}))),
                new ChartFigure(
                        "histogram",
                        "Distribution",
                        "2.24 mm ± 0.11 mm: Monte Carlo agrees",
                        focus,
                        new Axis("samples in each bar", "1", "%"),
                        List.of(
                                new Series(Style.STEPS, "", edges, parts),
                                new Series(Style.MODEL, "normal, linear budget", Arrays.copyOf(edges, 20), parts),
                                new Series(Style.MARKS, "95 % interval", new double[] {4e-3, 16e-3}, new double[2]))),
                new MapFigure(
                        "map",
                        "Two inputs",
                        "A map",
                        g,
                        new Axis("train.surfaces[1].at", "m", "mm"),
                        none,
                        new double[] {280, 290, 310, 320},
                        new double[] {2e-3, 3e-3, 5e-3},
                        map),
                new BarFigure("bars", "Residuals", "All well", new Axis("residual", "m", ""), bars, 3e-6),
                new BarFigure(
                        "contributions",
                        "What contributes",
                        LONG + " makes up 93 % of the variance",
                        new Axis("contribution", "m", ""),
                        bars.subList(5, 9),
                        0),
                wavefront(0),
                wavefront(3e-7),
                spots(1, 1),
                spots(5, 3));
    }

    private static WavefrontFigure wavefront(double size) {
        int side = 41;
        double[] values = new double[side * side];
        for (int j = 0; j < side; j++) {
            for (int i = 0; i < side; i++) {
                double x = (i - 20) / 20.0;
                double y = (j - 20) / 20.0;
                double coma = (3 * (x * x + y * y) - 2) * y;
                values[j * side + i] = y > 0.8 ? Double.NaN : size * (coma + 0.3 * x * x);
            }
        }
        return new WavefrontFigure(
                "wavefront" + size,
                "How far is the wave from a sphere?",
                "Wavefront 0.11 waves rms, 0.62 waves from peak to valley: Strehl ratio 0.61",
                "x in the pupil",
                "y in the pupil",
                0.35e-3,
                633e-9,
                side,
                values);
    }

    private static SpotFigure spots(int fields, int colours) {
        List<SpotFigure.Spot> spots = new ArrayList<>();
        for (int f = 0; f < fields; f++) {
            List<SpotFigure.Colour> all = new ArrayList<>();
            for (int c = 0; c < colours; c++) {
                double size = (1 + f + 0.3 * c) * 1e-6;
                double[] x = new double[60];
                double[] y = new double[60];
                Arrays.setAll(x, i -> size * (1 + i / 20) * Math.cos(i * Math.PI / 10));
                Arrays.setAll(y, i -> size * (1 + i / 20) * Math.sin(i * Math.PI / 10));
                all.add(new SpotFigure.Colour(colours > 1 ? 450 + 100 * c + " nm" : "", new Points(x, y)));
            }
            spots.add(new SpotFigure.Spot(
                    "field " + f + " deg",
                    "rms radius 1.4 µm",
                    all,
                    List.of(
                            new SpotFigure.Circle("80 % of the rays", 2e-6),
                            new SpotFigure.Circle("first dark ring of a perfect lens", 1.2e-6))));
        }
        return new SpotFigure(
                "spot" + fields, "How sharp is a point?", "Spot 1.4 µm rms at the best focus", false, spots);
    }

    static Stream<Arguments> pictures() {
        return all().stream()
                .flatMap(f -> Arrays.stream(Width.values()).map(w -> Arguments.of(f.name() + " " + w, f, w)));
    }

    @ParameterizedTest(name = "{0}")
    @MethodSource("pictures")
    void wordsStandApartAndInside(String name, Figure figure, Width width) {
        Picture picture = Pictures.of(figure, width);
        List<Picture.Label> labels = picture.labels();
        for (int i = 0; i < labels.size(); i++) {
            Picture.Label a = labels.get(i);
            assertThat(a.left()).as(a.text()).isGreaterThanOrEqualTo(0);
            assertThat(a.right()).as(a.text()).isLessThanOrEqualTo(picture.width());
            assertThat(a.bottom()).as(a.text()).isLessThanOrEqualTo(picture.height());
            for (Picture.Label b : labels.subList(i + 1, labels.size())) {
                boolean overlap =
                        a.left() < b.right() && b.left() < a.right() && a.top() < b.bottom() && b.top() < a.bottom();
                assertThat(overlap).as("%s over %s", a, b).isFalse();
            }
        }
        assertThat(picture.unplaced()).isEmpty();
        assertThat(picture.svg()).isEqualTo(Pictures.of(figure, width).svg()).doesNotContain("NaN");
        assertThat(picture.png().length).isGreaterThan(1000);
    }

    @Test
    void namesUnitsAndPowers() {
        Ruler r = Ruler.of(0, 4e-12, "1/m^2", "", 4);
        assertThat(r.name("slope")).isEqualTo("slope / (10^−12 1/m^2)");
        assertThat(r.ticks().get(1).text()).isEqualTo("1");
        assertThat(Ruler.of(0.28e3, 0.32e3, "1/m", "1/mm", 5).name("g")).isEqualTo("g / 1/mm");
        assertThat(Ruler.of(0, 1, "1", "", 5).name("yield")).isEqualTo("yield");
    }
}
