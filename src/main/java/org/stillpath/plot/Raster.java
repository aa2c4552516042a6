package org.stillpath.plot;

import java.awt.BasicStroke;
import java.awt.Color;
import java.awt.Graphics2D;
import java.awt.RenderingHints;
import java.awt.Shape;
import java.awt.geom.AffineTransform;
import java.awt.geom.Ellipse2D;
import java.awt.geom.Path2D;
import java.awt.image.BufferedImage;
import java.awt.image.DataBufferInt;

/** Paints a picture at 200 dots an inch. Letters are painted as outlines, so that no font of the system is asked for. */
final class Raster {
    private static final double DOTS_PER_INCH = 200;
    private static final double HALO = 2.2;
    private static final Color HALO_COLOUR = new Color(255, 255, 255, 180);

    private final Picture picture;

    Raster(Picture picture) {
        this.picture = picture;
    }

    byte[] png() {
        double scale = DOTS_PER_INCH / 72;
        int columns = (int) Math.round(picture.width() * scale);
        int rows = (int) Math.round(picture.height() * scale);
        BufferedImage image = new BufferedImage(columns, rows, BufferedImage.TYPE_INT_RGB);
        Graphics2D g = image.createGraphics();
        try {
            g.setColor(Color.WHITE);
            g.fillRect(0, 0, columns, rows);
            g.setRenderingHint(RenderingHints.KEY_ANTIALIASING, RenderingHints.VALUE_ANTIALIAS_ON);
            g.setRenderingHint(RenderingHints.KEY_STROKE_CONTROL, RenderingHints.VALUE_STROKE_PURE);
            g.setRenderingHint(RenderingHints.KEY_INTERPOLATION, RenderingHints.VALUE_INTERPOLATION_BILINEAR);
            g.scale(scale, scale);
            for (Item item : picture.items()) {
                paint(g, item);
            }
        } finally {
            g.dispose();
        }
        int[] pixels = ((DataBufferInt) image.getRaster().getDataBuffer()).getData();
        return Png.encode(columns, rows, pixels, false, (int) Math.round(DOTS_PER_INCH / 0.0254));
    }

    private static void paint(Graphics2D g, Item item) {
        if (item instanceof Item.Stroke s) {
            g.setColor(colour(s.pen().ink()));
            g.setStroke(stroke(s.pen()));
            g.draw(path(s.x(), s.y(), false));
        } else if (item instanceof Item.Area a) {
            g.setColor(colour(a.ink()));
            g.fill(path(a.x(), a.y(), true));
        } else if (item instanceof Item.Dot d) {
            g.setColor(colour(d.ink()));
            g.fill(new Ellipse2D.Double(d.x() - d.radius(), d.y() - d.radius(), 2 * d.radius(), 2 * d.radius()));
        } else if (item instanceof Item.Colours c) {
            BufferedImage raster = new BufferedImage(c.columns(), c.rows(), BufferedImage.TYPE_INT_ARGB);
            raster.setRGB(0, 0, c.columns(), c.rows(), c.argb(), 0, c.columns());
            g.drawImage(
                    raster,
                    new AffineTransform(c.width() / c.columns(), 0, 0, c.height() / c.rows(), c.x(), c.y()),
                    null);
        } else if (item instanceof Item.Words w) {
            Shape outline = w.face().outline(w.text(), w.x(), w.y(), w.size());
            if (w.halo()) {
                g.setColor(HALO_COLOUR);
                g.setStroke(new BasicStroke((float) HALO, BasicStroke.CAP_ROUND, BasicStroke.JOIN_ROUND));
                g.draw(outline);
            }
            g.setColor(colour(w.ink()));
            g.fill(outline);
        }
    }

    private static Color colour(Ink ink) {
        return new Color(ink.rgb());
    }

    private static BasicStroke stroke(Pen pen) {
        if (pen.dashes().isEmpty()) {
            return new BasicStroke((float) pen.width(), BasicStroke.CAP_BUTT, BasicStroke.JOIN_ROUND);
        }
        float[] dashes = new float[pen.dashes().size()];
        for (int i = 0; i < dashes.length; i++) {
            dashes[i] = pen.dashes().get(i).floatValue();
        }
        return new BasicStroke((float) pen.width(), BasicStroke.CAP_BUTT, BasicStroke.JOIN_ROUND, 10, dashes, 0);
    }

    private static Path2D path(double[] x, double[] y, boolean closed) {
        Path2D.Double path = new Path2D.Double(Path2D.WIND_NON_ZERO, x.length + 1);
        path.moveTo(x[0], y[0]);
        for (int i = 1; i < x.length; i++) {
            path.lineTo(x[i], y[i]);
        }
        if (closed) {
            path.closePath();
        }
        return path;
    }
}
