package org.stillpath.io;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.fail;
import static org.assertj.core.api.Assertions.within;

import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.InputStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collections;
import java.util.List;
import java.util.Optional;
import java.util.Random;
import org.apache.commons.rng.UniformRandomProvider;
import org.apache.commons.rng.simple.RandomSource;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;
import org.stillpath.job.Lattice;
import org.stillpath.problem.Place;
import org.stillpath.problem.ProblemException;

class LatticeTest {
    private static final Place ASKED = new Place("job.yaml", 4, 20);
    private static final double[] X = {-2, -0.5, 1, 2.5};
    private static final double[] Y = {0, 1, 3};
    private static final double[] Z = {0, 2};

    @TempDir
    Path folder;

    private Lattice read(byte[] bytes, Lattice.Wanted wanted) {
        try {
            Files.write(folder.resolve("f"), bytes);
        } catch (IOException e) {
            throw new IllegalStateException(e);
        }
        return FileSources.of(folder.resolve("job.yaml"), false).lattice("f", wanted, ASKED);
    }

    private Lattice read(String text) {
        return read(text.getBytes(StandardCharsets.UTF_8), Lattice.Wanted.any());
    }

    private static Lattice.Wanted array(String name) {
        return new Lattice.Wanted(List.of(), Optional.of(name));
    }

    private static byte[] resource(String name) {
        try (InputStream in = LatticeTest.class.getResourceAsStream("vtk/" + name)) {
            return in == null ? fail("no resource " + name) : in.readAllBytes();
        } catch (IOException e) {
            throw new IllegalStateException(e);
        }
    }

    private static String text(String resource) {
        return new String(resource(resource), StandardCharsets.ISO_8859_1);
    }

    private void refused(byte[] bytes, Lattice.Wanted wanted, String... words) {
        assertThatThrownBy(() -> read(bytes, wanted))
                .isInstanceOf(ProblemException.class)
                .message()
                .contains(words);
    }

    private void refused(String text, Lattice.Wanted wanted, String... words) {
        refused(text.getBytes(StandardCharsets.ISO_8859_1), wanted, words);
    }

    private static double f(double x, double y, double z) {
        return 1.5 + 0.01 * x - 0.02 * y + 0.003 * z + 0.001 * x * y * z;
    }

    private static void holds(Lattice l, double[] x, double[] y, double[] z, double error) {
        assertThat(l.x().numbers()).containsExactly(x);
        assertThat(l.y().numbers()).containsExactly(y);
        assertThat(l.z().numbers()).containsExactly(z);
        double[] v = l.value().numbers();
        assertThat(v).hasSize(x.length * y.length * z.length);
        for (int n = 0; n < v.length; n++) {
            assertThat(v[n])
                    .isCloseTo(
                            f(x[n % x.length], y[n / x.length % y.length], z[n / x.length / y.length]), within(error));
        }
    }

    // --- CSV ---

    private static List<String> rows() {
        List<String> rows = new ArrayList<>();
        for (double x : X) {
            for (double y : Y) {
                for (double z : Z) {
                    rows.add(x + "," + y + "," + z + "," + f(x, y, z));
                }
            }
        }
        return rows;
    }

    private static String csv(List<String> rows) {
        return "x [mm],y [mm],z [mm],value\n" + String.join("\n", rows) + "\n";
    }

    @Test
    void rowsMayStandInAnyOrder() {
        List<String> rows = rows();
        for (int seed = 0; seed < 5; seed++) {
            Lattice l = read(csv(rows));
            holds(l, X, Y, Z, 0);
            assertThat(l.x().unit()).isEqualTo("mm");
            assertThat(l.value().unit()).isEmpty();
            assertThat(l.value().place())
                    .isEqualTo(new Place(folder.resolve("f").toString(), 1, 22));
            assertThat(l.namesUnits()).isTrue();
            Collections.shuffle(rows, new Random(seed));
        }
    }

