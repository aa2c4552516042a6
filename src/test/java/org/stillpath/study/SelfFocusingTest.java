package org.stillpath.study;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.nio.charset.StandardCharsets;
import java.util.Objects;
import org.junit.jupiter.api.Test;
import org.stillpath.io.YamlReader;
import org.stillpath.job.Node;
import org.stillpath.job.Sources;
import org.stillpath.problem.Problems;
import org.stillpath.task.Tasks;

/** Studies read what real rays say of a lens. */
class SelfFocusingTest {
    /** A quarter-pitch rod: a collimated beam comes together in its last face. */
    private static final String ROD = """
            task: lens
            wavelength: 633 nm
            accuracy: 1e-12
            media:
              a: {index: 1}
              rod:
                index: n0*sqrt(1 - (g*r)^2 + h4*(g*r)^4 + h6*(g*r)^6 + h8*(g*r)^8)
                with: {n0: 1.6, g: 0.3 1/mm, h4: 0, h6: -0.37777777777777777, h8: 0.19682539682539682}
            train:
              from: a
              surfaces: [{at: 0 mm, into: rod}, {at: 5.235987755982989 mm, into: a}]
            pupil: {radius: 0.6 mm, sampling: {radial: 5, angular: 12}}
            """;

    private static Outcome run(String study) {
        Problems problems = new Problems();
        Node.Mapping job = YamlReader.parse((ROD + study).getBytes(StandardCharsets.UTF_8), "job.yaml", problems);
        problems.throwIfAny();
        return Studies.run(job, Sources.none(), new Tasks.Options(false), Studies.Means.plain());
    }

    @Test
    void theProfileWithoutSphericalAberrationIsTheHyperbolicSecant() {
        // Fletcher, Murphy & Young 1954: n = n0 sech gr images all meridional rays without aberration; n² = n0²(1 − u +
        // 2/3 u²
        // − 17/45 u³ + 62/315 u⁴ ..), u = (gr)². Given all other terms, the fourth-order one that nulls the aberration
        // is 2/3; the
        // terms left out are of the order u⁵/u² = 3e-5 at gr = 0.18
        Outcome o = run("""
                study:
                  fit:
                    unknowns: {media.rod.with.h4: {start: 0.5, low: 0, high: 1}}
                    match: {quantities.longitudinal-aberration: {value: 0 m, standard: 1 nm}}
                """);
        assertThat(number(o, "media.rod.with.h4")).isCloseTo(2.0 / 3, within(3e-5));
    }

    @Test
    void aSweepReadsSingleTermsOfALens() {
        Outcome o = run("""
                study:
                  sweep: {media.rod.with.h4: {values: [0.6, 0.6666666666666667]}}
                  watch: [quantities.zernike.10, quantities.strehl, quantities.spot-radius-rms]
                """);
        Doc rows = at(at(o.doc(), "sweep"), "rows");
        double[] off = results(rows, 0);
        double[] sech = results(rows, 1);
        assertThat(Math.abs(sech[0])).isLessThan(1e-3 * Math.abs(off[0]));
        assertThat(sech[1]).isCloseTo(1, within(1e-6));
        assertThat(sech[2]).isLessThan(1e-3 * off[2]);
    }

    private static double[] results(Doc rows, int row) {
        Doc.Items results = (Doc.Items) at(((Doc.Items) rows).values().get(row), "results");
        return results.values().stream()
                .mapToDouble(d -> ((Doc.Amount) d).value())
                .toArray();
    }

    private static double number(Outcome o, String unknown) {
        return ((Doc.Amount) at(at(at(at(o.doc(), "fit"), "unknowns"), unknown), "value")).value();
    }

    private static Doc at(Doc doc, String key) {
        return Objects.requireNonNull(((Doc.Fields) doc).values().get(key));
    }
}
