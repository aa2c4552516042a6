package org.stillpath.io;

import java.io.ByteArrayInputStream;
import java.io.ByteArrayOutputStream;
import java.io.DataInputStream;
import java.io.DataOutputStream;
import java.io.IOException;
import java.nio.ByteBuffer;
import java.nio.channels.FileChannel;
import java.nio.channels.FileLock;
import java.nio.channels.OverlappingFileLockException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.StandardOpenOption;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import java.util.zip.CRC32;
import org.jspecify.annotations.Nullable;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.study.Store;

/**
 * The runs of an unfinished study, in the file {@value #NAME} of its folder. A header says which study it is; then follow
 * records, each with its length and a checksum, only ever appended. A process that is killed leaves at most one torn record
 * at the end, which the next one cuts off. The file is locked while a process works on it, and deleted when the results stand
 * beside it ({@link #finish}).
 *
 * <p>A log was chosen against rewriting a whole file at each step, whose cost grows with the square of the study, and
 * against a data base, which is a dependency for what one page of code does.
 */
public final class Checkpoint implements Store, AutoCloseable {
    /** Name of the file. */
    public static final String NAME = "study.unfinished";

    private static final byte[] MAGIC = "stillpath study 1\n".getBytes(StandardCharsets.US_ASCII);
    private static final int LONGEST = 1 << 28;

    private final Path folder;
    private final Path file;
    private @Nullable FileChannel channel;
    private final Map<String, List<Part>> kept = new HashMap<>();
    private int found;
    /** Whether anything is kept. */
    private boolean worth;

    private Checkpoint(Path folder) {
        this.folder = folder;
        this.file = folder.resolve(NAME);
    }

    /** The checkpoint of a folder, which is made if need be; nothing is read or written before {@link #open}. */
    public static Checkpoint in(Path folder) {
        return new Checkpoint(folder);
    }

    /** How many runs an earlier process left. */
    public int found() {
        return found;
    }

    @Override
    public void open(String fingerprint) {
        try {
            Files.createDirectories(folder);
            FileChannel opened = FileChannel.open(
                    file, StandardOpenOption.CREATE, StandardOpenOption.READ, StandardOpenOption.WRITE);
            channel = opened;
            lock(opened);
            byte[] header = header(fingerprint);
            ByteBuffer start = ByteBuffer.allocate(header.length);
            while (start.hasRemaining() && opened.read(start, start.position()) >= 0) {
                // reads on to the end of the header or of the file
            }
            boolean same = !start.hasRemaining() && Arrays.equals(start.array(), header);
            if (!same && opened.size() <= header.length) {
                // new, or of a process that ended before anything was kept
                opened.truncate(0);
                opened.write(ByteBuffer.wrap(header), 0);
                opened.position(header.length);
                return;
            }
            if (!same) {
                throw refuse("holds the unfinished study of another job, of other files or of another version of the "
                        + "program; give another --out, or delete " + file + " to begin anew");
            }
            opened.position(header.length);
            read(opened);
        } catch (IOException e) {
            throw failed(e);
        }
    }

    private byte[] header(String fingerprint) throws IOException {
        ByteArrayOutputStream bytes = new ByteArrayOutputStream();
        bytes.write(MAGIC);
        bytes.write((fingerprint + "\n").getBytes(StandardCharsets.UTF_8));
        return bytes.toByteArray();
    }

    private void lock(FileChannel opened) throws IOException {
        @Nullable FileLock lock;
        try {
            lock = opened.tryLock();
        } catch (OverlappingFileLockException e) {
            lock = null;
        }
        if (lock == null) {
            throw refuse("is being worked on by another process");
        }
    }

    private ProblemException refuse(String why) {
        worth = true;
        close();
        return new ProblemException(Problem.input(Place.of("--out " + folder), "", "the folder " + why));
    }

    private static ProblemException failed(IOException e) {
        String message = e.getMessage() == null ? e.getClass().getSimpleName() : e.getMessage();
        return new ProblemException(
                Problem.file(Place.of("--out"), "the runs of the study cannot be kept: " + message));
    }

