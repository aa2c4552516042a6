package org.stillpath.task;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.List;
import java.util.Objects;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

/** Wavefronts and figures of the task {@code between}. */
class BetweenTest {
    private static final String FISHEYE = """
            task: between
            media: {fish: {index: "2/(1 + (x^2+y^2+z^2)/a^2)", with: {a: 1 m}}}
            through: fish
            from: [0, 0.5 m, 0]
            to: [0, -0.3 m, 0.6 m]
            """;

    private static final String LUMP = """
            task: between
            media: {lump: {index: "1 + 0.3*exp(-((y-0.02 m)^2+z^2)/(0.5 m)^2)"}}
            through: lump
            from: [0, 0, -2 m]
            to: [0, 0.1 m, 2 m]
            """;

    private static final String LENS = """
            task: between
            media: {glass: {index: 1.5}}
            train:
              from: vacuum
              surfaces:
                - {at: 0 mm, radius: 10 mm, whole: true, into: glass}
                - {at: 0 mm, radius: 10 mm, whole: true, into: vacuum}
            from: [0, 0, -40 mm]
            to: [0, 0.1 mm, 29 mm]
            search: {half-angle: 20 deg, in: yz}
            """;

    private static final String BUMPS = """
            task: between
            media:
              bumps:
                index: "1.3 + 0.2*exp(-((x-a)^2+(y-0.05 m)^2+(z-0.4 m)^2)/(0.3 m)^2)
                  - 0.1*exp(-((x+0.2 m)^2+(y-0.25 m)^2+(z-0.6 m)^2)/(0.3 m)^2)"
                with: {a: 0.1 m}
            through: bumps
            from: [0, 0, 0]
            to: [0.03 m, 0.02 m, 1 m]
            search: {half-angle: 30 deg}
            """;

    private static Quantity.Amount amount(Result r, String name) {
        return (Quantity.Amount) Objects.requireNonNull(r.quantities().get(name));
    }

    /** The grid's answer is the first path's, to the grid's own error, and that is small. */
    private static void agrees(Result r, double most) {
        Quantity.Amount grid = amount(r, "first-arrival-grid");
        assertThat(grid.unit()).isEqualTo("m");
        assertThat(grid.error()).isLessThan(most);
        assertThat(grid.value()).isCloseTo(amount(r, "first-arrival").value(), within(grid.error()));
        assertThat(r.warnings()).noneMatch(w -> w.contains("grid of wavefronts"));
    }

    @Test
    void theGridFindsTheFirstArrivalOfTheFisheye() {
        Result r = Jobs.run(FISHEYE + "fronts: true\n");
        agrees(r, 1e-6);
        // n0 a asin(chord on the unit sphere/2), with the chord 2|u − v|/√((1 + u²)(1 + v²)) (Luneburg, section 28,
        // from
        // memory)
        double exact = 2 * Math.asin(1 / Math.sqrt(1.25 * 1.45));
        assertThat(amount(r, "first-arrival").value()).isCloseTo(exact, within(1e-8));
        assertThat(amount(r, "first-arrival-grid").value())
                .isCloseTo(exact, within(amount(r, "first-arrival-grid").error()));
    }

    /** The parabolas of PathSearchTest, whose lengths are 21.542780085893725 m and more. */
    @Test
    void theGridFindsTheLowTrajectory() {
        Result r = Jobs.run("""
                task: between
                media: {fall: {index: "sqrt(2.25 - 0.2*y/(1 m))"}}
                through: fall
                from: [0, 0, 0]
                to: [0, 1 m, 15 m]
                fronts: true
                """);
        agrees(r, 1e-4);
        assertThat(amount(r, "first-arrival-grid").value())
                .isCloseTo(
                        21.542780085893725,
                        within(amount(r, "first-arrival-grid").error()));
    }

    @Test
    void theGridFindsTheFirstOfThreeImages() {
        Result r = Jobs.run(LUMP + "fronts: true\n");
        assertThat(r.paths()).hasSize(3);
        agrees(r, 1e-4);
    }

    @Test
    void theGridIsABoxWhereNoPlaneIsOneOfSymmetry() {
        Result r = Jobs.run(BUMPS + "fronts: true\nfigures: [paths, arrival]\n", true);
        agrees(r, 1e-4);
        assertThat(r.figures().stream().map(Figure::name)).containsExactly("paths");
        assertThat(r.warnings()).anyMatch(w -> w.contains("\"arrival\" exists only for searches in a plane"));
        assertThat(((SectionFigure) r.figures().get(0)).fronts()).isPresent();
    }