    @Test
    void columnsMayStandInAnyOrderAndBeChosen() {
        List<String> lines = new ArrayList<>(List.of("T [degC];Z [m];name;n;Y [m];X [m]"));
        for (String row : rows()) {
            String[] c = row.split(",");
            lines.add(("20.5;" + c[2] + ";probe;" + c[3] + ";" + c[1] + ";" + c[0]).replace('.', ','));
        }
        byte[] bytes = String.join("\r\n", lines).getBytes(StandardCharsets.UTF_8);
        Lattice l = read(bytes, new Lattice.Wanted(List.of("X", "Y", "Z", "n"), Optional.empty()));
        holds(l, X, Y, Z, 0);
        assertThat(l.notes()).anyMatch(n -> n.startsWith("decimal commas were read"));
        refused(bytes, Lattice.Wanted.any(), "f:1:1: there are 3 columns beside x, y and z; `columns: [x, y, z, T]`");
        refused(
                bytes,
                new Lattice.Wanted(List.of("X", "Y", "Z", "N2"), Optional.empty()),
                "job.yaml:4:20: ",
                "has no column \"N2\"; did you mean \"n\"?");
        refused(bytes, new Lattice.Wanted(List.of("X", "Y", "Z", "Z"), Optional.empty()), "names \"Z\" twice");
        refused(
                bytes,
                new Lattice.Wanted(List.of("X", "Y", "Z", "name"), Optional.empty()),
                "f:2:10: column \"name\", row 1: \"probe\" is not a number");
        refused(bytes, array("n"), "`array` belongs to VTK files");
    }

    @Test
    void aMissingNodeIsNamed() {
        List<String> rows = rows();
        String gone = rows.remove(7);
        assertThat(gone).startsWith("-0.5,0.0,2.0,");
        // the node before it, x running fastest, is x = -2, y = 0, z = 2, the second row
        refused(
                csv(rows),
                Lattice.Wanted.any(),
                "f:3:1: there is no value at x = -0.5 mm, y = 0 mm, z = 2 mm, the node next to this row; a grid needs one"
                        + " for each of the 4 x 3 x 2 combinations of x, y and z; only this one is missing");
    }

    @Test
    void aNodeGivenTwiceIsNamed() {
        List<String> rows = rows();
        rows.add(5, rows.get(2));
        refused(
                csv(rows),
                Lattice.Wanted.any(),
                "f:7:1: the node at x = -2 mm, y = 1 mm, z = 0 mm stands here again, first in line 4; each is needed once");
    }

    @Test
    void scatteredPointsAreNoGrid() {
        UniformRandomProvider rng = RandomSource.XO_RO_SHI_RO_128_PP.create(7L);
        List<String> rows = new ArrayList<>();
        for (int i = 0; i < 300; i++) {
            rows.add(rng.nextDouble() + "," + rng.nextDouble() + "," + rng.nextDouble() + ",1.5");
        }
        refused(
                csv(rows),
                Lattice.Wanted.any(),
                "f:1:1: these points are no rectilinear grid: 300 rows with 300 different x");
    }

    @Test
    void planesThatDifferByRoundingAreNotJoined() {
        List<String> rows = rows();
        rows.set(10, rows.get(10).replace("-0.5,", "-0.49999999999999994,"));
        refused(
                csv(rows),
                Lattice.Wanted.any(),
                "f:12:1: x = -0.5 mm and -0.49999999999999994 mm differ by rounding only, first in line 8 and here");
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            value = {
                "x [mm],y [mm],value\\n1,2,3\\n| f:1:1: there is no column \"z\" among x, y, value; a grid needs a header",
                "x,y,z\\n1,2,3\\n| f:1:1: there is no column of values beside x, y and z",
                "x,y,z,n\\n0,0,0,1\\n1,0,0,1\\n0,1,0,1\\n1,1,0,1\\n"
                        + "| f:1:5: there is one plane only along z, at 0; a grid needs two or more on each axis",
                "x,y,z,n\\n0,0,0,1\\n1,0,0,?\\n| f:3:7: column \"n\", row 2: \"?\" is not a number",
                "x,y,z,n\\n0,0,0,1\\n1,0,0,NaN\\n| f:3:7: column \"n\", row 2: \"NaN\" is not a number",
                "x,y,z,n\\n0,0,0\\n| f:2:1: row 1 has 3 cells, the header 4",
                "x,y,z,n\\n| f:2:1: the table has no rows",
                "1,2,3,4\\n1,2,3,5\\n| f:1:1: a header line must stand before the numbers",
            })
    void tablesThatAreNoGrid(String text, String message) {
        refused(text.replace("\\n", "\n"), Lattice.Wanted.any(), message);
    }

