package org.stillpath.ray;

import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Quadric;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Medium;

/**
 * A train as a job declares it: named media and placed surfaces, before the wavelength is known.
 *
 * @param from the medium before the first surface
 * @param surfaces the surfaces in order
 */
public record TrainPlan(Medium from, List<Step> surfaces) {
    public TrainPlan {
        surfaces = List.copyOf(surfaces);
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
            elements.add(new Element(s.surface(), s.action(), now));
        }
        return new Train(first, elements);
    }

    private static Vector origin(Surface surface) {
        Frame f = surface.frame();
        boolean centred = surface.whole() && surface.form() instanceof Quadric q && q.g() != 0;
        return centred ? f.toJob(new Vector(0, 0, 1 / ((Quadric) surface.form()).g())) : f.origin();
    }
}
