package org.stillpath.plot;

import java.awt.BasicStroke;
import java.awt.Color;
import java.awt.Composite;
import java.awt.Font;
import java.awt.FontMetrics;
import java.awt.Graphics;
import java.awt.Graphics2D;
import java.awt.GraphicsConfiguration;
import java.awt.Image;
import java.awt.Paint;
import java.awt.Rectangle;
import java.awt.RenderingHints;
import java.awt.Shape;
import java.awt.Stroke;
import java.awt.font.FontRenderContext;
import java.awt.font.GlyphVector;
import java.awt.font.LineMetrics;
import java.awt.geom.AffineTransform;
import java.awt.geom.Path2D;
import java.awt.geom.PathIterator;
import java.awt.geom.Rectangle2D;
import java.awt.image.BufferedImage;
import java.awt.image.BufferedImageOp;
import java.awt.image.ImageObserver;
import java.awt.image.RenderedImage;
import java.awt.image.renderable.RenderableImage;
import java.text.AttributedCharacterIterator;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import org.jspecify.annotations.Nullable;

/**
 * The paper that JFreeChart draws on: keeps what is stroked, filled and written as items of a picture, so that SVG and PNG
 * come from one drawing, and measures words with the program's own typeface. Java's font system would be asked otherwise,
 * and on a machine without fontconfig it fails at the first word even for a font from a file.
 *
 * <p>Only what a chart's axes and lines need is kept: strokes, filled shapes and level words. Images and slanted words are a
 * programmer's fault here.
 */
final class Sheet extends Graphics2D {
    private final Canvas canvas;
    private final List<Item> strokes = new ArrayList<>();
    private final RenderingHints hints = new RenderingHints(Map.of());
    private Color color = Color.BLACK;
    private BasicStroke stroke = new BasicStroke();
    private Font font = face();
    private Shape clip = new Rectangle2D.Double(-1e6, -1e6, 2e6, 2e6);
    private final AffineTransform transform = new AffineTransform();

    /** A sheet whose words go to a canvas at once and whose strokes are kept for {@link #strokes}. */
    Sheet(Canvas canvas) {
        this.canvas = canvas;
    }

    /** What was stroked and filled, in order. */
    List<Item> strokes() {
        return List.copyOf(strokes);
    }

    /** The house typeface at label size, as JFreeChart asks for it. */
    static Font face() {
        return new Face();
    }

    @Override
    public void draw(Shape shape) {
        Pen pen = pen();
        for (Polyline line : lines(shape)) {
            strokes.add(new Item.Stroke(line.x(), line.y(), pen));
        }
    }

    @Override
    public void fill(Shape shape) {
        for (Polyline line : lines(shape)) {
            strokes.add(new Item.Area(line.x(), line.y(), ink()));
        }
    }

    @Override
    public void drawString(String text, float x, float y) {
        canvas.words(Canvas.clean(text), x, y, ink());
    }

    @Override
    public void drawString(String text, int x, int y) {
        drawString(text, (float) x, (float) y);
    }

    private Pen pen() {
        float[] dashes = stroke.getDashArray();
        List<Double> lengths = new ArrayList<>();
        if (dashes != null) {
            for (float d : dashes) {
                lengths.add((double) d);
            }
        }
        return new Pen(ink(), stroke.getLineWidth(), lengths);
    }

    private Ink ink() {
        int rgb = color.getRGB() & 0xFFFFFF;
        for (Ink ink : Ink.values()) {
            if (ink.rgb() == rgb) {
                return ink;
            }
        }
        throw new IllegalArgumentException("color must be of the house theme: " + color);
    }

