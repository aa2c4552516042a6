package org.stillpath.plot;

import static org.assertj.core.api.Assertions.assertThat;

import java.awt.image.BufferedImage;
import java.io.ByteArrayInputStream;
import java.io.File;
import java.io.IOException;
import java.io.StringReader;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import java.util.concurrent.TimeUnit;
import java.util.regex.MatchResult;
import java.util.regex.Pattern;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import javax.imageio.ImageIO;
import javax.xml.parsers.DocumentBuilderFactory;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.Arguments;
import org.junit.jupiter.params.provider.MethodSource;
import org.stillpath.task.BarFigure;
import org.stillpath.task.ChartFigure;
import org.stillpath.task.CurveFigure;
import org.stillpath.task.Figure;
import org.stillpath.task.MapFigure;
import org.stillpath.task.PanelFigure;
import org.stillpath.task.SectionFigure;
import org.stillpath.task.SectionFigure.Role;
import org.stillpath.task.SpotFigure;
import org.stillpath.task.WavefrontFigure;
import org.w3c.dom.Document;
import org.w3c.dom.Element;
import org.w3c.dom.NodeList;
import org.xml.sax.InputSource;

class PicturesTest {
    static Stream<Arguments> pictures() {
        return Scenes.figures().stream()
                .flatMap(f -> Arrays.stream(Width.values()).map(w -> Arguments.of(f.answer(), Pictures.of(f, w), f)));
    }

    @ParameterizedTest(name = "{0}")
    @MethodSource("pictures")
    void wordsStandApartAndInside(String name, Picture picture) {
        List<Picture.Label> labels = picture.labels();
        for (int i = 0; i < labels.size(); i++) {
            Picture.Label a = labels.get(i);
            assertThat(a.left()).as(a.text()).isGreaterThanOrEqualTo(0);
            assertThat(a.top()).as(a.text()).isGreaterThanOrEqualTo(0);
            assertThat(a.right()).as(a.text()).isLessThanOrEqualTo(picture.width());
            assertThat(a.bottom()).as(a.text()).isLessThanOrEqualTo(picture.height());
            for (Picture.Label b : labels.subList(i + 1, labels.size())) {
                boolean overlap =
                        a.left() < b.right() && b.left() < a.right() && a.top() < b.bottom() && b.top() < a.bottom();
                assertThat(overlap).as("%s over %s", a, b).isFalse();
            }
        }
    }

    @ParameterizedTest(name = "{0}")
    @MethodSource("pictures")
    void everyLabelIsThereOrToldAsMissing(String name, Picture picture, Figure any) {
        if (!(any instanceof SectionFigure figure)) {
            assertThat(picture.unplaced()).isEmpty();
            return;
        }
        List<String> placed = picture.labels().stream().map(Picture.Label::text).toList();
        Stream.concat(
                        figure.lines().stream().map(SectionFigure.Line::label),
                        figure.marks().stream().map(SectionFigure.Mark::label))
                .map(s -> Canvas.clean(s).strip())
                .filter(s -> !s.isEmpty())
                .forEach(s -> {
                    if (!placed.contains(s)) {
                        assertThat(picture.unplaced()).contains(s);
                        assertThat(picture.description()).contains(s);
                    }
                });
        if (!figure.name().equals("odd")) {
            assertThat(picture.unplaced()).isEmpty();
        }
    }

    @ParameterizedTest(name = "{0}")
    @MethodSource("pictures")
    void svgIsWellFormedWithTextAsText(String name, Picture picture, Figure figure) throws Exception {
        String svg = picture.svg();
        Document document =
                DocumentBuilderFactory.newInstance().newDocumentBuilder().parse(new InputSource(new StringReader(svg)));
        Element root = document.getDocumentElement();
        assertThat(root.getAttribute("role")).isEqualTo("img");
        assertThat(text(root, "title")).containsExactly(Canvas.clean(figure.answer()));
        assertThat(text(root, "desc").get(0)).startsWith(Canvas.clean(figure.question()));
        assertThat(text(root, "text"))
                .containsExactlyElementsOf(
                        picture.labels().stream().map(Picture.Label::text).toList());
        int panels = figure instanceof CurveFigure c ? c.panels().size() : 1;
        assertThat(text(root, "text").stream()
                        .filter(t -> t.matches(".* / (km|m|mm|µm|nm|deg|mrad|µrad|arcmin|°C|ppm)( \\(log.*\\))?")))
                .hasSize(figure instanceof PanelFigure p ? p.panels().size() + 1 : 2 * panels);
        assertThat(svg.chars().filter(c -> c != '\n' && Character.isISOControl(c)))
                .isEmpty();
        assertThat(svg).doesNotContain(" id=");
    }

