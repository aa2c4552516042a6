package org.stillpath.plot;

import java.math.BigDecimal;
import java.math.RoundingMode;
import java.util.Base64;
import java.util.List;
import java.util.stream.Collectors;

/**
 * Writes a picture as SVG 1.1. Words are text elements whose length is stated, so that a viewer without the typeface sets
 * another one into the same room. Neither ids nor times are written: the same data give the same bytes, and several
 * pictures may stand in one page.
 */
final class SvgWriter {
    private final Picture picture;
    private final StringBuilder out = new StringBuilder(1 << 16);

    SvgWriter(Picture picture) {
        this.picture = picture;
    }

    String document() {
        out.append("<svg xmlns=\"http://www.w3.org/2000/svg\" xmlns:xlink=\"http://www.w3.org/1999/xlink\" width=\"")
                .append(number(picture.widthMillimetres()))
                .append("mm\" height=\"")
                .append(number(picture.heightMillimetres()))
                .append("mm\" viewBox=\"0 0 ")
                .append(number(picture.width()))
                .append(' ')
                .append(number(picture.height()))
                .append("\" role=\"img\" font-family=\"")
                .append(Typeface.FAMILY)
                .append("\" stroke-linejoin=\"round\">\n<title>")
                .append(escaped(picture.title()))
                .append("</title>\n<desc>")
                .append(escaped(picture.description()))
                .append("</desc>\n<rect class=\"f-paper\" width=\"100%\" height=\"100%\" fill=\"")
                .append(Ink.PAPER.hex())
                .append("\"/>\n");
        picture.items().forEach(this::write);
        return out.append("</svg>\n").toString();
    }

    private void write(Item item) {
        if (item instanceof Item.Stroke s) {
            out.append("<polyline");
            ink("stroke", s.pen().ink());
            attribute("fill", "none");
            attribute("stroke-width", number(s.pen().width()));
            List<Double> dashes = s.pen().dashes();
            if (!dashes.isEmpty()) {
                attribute(
                        "stroke-dasharray",
                        dashes.stream().map(SvgWriter::number).collect(Collectors.joining(" ")));
            }
            points(s.x(), s.y());
        } else if (item instanceof Item.Area a) {
            out.append("<polygon");
            ink("fill", a.ink());
            points(a.x(), a.y());
        } else if (item instanceof Item.Dot d) {
            out.append("<circle");
            ink("fill", d.ink());
            attribute("cx", number(d.x()));
            attribute("cy", number(d.y()));
            attribute("r", number(d.radius()));
        } else if (item instanceof Item.Colours c) {
            out.append("<image class=\"shading\"");
            attribute("x", number(c.x()));
            attribute("y", number(c.y()));
            attribute("width", number(c.width()));
            attribute("height", number(c.height()));
            attribute("preserveAspectRatio", "none");
            byte[] png = Png.encode(c.columns(), c.rows(), c.argb(), true, 0);
            attribute(
                    "xlink:href", "data:image/png;base64," + Base64.getEncoder().encodeToString(png));
        } else if (item instanceof Item.Words w) {
            words(w);
            return;
        }
        out.append("/>\n");
    }

    private void words(Item.Words w) {
        out.append("<text");
        ink("fill", w.ink());
        if (w.halo()) {
            attribute("stroke", Ink.PAPER.hex());
            attribute("stroke-width", "2.2");
            attribute("stroke-opacity", "0.7");
            attribute("paint-order", "stroke");
        }
        attribute("x", number(w.x()));
        attribute("y", number(w.y()));
        attribute("font-size", number(w.size()));
        if (w.face().weight() != 400) {
            attribute("font-weight", Integer.toString(w.face().weight()));
        }
        attribute("textLength", number(w.face().width(w.text(), w.size())));
        attribute("lengthAdjust", "spacingAndGlyphs");
        out.append('>').append(escaped(w.text())).append("</text>\n");
    }

    private void ink(String what, Ink ink) {
        if (ink.isNeutral()) {
            attribute("class", what.charAt(0) + "-" + ink.word());
        }
        attribute(what, ink.hex());
    }

    private void attribute(String name, String value) {
        out.append(' ').append(name).append("=\"").append(value).append('"');
    }

    private void points(double[] x, double[] y) {
        out.append(" points=\"");
        for (int i = 0; i < x.length; i++) {
            if (i > 0) {
                out.append(' ');
            }
            out.append(number(x[i])).append(',').append(number(y[i]));
        }
        out.append('"');
    }

    /** Two decimals of a point are 3.5 µm on paper. */
    private static String number(double value) {
        BigDecimal rounded = BigDecimal.valueOf(value).setScale(2, RoundingMode.HALF_EVEN);
        return rounded.signum() == 0 ? "0" : rounded.stripTrailingZeros().toPlainString();
    }

    static String escaped(String text) {
        return text.replace("&", "&amp;")
                .replace("<", "&lt;")
                .replace(">", "&gt;")
                .replace("\"", "&quot;");
    }
}