    private static List<Polyline> lines(Shape shape) {
        List<Polyline> lines = new ArrayList<>();
        List<double[]> points = new ArrayList<>();
        double[] at = new double[6];
        for (PathIterator it = shape.getPathIterator(null, 0.05); !it.isDone(); it.next()) {
            int kind = it.currentSegment(at);
            if (kind == PathIterator.SEG_MOVETO) {
                keep(points, lines);
                points.add(new double[] {at[0], at[1]});
            } else if (kind == PathIterator.SEG_LINETO) {
                points.add(new double[] {at[0], at[1]});
            } else if (!points.isEmpty()) {
                points.add(points.get(0).clone());
            }
        }
        keep(points, lines);
        return lines;
    }

    private static void keep(List<double[]> points, List<Polyline> lines) {
        if (points.size() > 1) {
            lines.add(new Polyline(
                    points.stream().mapToDouble(p -> p[0]).toArray(),
                    points.stream().mapToDouble(p -> p[1]).toArray()));
        }
        points.clear();
    }

    // ---- state

    @Override
    public void setPaint(Paint paint) {
        if (paint instanceof Color c) {
            color = c;
        }
    }

    @Override
    public Paint getPaint() {
        return color;
    }

    @Override
    public void setColor(Color c) {
        color = c;
    }

    @Override
    public Color getColor() {
        return color;
    }

    @Override
    public void setStroke(Stroke s) {
        if (s instanceof BasicStroke b) {
            stroke = b;
        }
    }

    @Override
    public Stroke getStroke() {
        return stroke;
    }

    @Override
    public void setFont(Font f) {
        font = f instanceof Face ? f : face();
    }

    @Override
    public Font getFont() {
        return font;
    }

    @Override
    public FontMetrics getFontMetrics(Font f) {
        return new Measures(f instanceof Face ? f : face());
    }

    @Override
    public FontRenderContext getFontRenderContext() {
        return new FontRenderContext(null, true, true);
    }

    @Override
    public Graphics create() {
        Sheet copy = new Sheet(canvas);
        copy.color = color;
        copy.stroke = stroke;
        copy.font = font;
        copy.clip = clip;
        return copy;
    }

    @Override
    public void dispose() {}

    @Override
    public Shape getClip() {
        return clip;
    }

    @Override
    public void setClip(@Nullable Shape shape) {
        clip = shape == null ? new Rectangle2D.Double(-1e6, -1e6, 2e6, 2e6) : shape;
    }

    /** Lines are clipped before they are drawn here; the clip is only remembered. */
    @Override
    public void clip(Shape shape) {
        clip = shape;
    }

    @Override
    public Rectangle getClipBounds() {
        return clip.getBounds();
    }

    @Override
    public void clipRect(int x, int y, int width, int height) {
        clip = new Rectangle(x, y, width, height);
    }

    @Override
    public void setClip(int x, int y, int width, int height) {
        clip = new Rectangle(x, y, width, height);
    }

    @Override
    public void setRenderingHint(RenderingHints.Key key, Object value) {
        hints.put(key, value);
    }

    @Override
    public @Nullable Object getRenderingHint(RenderingHints.Key key) {
        return hints.get(key);
    }

    @Override
    public void setRenderingHints(Map<?, ?> given) {
        hints.clear();
        addRenderingHints(given);
    }

    @Override
    public void addRenderingHints(Map<?, ?> given) {
        given.forEach(hints::put);
    }

    @Override
    public RenderingHints getRenderingHints() {
        return hints;
    }

    @Override
    public AffineTransform getTransform() {
        return new AffineTransform(transform);
    }

    @Override
    public void setTransform(AffineTransform t) {
        if (!t.isIdentity()) {
            throw level();
        }
    }

    private static IllegalArgumentException level() {
        return new IllegalArgumentException("nothing but level words and untransformed shapes is drawn on a sheet");
    }

    @Override
    public void transform(AffineTransform t) {
        setTransform(t);
    }

    @Override
    public void translate(int x, int y) {
        throw level();
    }

    @Override
    public void translate(double x, double y) {
        throw level();
    }

    @Override
    public void rotate(double angle) {
        throw level();
    }