    private static List<String> text(Element root, String tag) {
        NodeList nodes = root.getElementsByTagName(tag);
        return Stream.iterate(0, i -> i + 1)
                .limit(nodes.getLength())
                .map(i -> nodes.item(i).getTextContent())
                .toList();
    }

    @ParameterizedTest(name = "{0}")
    @MethodSource("pictures")
    void coloursAreOfTheHouse(String name, Picture picture) {
        assertThat(Pattern.compile("=\"(#[0-9A-Fa-f]+)\"")
                        .matcher(picture.svg())
                        .results()
                        .map((MatchResult m) -> m.group(1))
                        .collect(Collectors.toSet()))
                .isSubsetOf(Arrays.stream(Ink.values()).map(Ink::hex).toList());
    }

    @ParameterizedTest(name = "{0}")
    @MethodSource("pictures")
    void pngHasTheSizeAndInkOfThePicture(String name, Picture picture, Figure figure) throws IOException {
        BufferedImage image = ImageIO.read(new ByteArrayInputStream(picture.png()));
        assertThat(image.getWidth()).isEqualTo(picture.widthMillimetres() > 100 ? 1260 : 630);
        assertThat(image.getHeight()).isEqualTo((int) Math.round(picture.heightMillimetres() / 25.4 * 200));
        // panels stand below each other on narrow paper
        int panels = figure instanceof CurveFigure c && picture.widthMillimetres() < 100
                ? c.panels().size()
                : 1;
        assertThat(picture.heightMillimetres()).isBetween(45.0, panels > 1 ? 160.0 : 110.0);
        // every word leaves ink in its box
        double scale = 200 / 72.0;
        for (Picture.Label label : picture.labels()) {
            int dark = 0;
            for (int y = (int) (label.top() * scale); y < label.bottom() * scale; y++) {
                for (int x = (int) (label.left() * scale); x < label.right() * scale; x++) {
                    dark += (image.getRGB(x, y) & 0xFF) < 150 ? 1 : 0;
                }
            }
            assertThat(dark).as(label.text()).isGreaterThan(0);
        }
    }

    @Test
    void sameDataGiveTheSameBytes() {
        assertThat(Pictures.of(Scenes.rod(), Width.FULL).svg())
                .isEqualTo(Pictures.of(Scenes.rod(), Width.FULL).svg());
        assertThat(Pictures.of(Scenes.mirage(), Width.HALF).png())
                .isEqualTo(Pictures.of(Scenes.mirage(), Width.HALF).png());
    }

    @Test
    void localeDoesNotReachThePicture() {
        Locale before = Locale.getDefault();
        String svg = Pictures.of(Scenes.rod(), Width.FULL).svg();
        try {
            Locale.setDefault(Locale.forLanguageTag("ar-EG-u-nu-arab"));
            assertThat(Pictures.of(Scenes.rod(), Width.FULL).svg()).isEqualTo(svg);
        } finally {
            Locale.setDefault(before);
        }
    }

    @Test
    void exaggerationIsToldWithBars() {
        List<String> mirage = words(Scenes.mirage());
        assertThat(mirage).anyMatch(t -> t.matches("heights \\d+ ×")).contains("100 m", "0.2 m");
        assertThat(words(Scenes.realImage())).noneMatch(t -> t.contains("×"));
        assertThat(Pictures.of(Scenes.mirage(), Width.FULL).description()).contains("heights 150 ×");
    }

    /** The factor told is the factor drawn: measured on the ticks of both axes. */
    @Test
    void exaggerationToldIsTheOneDrawn() {
        Picture picture = Pictures.of(Scenes.mirage(), Width.FULL);
        double across = distance(picture, "200", "400", true) / 200;
        double up = distance(picture, "0.5", "1.0", false) / 0.5;
        assertThat(up / across).isCloseTo(150, org.assertj.core.data.Percentage.withPercentage(0.1));
    }

    private static double distance(Picture picture, String a, String b, boolean across) {
        return Math.abs(middle(picture, a, across) - middle(picture, b, across));
    }

    private static double middle(Picture picture, String text, boolean across) {
        return picture.labels().stream()
                .filter(l -> l.text().equals(text))
                .mapToDouble(l -> across ? (l.left() + l.right()) / 2 : (l.top() + l.bottom()) / 2)
                .findFirst()
                .orElseThrow();
    }