    // --- VTK, files written by VTK 9.7.1 itself, see the README beside them ---

    @ParameterizedTest
    @ValueSource(
            strings = {
                "rectilinear-ascii.vtk",
                "rectilinear-binary.vtk",
                "ascii.vtr",
                "binary.vtr",
                "binary-zlib64.vtr",
                "binary-big64.vtr",
                "appended-raw.vtr",
                "appended-raw-zlib.vtr",
                "appended-base64.vtr",
                "appended-base64-zlib.vtr",
                "points-ascii.vtk",
                "points-binary.vtk",
                "ascii.vti",
                "binary-zlib.vti",
                "appended-raw.vti",
            })
    void readsWhatVtkWrites(String name) {
        byte[] bytes = resource(name);
        boolean image = name.startsWith("points") || name.endsWith(".vti");
        double[] x = image ? new double[] {-1, 0.5, 2, 3.5} : X;
        double[] y = image ? new double[] {0, 1, 2} : Y;
        Lattice l = read(bytes, array("n index"));
        // legacy text has six digits
        holds(l, x, y, Z, name.endsWith("ascii.vtk") ? 1e-6 : 1e-15);
        assertThat(l.namesUnits()).isFalse();
        assertThat(l.notes()).isEmpty();
        Lattice t = read(bytes, array("T"));
        assertThat(t.value().numbers()[2]).isEqualTo(300 + x[2]);
        assertThat(t.notes()).singleElement().asString().contains("single precision");
        refused(bytes, Lattice.Wanted.any(), "job.yaml:4:20: ", "has 2 arrays on its nodes (", "`array: NAME`");
        refused(bytes, array("n_index"), "has no array \"n_index\" on its nodes; did you mean \"n index\"?");
        refused(bytes, array("flow"), "the array \"flow\" has 3 numbers a node");
        refused(
                bytes,
                new Lattice.Wanted(List.of("x", "y", "z", "n"), Optional.empty()),
                "`columns` belongs to CSV files");
    }

    @Test
    void theOnlyArrayNeedsNoName() {
        Lattice l = read(resource("single.vti"), Lattice.Wanted.any());
        holds(l, new double[] {-1, 0.5, 2, 3.5}, new double[] {0, 1, 2}, Z, 1.2e-7);
        assertThat(l.notes()).hasSize(1);
    }

    @Test
    void cutOffFilesAreRefused() {
        for (String name :
                new String[] {"rectilinear-binary.vtk", "appended-raw.vtr", "binary.vtr", "binary-zlib64.vtr"}) {
            byte[] bytes = resource(name);
            for (int length : new int[] {bytes.length / 2, 3 * bytes.length / 4, bytes.length - 60, 120, 30}) {
                refused(Arrays.copyOf(bytes, length), array("n index"), "f:");
            }
        }
    }

    private static final String LEGACY = """
            # vtk DataFile Version 3.0
            a block
            ASCII
            DATASET STRUCTURED_POINTS
            DIMENSIONS 2 2 2
            ORIGIN 0 0 0
            SPACING 1 1 1
            POINT_DATA 8
            SCALARS n float 1
            LOOKUP_TABLE default
            1 2 3 4 5 6 7 8
            """;

