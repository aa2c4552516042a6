package org.stillpath.task;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import org.stillpath.geometry.Vector;
import org.stillpath.job.Section;
import org.stillpath.job.Sources;
import org.stillpath.job.Value;
import org.stillpath.medium.Media;
import org.stillpath.medium.MediaMemory;
import org.stillpath.medium.MediaReader;
import org.stillpath.medium.Medium;
import org.stillpath.ray.Plate;
import org.stillpath.ray.Train;
import org.stillpath.ray.TrainPlan;
import org.stillpath.ray.TrainReader;
import org.stillpath.unit.Display;
import org.stillpath.unit.Kind;

/**
 * What every task's job has: title, wavelengths, accuracy, media, and a train or one medium everywhere.
 *
 * @param title shown on plots and reports; may be empty
 * @param wavelengths vacuum wavelengths, metres, one or more
 * @param wavelengthGiven whether the job gave them, or the default stands in
 * @param accuracy asked accuracy
 * @param train the train; absent where one medium is everywhere
 * @param through the medium that is everywhere; absent where there is a train
 * @param figures names of the figures asked for; absent: the task's usual ones
 * @param sources files that the job may name
 * @param memory what it has in common with jobs that differ in some values only
 */
public record Scene(
        String title,
        double[] wavelengths,
        boolean wavelengthGiven,
        double accuracy,
        Optional<TrainPlan> train,
        Optional<Medium> through,
        Optional<List<Value>> figures,
        Sources sources,
        MediaMemory memory) {
    /** The helium d line, the usual reference of catalogues, for jobs that name no wavelength. */
    private static final double D_LINE = 587.5618e-9;

    private static final double DEFAULT_ACCURACY = 1e-9;
    private static final double LEAST_ACCURACY = 1e-13;
    private static final double MOST_ACCURACY = 1e-2;
    private static final int MOST_WAVELENGTHS = 100;
    /** Figures that belong to a study of the job. */
    private static final List<String> STUDY_FIGURES = List.of("sweep", "batch", "budget", "fit");

    private static final int LONGEST_TITLE = 500;

    public Scene {
        wavelengths = wavelengths.clone();
    }

    /** The wavelengths (a copy). */
    @Override
    public double[] wavelengths() {
        return wavelengths.clone();
    }

    /** The first wavelength, to which a result refers where nothing else is said, metres. */
    public double wavelength() {
        return wavelengths[0];
    }

    /** The train at one wavelength; without surfaces where one medium is everywhere. */
    public Train trainAt(double wavelength) {
        if (train.isPresent()) {
            return train.get().at(wavelength);
        }
        Medium m = through.orElseThrow();
        return Train.through(m.field(wavelength, m.frame(Vector.ZERO)));
    }

    /** The same scene in another medium everywhere. */
    Scene in(Medium other) {
        return new Scene(
                title, wavelengths, wavelengthGiven, accuracy, train, Optional.of(other), figures, sources, memory);
    }

    /** What the media and the choice of wavelength make doubtful. */
    public List<String> warnings() {
        List<String> list = new ArrayList<>();
        List<Medium> media = train.map(TrainPlan::media).orElseGet(() -> List.of(through.orElseThrow()));
        boolean needed = media.stream().anyMatch(Medium::needsWavelength);
        if (needed && !wavelengthGiven) {
            list.add("no wavelength is given; " + Display.in(D_LINE, "nm", 0.01e-9) + " (the helium d line) is taken");
        }
        for (Medium m : media) {
            list.addAll(m.warnings());
            if (needed || wavelengthGiven) {
                Arrays.stream(wavelengths)
                        .forEach(w -> m.warningsAt(w).stream()
                                .filter(t -> !list.contains(t))
                                .forEach(list::add));
            }
        }
        train.ifPresent(t -> t.plates().forEach(p -> {
            Plate.Span met = p.span(p.radius());
            p.medium().warningsBetween(met.coldest(), met.hottest()).stream()
                    .filter(w -> !list.contains(w))
                    .forEach(list::add);
        }));
        return List.copyOf(list);
    }

    static Scene read(Section job, Sources sources, MediaMemory memory) {
        String title = job.find("title").map(Value::text).orElse("");
        if (title.length() > LONGEST_TITLE) {
            job.fault("title", "a title may have " + LONGEST_TITLE + " characters; this one has " + title.length());
            title = "";
        }
        Optional<Value> wavelength = job.find("wavelength");
        double[] wavelengths = wavelength.map(Scene::wavelengths).orElse(new double[] {D_LINE});
        double accuracy = job.find("accuracy").map(Scene::accuracy).orElse(DEFAULT_ACCURACY);
        Media media = MediaReader.read(job.find("media").map(Value::section), sources, job.problems(), memory);
        Optional<Value> trainValue = job.find("train");
        Optional<Value> throughValue = job.find("through");
        if (trainValue.isPresent() && throughValue.isPresent()) {
            throughValue
                    .get()
                    .fault("a job has a train or one medium everywhere, not both; leave \"through\" or \"train\" out");
        }
        Optional<TrainPlan> train = trainValue.map(v -> TrainReader.read(v.section(), media));
        Optional<Medium> through = throughValue.map(media::need);
        if (train.isEmpty() && through.isEmpty()) {
            job.fault("light needs something to go through: add \"train\", with its surfaces, or \"through: MEDIUM\"");
        }
        // read by the floor above; what it draws is none of the task's figures
        boolean studied = job.has("study");
        Optional<List<Value>> figures = job.find("figures")
                .map(Value::items)
                .map(list -> list.stream()
                        .filter(v -> !(studied && isStudyFigure(v)))
                        .toList());
        return new Scene(
                title, wavelengths, wavelength.isPresent(), accuracy, train, through, figures, sources, memory);
    }

    private static boolean isStudyFigure(Value value) {
        return value.isText() && STUDY_FIGURES.contains(value.text());
    }

    private static double[] wavelengths(Value value) {
        List<Value> items = value.isList() ? value.items() : List.of(value);
        if (items.isEmpty() || items.size() > MOST_WAVELENGTHS) {
            value.fault(items.size() + " wavelengths stand here; one to " + MOST_WAVELENGTHS + " are needed");
            return new double[] {D_LINE};
        }
        double[] list = new double[items.size()];
        for (int i = 0; i < list.length; i++) {
            double w = items.get(i).positive(Kind.LENGTH);
            list[i] = w > 0 ? w : D_LINE;
            if (w > 1) {
                items.get(i).fault("a vacuum wavelength of more than 1 m is not light; write one such as 633 nm");
            }
        }
        return list;
    }

    private static double accuracy(Value value) {
        double a = value.number();
        if (a < LEAST_ACCURACY || a > MOST_ACCURACY) {
            value.fault("an accuracy from 1e-13 to 0.01 is needed");
            return DEFAULT_ACCURACY;
        }
        return Double.isNaN(a) ? DEFAULT_ACCURACY : a;
    }
}
