package org.stillpath.ray;

import java.util.ArrayList;
import java.util.HashMap;
import java.util.HashSet;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import org.stillpath.geometry.Displaced;
import org.stillpath.geometry.Displacement;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Quadric;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Medium;
import org.stillpath.medium.SolidMedium;

/**
 * A train as a job declares it: named media and placed surfaces, before the wavelength is known.
 *
 * <p>Surfaces stand as they are drawn, at 20 °C. Those of heated plates that expand freely bulge ({@link Swelling}); how is
 * worked out once, when the plan is made, and does not depend on the wavelength.
 */
public final class TrainPlan {
    private final Medium from;
    private final List<Step> surfaces;
    private final List<Plate> plates;
    private final List<Surface> shapes;

    private TrainPlan(Medium from, List<Step> surfaces) {
        this.from = from;
        this.surfaces = List.copyOf(surfaces);
        this.plates = plates(this.surfaces);
        this.shapes = shapes(this.surfaces, plates);
    }

    /**
     * A train.
     *
     * @param from the medium before the first surface
     * @param surfaces the surfaces in order
     */
    public static TrainPlan of(Medium from, List<Step> surfaces) {
        return new TrainPlan(from, surfaces);
    }

    /** The surfaces in order, as drawn. */
    public List<Step> surfaces() {
        return surfaces;
    }

    /** The solids between two surfaces, in order. */
    public List<Plate> plates() {
        return plates;
    }

    /** The same train with every solid and all air at one temperature in kelvin. */
    public TrainPlan atTemperature(double kelvin) {
        return new TrainPlan(
                from.atTemperature(kelvin),
                surfaces.stream()
                        .map(s -> new Step(s.surface(), s.action(), s.into().map(m -> m.atTemperature(kelvin))))
                        .toList());
    }

    /**
     * One surface.
     *
     * @param surface where it is
     * @param action what it does
     * @param into the medium behind it, where it changes
     */
    public record Step(Surface surface, Action action, Optional<Medium> into) {}

    /** All media in the order in which light meets them, each once. */
    public List<Medium> media() {
        List<Medium> list = new ArrayList<>();
        list.add(from);
        for (Step s : surfaces) {
            s.into().filter(m -> !list.contains(m)).ifPresent(list::add);
        }
        return list;
    }

    /**
     * The train at one wavelength. A medium's frame has its origin at the vertex of the first surface that leads into it
     * (at the centre, if that surface is whole) and the job's axes, unless the medium says otherwise; the medium before the
     * first surface has the job's coordinates. One frame a medium, however often light enters it.
     *
     * @param wavelength vacuum wavelength, metres; NaN where no medium needs one
     */
    public Train at(double wavelength) {
        Map<String, IndexField> fields = new HashMap<>();
        IndexField first = from.field(wavelength, from.frame(Vector.ZERO));
        fields.put(from.name(), first);
        List<Element> elements = new ArrayList<>();
        IndexField now = first;
        for (Step s : surfaces) {
            if (s.into().isPresent()) {
                Medium m = s.into().get();
                now = fields.computeIfAbsent(m.name(), name -> m.field(wavelength, m.frame(origin(s.surface()))));
            }
            elements.add(new Element(shapes.get(elements.size()), s.action(), now));
        }
        return new Train(first, elements);
    }

    private static List<Plate> plates(List<Step> surfaces) {
        List<Plate> list = new ArrayList<>();
        Map<String, Vector> origins = new HashMap<>();
        Optional<Medium> now = Optional.empty();
        int entered = -1;
        for (int i = 0; i < surfaces.size(); i++) {
            Step s = surfaces.get(i);
            boolean face = s.into().isPresent() || s.action() instanceof Action.Reflect;
            if (face && now.isPresent() && now.get() instanceof SolidMedium solid) {
                Frame own = solid.frame(origins.getOrDefault(solid.name(), Vector.ZERO));
                list.add(new Plate(solid, own, entered, i, surfaces.get(entered).surface(), s.surface()));
            }
            if (s.into().isPresent()) {
                now = s.into();
                origins.putIfAbsent(now.get().name(), origin(s.surface()));
            }
            entered = face ? i : entered;
        }
        return List.copyOf(list);
    }

    /** The surfaces as they bulge: each by the plates on its two sides; a plate that light passes twice counts once. */
    private static List<Surface> shapes(List<Step> surfaces, List<Plate> plates) {
        List<Surface> shapes =
                new ArrayList<>(surfaces.stream().map(Step::surface).toList());
        Set<String> done = new HashSet<>();
        for (Plate p : plates) {
            if (!p.medium().free() || p.refusal().isPresent()) {
                continue;
            }
            Swelling swelling = p.swelling();
            double most = swelling.most();
            for (int i : new int[] {p.front(), p.back()}) {
                Surface drawn = surfaces.get(i).surface();
                if (done.add(p.medium().name() + " " + i)) {
                    Surface now = shapes.get(i);
                    Displacement by = swelling.of(drawn, i == p.front());
                    shapes.set(i, new Surface(now.frame(), new Displaced(now.form(), by, most), false, now.aperture()));
                }
            }
        }
        return List.copyOf(shapes);
    }

    private static Vector origin(Surface surface) {
        Frame f = surface.frame();
        boolean centred = surface.whole() && surface.form() instanceof Quadric q && q.g() != 0;
        return centred ? f.toJob(new Vector(0, 0, 1 / ((Quadric) surface.form()).g())) : f.origin();
    }
}
