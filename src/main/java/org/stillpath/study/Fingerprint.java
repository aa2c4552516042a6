package org.stillpath.study;

import java.nio.ByteBuffer;
import java.nio.charset.StandardCharsets;
import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.util.HexFormat;
import org.stillpath.job.Node;

/**
 * Tells one study from another: a SHA-256 digest of the job's tree and of every file that it names, in the order in which
 * they were read. Comments and layout of a job do not count. Mutable; safe for several threads.
 */
final class Fingerprint {
    private final MessageDigest digest;

    Fingerprint() {
        try {
            digest = MessageDigest.getInstance("SHA-256");
        } catch (NoSuchAlgorithmException e) {
            throw new IllegalStateException("every Java has SHA-256", e);
        }
    }

    synchronized void add(String text) {
        byte[] bytes = text.getBytes(StandardCharsets.UTF_8);
        digest.update(ByteBuffer.allocate(4).putInt(bytes.length).flip());
        digest.update(bytes);
    }

    synchronized void add(double[] numbers) {
        ByteBuffer buffer = ByteBuffer.allocate(8 * Math.min(numbers.length, 8192));
        for (int from = 0; from < numbers.length; from += 8192) {
            buffer.clear();
            for (int i = from; i < Math.min(numbers.length, from + 8192); i++) {
                buffer.putDouble(numbers[i]);
            }
            digest.update(buffer.flip());
        }
        add("|");
    }

    void add(Node node) {
        if (node instanceof Node.Mapping m) {
            add("{");
            for (Node.Entry e : m.entries()) {
                add(e.key());
                add(e.value());
            }
            add("}");
        } else if (node instanceof Node.Sequence s) {
            add("[");
            s.items().forEach(this::add);
            add("]");
        } else if (node instanceof Node.Scalar s) {
            add(s.text());
        }
    }

    /** What was added so far, as hexadecimal digits. */
    synchronized String text() {
        try {
            return HexFormat.of().formatHex(((MessageDigest) digest.clone()).digest());
        } catch (CloneNotSupportedException e) {
            throw new IllegalStateException("SHA-256 can be copied", e);
        }
    }
}
