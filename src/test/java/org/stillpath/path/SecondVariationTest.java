package org.stillpath.path;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.Random;
import org.junit.jupiter.api.Test;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Quadric;
import org.stillpath.geometry.Surface;
import org.stillpath.geometry.Vector;
import org.stillpath.medium.IndexField;
import org.stillpath.ray.Action;
import org.stillpath.ray.Columns;
import org.stillpath.ray.Element;
import org.stillpath.ray.Ending;
import org.stillpath.ray.Fields;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.ray.Train;

/**
 * The inertia of the reduced second variation is the number of conjugate points (Morse's index theorem), through media,
 * refractions and mirrors. Every ray is a stationary path between its start and any of its points, so none needs searching.
 */
class SecondVariationTest {
    private static final int RAYS = 400;

    @Test
    void agreesWithConjugatePointsOverRandomMediaAndTrains() {
        Random r = new Random(20261201);
        int counted = 0;
        int most = 0;
        int surfaces = 0;
        for (int i = 0; i < RAYS; i++) {
            Train train = train(r);
            Vector direction = new Vector(0.3 * (r.nextDouble() - 0.5), 0.3 * (r.nextDouble() - 0.5), 1).unit();
            double length = 4 + 30 * r.nextDouble();
            boolean planar = i % 4 == 0;
            Optional<Vector> normal = planar ? Optional.of(new Vector(1, 0, 0)) : Optional.empty();
            if (planar) {
                direction = new Vector(0, direction.y(), direction.z()).unit();
                train = flattened(train, r);
            }
            Columns columns = normal.map(Columns.RAY::in).orElse(Columns.RAY).withConjugates();
            Traced ray = new Tracer(
                            train, new Ending.AtLength(length), new Tracer.Settings(1e-10, true, false, columns, 100))
                    .trace(RayStart.of(Vector.ZERO, direction));
            if (ray.status() != Status.ARRIVED) {
                continue;
            }
            int index = ray.conjugates().length;
            Optional<SecondVariation.Counts> counts =
                    SecondVariation.of(train, Vector.ZERO, direction, ray.length(), normal);
            assertThat(counts).as("ray " + i).isPresent();
            assertThat(counts.get().negative())
                    .as("ray " + i + " through " + train.elements().size() + " surfaces, " + length + " m")
                    .isEqualTo(index);
            counted++;
            most = Math.max(most, index);
            surfaces += train.elements().size();
        }
        assertThat(counted).isGreaterThan(RAYS / 3);
        assertThat(most).isGreaterThan(3);
        assertThat(surfaces).isGreaterThan(counted);
    }

    /** Random lenses and mirrors, with a rod, bumps or a uniform medium behind each. */
    private static Train train(Random r) {
        List<Element> elements = new ArrayList<>();
        IndexField first = medium(r);
        IndexField now = first;
        double z = 0;
        boolean back = false;
        int count = r.nextInt(5);
        for (int i = 0; i < count; i++) {
            z += (back ? -1 : 1) * (1 + 2 * r.nextDouble());
            double curvature = 0.35 * (2 * r.nextDouble() - 1);
            Surface surface = new Surface(
                    Frame.at(new Vector(0, 0, z)),
                    new Quadric(curvature, curvature, curvature * (1 + r.nextDouble() - 0.5)),
                    false,
                    3);
            if (r.nextInt(3) == 0) {
                elements.add(new Element(surface, new Action.Reflect(), now));
                back = !back;
            } else {
                now = medium(r);
                elements.add(new Element(surface, new Action.Refract(r.nextBoolean()), now));
            }
        }
        return new Train(first, elements);
    }

    private static IndexField medium(Random r) {
        return switch (r.nextInt(3)) {
            case 0 -> Fields.uniform(1 + r.nextDouble());
            case 1 -> Fields.oscillator(1.6, 0.12 + 0.2 * r.nextDouble(), 0);
            default ->
                Fields.bumps(1.5, new double[][] {
                    {r.nextDouble() - 0.5, r.nextDouble() - 0.5, 6 * r.nextDouble(), r.nextDouble() - 0.3, 1},
                    {r.nextDouble() - 0.5, r.nextDouble() - 0.5, 6 * r.nextDouble(), r.nextDouble() - 0.3, 1}
                });
        };
    }

    /** The same surfaces in media that have the plane x = 0 as a plane of symmetry. */
    private static Train flattened(Train train, Random r) {
        List<Element> elements = new ArrayList<>();
        IndexField first = Fields.oscillator(1.5, 0.2 * r.nextDouble(), 0);
        IndexField now = first;
        for (Element e : train.elements()) {
            if (e.action() instanceof Action.Refract) {
                now = Fields.bumps(1.4, new double[][] {{0, r.nextDouble() - 0.5, 6 * r.nextDouble(), 0.6, 1}});
            }
            elements.add(new Element(e.surface(), e.action(), now));
        }
        return new Train(first, elements);
    }
}
