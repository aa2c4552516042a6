package org.stillpath.task;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.problem.Place;
import org.stillpath.problem.ProblemException;
import org.stillpath.unit.Display;

/** The figure {@code chromatic}: where each wavelength has its focus. */
final class ChromaticFigure {
    private static final int BETWEEN = 101;
    /** Pictures need no more. */
    private static final double ACCURACY = 1e-9;

    private ChromaticFigure() {}

    /** Points at the job's wavelengths, and a line between them where the media are defined there. */
    static ChartFigure of(Scene scene, List<Axial> axials, Place place) {
        double[] w = scene.wavelengths();
        double first = axials.get(0).mean().backFocalDistance();
        double[] shift = new double[w.length];
        double least = w[0];
        double most = w[0];
        int far = 0;
        for (int i = 0; i < w.length; i++) {
            shift[i] = axials.get(i).mean().backFocalDistance() - first;
            least = Math.min(least, w[i]);
            most = Math.max(most, w[i]);
            far = Math.abs(shift[i]) > Math.abs(shift[far]) ? i : far;
        }
        double[] x = new double[BETWEEN];
        double[] y = new double[BETWEEN];
        for (int i = 0; i < BETWEEN; i++) {
            x[i] = least + (most - least) * i / (BETWEEN - 1);
            try {
                y[i] = Axial.of(scene.trainAt(x[i]), ACCURACY, place).mean().backFocalDistance() - first;
            } catch (ProblemException e) {
                // a table of indices may end between two wavelengths: the line has a gap there
                y[i] = Double.NaN;
            }
        }
        String name = Imaging.nanometres(w[0]);
        List<ChartFigure.Series> series = new ArrayList<>();
        series.add(new ChartFigure.Series(ChartFigure.Style.CURVE, "", x, y));
        series.add(new ChartFigure.Series(ChartFigure.Style.POINTS, "", w, shift));
        String answer = shift[far] == 0
                ? "All wavelengths have one focus"
                : "The focus at " + Imaging.nanometres(w[far]) + " lies "
                        + Display.of(Math.abs(shift[far]), "m", 1e-3 * Math.abs(shift[far]))
                        + (shift[far] > 0 ? " behind" : " before") + " that at " + name;
        return new ChartFigure(
                "chromatic",
                "Where does each colour focus?",
                answer,
                new ChartFigure.Axis("vacuum wavelength", "m", most < 2e-6 ? "nm" : ""),
                new ChartFigure.Axis("focus less that at " + name, "m", ""),
                series);
    }
}
