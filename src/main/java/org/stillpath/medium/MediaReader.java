package org.stillpath.medium;

import java.util.ArrayList;
import java.util.Collections;
import java.util.HashMap;
import java.util.LinkedHashMap;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.stream.Stream;
import org.stillpath.formula.Chart;
import org.stillpath.formula.Condition;
import org.stillpath.formula.Coordinate;
import org.stillpath.formula.Formula;
import org.stillpath.formula.FormulaException;
import org.stillpath.formula.Names;
import org.stillpath.geometry.Vector;
import org.stillpath.job.Node;
import org.stillpath.job.Section;
import org.stillpath.job.Sources;
import org.stillpath.job.Value;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;
import org.stillpath.unit.Dimension;
import org.stillpath.unit.Flavour;
import org.stillpath.unit.Kind;
import org.stillpath.unit.Quantity;
import org.stillpath.unit.UnitException;

/**
 * Reads the {@code media:} of a job, and media files. All faults are collected; a medium at fault stands as vacuum, so
 * that reading goes on.
 *
 * <p>A medium that comes {@code from} a file is read with the {@code with} values of all who asked for it laid over its
 * own, the outermost on top. Formulas are shared through a {@link FormulaCache}, their values never are.
 */
public final class MediaReader {
    private static final String EXAMPLE = "{index: 1.5168}";
    /** What a region or a state of the air may depend on: not the light. */
    private static final Set<Coordinate> PLACE_ALONE = placeAlone();

    private final Sources sources;
    private final Problems problems;
    private final FormulaCache cache;
    private final TableReader tables;

    private MediaReader(Sources sources, Problems problems, FormulaCache cache) {
        this.sources = sources;
        this.problems = problems;
        this.cache = cache;
        this.tables = new TableReader(sources, problems);
    }

    /**
     * Reads the media of a job.
     *
     * @param media the job's {@code media:} section, if it has one
     * @param sources gives the files that media name
     * @param problems collects faults
     */
    public static Media read(Optional<Section> media, Sources sources, Problems problems) {
        return read(media, sources, problems, new MediaMemory());
    }

    /** The same with what earlier readings of jobs like this one left. */
    public static Media read(Optional<Section> media, Sources sources, Problems problems, MediaMemory memory) {
        if (media.isEmpty()) {
            return Media.of(List.of());
        }
        MediaReader reader = new MediaReader(sources, problems, memory.formulas());
        List<Medium> list = new ArrayList<>();
        for (String name : media.get().names()) {
            Value value = media.get().at(name);
            Optional<Medium> known = memory.find(name, value.node());
            if (known.isPresent()) {
                list.add(known.get());
                continue;
            }
            Medium read = reader.medium(name, value.section(), Overrides.NONE, List.of())
                    .medium();
            if (problems.isEmpty()) {
                memory.add(name, value.node(), read);
            }
            list.add(read);
        }
        return Media.of(list);
    }

    /**
     * Reads a document that is one medium.
     *
     * @param name name that the medium gets
     */
    static Parsed document(String name, Section section, Sources sources, Problems problems, FormulaCache cache) {
        MediaReader reader = new MediaReader(sources, problems, cache);
        return reader.medium(
                name, section, Overrides.NONE, List.of(section.place().source()));
    }

    /** Values that an asking medium lays over those of the medium it asks for. */
    private record Overrides(Map<String, Value> values) {
        static final Overrides NONE = new Overrides(Map.of());
    }

    /** A medium with the values of its names, as read. */
    record Parsed(Medium medium, Map<String, Quantity> with) {}

    private Parsed medium(String name, Section s, Overrides overrides, List<String> chain) {
        if (s.isPlaceholder()) {
            return vacuum(name, Map.of());
        }
        List<String> givers =
                Stream.of("index", "air", "solid", "from").filter(s::has).toList();
        if (givers.size() > 1) {
            String last = givers.get(givers.size() - 1);
            s.fault(
                    last,
                    "`" + givers.get(0) + "` and `" + last + "` cannot stand together; one of them gives the medium");
        }
        Parsed parsed;
        if (s.has("from")) {
            parsed = borrowed(name, s, overrides, chain);
        } else if (s.has("air")) {
            parsed = air(name, s, overrides);
        } else if (s.has("solid")) {
            parsed = solid(name, s, overrides);
        } else if (s.has("index")) {
            parsed = own(name, s, overrides);
        } else {
            s.fault("a medium needs `index`, such as " + EXAMPLE
                    + ", `air`, `solid`, or `from`, such as {from: rods/parabolic}");
            s.find("with");
            s.find("relative-to");
            parsed = vacuum(name, Map.of());
        }
        Parsed dressed = new Parsed(dressed(parsed, s), parsed.with());
        s.finish();
        return dressed;
    }