    /** Uniform, the plane is free to choose, and the sight may lie along any axis. */
    @ParameterizedTest
    @CsvSource({"1 m, 0, 0", "0, 1 m, 0", "0, 0, 1 m", "1 m, 2 m, 2 m"})
    void theGridIsExactInVacuum(String x, String y, String z) {
        Result r = Jobs.run(
                "task: between\nthrough: vacuum\nfrom: [0, 0, 0]\nto: [%s, %s, %s]\nfronts: true\n".formatted(x, y, z),
                true);
        agrees(r, 1e-12);
        SectionFigure paths = (SectionFigure) r.figures().get(0);
        assertThat(paths.fronts()).isPresent();
    }

    @Test
    void tellsWhenTheFirstLightPassesAWall() {
        // thin air along the ground: the way along the ground is the shorter
        Result r = Jobs.run("""
                task: between
                media:
                  hot:
                    index: 1.000277 - 5e-6*exp(-((y-0.1 m)/h)^2) - 20e-6*exp(-y/h)
                    with: {h: 0.25 m}
                    valid: y > 0 m
                through: hot
                from: [0, 1.5 m, 0]
                to: [0, 1.2 m, 900 m]
                fronts: true
                """);
        assertThat(r.warnings()).anyMatch(w -> w.contains("passes along the edge of the medium"));
        // a way along a wall is none of the search's
        assertThat(r.warnings()).anyMatch(w -> w.contains("along the edge of the medium, which is not stationary"));
    }

    @Test
    void tellsWhenTheFirstLightPassesTheEdgeOfTheGrid() {
        Result r = Jobs.run("""
                task: between
                media: {fall: {index: "sqrt(2.25 - 0.2*y/(1 m))", valid: y < 11.25 m}}
                through: fall
                from: [0, 0, 0]
                to: [0, 0, 22.6 m]
                search: {half-angle: 80 deg}
                fronts: true
                """);
        assertThat(r.paths()).isEmpty();
        assertThat(r.warnings()).anyMatch(w -> w.contains("passes the edge of the grid"));
        assertThat(r.warnings()).anyMatch(w -> w.contains("the search found no path, but"));
    }

    @Test
    void tellsWhyNothingArrives() {
        Result r = Jobs.run("""
                task: between
                media: {split: {index: "1.3 + 0.01*y/(1 m)", valid: "(z - 0.5 m)^2 > 0.01 m^2"}}
                through: split
                from: [0, 0, 0]
                to: [0, 0, 1 m]
                fronts: true
                """);
        assertThat(r.quantities()).doesNotContainKey("first-arrival-grid");
        assertThat(r.warnings())
                .anyMatch(w -> w.contains("no light arrives") && w.contains("no way to the target leads"));
    }

    @Test
    void tellsWhenTheSearchMissedTheFirstArrival() {
        // away from the target only the long way round the fisheye's circle is found
        Result r = Jobs.run(FISHEYE + "search: {around: [0, 0.8, -0.6], half-angle: 90 deg}\nfronts: true\n");
        assertThat(r.paths()).hasSize(1);
        assertThat(r.warnings())
                .anyMatch(w ->
                        w.contains("longer than the first arrival") && w.contains("may have missed a shorter way"));
    }

    @Test
    void refusesFrontsThroughATrain() {
        List<String> faults = Jobs.faults(LENS + "fronts: true\n");
        assertThat(faults).hasSize(1);
        assertThat(faults.get(0)).startsWith("job.yaml:11:9:").contains("leave \"fronts\" out");
        assertThat(Jobs.faults(LENS + "fronts: false\n")).isEmpty();
    }

    @Test
    void drawsThePathsByKindBetweenMarkedEnds() {
        Result r = Jobs.run(LUMP, true);
        assertThat(r.figures().stream().map(Figure::name)).containsExactly("paths");
        SectionFigure paths = (SectionFigure) r.figures().get(0);
        assertThat(paths.fronts()).isEmpty();
        assertThat(paths.lines().stream().map(SectionFigure.Line::role))
                .containsExactly(SectionFigure.Role.MINIMUM, SectionFigure.Role.MINIMUM, SectionFigure.Role.SADDLE);
        assertThat(paths.marks())
                .containsExactly(new SectionFigure.Mark("from", -2, 0), new SectionFigure.Mark("to", 2, 0.1));
        assertThat(paths.across()).isEqualTo("z");
        for (SectionFigure.Line l : paths.lines()) {
            assertThat(l.u()[0]).isCloseTo(-2, within(1e-12));
            assertThat(l.v()[l.v().length - 1]).isCloseTo(0.1, within(1e-6));
        }
    }