    @Override
    public void rotate(double angle, double x, double y) {
        throw level();
    }

    @Override
    public void scale(double x, double y) {
        throw level();
    }

    @Override
    public void shear(double x, double y) {
        throw level();
    }

    @Override
    public void setComposite(Composite composite) {}

    @Override
    public Composite getComposite() {
        return java.awt.AlphaComposite.SrcOver;
    }

    @Override
    public void setBackground(Color background) {}

    @Override
    public Color getBackground() {
        return Color.WHITE;
    }

    @Override
    public void setPaintMode() {}

    @Override
    public void setXORMode(Color c) {
        throw level();
    }

    @Override
    public boolean hit(Rectangle rectangle, Shape shape, boolean onStroke) {
        return shape.intersects(rectangle);
    }

    @Override
    public GraphicsConfiguration getDeviceConfiguration() {
        throw new UnsupportedOperationException("a sheet has no device");
    }

    // ---- shapes by number

    @Override
    public void drawLine(int x1, int y1, int x2, int y2) {
        Path2D line = new Path2D.Double();
        line.moveTo(x1, y1);
        line.lineTo(x2, y2);
        draw(line);
    }

    @Override
    public void fillRect(int x, int y, int width, int height) {
        fill(new Rectangle(x, y, width, height));
    }

    @Override
    public void clearRect(int x, int y, int width, int height) {}

    @Override
    public void drawRoundRect(int x, int y, int width, int height, int arcWidth, int arcHeight) {
        draw(new java.awt.geom.RoundRectangle2D.Double(x, y, width, height, arcWidth, arcHeight));
    }

    @Override
    public void fillRoundRect(int x, int y, int width, int height, int arcWidth, int arcHeight) {
        fill(new java.awt.geom.RoundRectangle2D.Double(x, y, width, height, arcWidth, arcHeight));
    }

    @Override
    public void drawOval(int x, int y, int width, int height) {
        draw(new java.awt.geom.Ellipse2D.Double(x, y, width, height));
    }

    @Override
    public void fillOval(int x, int y, int width, int height) {
        fill(new java.awt.geom.Ellipse2D.Double(x, y, width, height));
    }

    @Override
    public void drawArc(int x, int y, int width, int height, int start, int angle) {
        draw(new java.awt.geom.Arc2D.Double(x, y, width, height, start, angle, java.awt.geom.Arc2D.OPEN));
    }

    @Override
    public void fillArc(int x, int y, int width, int height, int start, int angle) {
        fill(new java.awt.geom.Arc2D.Double(x, y, width, height, start, angle, java.awt.geom.Arc2D.PIE));
    }

    @Override
    public void drawPolyline(int[] x, int[] y, int n) {
        for (int i = 1; i < n; i++) {
            drawLine(x[i - 1], y[i - 1], x[i], y[i]);
        }
    }

    @Override
    public void drawPolygon(int[] x, int[] y, int n) {
        draw(new java.awt.Polygon(x, y, n));
    }

    @Override
    public void fillPolygon(int[] x, int[] y, int n) {
        fill(new java.awt.Polygon(x, y, n));
    }

    // ---- what no chart of ours uses

    private static UnsupportedOperationException unused() {
        return new UnsupportedOperationException("a sheet keeps strokes, areas and level words only");
    }

    @Override
    public void copyArea(int x, int y, int width, int height, int dx, int dy) {
        throw unused();
    }

    @Override
    public void drawString(AttributedCharacterIterator iterator, int x, int y) {
        throw unused();
    }

    @Override
    public void drawString(AttributedCharacterIterator iterator, float x, float y) {
        throw unused();
    }

    @Override
    public void drawGlyphVector(GlyphVector glyphs, float x, float y) {
        throw unused();
    }

    @Override
    public boolean drawImage(Image image, AffineTransform t, ImageObserver observer) {
        throw unused();
    }

    @Override
    public void drawImage(BufferedImage image, BufferedImageOp op, int x, int y) {
        throw unused();
    }

