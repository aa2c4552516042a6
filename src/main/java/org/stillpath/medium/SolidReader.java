package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.job.Section;
import org.stillpath.job.Sources;
import org.stillpath.job.Value;
import org.stillpath.problem.Problems;
import org.stillpath.unit.Dimension;
import org.stillpath.unit.Kind;

/**
 * Reads the {@code solid:} of a medium: its material, its temperature, whether it expands freely, and constants of one's
 * own in place of the material's.
 */
final class SolidReader {
    private static final Kind PER_KELVIN = Kind.of(Dimension.TEMPERATURE.power(-1, 1));

    private final FieldReader fields;
    private final NodesReader nodes;
    private final Sources sources;
    private final Problems problems;

    SolidReader(FieldReader fields, NodesReader nodes, Sources sources, Problems problems) {
        this.fields = fields;
        this.nodes = nodes;
        this.sources = sources;
        this.problems = problems;
    }

    /** The medium; empty after a fault. */
    Optional<Medium> medium(Declaration declaration, Section s) {
        List<String> notes = new ArrayList<>();
        Optional<Material> material = MaterialReader.named(s.need("material", "fused-silica"), sources, problems)
                .map(m -> own(m, s));
        Optional<ScalarField> temperature = s.find("temperature")
                .map(v -> temperature(v, notes))
                .orElse(Optional.of(new Constant(SolidMedium.SIZED_AT)));
        boolean free = s.find("expansion")
                .map(v -> v.word("free", "none").equals("free"))
                .orElse(false);
        double diameter = s.find("diameter").map(v -> v.positive(Kind.LENGTH)).orElse(Double.NaN);
        if (free && !s.has("diameter")) {
            s.fault(
                    "expansion",
                    "a free plate needs its `diameter`, such as 50 mm: the mean temperature of all of it "
                            + "decides how its faces bulge");
        }
        if (!s.has("expansion") && temperature.filter(t -> !t.isConstant()).isPresent()) {
            notes.add("medium `" + declaration.name() + "` does not say whether it expands: its faces stay where they "
                    + "are; `expansion: free` lets a heated plate bulge");
        }
        s.finish();
        if (material.isEmpty() || temperature.isEmpty() || (free && !(diameter > 0))) {
            return Optional.empty();
        }
        Material m = material.get();
        if (free && m.elastic().expansion() == 0) {
            notes.add("medium `" + declaration.name() + "`: " + m.name() + " has no expansion, and its faces stay");
        }
        Declaration told = declaration.withSource(m.source()).withWarnings(notes);
        Declaration ranged = new Declaration(
                told.name(),
                told.origin(),
                told.axis(),
                told.valid(),
                Optional.of(m.wavelengths()),
                told.source(),
                told.warnings());
        return Optional.of(new SolidMedium(ranged, m, temperature.get(), free, diameter));
    }

    /** The material with what the job says of the very piece at hand; a stated value has no uncertainty of its own. */
    private static Material own(Material m, Section s) {
        Optional<Double> slope = s.find("dn-dt").map(v -> v.quantity(PER_KELVIN));
        Optional<Double> expansion = s.find("expansion-coefficient").map(v -> v.quantity(PER_KELVIN));
        Optional<Double> poisson = s.find("poisson-ratio").map(Value::number);
        if (poisson.filter(p -> !(p > -1 && p <= 0.5)).isPresent()) {
            s.fault("poisson-ratio", "Poisson's ratio lies between -1 and 0.5");
            return m;
        }
        if (slope.filter(v -> v.isNaN()).isPresent()
                || expansion.filter(v -> v.isNaN()).isPresent()) {
            return m;
        }
        SolidLaw law = slope.<SolidLaw>map(v -> new GivenSlope(m.law(), v, SolidMedium.SIZED_AT))
                .orElse(m.law());
        return m.with(
                law,
                new Material.Elastic(
                        expansion.orElse(m.elastic().expansion()),
                        poisson.orElse(m.elastic().poisson())),
                new Material.Uncertainty(
                        slope.isPresent() ? 0 : m.uncertainty().slope(),
                        expansion.isPresent() ? 0 : m.uncertainty().expansion()));
    }

    private Optional<ScalarField> temperature(Value v, List<String> notes) {
        if (v.isSection() && v.section().has("nodes")) {
            Section s = v.section();
            Optional<TableReader.Read> read = nodes.nodes(s.at("nodes").section(), Kind.TEMPERATURE);
            s.finish();
            read.ifPresent(r -> notes.addAll(r.notes()));
            return read.map(TableReader.Read::field);
        }
        return fields.field(v, Kind.TEMPERATURE, Interpolation.SPLINE, notes);
    }
}