    /** A plane across no axis of the job has coordinates along and across the chord. */
    @Test
    void drawsAnObliquePlaneAlongItsChord() {
        Result r = Jobs.run("""
                task: between
                media: {fall: {index: "sqrt(2.25 - 0.2*y/(1 m))"}}
                through: fall
                from: [0, 0, 0]
                to: [10 m, 1 m, 11 m]
                fronts: true
                """, true);
        SectionFigure paths = (SectionFigure) r.figures().get(0);
        assertThat(paths.across()).isEqualTo("distance along the chord");
        SectionFigure.Mark to = paths.marks().get(1);
        assertThat(to.u()).isCloseTo(Math.sqrt(222), within(1e-12));
        assertThat(to.v()).isCloseTo(0, within(1e-12));
        // light that falls bends away from the thin medium above
        assertThat(paths.lines().get(0).v()[paths.lines().get(0).v().length / 2])
                .isPositive();
    }

    @Test
    void drawsMissesWithTheirRootsByKind() {
        Result r = Jobs.run(LUMP + "figures: [paths, arrival]\n", true);
        assertThat(r.figures().stream().map(Figure::name)).containsExactly("paths", "arrival");
        CurveFigure arrival = (CurveFigure) r.figures().get(1);
        CurveFigure.Panel all = arrival.panels().get(0);
        assertThat(all.across().quantity()).isEqualTo("launch angle toward +y");
        assertThat(all.across().high()).isCloseTo(Math.toRadians(60), within(1e-12));
        assertThat(all.points().stream().map(CurveFigure.Point::role))
                .containsExactly(SectionFigure.Role.MINIMUM, SectionFigure.Role.SADDLE, SectionFigure.Role.MINIMUM);
        // each root is where its launch points, from the chord, whose slope is 0.1/4
        double slope = r.paths().get(0).launch().y() / r.paths().get(0).launch().z();
        assertThat(all.points().get(2).x()).isCloseTo(Math.atan(slope) - Math.atan(0.025), within(1e-12));
        // the curve changes sign at the roots alone
        CurveFigure.Curve curve = all.curves().get(0);
        int changes = 0;
        for (int i = 1; i < curve.y().length; i++) {
            changes += curve.y()[i] > 0 != curve.y()[i - 1] > 0 ? 1 : 0;
        }
        assertThat(changes).isEqualTo(3);
        assertThat(arrival.answer())
                .isEqualTo("3 launch angles reach the target: -13.15, -2.71 and 13.03 deg from the chord toward +y");
    }

    /** Three images within some milliradians of a search over 120 degrees have a panel of their own. */
    @Test
    void showsTheNeighbourhoodOfImagesThatAreClose() {
        Result r = Jobs.run("""
                task: between
                media:
                  strip:
                    index: 1.000277 - 33e-6*exp(-(y/h)^2) + 8e-6*exp(-((y-3.5 m)/(1 m))^2)
                    with: {h: 0.4 m}
                    valid: y > 0 m
                through: strip
                from: [0 m, 1.5 m, 0 m]
                to: [0 m, 1.2 m, 900 m]
                figures: [arrival]
                """, true);
        assertThat(r.paths()).hasSize(3);
        CurveFigure arrival = (CurveFigure) r.figures().get(0);
        assertThat(arrival.panels()).hasSize(2);
        assertThat(arrival.panels().get(0).up().linear()).isPositive();
        CurveFigure.Panel near = arrival.panels().get(1);
        assertThat(near.points()).hasSize(3);
        assertThat(near.across().high() - near.across().low()).isLessThan(0.02);
        assertThat(near.up().high()).isLessThan(10);
    }

    @Test
    void showsAGapWhereRaysDoNotArrive() {
        Result r = Jobs.run(LENS + "figures: [arrival]\n", true);
        CurveFigure.Curve curve =
                ((CurveFigure) r.figures().get(0)).panels().get(0).curves().get(0);
        // at 20 deg rays pass beside the ball
        assertThat(curve.y()[0]).isNaN();
        assertThat(curve.y()[curve.y().length - 1]).isNaN();
    }

    @Test
    void saysHowNearTheNearestRayCame() {
        Result r = Jobs.run("""
                task: between
                media: {fall: {index: "sqrt(2.25 - 0.2*y/(1 m))", valid: y < 11.25 m}}
                through: fall
                from: [0, 0, 0]
                to: [0, 0, 22.6 m]
                search: {half-angle: 80 deg}
                figures: [paths, arrival]
                """, true);
        assertThat(r.figures().get(1).answer())
                .startsWith("No launch angle searched reaches the target; the nearest ray, at 4");
        // the picture without a path still shows both points in their medium
        SectionFigure paths = (SectionFigure) r.figures().get(0);
        assertThat(paths.lines()).isEmpty();
        assertThat(paths.marks()).hasSize(2);
        assertThat(paths.shading()).isPresent();
    }
}
