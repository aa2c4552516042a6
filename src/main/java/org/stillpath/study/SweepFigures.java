package org.stillpath.study;

import java.util.List;
import org.stillpath.task.Figure;

final class SweepFigures {
    private SweepFigures() {}

    static List<Figure> of(
            Bench bench, List<Input> inputs, double[][] columns, int inner, List<Watched> watch, Crew.Runs runs) {
        return List.of();
    }
}
