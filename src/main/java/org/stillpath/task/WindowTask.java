package org.stillpath.task;

import java.util.List;
import java.util.Optional;
import org.stillpath.job.Section;
import org.stillpath.job.Value;
import org.stillpath.unit.Kind;
import org.stillpath.wave.Pupil;

/**
 * The task {@code window}: what a train does to a collimated beam, against no train or against the same train at one
 * temperature.
 */
final class WindowTask implements Task {
    private static final Pupil USUAL = new Pupil(10, 20);
    private static final double USUAL_TRUNCATION = 1.5;
    private static final double STEEPEST = Math.toRadians(89);
    private static final List<String> FIGURES = List.of("temperature", "wavefront", "zernike");

    @Override
    public String name() {
        return "window";
    }

    @Override
    public Plan read(Section job, Scene scene) {
        double incidence = job.find("incidence").map(WindowTask::angle).orElse(0.0);
        Optional<WindowBeam> beam = beam(job.need("beam", "{diameter: 20 mm}").section(), incidence);
        Pupil sampling = job.find("sampling").map(Pupil::read).orElse(USUAL);
        Optional<Double> reference = job.find("reference").flatMap(WindowTask::reference);
        if (scene.train().isEmpty()) {
            job.fault(
                    scene.through().isPresent() ? "through" : "task",
                    "a window has faces; give a \"train\" with its surfaces");
        }
        Figures figures = Figures.read(job, scene, FIGURES, FIGURES);
        return options -> new WindowRun(
                        scene, beam.orElseThrow(), sampling, reference, options.figures() ? figures.names() : List.of())
                .result();
    }

    private static double angle(Value v) {
        double a = v.quantity(Kind.ANGLE);
        if (Math.abs(a) > STEEPEST) {
            v.fault("an incidence from -89 deg to 89 deg is needed");
            return 0;
        }
        return Double.isNaN(a) ? 0 : a;
    }

    private static Optional<WindowBeam> beam(Section s, double incidence) {
        double diameter = s.need("diameter", "20 mm").positive(Kind.LENGTH);
        boolean gaussian = s.find("profile")
                .map(v -> v.word("uniform", "gaussian").equals("gaussian"))
                .orElse(false);
        Optional<Value> truncate = s.find("truncate");
        double truncation = truncate.map(v -> v.positive(Kind.NUMBER)).orElse(USUAL_TRUNCATION);
        if (truncate.isPresent() && !gaussian) {
            truncate.get().fault("a uniform beam ends at its diameter; `truncate` belongs to `profile: gaussian`");
        }
        if (truncation > 4) {
            s.fault("truncate", "beyond 4 beam radii there is no light; a number such as 1.5 is needed");
        }
        double[] centre = {0, 0};
        Optional<Value> said = s.find("centre");
        if (said.isPresent()) {
            List<Value> items = said.get().items();
            if (said.get().isList() && items.size() != 2) {
                said.get().fault(items.size() + " values stand here; two lengths such as [1 mm, 0] are needed");
            }
            for (int i = 0; i < Math.min(2, items.size()); i++) {
                centre[i] = items.get(i).quantity(Kind.LENGTH);
            }
        }
        s.finish();
        boolean sound = diameter > 0 && truncation > 0 && truncation <= 4 && Double.isFinite(centre[0] + centre[1]);
        return sound
                ? Optional.of(new WindowBeam(0.5 * diameter, gaussian, truncation, centre[0], centre[1], incidence))
                : Optional.empty();
    }

    /** The reference's temperature in kelvin; none where the beam is held against no train. */
    private static Optional<Double> reference(Value v) {
        if (!v.isSection()) {
            v.word("none");
            return Optional.empty();
        }
        Section s = v.section();
        double kelvin = s.need("temperature", "20 degC").positive(Kind.TEMPERATURE);
        s.finish();
        return Double.isNaN(kelvin) ? Optional.empty() : Optional.of(kelvin);
    }
}