    @Test
    void legacyByHand() {
        assertThat(read(LEGACY).value().numbers()).containsExactly(1, 2, 3, 4, 5, 6, 7, 8);
        assertThat(read(LEGACY.replace("SPACING", "ASPECT_RATIO").replace("\n", "\r\n"))
                        .y()
                        .numbers())
                .containsExactly(0, 1);
        // everything else that may stand beside it
        String more = LEGACY.replace("SCALARS n", """
                COLOR_SCALARS c 2
                0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0
                METADATA
                COMPONENT_NAMES
                SCALARS

                LOOKUP_TABLE hot 2
                0 0 0 1 1 1 1 1
                VECTORS v int
                1 2 3 1 2 3 1 2 3 1 2 3 1 2 3 1 2 3 1 2 3 1 2 3
                TEXTURE_COORDINATES t 2 float
                0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0
                SCALARS n""");
        assertThat(read(more).value().numbers()).containsExactly(1, 2, 3, 4, 5, 6, 7, 8);
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            value = {
                "ASCII | TEXT | f:3:1: the third line must say ASCII or BINARY, not \"TEXT\"",
                "DATASET STRUCTURED_POINTS | DATASET UNSTRUCTURED_GRID"
                        + " | f:4:1: a data set \"UNSTRUCTURED_GRID\" is no rectilinear grid",
                "DATASET STRUCTURED_POINTS | POINTS | f:4:1: \"DATASET RECTILINEAR_GRID\" or",
                "DIMENSIONS 2 2 2 | DIMENSIONS 2 2 1 | f:5:1: the grid has 1 plane along z; two or more are needed",
                "DIMENSIONS 2 2 2 | DIMENSIONS 2 2 | f:5:1: DIMENSIONS lacks a word where a whole number is needed",
                "DIMENSIONS 2 2 2 | DIMENSIONS 2 2 x | f:5:1: DIMENSIONS has \"x\" where a whole number is needed",
                "DIMENSIONS 2 2 2 | DIMENSIONS 100000 100000 100000"
                        + " | f:5:1: the limit of nodes in a grid, 4000000, is exceeded",
                "POINT_DATA 8 | POINT_DATA 9 | f:8:1: point data for 9 nodes, DIMENSIONS makes 8",
                "POINT_DATA 8 | CELL_DATA 8 | there is no array with one number a node (POINT_DATA, <PointData>);"
                        + " values of cells must be put on the nodes before",
                "SPACING 1 1 1 | SPACING 1 -1 1 | f:5:1: planes must ascend: along y number 2, -1.0, comes after 0.0",
                "SPACING 1 1 1 | SPACING 1 1 | f:7:1: SPACING needs three numbers",
                "SCALARS n float 1 | SCALARS n long 1 | f:9:1: \"long\" is not a type of number that is read here",
                "SCALARS n float 1 | SCALARS n float 4 | f:9:1: the file is too short: 32 numbers are announced here",
                "LOOKUP_TABLE default | 0 | f:10:1: after SCALARS the line \"LOOKUP_TABLE default\" is needed",
                "5 6 7 8 | 5 6 7 | f:9:1: the file is too short: 8 numbers are announced here",
                "5 6 7 8 | 5 6 7 8 9 | f:11:17: \"9\" is not understood here",
                "5 6 7 8 | 5 6 x 8 | f:11:13: \"x\" is not a number",
                "5 6 7 8 | 5 6 nan 8 | f:11:13: \"nan\" is not a number",
            })
    void legacyFilesAtFault(String old, String now, String message) {
        refused(LEGACY.replace(old, now), Lattice.Wanted.any(), message);
    }

    @Test
    void anOversizedHeaderTakesNoMemory() {
        // within the limit of nodes, yet far beyond the file
        refused(
                LEGACY.replace("2 2 2", "100 200 200")
                        .replace("POINT_DATA 8", "POINT_DATA 4000000")
                        .replace("ASCII", "BINARY"),
                Lattice.Wanted.any(),
                "f:9:1: the file is too short: 4000000 numbers are announced here, 16 bytes follow");
        String field =
                LEGACY.replace("SCALARS n float 1\nLOOKUP_TABLE default", "FIELD f 1\nn 999999999 999999999 double");
        refused(field, Lattice.Wanted.any(), "f:10:1: the file is too short");
        refused(
                text("binary.vtr").replace("0 3 0 2 0 1", "0 199 0 199 0 99"),
                array("n index"),
                "the array has 192 bytes, its 4000000 numbers need 32000000");
        refused(
                text("ascii.vtr").replace("0 3 0 2 0 1", "0 199 0 199 0 99"),
                array("n index"),
                "4000000 numbers are needed here, there are");
        refused(
                text("ascii.vtr").replace("0 3 0 2 0 1", "0 999999 0 999999 0 1"),
                array("n index"),
                "the limit of nodes in a grid, 4000000, is exceeded");
        String zlib = text("binary-zlib64.vtr").replace("0 3 0 2 0 1", "0 199 0 199 0 99");
        refused(zlib, array("n index"), "the array says 3 blocks of 64 bytes, its numbers need 32000000 bytes");
    }

