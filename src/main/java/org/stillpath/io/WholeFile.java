package org.stillpath.io;

import java.io.BufferedOutputStream;
import java.io.IOException;
import java.io.OutputStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.AtomicMoveNotSupportedException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.StandardCopyOption;
import java.nio.file.StandardOpenOption;

/**
 * Files that appear whole or not at all: written beside under another name, then moved into place. A reader sees the old
 * file or the new one, never a part; a failure leaves the old one.
 */
public final class WholeFile {
    private WholeFile() {}

    /** What writes the bytes of a file. */
    @FunctionalInterface
    public interface Content {
        /**
         * Writes everything; need not close.
         *
         * @throws IOException if it cannot
         */
        void writeTo(OutputStream out) throws IOException;
    }

    /**
     * Writes a file, replacing one that is there. Its folder must exist.
     *
     * @throws IOException if the file cannot be written; then {@code target} is as it was
     */
    public static void write(Path target, Content content) throws IOException {
        Path beside = target.resolveSibling("." + target.getFileName() + "."
                + ProcessHandle.current().pid() + "-" + Long.toHexString(System.nanoTime()) + ".part");
        try {
            try (OutputStream out = new BufferedOutputStream(
                    Files.newOutputStream(beside, StandardOpenOption.CREATE_NEW, StandardOpenOption.WRITE))) {
                content.writeTo(out);
            }
            move(beside, target);
        } catch (IOException | RuntimeException e) {
            Files.deleteIfExists(beside);
            throw e;
        }
    }

    /**
     * Writes a text in UTF-8, otherwise as {@link #write(Path, Content)}.
     *
     * @throws IOException if the file cannot be written
     */
    public static void write(Path target, String text) throws IOException {
        write(target, out -> out.write(text.getBytes(StandardCharsets.UTF_8)));
    }

    private static void move(Path from, Path to) throws IOException {
        try {
            Files.move(from, to, StandardCopyOption.ATOMIC_MOVE, StandardCopyOption.REPLACE_EXISTING);
        } catch (AtomicMoveNotSupportedException e) {
            Files.move(from, to, StandardCopyOption.REPLACE_EXISTING);
        }
    }
}