    /** Kinds of paths differ by line style, not by colour alone; the legend counts them. */
    @Test
    void kindsOfPathsAreToldApartAndCounted() {
        assertThat(words(Scenes.paths())).contains("2 minima", "1 saddle", "1 degenerate path", "from", "to");
        assertThat(Stream.of(Role.MINIMUM, Role.SADDLE, Role.DEGENERATE)
                        .map(r -> Legend.pen(r).dashes()))
                .doesNotHaveDuplicates();
        assertThat(Stream.of(Role.MINIMUM, Role.SADDLE, Role.DEGENERATE)
                        .map(r -> Legend.pen(r).ink()))
                .doesNotHaveDuplicates();
        // 2 m of optical length end 1.82 m from the start, on circles
        assertThat(words(Scenes.paths()).stream().filter(t -> t.matches("\\d\\.\\d m")))
                .hasSizeBetween(4, 10)
                .contains("2.0 m");
    }

    @Test
    void arrivalsShowTheirKindsPassagesAndGaps() {
        Picture picture = Pictures.of(Scenes.arrival(2), Width.FULL);
        List<String> words = picture.labels().stream().map(Picture.Label::text).toList();
        assertThat(words).contains("1 minimum", "1 saddle", "1 degenerate path", "2nd passage of the target");
        assertThat(words).contains("miss / m (log beyond ±0.000001)", "launch angle toward +y / mrad");
        // the second branch has a gap about zero: two parts in the first panel, none in the second, one in the legend
        assertThat(picture.items().stream()
                        .filter(i -> i instanceof Item.Stroke s && s.pen().ink() == Ink.GREEN))
                .hasSize(3);
    }

    /** Erect and inverted differ by line style and by colour; the lowest clearance is told. */
    @Test
    void imagesOfASightAreToldApart() {
        assertThat(words(Scenes.sight())).contains("1 erect image", "1 inverted image", "lowest 0.25 m", "1", "2");
        assertThat(Legend.pen(Role.ERECT).dashes()).isEmpty();
        assertThat(Legend.pen(Role.INVERTED).dashes()).isNotEmpty();
        assertThat(Legend.pen(Role.ERECT).ink())
                .isNotEqualTo(Legend.pen(Role.INVERTED).ink());
    }

    /** What lies wholly outside its panel needs no entry in the legend. */
    @Test
    void theLegendNamesOnlyWhatIsSeen() {
        PanelFigure.Axis across = new PanelFigure.Axis("distance", PanelFigure.Measure.LENGTH, 0, 1);
        PanelFigure.Axis up = new PanelFigure.Axis("height", PanelFigure.Measure.LENGTH, 0, 1);
        double[] x = {0, 1};
        PanelFigure figure = new PanelFigure(
                "transfer",
                "Which?",
                "This one",
                up,
                List.of(new PanelFigure.Panel(
                        "",
                        across,
                        List.of(),
                        List.of(
                                new PanelFigure.Curve(PanelFigure.Style.ERECT, "within", x, new double[] {0.2, 0.7}),
                                new PanelFigure.Curve(PanelFigure.Style.SECOND, "across", x, new double[] {-9, 10}),
                                new PanelFigure.Curve(PanelFigure.Style.GUIDE, "beyond", x, new double[] {2, 3})),
                        List.of(),
                        List.of())),
                false);
        for (Width width : Width.values()) {
            assertThat(Pictures.of(figure, width).labels().stream().map(Picture.Label::text))
                    .contains("within", "across")
                    .doesNotContain("beyond");
        }
    }

    /** A thing keeps its form: the square is as wide as it is tall, and the taller one twice as tall. */
    @Test
    void aViewHasOneScaleForBothDirectionsAndBothPanels() {
        for (Width width : Width.values()) {
            List<Item.Area> dark = Pictures.of(Scenes.view(), width).items().stream()
                    .filter(i -> i instanceof Item.Area a && a.ink() == Ink.INK)
                    .map(i -> (Item.Area) i)
                    .toList();
            assertThat(dark).hasSize(2);
            double wide = span(dark.get(0).x());
            assertThat(span(dark.get(0).y())).isCloseTo(wide, org.assertj.core.data.Offset.offset(1e-6));
            assertThat(span(dark.get(1).y())).isCloseTo(2 * wide, org.assertj.core.data.Offset.offset(1e-6));
        }
    }

    private static double span(double[] values) {
        return Arrays.stream(values).max().orElseThrow()
                - Arrays.stream(values).min().orElseThrow();
    }

    private static List<String> words(SectionFigure figure) {
        return Pictures.of(figure, Width.FULL).labels().stream()
                .map(Picture.Label::text)
                .toList();
    }

    @Test
    void threeToFiveContoursAreLabelled() {
        assertThat(words(Scenes.rod()).stream().filter(t -> t.matches("1\\.\\d\\d")))
                .hasSizeBetween(3, 5);
        assertThat(words(Scenes.mirage()).stream().filter(t -> t.matches("1\\.\\d{6}")))
                .hasSizeBetween(3, 5);
    }