    // --- XML by hand ---

    private static final String IMAGE = """
            <?xml version="1.0"?>
            <VTKFile type="ImageData" version="0.1" byte_order="LittleEndian">
            <ImageData WholeExtent="0 1 0 1 0 1" Origin="0 0 0" Spacing="1 1 1">
            <Piece Extent="0 1 0 1 0 1">
            <PointData>
            <DataArray type="Float64" Name="n" format="ascii">1 2 3 4 5 6 7 8</DataArray>
            </PointData>
            </Piece>
            </ImageData>
            </VTKFile>
            """;

    @Test
    void xmlByHand() {
        assertThat(read(IMAGE).value().numbers()).containsExactly(1, 2, 3, 4, 5, 6, 7, 8);
        assertThat(read(IMAGE.replace("1 2 3 4", "<![CDATA[1 2]]>\n<!-- half -->3 4"))
                        .value()
                        .numbers())
                .containsExactly(1, 2, 3, 4, 5, 6, 7, 8);
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            value = {
                "<Piece Extent | <Piece Wrong | f:4: Extent needs six whole numbers",
                "Extent=\"0 1 0 1 0 1\">\\n<P | Extent=\"0 1 0 1 0 0\">\\n<P | the grid has 1 plane along z",
                "</Piece> | </Piece><Piece Extent=\"0 1 0 1 0 1\"/> | f:3: the grid is in 2 pieces; save it in one",
                "Spacing=\"1 1 1\" | Spacing=\"1 1 1\" Direction=\"0 1 0 1 0 0 0 0 1\" | f:3: Direction turns the grid",
                "Spacing=\"1 1 1\" | Spacing=\"1 1\" | f:3: Spacing needs three numbers, not \"1 1\"",
                "type=\"ImageData\" | type=\"UnstructuredGrid\""
                        + " | f:2: a VTK file of type \"UnstructuredGrid\" is no rectilinear grid",
                "<VTKFile | <VTKFile compressor=\"vtkLZ4DataCompressor\""
                        + " | f:2: data compressed by \"vtkLZ4DataCompressor\" are not read; save them by zlib",
                "<VTKFile | <VTKFile header_type=\"Int8\" | f:2: header_type must be UInt32 or UInt64",
                "byte_order=\"LittleEndian\" | byte_order=\"Middle\" | f:2: byte_order must be LittleEndian or BigEndian",
                "Float64 | Float80 | f:6: \"Float80\" is not a type of number of VTK files",
                "format=\"ascii\" | format=\"hex\" | f:6: format must be ascii, binary or appended",
                "format=\"ascii\" | format=\"appended\" offset=\"0\" | f:6: offset \"0\" does not lie in the appended data",
                "format=\"ascii\" | format=\"binary\" | f:6: the array has",
                "1 2 3 4 5 6 7 8 | 1.50 2 3 4 5 6 7 | f:6: 8 numbers are needed here, there are 7",
                "7 8 | 7 8 9 | f:6: 8 numbers are needed here, there are more",
                "7 8 | 7 nan | f:6: \"nan\", number 8 of this array, is not a number",
                "</Piece> | </Peice> | f:8: this is not sound XML: ",
                "VTKFile | Other | f:2: this XML file starts with <Other>; <VTKFile> is expected",
                "PointData | CellData | f:4: there is no array with one number a node (POINT_DATA, <PointData>); values of",
            })
    void xmlFilesAtFault(String old, String now, String message) {
        String text = IMAGE.replace(old.replace("\\n", "\n"), now.replace("\\n", "\n"));
        assertThat(text).isNotEqualTo(IMAGE);
        // the column is that of the tag's end, which moves with the change
        assertThatThrownBy(() -> read(text))
                .isInstanceOf(ProblemException.class)
                .satisfies(e -> assertThat(String.valueOf(e.getMessage()).replaceAll("f:(\\d+):\\d+:", "f:$1:"))
                        .contains(message));
    }

