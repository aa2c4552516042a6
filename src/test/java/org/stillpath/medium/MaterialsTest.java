package org.stillpath.medium;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.nio.file.Path;
import java.util.List;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvFileSource;
import org.junit.jupiter.params.provider.MethodSource;
import org.stillpath.io.FileSources;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problems;

/** The shipped materials against published indices and thermal slopes, and their own samples. */
class MaterialsTest {
    private static final double D = 587.5618e-9;

    static Stream<String> names() {
        return FileSources.shipped().stream().filter(n -> n.startsWith("materials/"));
    }

    private static MaterialReader.File file(String name) {
        Problems problems = new Problems();
        FileSources sources = FileSources.of(Path.of("job.yaml"), false);
        MaterialReader.File file =
                MaterialReader.of(name, sources.document("materials/" + name, Place.of(name)), problems);
        assertThat(problems.list()).isEmpty();
        return file;
    }

    /** The law as it was published: freed of the conversion to absolute indices. */
    private static SolidLaw.Slope published(SolidLaw law, double wavelength) {
        Sellmeier s = (Sellmeier) law;
        return new Sellmeier(s.constant(), s.terms(), s.temperature(), false, s.thermal()).at(wavelength);
    }

    @ParameterizedTest
    @CsvFileSource(resources = "materials.csv", numLinesToSkip = 4, maxCharsPerColumn = 500)
    void agreesWithPublishedValues(
            String id, String kind, String name, double micrometres, String kelvin, double value, double tolerance) {
        Material m = file(name).material();
        double w = micrometres * 1e-6;
        // germanium's constants hold for the temperature that they are evaluated at: 293 K in the source
        double own = name.equals("germanium") ? 293 : ((Sellmeier) m.law()).temperature();
        if (kind.equals("slope")) {
            double[] jet = new double[3];
            m.law().at(w).jet(Double.parseDouble(kelvin), jet);
            assertThat(jet[1]).as(id).isCloseTo(value, within(tolerance));
        } else if (kind.equals("index")) {
            double n = 1 + published(m.law(), w).refractivity(own);
            // the forms in temperature of germanium round its constants for 293 K in the fifth digit
            assertThat(n).as(id).isCloseTo(value, within(name.equals("germanium") ? 2e-5 : tolerance));
        } else {
            double h = 1e-4 * w;
            double slope = (published(m.law(), w + h).refractivity(own)
                            - published(m.law(), w - h).refractivity(own))
                    / (2 * h);
            double n = 1 + published(m.law(), w).refractivity(own);
            assertThat(n - w * slope).as(id).isCloseTo(value, within(1e-7));
        }
    }

    /** Absolute is relative times air: at the d line in air of 20 °C, 1.0002724 after Ciddor (computed here). */
    @Test
    void keepsAbsoluteAndRelativeApart() {
        Material m = file("n-bk7").material();
        double absolute = 1 + m.law().at(D).refractivity(293.15);
        double air = 1 + AirState.laboratory().refractivity(D);
        assertThat(absolute / air).isCloseTo(1.5168000345005885, within(1e-12));
        assertThat(air - 1).isBetween(2.70e-4, 2.73e-4);
    }

    /** Release IAPWS R9-97, table of check values, and its derivative at fixed density. */
    @Test
    void waterAgreesWithTheRelease() {
        assertThat(1 + WaterLaw.refractivity(0.2265e-6, 298.15, 997.047435)).isCloseTo(1.39277824, within(2e-8));
        assertThat(1 + WaterLaw.refractivity(0.5893e-6, 773.15, 30.4758534)).isCloseTo(1.00949307, within(2e-8));
        assertThat(1 + WaterLaw.refractivity(0.5893e-6, 298.15, 997.047435)).isCloseTo(1.33285819, within(2e-8));
        assertThat(1 + WaterLaw.refractivity(0.5893e-6, 293.15, 998.2071)).isCloseTo(1.3333491189426008, within(1e-9));
        // Kell's density at 25 °C is 997.0479 kg/m³ (J. Chem. Eng. Data 20 (1975) 97, table), IAPWS-95's 997.0474
        assertThat(1 + new WaterLaw().at(0.5893e-6).refractivity(298.15)).isCloseTo(1.33285819, within(1e-6));
        double[] jet = new double[3];
        new WaterLaw().at(0.5893e-6).jet(298.15, jet);
        // at fixed density -22.5457e-6 1/K, by density 326.028e-6 per kg/m³ (recomputed from the release), and about
        // -0.257 kg/m³/K at 25 °C
        assertThat(jet[1]).isCloseTo(-22.5457e-6 - 0.257 * 326.028e-6, within(3e-7));
    }