    private Parsed vacuum(String name, Map<String, Quantity> with) {
        return new Parsed(UniformMedium.of(name, 1), with);
    }

    // --- a medium that gives its own index ---

    private Parsed own(String name, Section s, Overrides overrides) {
        Map<String, Quantity> with = with(s, overrides);
        boolean relative =
                s.find("relative-to").map(v -> v.word("air")).orElse("").equals("air");
        Value index = s.need("index", "1.5168");
        return new Parsed(index(name, index, with, relative), with);
    }

    private Medium index(String name, Value index, Map<String, Quantity> with, boolean relative) {
        Declaration d = Declaration.of(name);
        if (index.isText()) {
            if (isQuantity(index.text(), with.keySet())) {
                double n = index.positive(Kind.NUMBER);
                return new UniformMedium(d, Double.isNaN(n) ? 1 : n, relative);
            }
            return formula(d, index, with, relative);
        }
        if (index.isList()) {
            index.fault("an index is a number, a formula, or a section such as {profile: {along: r, ..}}, not a list");
            return new UniformMedium(d, 1, false);
        }
        if (index.isSection() && index.section().has("luneburg")) {
            return luneburg(d, index.section(), with, relative);
        }
        return tables.tabulated(index, Kind.NUMBER, 1, Interpolation.SPLINE)
                .map(r -> (Medium) new FieldMedium(d.withWarnings(r.notes()), r.field(), true, relative))
                .orElseGet(() -> new UniformMedium(d, 1, false));
    }

    private Medium luneburg(Declaration d, Section index, Map<String, Quantity> with, boolean relative) {
        Section s = index.at("luneburg").section();
        index.finish();
        double radius = length(s.need("radius", "10 mm"), with);
        double object = s.find("object").map(v -> distance(v, with)).orElse(Double.POSITIVE_INFINITY);
        double image = distance(s.need("image", "20 mm"), with);
        s.finish();
        boolean read = radius > 0 && !Double.isNaN(object + image);
        if (read && (object < radius || image < radius)) {
            s.fault(
                    object < radius ? "object" : "image",
                    "the point lies inside the sphere, " + Told.length(Math.min(object, image))
                            + " from its centre; at least its radius, " + Told.length(radius) + ", is needed");
            read = false;
        }
        if (!read) {
            return new UniformMedium(d, 1, false);
        }
        return new FieldMedium(d, LuneburgSphere.of(radius, object, image), true, relative);
    }

    private static double distance(Value value, Map<String, Quantity> with) {
        return value.isText() && value.text().equals("infinity") ? Double.POSITIVE_INFINITY : length(value, with);
    }

    /** A positive length, as a quantity or as the name of one. */
    private static double length(Value value, Map<String, Quantity> with) {
        Quantity named = value.isText() ? with.get(value.text()) : null;
        if (named == null) {
            return value.positive(Kind.LENGTH);
        }
        Optional<String> refusal = Kind.LENGTH.refusal(named);
        if (refusal.isPresent() || !(named.value() > 0)) {
            value.fault(refusal.orElse("\"" + named.text() + "\" must be greater than 0"));
            return Double.NaN;
        }
        return named.value();
    }

    /** Whether a text is a plain quantity, so that its own messages are better than those of a formula. */
    static boolean isQuantity(String text, Set<String> names) {
        if (names.contains(text.strip())) {
            return false;
        }
        try {
            Quantity.parse(text);
            return true;
        } catch (UnitException e) {
            return false;
        }
    }

    private Medium formula(Declaration d, Value index, Map<String, Quantity> with, boolean relative) {
        String text = index.text();
        if (text.isEmpty()) {
            index.fault("the index is empty; a number or a formula is needed");
            return new UniformMedium(d, 1, false);
        }
        if (with.values().stream().anyMatch(q -> Double.isNaN(q.value()))) {
            // a value that could not be read has been told, and would only make the formula look wrong
            return new UniformMedium(d, 1, false);
        }
        try {
            Names names = names(Names.SIGHT, with);
            Formula whole = cache.formula(text, names, Dimension.NONE);
            String rest = behindOne(text);
            Formula used = rest.isEmpty() ? whole : cache.formula(rest, names, Dimension.NONE);
            FormulaField field = FormulaField.of(used, values(with));
            return new FieldMedium(d, field, !rest.isEmpty(), relative);
        } catch (FormulaException e) {
            e.faults().forEach(f -> index.fault(f.offset(), f.message()));
            return new UniformMedium(d, 1, false);
        }
    }

