package org.stillpath.io;

import java.io.IOException;
import java.io.InputStream;

/**
 * Base64 (RFC 4648), group by group, blanks skipped. Padding ends a group, not the text: VTK files put a header and its
 * data one behind the other, each padded for itself, which the JDK's decoder refuses. Ends at the first character that
 * is none of the alphabet, as at the {@code <} of an end tag.
 */
final class Base64Groups extends InputStream {
    private final byte[] text;
    private int pos;
    /** Bytes of the group read last, the first one highest, and how many of them are left. */
    private int group;

    private int left;

    /** The bytes that the text from {@code start} on stands for. */
    Base64Groups(byte[] text, int start) {
        this.text = text;
        this.pos = start;
    }

    @Override
    public int read() throws IOException {
        if (left == 0 && !next()) {
            return -1;
        }
        left--;
        return (group >>> (8 * left)) & 0xff;
    }

    @Override
    public int read(byte[] out, int start, int length) throws IOException {
        int done = 0;
        while (done < length && (left > 0 || next())) {
            left--;
            out[start + done++] = (byte) (group >>> (8 * left));
        }
        return done == 0 && length > 0 ? -1 : done;
    }

    private boolean next() throws IOException {
        int bits = 0;
        int letters = 0;
        int padding = 0;
        while (letters + padding < 4) {
            while (pos < text.length && text[pos] <= ' ' && text[pos] >= 0) {
                pos++;
            }
            int c = pos < text.length ? text[pos] : '<';
            int value = value(c);
            if (c == '=' && letters >= 2) {
                padding++;
            } else if (value >= 0 && padding == 0) {
                bits = bits << 6 | value;
                letters++;
            } else if (letters == 0) {
                return false;
            } else {
                throw new IOException("the base64 text of this array is damaged");
            }
            pos++;
        }
        // 4, 3 or 2 letters are 3, 2 or 1 bytes
        left = letters - 1;
        group = bits >>> (letters == 4 ? 0 : letters == 3 ? 2 : 4);
        return true;
    }

    private static int value(int c) {
        if (c >= 'A' && c <= 'Z') {
            return c - 'A';
        }
        if (c >= 'a' && c <= 'z') {
            return c - 'a' + 26;
        }
        if (c >= '0' && c <= '9') {
            return c - '0' + 52;
        }
        return c == '+' ? 62 : c == '/' ? 63 : -1;
    }
}