    @Test
    void lostRaysAreDashedInVermillionAndEndInACross() {
        List<Item.Stroke> warm = Pictures.of(Scenes.lost(), Width.FULL).items().stream()
                .filter(i -> i instanceof Item.Stroke s && s.pen().ink() == Ink.VERMILLION)
                .map(i -> (Item.Stroke) i)
                .toList();
        assertThat(warm.stream().filter(s -> !s.pen().dashes().isEmpty())).hasSize(3);
        // two crosses of two strokes; the third ray leaves the picture
        assertThat(warm.stream().filter(s -> s.pen().dashes().isEmpty())).hasSize(4);
    }

    @Test
    void nothingIsDrawnOutsideThePaper() {
        for (Figure figure : Scenes.figures()) {
            Picture picture = Pictures.of(figure, Width.HALF);
            for (Item item : picture.items()) {
                if (item instanceof Item.Stroke s) {
                    assertThat(Arrays.stream(s.x()).min().orElseThrow()).isGreaterThanOrEqualTo(0);
                    assertThat(Arrays.stream(s.x()).max().orElseThrow()).isLessThanOrEqualTo(picture.width());
                    assertThat(Arrays.stream(s.y()).min().orElseThrow()).isGreaterThanOrEqualTo(0);
                    assertThat(Arrays.stream(s.y()).max().orElseThrow()).isLessThanOrEqualTo(picture.height());
                }
            }
        }
    }

    @Test
    void everyRoleIsDrawnAndEveryKindOfFigureToo() {
        for (Role role : Role.values()) {
            SectionFigure figure = new SectionFigure(
                    "one",
                    "q",
                    "a",
                    "z",
                    "y",
                    Optional.empty(),
                    List.of(Scenes.line(Role.RAY, "", 0, 0, 1, 0.3), Scenes.line(role, "the thing", 0.2, 0, 0.2, 0.3)),
                    List.of());
            assertThat(words(figure)).as(role.name()).contains("the thing");
        }
        // the others are drawn by ChartsTest and the tests of a sight's figures
        assertThat(Figure.class.getPermittedSubclasses())
                .containsExactly(
                        SectionFigure.class,
                        CurveFigure.class,
                        PanelFigure.class,
                        ChartFigure.class,
                        MapFigure.class,
                        BarFigure.class,
                        WavefrontFigure.class,
                        SpotFigure.class);
    }

    @Test
    void emptyAndDegenerateFiguresAreDrawn() {
        SectionFigure empty = new SectionFigure("none", "q", "a", "z", "y", Optional.empty(), List.of(), List.of());
        assertThat(Pictures.of(empty, Width.HALF).png()).isNotEmpty();
        SectionFigure upright = new SectionFigure(
                "none",
                "q",
                "a",
                "z",
                "y",
                Optional.empty(),
                List.of(Scenes.line(Role.RAY, "up", 1, 0, 1, 5e3)),
                List.of());
        assertThat(words(upright)).contains("up");
        SectionFigure tower = new SectionFigure(
                "none",
                "q",
                "a",
                "z",
                "y",
                Optional.empty(),
                List.of(Scenes.line(Role.RAY, "up", 1, 0, 2, 5e3)),
                List.of());
        assertThat(words(tower)).anyMatch(t -> t.matches("widths \\S+ ×"));
    }

    /**
     * Run in a process of its own that finds no font of the system; Java's font system, which throws there, must not even
     * be loaded.
     */
    @Test
    void needsNoFontOfTheSystem(@TempDir Path folder) throws Exception {
        Path config = Files.writeString(folder.resolve("fonts.conf"), "<fontconfig></fontconfig>");
        Path classes = folder.resolve("classes.log");
        Path java = Path.of(System.getProperty("java.home"), "bin", "java");
        ProcessBuilder builder = new ProcessBuilder(
                java.toString(),
                "-Djava.awt.headless=true",
                "-Duser.home=" + folder,
                "-Xlog:class+load:file=" + classes,
                "-cp",
                System.getProperty("java.class.path"),
                DrawAll.class.getName(),
                folder.resolve("out").toString());
        builder.environment().put("FONTCONFIG_FILE", config.toString());
        File log = folder.resolve("log.txt").toFile();
        Process process = builder.redirectErrorStream(true).redirectOutput(log).start();
        assertThat(process.waitFor(120, TimeUnit.SECONDS)).isTrue();
        assertThat(process.exitValue()).as(Files.readString(log.toPath())).isZero();
        assertThat(Files.readString(classes, StandardCharsets.ISO_8859_1))
                .contains("org.stillpath.plot.Typeface")
                .doesNotContain("sun.font.FontManagerFactory")
                .doesNotContain("sun.font.SunFontManager");
        assertThat(Files.readAllBytes(folder.resolve("out/0-rays-160.png")))
                .isEqualTo(Pictures.of(Scenes.rod(), Width.FULL).png());
    }
}
