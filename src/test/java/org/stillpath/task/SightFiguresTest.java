package org.stillpath.task;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.Arrays;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.stillpath.task.PanelFigure.Curve;
import org.stillpath.task.PanelFigure.Mark;
import org.stillpath.task.PanelFigure.Shape;
import org.stillpath.task.PanelFigure.Style;
import org.stillpath.task.PanelFigure.Tone;
import org.stillpath.task.SectionFigure.Role;

class SightFiguresTest {
    /** A road's hot air, well mixed at the ground: three images. */
    private static final String ROAD = """
            task: sightline
            wavelength: 0.55 um
            media:
              field:
                air:
                  law: iag-1999
                  temperature: 303.15 K + dTs*exp(-(height/delta)^2)
                  pressure: 1013.25 hPa
                  humidity: 0 %
                with: {dTs: 20 K, delta: 0.3 m}
            through: field
            earth: {radius: 6371 km}
            ground: {height: 0 m}
            from: {height: 1.5 m}
            """;

    private static final String THERE = "to: {distance: 600 m, height: 0.6 m}\n";
    private static final String ALL = "figures: [profile, sightline, transfer, view]\n";

    private static final String STILL = """
            task: sightline
            media: {even: {index: 1.0003}}
            through: even
            """;

    private static PanelFigure panels(Result r, String name) {
        return r.figures().stream()
                .filter(f -> f.name().equals(name))
                .map(f -> (PanelFigure) f)
                .findFirst()
                .orElseThrow();
    }

    private static List<String> names(Result r) {
        return r.figures().stream().map(Figure::name).toList();
    }

    @Test
    void theUsualFigureIsTheSightline() {
        Result r = Jobs.run(ROAD + THERE, true);
        assertThat(names(r)).containsExactly("sightline");
        assertThat(Jobs.run(ROAD + THERE + ALL, false).figures()).isEmpty();
    }

    @Test
    void pathsAreNumberedFromAboveAndTheLowestClearanceIsMarked() {
        SectionFigure f = (SectionFigure) Jobs.run(ROAD + THERE, true).figures().get(0);
        assertThat(f.lines().stream()
                        .filter(l -> l.role() == Role.ERECT || l.role() == Role.INVERTED)
                        .map(l -> l.label() + " " + l.role()))
                .containsExactly("0 ERECT", "1 INVERTED", "2 ERECT");
        assertThat(f.lines().stream().filter(l -> l.role() == Role.CLEARANCE).map(SectionFigure.Line::label))
                .hasSize(1)
                .allMatch(l -> l.startsWith("lowest 0.03"));
        assertThat(f.lines().stream().filter(l -> l.role() == Role.GROUND)).hasSize(1);
        assertThat(f.answer()).contains("3 images").contains("lowest clearance 0.03");
        assertThat(f.marks().stream().map(SectionFigure.Mark::label)).contains("instrument 1.5 m", "target 0.6 m");
    }

    @Test
    void theTransferCurveHasTwoFoldsBetweenThreeRanges() {
        PanelFigure.Panel p =
                panels(Jobs.run(ROAD + THERE + ALL, true), "transfer").panels().get(0);
        assertThat(p.curves().stream().map(Curve::style).filter(s -> s != Style.GUIDE))
                .containsExactly(Style.ERECT, Style.INVERTED, Style.ERECT);
        assertThat(p.marks().stream().filter(m -> m.style() == Style.FOLD)).hasSize(2);
        assertThat(p.marks().stream().filter(m -> m.style() == Style.INVERTED).map(Mark::label))
                .containsExactly("1");
        // the curve goes through the images that were found with the air itself
        for (Mark m : p.marks()) {
            if (m.style() == Style.ERECT || m.style() == Style.INVERTED) {
                double near = p.curves().stream()
                        .filter(c -> c.style() == m.style())
                        .mapToDouble(c -> Math.abs(at(c, m.x()) - m.y()))
                        .filter(Double::isFinite)
                        .min()
                        .orElseThrow();
                assertThat(near).isLessThan(2e-3);
            }
        }
    }

    private static double at(Curve c, double x) {
        double[] u = c.x();
        double[] v = c.y();
        for (int i = 1; i < u.length; i++) {
            if (u[i - 1] <= x && x <= u[i]) {
                return v[i - 1] + (x - u[i - 1]) / (u[i] - u[i - 1]) * (v[i] - v[i - 1]);
            }
        }
        return Double.NaN;
    }

    @Test
    void theProfileShowsTheAir() {
        PanelFigure f = panels(Jobs.run(ROAD + THERE + ALL, true), "profile");
        assertThat(f.panels()).hasSize(2);
        Curve t = f.panels().get(0).curves().get(0);
        assertThat(t.y()[0]).isEqualTo(0);
        assertThat(t.x()[0]).isCloseTo(323.15, within(1e-9));
        // where T'/T² of the Gaussian is greatest, a little above its own steepest place at 0.3 m/√2 = 0.212 m; there
        // T' = -(2 · 20 K · h/δ²) exp(-(h/δ)²) = -57.1 K/m
        assertThat(f.answer()).contains("0.22").contains("-57.1 K/m");
        assertThat(f.panels().get(1).levels().stream().map(PanelFigure.Level::label))
                .containsExactly("instrument 1.5 m", "target 0.6 m", "ground");
    }

