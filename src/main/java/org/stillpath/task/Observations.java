package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import java.util.OptionalDouble;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;
import org.stillpath.medium.Medium;
import org.stillpath.path.Chord;
import org.stillpath.path.Sightings;
import org.stillpath.ray.Status;
import org.stillpath.task.survey.Classical;
import org.stillpath.task.survey.Reduced;
import org.stillpath.task.survey.Reduction;
import org.stillpath.unit.Display;

/**
 * What the observations of a sight give.
 *
 * @param point the point looked at, with what was unknown of it; empty where the observed ray does not lead anywhere
 * @param reduced the reductions
 * @param warnings what looks wrong about them, in words
 */
record Observations(Optional<Sight.Point> point, List<Reduced> reduced, List<String> warnings) {
    /** Heights that differ by so much may be above the geoid and above the ellipsoid, metres. Common practice, no source. */
    private static final double LEAST_UNDULATION = 5;

    private static final double MOST_UNDULATION = 120;

    /** Reduces the observations, if there are any. */
    static Observations of(Scene scene, SightlineTask.Setting setting, Sight sight, Sight.Point asked) {
        if (sight.observed().isEmpty()) {
            return new Observations(Optional.of(asked), List.of(), List.of());
        }
        return new Work(scene, setting, sight, asked, sight.observed().get()).run();
    }

    private static final class Work {
        private final Scene scene;
        private final SightlineTask.Setting setting;
        private final Sight sight;
        private final Sight.Point asked;
        private final Sight.Observed observed;
        private final double radius;
        private final List<Reduced> reduced = new ArrayList<>();
        private final List<String> warnings = new ArrayList<>();

        Work(Scene scene, SightlineTask.Setting setting, Sight sight, Sight.Point asked, Sight.Observed observed) {
            this.scene = scene;
            this.setting = setting;
            this.sight = sight;
            this.asked = asked;
            this.observed = observed;
            this.radius = setting.chart().radius();
        }

        Observations run() {
            Optional<Reduction.Found> found = found();
            boolean unknown = asked.height().isEmpty();
            if (unknown && found.isEmpty()) {
                warnings.add("the ray of the observed zenith angle does not get as far as the observed distance");
                return new Observations(Optional.empty(), reduced, warnings);
            }
            Sight.Point point = unknown ? filled(found.orElseThrow()) : asked;
            if (found.isPresent()) {
                heights(found.get(), unknown);
                if (unknown) {
                    Reduction.Found f = found.get();
                    reduced.add(0, new Reduced("target-height", f.height(), f.error(), Double.NaN, "m", ""));
                    reduced.add(1, new Reduced("target-distance", f.distance(), f.error(), Double.NaN, "m", ""));
                }
            }
            if (observed.back().isPresent() && observed.zenith().isPresent()) {
                reduced.addAll(new Reduction(setting.sightings(), radius, sight.eye())
                        .reciprocal(
                                point.distance().orElseThrow(),
                                observed.zenith().getAsDouble(),
                                observed.back().getAsDouble(),
                                point.height().orElseThrow(),
                                sight.mark(),
                                point.target()));
            }
            if (!unknown) {
                packed(point);
            }
            return new Observations(Optional.of(point), reduced, warnings);
        }

        private Sight.Point filled(Reduction.Found f) {
            if (asked.distance().isPresent()) {
                double given = asked.distance().getAsDouble();
                double off = Math.abs(given - f.distance());
                if (off > 0.05 + 1e-5 * given) {
                    warnings.add("the observed slope distance leads to a point "
                            + Display.of(f.distance(), "m", 1e-3) + " along the datum, the job says "
                            + Display.of(given, "m", 1e-3) + "; the observed one is taken");
                }
            }
            return new Sight.Point(
                    OptionalDouble.of(f.distance()),
                    OptionalDouble.of(f.height() - asked.target()),
                    asked.target(),
                    asked.span());
        }

        /** The point to which the observations lead; empty where they do not lead to one. */
        private Optional<Reduction.Found> found() {
            OptionalDouble slope = observed.slope();
            if (observed.zenith().isEmpty()) {
                if (slope.isPresent()
                        && sight.meter().isPresent()
                        && asked.height().isPresent()) {
                    // the direction of the first image will do: a distance hardly depends on it
                    Chord chord = chord(asked);
                    return signal(0.5 * Math.PI - launch(chord), slope.getAsDouble());
                }
                return Optional.empty();
            }
            double zenith = observed.zenith().getAsDouble();
            if (slope.isPresent()) {
                return sight.meter().isPresent()
                        ? signal(zenith, slope.getAsDouble())
                        : new Reduction(setting.sightings(), radius, sight.eye()).byChord(zenith, slope.getAsDouble());
            }
            if (asked.distance().isEmpty()) {
                return Optional.empty();
            }
            double d = asked.distance().getAsDouble();
            Sightings.Reached r = setting.sightings().reach(sight.eye(), 0.5 * Math.PI - zenith, d);
            if (r.status() != Status.ARRIVED) {
                return Optional.empty();
            }
            double chord = new Chord(radius, sight.eye(), d, r.height()).length();
            return Optional.of(new Reduction.Found(d, r.height(), chord, r.length(), r.arrival(), r.heightError()));
        }

        private double launch(Chord chord) {
            return setting.sightings().find(chord.fromHeight(), chord.distance(), chord.toHeight()).images().stream()
                    .findFirst()
                    .map(s -> s.launch())
                    .orElse(chord.elevation());
        }