    @Override
    public void drawRenderedImage(RenderedImage image, AffineTransform t) {
        throw unused();
    }

    @Override
    public void drawRenderableImage(RenderableImage image, AffineTransform t) {
        throw unused();
    }

    @Override
    public boolean drawImage(Image image, int x, int y, ImageObserver observer) {
        throw unused();
    }

    @Override
    public boolean drawImage(Image image, int x, int y, int width, int height, ImageObserver observer) {
        throw unused();
    }

    @Override
    public boolean drawImage(Image image, int x, int y, Color background, ImageObserver observer) {
        throw unused();
    }

    @Override
    public boolean drawImage(
            Image image, int x, int y, int width, int height, Color background, ImageObserver observer) {
        throw unused();
    }

    @Override
    public boolean drawImage(
            Image image, int a, int b, int c, int d, int e, int f, int g, int h, ImageObserver observer) {
        throw unused();
    }

    @Override
    public boolean drawImage(
            Image image,
            int a,
            int b,
            int c,
            int d,
            int e,
            int f,
            int g,
            int h,
            Color background,
            ImageObserver observer) {
        throw unused();
    }

    /** The house typeface in the clothes of a Java font, so that JFreeChart measures with it and Java's own is never asked. */
    private static final class Face extends Font {
        private static final long serialVersionUID = 1L;

        Face() {
            super("Source Sans 3", Font.PLAIN, (int) Canvas.SIZE);
        }

        @Override
        public LineMetrics getLineMetrics(String text, FontRenderContext context) {
            return new Line(text.length());
        }

        @Override
        public Rectangle2D getStringBounds(String text, FontRenderContext context) {
            return bounds(text);
        }
    }

    private static Rectangle2D bounds(String text) {
        double up = Typeface.ASCENDER * Canvas.SIZE;
        return new Rectangle2D.Double(0, -up, Canvas.width(text), up + Typeface.DESCENDER * Canvas.SIZE);
    }

    /** Measures of a line of label words, points. */
    private static final class Line extends LineMetrics {
        private final int characters;

        Line(int characters) {
            this.characters = characters;
        }

        @Override
        public int getNumChars() {
            return characters;
        }

        @Override
        public float getAscent() {
            return (float) (Typeface.ASCENDER * Canvas.SIZE);
        }

        @Override
        public float getDescent() {
            return (float) (Typeface.DESCENDER * Canvas.SIZE);
        }

        @Override
        public float getLeading() {
            return 0;
        }

        @Override
        public float getHeight() {
            return getAscent() + getDescent();
        }

        @Override
        public int getBaselineIndex() {
            return Font.ROMAN_BASELINE;
        }

        @Override
        public float[] getBaselineOffsets() {
            return new float[] {0, 0, 0};
        }

        @Override
        public float getStrikethroughOffset() {
            return 0;
        }

        @Override
        public float getStrikethroughThickness() {
            return 0;
        }

        @Override
        public float getUnderlineOffset() {
            return 0;
        }

        @Override
        public float getUnderlineThickness() {
            return 0;
        }
    }

    /** The same for callers that want whole points. */
    private static final class Measures extends FontMetrics {
        private static final long serialVersionUID = 1L;

        Measures(Font font) {
            super(font);
        }

        @Override
        public int stringWidth(String text) {
            return (int) Math.ceil(Canvas.width(text));
        }

        @Override
        public int getAscent() {
            return (int) Math.ceil(Typeface.ASCENDER * Canvas.SIZE);
        }

        @Override
        public int getDescent() {
            return (int) Math.ceil(Typeface.DESCENDER * Canvas.SIZE);
        }

        @Override
        public Rectangle2D getStringBounds(String text, Graphics context) {
            return bounds(text);
        }

        @Override
        public LineMetrics getLineMetrics(String text, Graphics context) {
            return new Line(text.length());
        }
    }
}