    /**
     * What a formula of the form {@code 1 + ..} or {@code 1 - ..} adds to 1; empty for another form. Sums bind least and
     * from the left, so what follows is a formula of its own, its sign included.
     */
    static String behindOne(String text) {
        String t = text.strip();
        if (!t.startsWith("1")) {
            return "";
        }
        int i = 1;
        if (t.startsWith(".", i)) {
            i++;
            while (t.startsWith("0", i)) {
                i++;
            }
        }
        while (i < t.length() && Character.isWhitespace(t.charAt(i))) {
            i++;
        }
        if (t.startsWith("+", i)) {
            return t.substring(i + 1).strip();
        }
        return t.startsWith("-", i) ? t.substring(i) : "";
    }

    // --- air ---

    private Parsed air(String name, Section s, Overrides overrides) {
        Map<String, Quantity> with = with(s, overrides);
        if (s.has("relative-to")) {
            s.fault("relative-to", "`relative-to` belongs to an index; the index of air is absolute");
        }
        return new AirReader(fields(with), sources, problems)
                .medium(Declaration.of(name), s.at("air").section())
                .map(m -> new Parsed(m, with))
                .orElseGet(() -> vacuum(name, with));
    }

    /** A reader of states, which depend on the place alone. */
    private FieldReader fields(Map<String, Quantity> with) {
        boolean sound = with.values().stream().noneMatch(q -> Double.isNaN(q.value()));
        return new FieldReader(tables, cache, names(PLACE_ALONE, with), values(with), sound);
    }

    // --- solids and liquids ---

    private Parsed solid(String name, Section s, Overrides overrides) {
        Map<String, Quantity> with = with(s, overrides);
        if (s.has("relative-to")) {
            s.fault("relative-to", "`relative-to` belongs to an index; the index of a solid is absolute");
        }
        return new SolidReader(fields(with), new NodesReader(sources, problems), sources, problems)
                .medium(Declaration.of(name), s.at("solid").section())
                .map(m -> new Parsed(m, with))
                .orElseGet(() -> vacuum(name, with));
    }

    // --- a medium from a file ---

    private Parsed borrowed(String name, Section s, Overrides overrides, List<String> chain) {
        Value from = s.need("from", "rods/parabolic");
        Map<String, Value> asked = withValues(s);
        Map<String, Value> all = new LinkedHashMap<>(asked);
        all.putAll(overrides.values());
        if (s.has("relative-to")) {
            s.fault("relative-to", "`relative-to` belongs to the file that gives the index");
        }
        String file = from.text();
        if (file.isEmpty()) {
            return vacuum(name, Map.of());
        }
        Node.Mapping document;
        try {
            document = sources.document(file, from.place());
        } catch (ProblemException e) {
            for (Problem p : e.problems()) {
                boolean here = p.place().equals(from.place());
                problems.add(here ? new Problem(p.kind(), p.place(), from.path(), p.message()) : p);
            }
            return vacuum(name, Map.of());
        }
        String source = document.place().source();
        List<String> longer = new ArrayList<>(chain);
        longer.add(source);
        if (chain.contains(source)) {
            from.fault("this goes round in a circle: "
                    + String.join(" takes from ", longer.subList(chain.indexOf(source), longer.size())));
            return vacuum(name, Map.of());
        }
        Section section = Section.of(document, "", problems);
        for (String key : MediumFile.KEYS) {
            section.has(key);
        }
        return medium(name, section, new Overrides(all), longer);
    }

    // --- what any medium may say ---

    private Medium dressed(Parsed parsed, Section s) {
        Medium m = parsed.medium();
        Declaration old = m.declaration();
        Optional<Vector> origin =
                s.find("origin").flatMap(v -> vector(v.point())).or(old::origin);
        Optional<Vector> axis =
                s.find("axis").flatMap(v -> vector(v.direction())).or(old::axis);
        List<Level> valid = new ArrayList<>(old.valid());
        s.find("valid").ifPresent(v -> valid.addAll(conditions(v, parsed.with())));
        String source = s.find("source").map(Value::text).orElse(old.source());
        s.find("note").ifPresent(Value::text);
        Optional<Declaration.WavelengthRange> range =
                s.find("range").flatMap(v -> range(v.section())).or(old::range);
        return m.with(new Declaration(old.name(), origin, axis, valid, range, source, old.warnings()));
    }