    /** N-BK7's data sheet: 1.6e-6 1/K, e line, 20 to 40 °C, rounded; from memory. Fused silica: 8.3e-6, order from memory. */
    @Test
    void hasTheSlopesOfDataSheets() {
        SolidLaw.Slope bk7 = file("n-bk7").material().law().at(546.074e-9);
        assertThat((bk7.refractivity(313.15) - bk7.refractivity(293.15)) / 20).isCloseTo(1.6e-6, within(6e-8));
        assertThat(slope("fused-silica", D)).isBetween(8.2e-6, 8.7e-6);
        assertThat(slope("caf2", D)).isBetween(-11.6e-6, -10.5e-6);
        assertThat(slope("mgf2", 632.8e-9)).isCloseTo(1.0e-6, within(1e-10));
        assertThat(slope("baf2", 632.8e-9)).isCloseTo(-15e-6, within(1e-9));
        assertThat(slope("sapphire", 632.8e-9)).isCloseTo(13e-6, within(1e-9));
        assertThat(slope("znse", 10.6e-6)).isCloseTo(61e-6, within(1e-9));
        assertThat(slope("silicon", 5e-6)).isCloseTo(160e-6, within(1e-8));
    }

    private static double slope(String name, double wavelength) {
        double[] jet = new double[3];
        file(name).material().law().at(wavelength).jet(293.15, jet);
        return jet[1];
    }

    @ParameterizedTest
    @MethodSource("names")
    void saysWhereItComesFromAndDifferentiatesExactly(String path) {
        MaterialReader.File file = file(path.substring("materials/".length()));
        Material m = file.material();
        assertThat(m.title()).isNotEmpty();
        assertThat(m.source()).isNotEmpty();
        assertThat(m.uncertainty().slope()).isPositive();
        double w = 0.5 * (m.wavelengths().shortest() + m.wavelengths().longest());
        double t = 0.5 * (m.coldest() + m.hottest());
        SolidLaw.Slope law = m.law().at(w);
        double[] jet = new double[3];
        double[] above = new double[3];
        double[] below = new double[3];
        law.jet(t, jet);
        double h = 0.5;
        law.jet(t + h, above);
        law.jet(t - h, below);
        assertThat((above[0] - below[0]) / (2 * h)).isCloseTo(jet[1], within(1e-4 * Math.abs(jet[1])));
        assertThat((above[1] - below[1]) / (2 * h)).isCloseTo(jet[2], within(1e-3 * Math.abs(jet[2]) + 1e-14));
        for (MaterialReader.Sample s : file.samples()) {
            m.law().at(s.wavelength()).jet(s.temperature(), jet);
            assertThat(1 + jet[0]).isCloseTo(s.index(), within(2e-6));
            assertThat(jet[1]).isCloseTo(s.slope(), within(1e-9));
        }
    }

    @Test
    void shipsWhatTheDocumentationNames() {
        assertThat(names().toList())
                .containsAll(List.of(
                        "materials/fused-silica",
                        "materials/n-bk7",
                        "materials/caf2",
                        "materials/mgf2",
                        "materials/baf2",
                        "materials/sapphire",
                        "materials/znse",
                        "materials/germanium",
                        "materials/silicon",
                        "materials/water",
                        "materials/template"));
    }
}