    /** Where light runs straight over a flat earth, what is seen is what is. */
    @Test
    void evenAirShowsTheThingAsItIs() {
        Result r = Jobs.run(
                STILL + "earth: flat\nfrom: {height: 1.5 m}\nto: {distance: 500 m, height: 2 m}\n" + ALL, true);
        PanelFigure f = panels(r, "view");
        assertThat(f.equal()).isTrue();
        for (Tone tone : List.of(Tone.DARK, Tone.SIGNAL, Tone.SECOND)) {
            double[] truth = edges(f.panels().get(0), tone);
            double[] seen = edges(f.panels().get(1), tone);
            for (int i = 0; i < 4; i++) {
                assertThat(seen[i]).as(tone + " " + i).isCloseTo(truth[i], within(2e-6));
            }
        }
    }

    private static double[] edges(PanelFigure.Panel p, Tone tone) {
        double[] e = {1e9, -1e9, 1e9, -1e9};
        for (Shape s : p.shapes()) {
            if (s.tone() == tone) {
                e[0] = Math.min(e[0], Arrays.stream(s.x()).min().orElseThrow());
                e[1] = Math.max(e[1], Arrays.stream(s.x()).max().orElseThrow());
                e[2] = Math.min(e[2], Arrays.stream(s.y()).min().orElseThrow());
                e[3] = Math.max(e[3], Arrays.stream(s.y()).max().orElseThrow());
            }
        }
        return e;
    }

    @Test
    void theThingDrawnFollowsTheTargetOrTheJob() {
        String near = STILL + "earth: flat\nfrom: {height: 1.5 m}\nto: {distance: 500 m, height: 2 m}\n" + ALL;
        assertThat(panels(Jobs.run(near, true), "view").question()).contains("staff");
        assertThat(panels(Jobs.run(near + "view: hull\n", true), "view").question())
                .contains("hull");
        assertThat(panels(Jobs.run(near.replace("500 m", "8 km").replace("2 m", "9 m"), true), "view")
                        .question())
                .contains("hull");
        assertThat(panels(Jobs.run(near.replace("500 m", "20 km").replace("2 m", "900 m"), true), "view")
                        .question())
                .contains("hillside");
        assertThat(Jobs.faults(near + "view: ship\n")).anyMatch(s -> s.contains("view"));
    }

    /** The search ends a little above the target; what stands higher is seen all the same, and told as continued. */
    @Test
    void whatStandsAboveTheRaysShotIsNotDrawnAsMissing() {
        Result r = Jobs.run(
                ROAD + "to: {distance: 5 km, height: 12 m, span: [8 m, 400 m]}\n" + ALL + "view: staff\n", true);
        PanelFigure f = panels(r, "view");
        double[] truth = edges(f.panels().get(0), Tone.SIGNAL);
        double[] seen = edges(f.panels().get(1), Tone.SIGNAL);
        // refraction of some arcseconds, against 270 arcmin
        assertThat(seen[3]).isCloseTo(truth[3], within(3e-4));
        assertThat(panels(r, "transfer").panels().get(0).curves().stream().map(Curve::label))
                .contains("continued straight");
    }

    @Test
    void aHiddenTargetIsDrawnAsHidden() {
        Result r = Jobs.run(
                STILL + "earth: {radius: 6371 km}\nfrom: {height: 10 m}\nto: {distance: 40 km, height: 1 m}\n" + ALL,
                true);
        assertThat(names(r)).containsExactly("profile", "sightline", "transfer", "view");
        assertThat(panels(r, "view").answer()).contains("wholly hidden");
        assertThat(panels(r, "transfer").answer()).contains("at no elevation");
        SectionFigure s = (SectionFigure) r.figures().get(1);
        assertThat(s.marks().stream().map(SectionFigure.Mark::label)).anyMatch(l -> l.startsWith("lowest height seen"));
    }

    @Test
    void levelSightsAndStarsTellWhatCannotBeDrawn() {
        for (String to : List.of("to: {staff: {distance: 30 m}}\n", "to: {stars: [45 deg]}\n")) {
            Result asked = Jobs.run(ROAD + to + ALL, true);
            assertThat(names(asked)).containsExactly("profile");
            assertThat(asked.warnings().stream().filter(w -> w.contains("is not drawn")))
                    .hasSize(3)
                    .allMatch(w -> w.contains("has no target"));
            assertThat(Jobs.run(ROAD + to, true).warnings()).noneMatch(w -> w.contains("is not drawn"));
        }
    }
}