    private static Optional<Vector> vector(double[] v) {
        for (double d : v) {
            if (!Double.isFinite(d)) {
                return Optional.empty();
            }
        }
        return Optional.of(new Vector(v[0], v[1], v[2]));
    }

    private static Optional<Declaration.WavelengthRange> range(Section s) {
        List<Value> ends = s.need("wavelength", "[380 nm, 750 nm]").items();
        s.finish();
        if (ends.size() != 2) {
            if (s.has("wavelength") && s.at("wavelength").isList()) {
                s.fault("wavelength", "two wavelengths are needed, the shortest and the longest");
            }
            return Optional.empty();
        }
        double shortest = ends.get(0).positive(Kind.LENGTH);
        double longest = ends.get(1).positive(Kind.LENGTH);
        if (Double.isNaN(shortest) || Double.isNaN(longest)) {
            return Optional.empty();
        }
        if (longest <= shortest) {
            s.fault("wavelength", "the shortest wavelength comes first");
            return Optional.empty();
        }
        return Optional.of(new Declaration.WavelengthRange(shortest, longest));
    }

    private static Set<Coordinate> placeAlone() {
        Set<Coordinate> place = new LinkedHashSet<>(Names.SIGHT);
        place.remove(Coordinate.WAVELENGTH);
        return Collections.unmodifiableSet(place);
    }

    private List<Level> conditions(Value value, Map<String, Quantity> with) {
        List<Level> list = new ArrayList<>();
        if (value.text().isEmpty()) {
            return list;
        }
        try {
            for (Condition c : cache.conditions(value.text(), names(PLACE_ALONE, with))) {
                list.add(new FormulaLevel(
                        c.margin(),
                        FormulaField.arguments(c.margin(), values(with)),
                        Double.NaN,
                        c.text(),
                        Chart.FLAT));
            }
        } catch (FormulaException e) {
            e.faults().forEach(f -> value.fault(f.offset(), f.message()));
        }
        return list;
    }

    // --- with ---

    private Map<String, Value> withValues(Section s) {
        Map<String, Value> values = new LinkedHashMap<>();
        s.find("with").map(Value::section).ifPresent(w -> {
            for (String name : w.names()) {
                Optional<String> refusal = Names.refusal(name);
                if (refusal.isPresent()) {
                    problems.add(w.keyPlace(name), w.path() + "." + name, refusal.get());
                } else {
                    values.put(name, w.at(name));
                }
            }
        });
        return values;
    }

    /** The values of a medium's names: its own, with those of whoever asked laid over them. */
    private Map<String, Quantity> with(Section s, Overrides overrides) {
        Map<String, Quantity> own = new LinkedHashMap<>();
        withValues(s).forEach((name, value) -> own.put(name, value.anyQuantity()));
        overrides.values().forEach((name, value) -> {
            Quantity old = own.get(name);
            if (old == null) {
                value.fault("this medium has no value " + Words.quoted(name) + Words.remedy(name, own.keySet()));
                return;
            }
            Quantity q = value.anyQuantity();
            if (Double.isNaN(q.value())) {
                return;
            }
            Optional<String> refusal = kind(old).refusal(q);
            if (refusal.isPresent()) {
                value.fault(refusal.get());
            } else {
                own.put(name, new Quantity(q.value(), old.dimension(), old.flavour(), q.text()));
            }
        });
        return Collections.unmodifiableMap(own);
    }

    private static Kind kind(Quantity q) {
        return q.flavour() == Flavour.ANGLE ? Kind.ANGLE : Kind.of(q.dimension());
    }

    private static Names names(Set<Coordinate> coordinates, Map<String, Quantity> with) {
        Map<String, Dimension> dimensions = new LinkedHashMap<>();
        with.forEach((name, q) -> dimensions.put(name, q.dimension()));
        return Names.of(coordinates, dimensions);
    }

    private static Map<String, Double> values(Map<String, Quantity> with) {
        Map<String, Double> values = new HashMap<>();
        with.forEach((name, q) -> values.put(name, q.value()));
        return values;
    }
}
