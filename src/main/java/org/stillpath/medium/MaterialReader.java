package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.job.Node;
import org.stillpath.job.Section;
import org.stillpath.job.Sources;
import org.stillpath.job.Value;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.unit.Dimension;
import org.stillpath.unit.Kind;

/** Reads materials: files of {@code media-models/materials}, and users' own of the same form. */
public final class MaterialReader {
    /** Folder of the shipped materials; in a job their names stand without it. */
    public static final String SHIPPED = "materials/";

    private static final Dimension AREA = Dimension.LENGTH.power(2, 1);
    /** 20 °C, where nothing else is said: the reference temperature of catalogues and of lengths (ISO 1). */
    private static final double USUAL = Sellmeier.Thermal.ABOUT;

    private MaterialReader() {}

    /** Whether a document is a material rather than a medium. */
    public static boolean isOne(Node.Mapping document) {
        return document.find("sellmeier").isPresent() || document.find("law").isPresent();
    }

    /**
     * A material file with what its source says of it.
     *
     * @param material what it says
     * @param note in words, what one should know before using it; empty where nothing is said
     * @param samples indices that the source gives
     */
    public record File(Material material, String note, List<Sample> samples) {
        public File {
            samples = List.copyOf(samples);
        }
    }

    /**
     * A published index.
     *
     * @param wavelength vacuum wavelength, metres
     * @param temperature kelvin
     * @param index absolute
     * @param slope dn/dT of the absolute index, 1/K
     */
    public record Sample(double wavelength, double temperature, double index, double slope) {}

    /**
     * Reads the material that a job names.
     *
     * @param value its name: {@code fused-silica}, or a file {@code ./mine.yaml}
     * @param sources gives the file
     * @param problems collects faults
     * @return empty after a fault
     */
    static Optional<Material> named(Value value, Sources sources, Problems problems) {
        String name = value.text();
        if (name.isEmpty()) {
            return Optional.empty();
        }
        boolean own = name.contains("/") || name.endsWith(".yaml") || name.endsWith(".yml");
        String file = own ? name : SHIPPED + name;
        Node.Mapping document;
        try {
            document = sources.document(file, value.place());
        } catch (ProblemException e) {
            for (Problem p : e.problems()) {
                boolean here = p.place().equals(value.place());
                problems.add(here ? new Problem(p.kind(), p.place(), value.path(), p.message()) : p);
            }
            return Optional.empty();
        }
        Problems faults = new Problems();
        File read = of(name, document, faults);
        faults.list().forEach(problems::add);
        return faults.isEmpty() ? Optional.of(read.material()) : Optional.empty();
    }

    /**
     * Reads a material file.
     *
     * @param name as it was asked for
     * @param document the file
     * @param problems collects faults; what is returned then stands in for what was meant
     */
    public static File of(String name, Node.Mapping document, Problems problems) {
        Section s = Section.of(document, "", problems);
        String title = s.need("title", "\"Fused silica\"").text();
        String source = s.need("source", "\"Malitson, J. Opt. Soc. Am. 55 (1965) 1205\"")
                .text();
        String note = s.find("note").map(Value::text).orElse("");
        Optional<? extends SolidLaw> law = s.has("law") ? water(s) : sellmeier(s);
        double expansion =
                s.find("expansion").map(v -> quantity(v, perKelvin(1))).orElse(0.0);
        double poisson = s.find("poisson-ratio").map(Value::number).orElse(0.0);
        if (!(poisson > -1 && poisson <= 0.5) && !Double.isNaN(poisson)) {
            s.fault("poisson-ratio", "Poisson's ratio lies between -1 and 0.5");
            poisson = 0;
        }
        Section u = s.need("uncertainty", "{slope: 5 %, expansion: 5 %}").section();
        double slope = u.need("slope", "5 %").nonNegative(Kind.NUMBER);
        double ofExpansion =
                u.find("expansion").map(v -> v.nonNegative(Kind.NUMBER)).orElse(0.0);
        u.finish();
        Section r = s.need("range", "{wavelength: [0.21 um, 3.71 um], temperature: [-40 degC, 80 degC]}")
                .section();
        double[] wavelengths = two(r.need("wavelength", "[0.21 um, 3.71 um]"), Kind.LENGTH);
        double[] temperatures = two(r.need("temperature", "[-40 degC, 80 degC]"), Kind.TEMPERATURE);
        r.finish();
        List<Sample> samples = new ArrayList<>();
        s.find("samples").map(Value::items).orElse(List.of()).forEach(v -> samples.add(sample(v.section())));
        s.finish();
        boolean sound = problems.isEmpty();
        Material material = new Material(
                name,
                title,
                source,
                law.<SolidLaw>map(l -> l).orElseGet(WaterLaw::new),
                sound ? new Material.Elastic(expansion, poisson) : new Material.Elastic(0, 0),
                sound ? new Material.Uncertainty(slope, ofExpansion) : new Material.Uncertainty(0, 0),
                sound
                        ? new Declaration.WavelengthRange(wavelengths[0], wavelengths[1])
                        : new Declaration.WavelengthRange(1e-7, 1e-5),
                sound ? temperatures[0] : 1,
                sound ? temperatures[1] : 2);
        return new File(material, note, sound ? samples : List.of());
    }