    @Test
    void documentTypesAndEntitiesAreRefused() throws IOException {
        Path secret = Files.writeString(folder.resolve("secret.txt"), "1 2 3 4 5 6 7 8");
        String outside = IMAGE.replace(
                        "<VTKFile", "<!DOCTYPE VTKFile [<!ENTITY e SYSTEM \"" + secret.toUri() + "\">]>\n<VTKFile")
                .replace("1 2 3 4 5 6 7 8", "&e;");
        refused(outside, Lattice.Wanted.any(), "a DOCTYPE stands here");
        String dtd = IMAGE.replace(
                "<VTKFile",
                "<!DOCTYPE VTKFile SYSTEM \"" + folder.resolve("none.dtd").toUri() + "\">\n<VTKFile");
        refused(dtd, Lattice.Wanted.any(), "a DOCTYPE stands here");
        StringBuilder bomb = new StringBuilder("<!DOCTYPE VTKFile [<!ENTITY a0 \"1 \">");
        for (int i = 1; i < 40; i++) {
            bomb.append("<!ENTITY a")
                    .append(i)
                    .append(" \"&a")
                    .append(i - 1)
                    .append(";&a")
                    .append(i - 1)
                    .append(";\">");
        }
        String billions = IMAGE.replace("<VTKFile", bomb.append("]>\n<VTKFile")).replace("1 2 3 4", "&a39;");
        refused(billions, Lattice.Wanted.any(), "a DOCTYPE stands here");
        refused(IMAGE.replace("1 2 3 4", "&e;"), Lattice.Wanted.any(), "entity");
    }

    @Test
    void damagedFilesEndInAFaultAndNothingElse() {
        UniformRandomProvider rng = RandomSource.XO_RO_SHI_RO_128_PP.create(11L);
        List<byte[]> seeds = new ArrayList<>();
        for (String name : new String[] {
            "rectilinear-ascii.vtk",
            "points-binary.vtk",
            "binary-zlib64.vtr",
            "appended-raw.vtr",
            "appended-base64-zlib.vtr"
        }) {
            seeds.add(resource(name));
        }
        seeds.add(csv(rows()).getBytes(StandardCharsets.UTF_8));
        int refused = 0;
        for (int i = 0; i < 1500; i++) {
            byte[] bytes = seeds.get(i % seeds.size()).clone();
            for (int k = 0; k <= rng.nextInt(4); k++) {
                int at = rng.nextInt(bytes.length);
                bytes[at] = (byte) (rng.nextBoolean() ? rng.nextInt(256) : "0123456789 <>\"".charAt(rng.nextInt(14)));
            }
            try {
                read(bytes, rng.nextBoolean() ? Lattice.Wanted.any() : array("n index"));
            } catch (ProblemException e) {
                refused++;
            }
        }
        assertThat(refused).isGreaterThan(700);
    }

    @Test
    void base64GoesOnBehindPadding() throws IOException {
        // RFC 4648, section 10: "Zg==" is f, "Zm8=" is fo, "Zm9vYmFy" is foobar
        byte[] text = "Zg==Zm8=\n Zm9v YmFy<".getBytes(StandardCharsets.US_ASCII);
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        new Base64Groups(text, 0).transferTo(out);
        assertThat(out.toString(StandardCharsets.US_ASCII)).isEqualTo("ffofoobar");
        assertThatThrownBy(() -> new Base64Groups("Zg=a".getBytes(StandardCharsets.US_ASCII), 0).readAllBytes())
                .hasMessageContaining("damaged");
    }
}
