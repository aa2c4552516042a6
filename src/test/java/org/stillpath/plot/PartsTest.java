package org.stillpath.plot;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.awt.geom.Rectangle2D;
import java.io.ByteArrayInputStream;
import java.math.BigDecimal;
import java.util.List;
import javax.imageio.ImageIO;
import org.junit.jupiter.api.Test;

class PartsTest {
    @Test
    void typefaceHasTheSignsOfTheTrade() {
        for (Typeface face : List.of(Typeface.regular(), Typeface.semibold())) {
            "°µ′″−×λΔτ²±·³₀₁₂αβγθφωπ≤≥≈∞–…"
                    .codePoints()
                    .forEach(cp ->
                            assertThat(face.has(cp)).as(Character.toString(cp)).isTrue());
            assertThat(face.has(0x6F22)).isFalse();
        }
    }

    /** Advance widths and outline of the face as its own tables state them: H is 652, space 200 of 1000 units (hmtx). */
    @Test
    void typefaceMeasuresByItsTables() {
        Typeface face = Typeface.regular();
        assertThat(face.width("H", 1000)).isCloseTo(652, within(0.5));
        assertThat(face.width(" ", 1000)).isCloseTo(200, within(0.5));
        Rectangle2D h = face.outline("H", 0, 0, 1000).getBounds2D();
        assertThat(h.getMinY()).isCloseTo(-1000 * Typeface.CAPITAL, within(6.0));
        assertThat(h.getMaxY()).isCloseTo(0, within(0.5));
        // é is composed of two glyphs
        assertThat(face.outline("é", 0, 0, 1000).getBounds2D().getHeight())
                .isGreaterThan(face.outline("e", 0, 0, 1000).getBounds2D().getHeight() + 100);
    }

    @Test
    void scalesChooseUnitAndRoundTicks() {
        assertThat(Scale.of(-0.9e-3, 25e-3, Scale.unitFor(25e-3), 8).unit()).isEqualTo("mm");
        assertThat(Scale.of(0, 900, Scale.unitFor(900), 6).ticks().stream().map(Scale.Tick::text))
                .containsExactly("0", "200", "400", "600", "800");
        assertThat(Scale.of(0, 5000, Scale.unitFor(5000), 6).unit()).isEqualTo("km");
        assertThat(Scale.of(-0.4e-3, 0.4e-3, Scale.unitFor(0.4e-3), 5).ticks().stream()
                        .map(Scale.Tick::text))
                .containsExactly("−0.4", "−0.2", "0.0", "0.2", "0.4");
        assertThat(Scale.of(0, 3e-9, Scale.unitFor(3e-9), 4).unit()).isEqualTo("nm");
        assertThat(Scale.plain(new BigDecimal("1E-8"), 8)).isEqualTo("0.00000001");
        assertThat(Scale.plain(new BigDecimal("-1234567"), 0)).isEqualTo("−1\u2009234\u2009567");
    }

    /** Contours of x² + y² are circles; linear interpolation errs by at most step²·(second derivative)/8 over the slope. */
    @Test
    void contoursOfABowlAreCircles() {
        int n = 41;
        double[] at = new double[n];
        double[] values = new double[n * n];
        for (int i = 0; i < n; i++) {
            at[i] = -1 + 2.0 * i / (n - 1);
        }
        for (int i = 0; i < n * n; i++) {
            values[i] = at[i % n] * at[i % n] + at[i / n] * at[i / n];
        }
        List<Polyline> lines = new Contours(at, at, values).at(0.49);
        assertThat(lines).hasSize(1);
        Polyline circle = lines.get(0);
        assertThat(circle.x()[0]).isEqualTo(circle.x()[circle.size() - 1]);
        for (int i = 0; i < circle.size(); i++) {
            assertThat(Math.hypot(circle.x()[i], circle.y()[i])).isCloseTo(0.7, within(0.05 * 0.05 * 2 / 8 / 0.7));
        }
        assertThat(circle.length()).isCloseTo(2 * Math.PI * 0.7, within(0.01));
    }

    /** The ends of the published map: 00224E and FEE838 (Nuñez, Anderton &amp; Renslow 2018), 36 % of them on white. */
    @Test
    void cividisIsPaleAndGrowsLighter() {
        assertThat(Cividis.pale(0)).isEqualTo(0xA3AFBF);
        assertThat(Cividis.pale(1)).isEqualTo(0xFFF7B7);
        double before = -1;
        for (int i = 0; i <= 100; i++) {
            int rgb = Cividis.pale(i / 100.0);
            double luma = 0.2126 * (rgb >> 16 & 255) + 0.7152 * (rgb >> 8 & 255) + 0.0722 * (rgb & 255);
            assertThat(luma).isGreaterThanOrEqualTo(before - 0.5);
            before = luma;
        }
    }

    @Test
    void pngRoundTrips() throws Exception {
        int[] argb = new int[7 * 5];
        for (int i = 0; i < argb.length; i++) {
            argb[i] = 0x80000000 | (i * 0x01030507 & 0xFFFFFF);
        }
        var image = ImageIO.read(new ByteArrayInputStream(Png.encode(7, 5, argb, true, 7874)));
        assertThat(image.getRGB(0, 0, 7, 5, null, 0, 7)).isEqualTo(argb);
    }

    @Test
    void polylinesAreCutAtBoxes() {
        Polyline line = new Polyline(new double[] {-1, 11, 11, 5}, new double[] {5, 5, 20, 5});
        Box box = new Box(0, 0, 10, 10);
        List<Polyline> inside = line.inside(box);
        assertThat(inside).hasSize(2);
        assertThat(inside.get(0).x()).containsExactly(0, 10);
        assertThat(line.outside(box).stream().mapToDouble(Polyline::length).sum()
                        + inside.stream().mapToDouble(Polyline::length).sum())
                .isCloseTo(line.length(), within(0.5 + 1e-9));
    }

    @Test
    void labelsAvoidEachOtherAndTheFrame() {
        Labels labels = new Labels(new Box(0, 0, 100, 50));
        Box first = new Box(40, 20, 60, 30);
        List<Labels.Place> places = List.of(
                new Labels.Place(first, 0, 50, 32),
                new Labels.Place(new Box(95, 20, 115, 30), 1, 50, 32),
                new Labels.Place(new Box(40, 34, 60, 44), 2, 50, 32));
        assertThat(labels.place(places, "a", 4).orElseThrow().box()).isEqualTo(first);
        assertThat(labels.place(places, "b", 4).orElseThrow().price()).isEqualTo(2);
        assertThat(labels.place(places, "c", 4)).isEmpty();
    }
}