    private static Optional<WaterLaw> water(Section s) {
        String word = s.at("law").word("iapws-r9-97");
        for (String key : List.of("sellmeier", "thermal")) {
            if (s.has(key)) {
                s.fault(key, "`law` gives the index already; leave one of them out");
            }
        }
        return word.isEmpty() ? Optional.empty() : Optional.of(new WaterLaw());
    }

    private static Optional<Sellmeier> sellmeier(Section s) {
        Section d = s.need("sellmeier", "{terms: [{strength: 0.6961663, resonance: 0.0684043 um}]}")
                .section();
        boolean inAir = d.find("relative-to").map(v -> v.word("air")).orElse("").equals("air");
        double temperature =
                d.find("temperature").map(v -> v.positive(Kind.TEMPERATURE)).orElse(USUAL);
        List<Double> constant =
                d.find("constant").map(v -> polynomial(v, Dimension.NONE)).orElse(List.of(1.0));
        List<Sellmeier.Term> terms = new ArrayList<>();
        for (Value v : d.need("terms", "[{strength: 0.6961663, resonance: 0.0684043 um}]")
                .items()) {
            terms.add(term(v.section()));
        }
        d.finish();
        Optional<Sellmeier.Thermal> thermal = s.find("thermal").map(v -> thermal(v.section()));
        boolean varying = constant.size() > 1 || terms.stream().anyMatch(Sellmeier.Term::varies);
        if (thermal.isPresent() && varying) {
            s.fault("thermal", "the terms depend on the temperature already; leave `thermal` out");
            return Optional.empty();
        }
        boolean sound = s.problems().isEmpty() && !terms.isEmpty() && !constant.isEmpty();
        return sound ? Optional.of(new Sellmeier(constant, terms, temperature, inAir, thermal)) : Optional.empty();
    }

    private static Sellmeier.Term term(Section s) {
        List<Double> strength = polynomial(s.need("strength", "0.6961663"), Dimension.NONE);
        List<Double> squared;
        if (s.has("resonance")) {
            if (s.has("resonance-squared")) {
                s.fault("resonance-squared", "`resonance` stands here already; leave one of them out");
            }
            double l = s.at("resonance").quantity(Kind.LENGTH);
            squared = List.of(l * l);
        } else {
            squared = polynomial(s.need("resonance-squared", "0.00600069867 um^2"), AREA);
        }
        s.finish();
        return new Sellmeier.Term(strength, squared);
    }

    private static Sellmeier.Thermal thermal(Section s) {
        double d0 = quantity(s.need("d0", "1.86e-6 1/K"), perKelvin(1));
        double d1 = s.find("d1").map(v -> quantity(v, perKelvin(2))).orElse(0.0);
        double d2 = s.find("d2").map(v -> quantity(v, perKelvin(3))).orElse(0.0);
        double e0 = s.find("e0").map(v -> quantity(v, AREA.times(perKelvin(1)))).orElse(0.0);
        double e1 = s.find("e1").map(v -> quantity(v, AREA.times(perKelvin(2)))).orElse(0.0);
        double l = s.find("resonance").map(v -> v.quantity(Kind.LENGTH)).orElse(0.0);
        s.finish();
        return new Sellmeier.Thermal(d0, d1, d2, e0, e1, l);
    }

    /** A number, or a list of coefficients of ascending powers of the temperature in kelvin. */
    private static List<Double> polynomial(Value v, Dimension dimension) {
        if (!v.isList()) {
            return List.of(quantity(v, dimension));
        }
        List<Double> list = new ArrayList<>();
        for (Value item : v.items()) {
            list.add(quantity(item, dimension.times(perKelvin(list.size()))));
        }
        return list;
    }

    private static Dimension perKelvin(int power) {
        return Dimension.TEMPERATURE.power(-power, 1);
    }

    private static double quantity(Value v, Dimension dimension) {
        return v.quantity(Kind.of(dimension));
    }

    private static double[] two(Value v, Kind kind) {
        List<Value> items = v.items();
        double[] ends = {
            items.size() == 2 ? items.get(0).positive(kind) : Double.NaN,
            items.size() == 2 ? items.get(1).positive(kind) : Double.NaN
        };
        if ((items.size() != 2 && v.isList()) || ends[0] >= ends[1]) {
            v.fault("two are needed, the smaller first");
        }
        return ends;
    }

    private static Sample sample(Section s) {
        double wavelength = s.need("wavelength", "587.5618 nm").positive(Kind.LENGTH);
        double temperature =
                s.find("temperature").map(v -> v.positive(Kind.TEMPERATURE)).orElse(USUAL);
        double index = s.need("index", "1.45846").positive(Kind.NUMBER);
        double slope = s.need("slope", "8.3e-6 1/K").quantity(Kind.of(perKelvin(1)));
        s.finish();
        return new Sample(wavelength, temperature, index, slope);
    }
}