        private Chord chord(Sight.Point p) {
            return new Chord(
                    radius, sight.eye(), p.distance().orElseThrow(), p.height().orElseThrow());
        }

        /** Reduces a displayed distance. */
        private Optional<Reduction.Found> signal(double zenith, double displayed) {
            Sight.Meter meter = sight.meter().orElseThrow();
            Medium m = scene.through().orElseThrow();
            IndexField phase = m.field(meter.wavelength(), m.frame(Vector.ZERO), setting.chart());
            Optional<IndexField> known = m.groupField(meter.wavelength(), m.frame(Vector.ZERO), setting.chart());
            if (known.isEmpty()) {
                warnings.add(
                        "medium `" + m.name() + "` does not say how its index depends on the wavelength; its phase "
                                + "index stands for the group index of the distance meter");
            }
            m.warningsAt(meter.wavelength()).stream()
                    .map(w -> "distance meter: " + w)
                    .forEach(warnings::add);
            IndexField group = known.orElse(phase);
            double raw = displayed / (1 + meter.set()) + meter.constant();
            double path = raw * (1 + meter.reference());
            Reduction reduction =
                    new Reduction(Sightings.through(phase, setting.chart(), scene.accuracy()), radius, sight.eye());
            Optional<Reduction.Found> found = reduction.bySignal(zenith, path, phase, group);
            found.ifPresent(f -> {
                double x = new Chord(radius, sight.eye(), f.distance(), f.height()).x();
                double z = new Chord(radius, sight.eye(), f.distance(), f.height()).z();
                double ends =
                        0.5 * (Reduction.refractivity(group, 0, sight.eye()) + Reduction.refractivity(group, x, z));
                if (!setting.earth().flat()) {
                    reduced.addAll(reduction.distance(raw, meter.reference(), ends, f, Classical.USUAL_K));
                }
                alreadySet(meter, raw, f, Classical.firstVelocity(raw, meter.reference(), ends), displayed);
            });
            return found;
        }

        /** A distance that fits the heights and distance given only if the correction had been made already. */
        private void alreadySet(Sight.Meter meter, double raw, Reduction.Found f, double first, double displayed) {
            if (asked.height().isEmpty() || asked.distance().isEmpty() || Math.abs(first) < 1e-3) {
                return;
            }
            double geometric = chord(asked).length();
            double corrected = Math.abs(f.chord() - geometric);
            double shown = Math.abs(displayed + meter.constant() - geometric);
            if (shown < 0.3 * Math.abs(first) && corrected > 0.7 * Math.abs(first)) {
                warnings.add(
                        "the displayed distance fits the given points as it stands, and no longer after the first velocity "
                                + "correction of " + Display.of(first, "m", 1e-4)
                                + ": the refractivity may have been set in the "
                                + "instrument already; say so with `set`");
            }
            if (!meter.setGiven() && Math.abs(raw - displayed - meter.constant()) > 0) {
                throw new IllegalStateException("a correction that was not given was taken off");
            }
        }

        /** Height differences from mark to mark. */
        private void heights(Reduction.Found f, boolean unknown) {
            double exact = f.height() - asked.target() - sight.mark();
            if (observed.zenith().isEmpty()) {
                return;
            }
            double zenith = observed.zenith().getAsDouble();
            double slope = f.chord();
            double classical = Classical.heightDifference(
                    slope, zenith, Classical.USUAL_K, radius, sight.instrument(), asked.target());
            reduced.add(
                    0,
                    new Reduced(
                            "height-difference",
                            exact,
                            f.error(),
                            classical,
                            "m",
                            "s cos z + (1 - k)(s sin z)^2/(2R) + hi - ht, k = 0.13"));
            if (!setting.earth().flat()) {
                double k = setting.sightings().coefficient(0.5 * f.distance(), 0.5 * (sight.eye() + f.height()));
                if (!Double.isNaN(k)) {
                    reduced.add(
                            1,
                            new Reduced(
                                    "height-difference-by-gradient",
                                    Classical.heightDifference(
                                            slope, zenith, k, radius, sight.instrument(), asked.target()),
                                    0,
                                    Double.NaN,
                                    "m",
                                    String.format(
                                            Locale.ROOT, "the same with k = %.4f from the gradient half-way", k)));
                }
            }
            if (!unknown) {
                double off = Math.abs(f.height() - asked.height().orElseThrow());
                if (off > LEAST_UNDULATION && off < MOST_UNDULATION) {
                    warnings.add("the observed zenith angle leads to a height "
                            + Display.of(off, "m", 0.01)
                            + " from the one given: one of the heights may be above the ellipsoid "
                            + "and the other above the geoid");
                }
            }
        }

        /** A zenith angle that fits the given heights far better when its digits are degrees, minutes and seconds. */
        private void packed(Sight.Point point) {
            if (observed.packed().isEmpty() || observed.zenith().isEmpty()) {
                return;
            }
            double expected = 0.5 * Math.PI - launch(chord(point));
            double asIs = Math.abs(observed.zenith().getAsDouble() - expected);
            double other = Math.abs(observed.packed().getAsDouble() - expected);
            if (asIs > Math.toRadians(0.01) && other < 0.1 * asIs) {
                warnings.add(String.format(
                        Locale.ROOT,
                        "the zenith angle of %.6f deg fits the given heights only if its digits are degrees, minutes and seconds "
                                + "(%.6f deg); write it with the signs of minutes and seconds, or in decimals of a degree",
                        Math.toDegrees(observed.zenith().getAsDouble()),
                        Math.toDegrees(observed.packed().getAsDouble())));
            }
        }
    }
}
