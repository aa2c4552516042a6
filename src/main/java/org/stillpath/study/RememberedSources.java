package org.stillpath.study;

import java.util.Map;
import java.util.concurrent.ConcurrentHashMap;
import java.util.function.Supplier;
import org.stillpath.job.Cells;
import org.stillpath.job.Lattice;
import org.stillpath.job.Node;
import org.stillpath.job.Sounding;
import org.stillpath.job.Sources;
import org.stillpath.job.Table;
import org.stillpath.problem.Place;

/**
 * Files that are read once, however many runs of a study name them, so that they are also the same ones from the first run
 * to the last. Safe for any number of threads.
 */
final class RememberedSources implements Sources {
    private final Sources files;
    private final Map<Key, Object> known = new ConcurrentHashMap<>();
    private final Fingerprint fingerprint;

    private record Key(String kind, String name, String wanted, String asker) {}

    /**
     * @param files reads them
     * @param fingerprint is told of everything read
     */
    RememberedSources(Sources files, Fingerprint fingerprint) {
        this.files = files;
        this.fingerprint = fingerprint;
    }

    @Override
    public Node.Mapping document(String name, Place asked) {
        Key key = new Key("document", name, "", asked.source());
        return once(key, Node.Mapping.class, () -> {
            Node.Mapping document = files.document(name, asked);
            fingerprint.add(document);
            return document;
        });
    }

    @Override
    public Table table(String name, Place asked) {
        return once(new Key("table", name, "", asked.source()), Table.class, () -> {
            Table table = files.table(name, asked);
            table.headers().forEach(fingerprint::add);
            table.units().forEach(fingerprint::add);
            table.columns().forEach(fingerprint::add);
            return table;
        });
    }

    @Override
    public Lattice lattice(String name, Lattice.Wanted wanted, Place asked) {
        return once(new Key("lattice", name, wanted.toString(), asked.source()), Lattice.class, () -> {
            Lattice lattice = files.lattice(name, wanted, asked);
            for (Lattice.Column c : new Lattice.Column[] {lattice.x(), lattice.y(), lattice.z(), lattice.value()}) {
                fingerprint.add(c.unit());
                fingerprint.add(c.numbers());
            }
            return lattice;
        });
    }

    @Override
    public Cells cells(String name, Place asked) {
        return once(new Key("cells", name, "", asked.source()), Cells.class, () -> {
            Cells cells = files.cells(name, asked);
            cells.headers().forEach(h -> fingerprint.add(h.text()));
            cells.rows().forEach(r -> r.cells().forEach(fingerprint::add));
            return cells;
        });
    }

    @Override
    public Sounding sounding(String name, Sounding.Wanted wanted, Place asked) {
        return once(new Key("sounding", name, wanted.toString(), asked.source()), Sounding.class, () -> {
            Sounding sounding = files.sounding(name, wanted, asked);
            fingerprint.add(sounding.station());
            fingerprint.add(sounding.time());
            for (Sounding.Level l : sounding.levels()) {
                fingerprint.add(
                        new double[] {l.geopotential(), l.pressure(), l.temperature(), l.humidity(), l.depression()});
            }
            return sounding;
        });
    }

    private <T> T once(Key key, Class<T> type, Supplier<T> read) {
        Object there = known.get(key);
        if (there == null) {
            synchronized (this) {
                there = known.get(key);
                if (there == null) {
                    there = read.get();
                    known.put(key, there);
                }
            }
        }
        return type.cast(there);
    }
}
