package org.stillpath.medium;

import org.stillpath.formula.Samples;

/** Room for the coordinates and samples of one thread; grows as asked and is kept, so that hot loops allocate nothing. */
final class Scratch {
    double[] x = new double[1];
    double[] y = new double[1];
    double[] z = new double[1];
    Samples samples = new Samples(1);

    /** This scratch with room for at least {@code count} points. */
    Scratch with(int count) {
        if (x.length < count) {
            x = new double[count];
            y = new double[count];
            z = new double[count];
            samples = new Samples(count);
        }
        return this;
    }

    /** One point in the first place. */
    Scratch point(double px, double py, double pz) {
        x[0] = px;
        y[0] = py;
        z[0] = pz;
        return this;
    }
}
