package org.stillpath.plot;

import java.io.ByteArrayOutputStream;
import java.nio.ByteBuffer;
import java.nio.charset.StandardCharsets;
import java.util.zip.CRC32;
import java.util.zip.Deflater;

/**
 * Writes PNG files (ISO/IEC 15948), 8 bits a channel. Chosen against the JDK's image writer for the density and for start-up: that
 * one loads some two hundred classes for the same bytes.
 */
final class Png {
    private static final byte[] SIGNATURE = {(byte) 0x89, 'P', 'N', 'G', '\r', '\n', 0x1A, '\n'};
    private static final int FILTERS = 3;

    private Png() {}

    /**
     * Encodes a raster.
     *
     * @param argb 0xAARRGGBB by rows from above
     * @param alpha whether the alpha channel is written
     * @param dotsPerMetre density that the file states; 0 for none
     */
    static byte[] encode(int columns, int rows, int[] argb, boolean alpha, int dotsPerMetre) {
        ByteArrayOutputStream out = new ByteArrayOutputStream(columns * rows / 4);
        out.writeBytes(SIGNATURE);
        ByteBuffer header = ByteBuffer.allocate(13).putInt(columns).putInt(rows);
        header.put((byte) 8)
                .put((byte) (alpha ? 6 : 2))
                .put((byte) 0)
                .put((byte) 0)
                .put((byte) 0);
        chunk(out, "IHDR", header.array(), 13);
        if (dotsPerMetre > 0) {
            ByteBuffer density = ByteBuffer.allocate(9)
                    .putInt(dotsPerMetre)
                    .putInt(dotsPerMetre)
                    .put((byte) 1);
            chunk(out, "pHYs", density.array(), 9);
        }
        byte[] lines = filtered(columns, rows, argb, alpha ? 4 : 3);
        Deflater deflater = new Deflater(6);
        try {
            deflater.setInput(lines);
            deflater.finish();
            byte[] packed = new byte[lines.length + 1024];
            int length = deflater.deflate(packed);
            chunk(out, "IDAT", packed, length);
        } finally {
            deflater.end();
        }
        chunk(out, "IEND", new byte[0], 0);
        return out.toByteArray();
    }

    /** Each row by the filter (none, left, above) whose differences are smallest, as the standard advises in 12.7. */
    private static byte[] filtered(int columns, int rows, int[] argb, int channels) {
        int stride = columns * channels;
        byte[] out = new byte[rows * (stride + 1)];
        byte[] above = new byte[stride];
        byte[] row = new byte[stride];
        byte[][] tries = new byte[FILTERS][stride];
        for (int r = 0; r < rows; r++) {
            for (int c = 0; c < columns; c++) {
                int p = argb[r * columns + c];
                row[c * channels] = (byte) (p >> 16);
                row[c * channels + 1] = (byte) (p >> 8);
                row[c * channels + 2] = (byte) p;
                if (channels == 4) {
                    row[c * channels + 3] = (byte) (p >> 24);
                }
            }
            int best = 0;
            long least = Long.MAX_VALUE;
            for (int f = 0; f < FILTERS; f++) {
                long sum = 0;
                for (int i = 0; i < stride; i++) {
                    int before = f == 1 ? (i < channels ? 0 : row[i - channels]) : f == 2 ? above[i] : 0;
                    tries[f][i] = (byte) (row[i] - before);
                    sum += Math.abs(tries[f][i]);
                }
                if (sum < least) {
                    least = sum;
                    best = f;
                }
            }
            out[r * (stride + 1)] = (byte) best;
            System.arraycopy(tries[best], 0, out, r * (stride + 1) + 1, stride);
            byte[] swap = above;
            above = row;
            row = swap;
        }
        return out;
    }

    private static void chunk(ByteArrayOutputStream out, String type, byte[] body, int length) {
        byte[] name = type.getBytes(StandardCharsets.US_ASCII);
        CRC32 crc = new CRC32();
        crc.update(name);
        crc.update(body, 0, length);
        out.writeBytes(ByteBuffer.allocate(4).putInt(length).array());
        out.writeBytes(name);
        out.write(body, 0, length);
        out.writeBytes(ByteBuffer.allocate(4).putInt((int) crc.getValue()).array());
    }
}