    /** Reads sound records; what is torn or damaged, and all behind it, is cut off. */
    private void read(FileChannel opened) throws IOException {
        long sound = opened.position();
        ByteBuffer head = ByteBuffer.allocate(12);
        while (true) {
            head.clear();
            if (!fill(opened, head, sound)) {
                break;
            }
            head.flip();
            int length = head.getInt();
            long sum = head.getLong();
            if (length <= 0 || length > LONGEST) {
                break;
            }
            ByteBuffer body = ByteBuffer.allocate(length);
            if (!fill(opened, body, sound + 12) || checksum(body.array()) != sum) {
                break;
            }
            take(body.array());
            sound += 12 + length;
        }
        opened.truncate(sound);
        opened.position(sound);
    }

    private static boolean fill(FileChannel opened, ByteBuffer buffer, long from) throws IOException {
        long at = from;
        while (buffer.hasRemaining()) {
            int n = opened.read(buffer, at);
            if (n < 0) {
                return false;
            }
            at += n;
        }
        return true;
    }

    private static long checksum(byte[] bytes) {
        CRC32 crc = new CRC32();
        crc.update(bytes);
        return crc.getValue();
    }

    private void take(byte[] body) throws IOException {
        DataInputStream in = new DataInputStream(new ByteArrayInputStream(body));
        String stage = in.readUTF();
        int from = in.readInt();
        int count = in.readInt();
        int width = in.readInt();
        double[] results = new double[Math.multiplyExact(count, width)];
        for (int i = 0; i < results.length; i++) {
            results[i] = in.readDouble();
        }
        byte[] flags = new byte[count];
        in.readFully(flags);
        Map<Integer, String> faults = new TreeMap<>();
        for (int n = in.readInt(); n > 0; n--) {
            int number = in.readInt();
            byte[] text = new byte[in.readInt()];
            in.readFully(text);
            faults.put(number, new String(text, StandardCharsets.UTF_8));
        }
        kept.computeIfAbsent(stage, s -> new ArrayList<>()).add(new Part(from, width, results, flags, faults));
        found += count;
        worth = true;
    }

    @Override
    public List<Part> parts(String stage) {
        return List.copyOf(kept.getOrDefault(stage, List.of()));
    }

    @Override
    public void add(String stage, Part part) {
        FileChannel opened = channel;
        if (opened == null) {
            throw new IllegalStateException("open must come before add");
        }
        try {
            ByteArrayOutputStream bytes = new ByteArrayOutputStream(64 + 9 * part.results().length);
            DataOutputStream out = new DataOutputStream(bytes);
            out.writeUTF(stage);
            out.writeInt(part.from());
            out.writeInt(part.flags().length);
            out.writeInt(part.width());
            for (double r : part.results()) {
                out.writeDouble(r);
            }
            out.write(part.flags());
            out.writeInt(part.faults().size());
            for (Map.Entry<Integer, String> fault : new TreeMap<>(part.faults()).entrySet()) {
                out.writeInt(fault.getKey());
                byte[] text = fault.getValue().getBytes(StandardCharsets.UTF_8);
                out.writeInt(text.length);
                out.write(text);
            }
            byte[] body = bytes.toByteArray();
            ByteBuffer record = ByteBuffer.allocate(12 + body.length);
            record.putInt(body.length).putLong(checksum(body)).put(body).flip();
            while (record.hasRemaining()) {
                opened.write(record);
            }
            worth = true;
        } catch (IOException e) {
            throw failed(e);
        }
    }

    /**
     * Deletes the file: the study's results stand in the folder.
     *
     * @throws IOException if it cannot be deleted
     */
    public void finish() throws IOException {
        boolean open = channel != null;
        worth = true;
        close();
        if (open) {
            Files.deleteIfExists(file);
        }
    }

    /** Lets go of the file and leaves it where it is, if anything is kept in it. */
    @Override
    public void close() {
        FileChannel opened = channel;
        channel = null;
        if (opened != null) {
            try {
                opened.close();
                if (!worth) {
                    Files.deleteIfExists(file);
                }
            } catch (IOException e) {
                // nothing is lost: what was kept is in the file
            }
        }
    }
}
