package org.stillpath.io;

import java.io.IOException;
import java.io.InputStream;
import java.nio.ByteBuffer;
import java.nio.CharBuffer;
import java.nio.charset.CharsetDecoder;
import java.nio.charset.CoderResult;
import java.nio.charset.CodingErrorAction;
import java.nio.charset.StandardCharsets;
import java.nio.file.AccessDeniedException;
import java.nio.file.Files;
import java.nio.file.NoSuchFileException;
import java.nio.file.Path;
import java.util.Locale;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Words;

/**
 * Bytes of a file within a limit, and their text. Strict about UTF-8, because a letter guessed wrong in a unit is worse
 * than a refusal.
 */
final class FileText {
    private FileText() {}

    /**
     * All bytes of a file.
     *
     * @param file the file
     * @param limit most bytes that are read
     * @param asked where the file is named, for the fault
     * @param shown the file's name as the user would write it
     * @throws ProblemException if it cannot be read or is larger than the limit
     */
    static byte[] bytes(Path file, int limit, Place asked, String shown) {
        try {
            if (Files.isDirectory(file)) {
                throw new ProblemException(Problem.file(asked, Words.quoted(shown) + " is a folder, not a file"));
            }
            if (Files.isRegularFile(file) && Files.size(file) > limit) {
                throw tooLarge(limit, asked, shown);
            }
            try (InputStream in = Files.newInputStream(file)) {
                return bytes(in, limit, asked, shown);
            }
        } catch (NoSuchFileException e) {
            throw new ProblemException(Problem.file(asked, "there is no file " + Words.quoted(shown)));
        } catch (AccessDeniedException e) {
            throw new ProblemException(Problem.file(asked, Words.quoted(shown) + " may not be read: access is denied"));
        } catch (IOException | SecurityException e) {
            throw new ProblemException(Problem.file(asked, Words.quoted(shown) + " cannot be read: " + reason(e)));
        }
    }

    /** All bytes of a stream, which the caller closes. */
    static byte[] bytes(InputStream in, int limit, Place asked, String shown) throws IOException {
        byte[] bytes = in.readNBytes(limit + 1);
        if (bytes.length > limit) {
            throw tooLarge(limit, asked, shown);
        }
        return bytes;
    }

    /**
     * The text, a byte-order mark left in place.
     *
     * @throws ProblemException if it is binary or not UTF-8, with line and column of the first byte that is not
     */
    static String decode(byte[] bytes, String source) {
        boolean wide = bytes.length >= 2
                && (((bytes[0] & 0xff) == 0xff && (bytes[1] & 0xff) == 0xfe)
                        || ((bytes[0] & 0xff) == 0xfe && (bytes[1] & 0xff) == 0xff));
        if (wide) {
            throw fault(new Place(source, 1, 1), "the file is UTF-16 text; save it as UTF-8");
        }
        if (isPlain(bytes)) {
            // by far the most files, and the large ones; this needs no second array of the characters
            return new String(bytes, StandardCharsets.ISO_8859_1);
        }
        CharsetDecoder decoder = StandardCharsets.UTF_8
                .newDecoder()
                .onMalformedInput(CodingErrorAction.REPORT)
                .onUnmappableCharacter(CodingErrorAction.REPORT);
        ByteBuffer in = ByteBuffer.wrap(bytes);
        CharBuffer out = CharBuffer.allocate(bytes.length);
        CoderResult result = decoder.decode(in, out, true);
        out.flip();
        String text = out.toString();
        for (int i = 0; i < text.length(); i++) {
            char c = text.charAt(i);
            if (c < ' ' && c != '\t' && c != '\n' && c != '\r') {
                String what = c == 0
                        ? "this is a binary file, not text"
                        : String.format(
                                Locale.ROOT, "control character U+%04X; this does not look like a text file", (int) c);
                throw fault(place(text, i, source), what);
            }
        }
        if (result.isError()) {
            boolean binary = false;
            for (byte b : bytes) {
                binary |= b == 0;
            }
            String what = binary
                    ? "this is a binary file, not text"
                    : String.format(
                            Locale.ROOT,
                            "byte 0x%02X is not UTF-8; save the file as UTF-8",
                            bytes[in.position()] & 0xff);
            throw fault(place(text, text.length(), source), what);
        }
        return text;
    }

    /** Whether it is ASCII text without control characters. */
    private static boolean isPlain(byte[] bytes) {
        for (byte b : bytes) {
            // bytes from 0x80 on are negative
            if (b < ' ' && b != '\t' && b != '\n' && b != '\r') {
                return false;
            }
        }
        return true;
    }

    /** Place of a character, by counting lines from the start; for faults only. */
    static Place place(String text, int offset, String source) {
        int line = 1;
        int start = text.startsWith("\ufeff") ? 1 : 0;
        for (int i = 0; i < offset; i++) {
            char c = text.charAt(i);
            if (c == '\n' || (c == '\r' && !(i + 1 < text.length() && text.charAt(i + 1) == '\n'))) {
                line++;
                start = i + 1;
            }
        }
        return new Place(source, line, 1 + text.codePointCount(Math.min(start, offset), offset));
    }

    private static ProblemException tooLarge(int limit, Place asked, String shown) {
        return new ProblemException(Problem.input(
                asked, "", Words.quoted(shown) + " is larger than the limit of file size, " + limit + " bytes"));
    }

    private static ProblemException fault(Place place, String message) {
        return new ProblemException(Problem.input(place, "", message));
    }

    private static String reason(Exception e) {
        String message = e.getMessage();
        return message == null ? e.getClass().getSimpleName() : message;
    }
}
