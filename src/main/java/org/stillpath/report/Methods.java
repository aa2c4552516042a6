package org.stillpath.report;

import java.util.ArrayList;
import java.util.List;
import org.stillpath.study.Finding;
import org.stillpath.study.Outcome;
import org.stillpath.task.Result;

/** How results are got and what their signs mean, in words for people; printed in every report. */
final class Methods {
    private Methods() {}

    /** Paragraphs on the method and the accuracy of a result. */
    static List<String> of(Outcome outcome) {
        Result result = outcome.result();
        List<String> paragraphs = new ArrayList<>();
        outcome.findings().stream()
                .map(Finding::key)
                .distinct()
                .map(Methods::study)
                .filter(text -> !text.isEmpty())
                .forEach(paragraphs::add);
        paragraphs.add("Rays follow from Fermat's principle: the ray equation is integrated in the parameter dτ = ds/n"
                + " (Luneburg, Mathematical Theory of Optics; Sharma, Kumar and Ghatak, Applied Optics 21 (1982) 984),"
                + " with the index and its derivatives taken exactly from the medium as given, never from differences."
                + " At surfaces the vector form of Snell's law holds with the index on the spot.");
        if (result.task().equals("lens")) {
            paragraphs.add(
                    "Focal lengths, focal points and principal planes come from the ray-transfer matrix about the"
                            + " axis, which is integrated beside the ray (the Jacobi equation): they are the paraxial constants"
                            + " themselves, not a fit to rays near the axis. Geometrical optics: diffraction images and transfer"
                            + " functions of contrast are not computed.");
        }
        if (result.quantities().containsKey("spot-radius-rms")
                || result.quantities().containsKey("angular-radius-rms")) {
            paragraphs.add(
                    "Spots and wavefronts come from real rays over the pupil, at Gauss points in the square of its radius and equal"
                            + " angles (Forbes, J. Opt. Soc. Am. A 5 (1988) 1943), so that averages do not depend on their number once"
                            + " it is enough. A path difference is a ray's optical length to the sphere about the image point"
                            + " through the last vertex less the chief ray's, positive where it is longer; rms, peak to valley and"
                            + " the Strehl ratio are told without tilt, the Strehl ratio as |⟨exp(2πiW/λ)⟩|² itself. Zernike"
                            + " terms are Noll's (J. Opt. Soc. Am. 66 (1976) 207), each of unit rms, over the ray's place in the"
                            + " entrance pupil, x and y as in the job.");
        }
        if (result.quantities().containsKey("coupling-efficiency")) {
            paragraphs.add(
                    "Coupling is the overlap of Gaussian modes: the source's, taken through the ray-transfer matrix (Kogelnik"
                            + " and Li, Applied Optics 5 (1966) 1550), and the receiver's.");
        }
        if (result.task().equals("sightline")) {
            paragraphs.add(
                    "Images are all rays from the eye that meet the target's earth radius at its height, found over the launch"
                            + " elevation with the derivative of that height, which is integrated beside the ray. Where the air"
                            + " depends on the height alone, Bouguer's integral by Gauss-Legendre quadrature answers a second"
                            + " time, and the difference is part of the numerical error.");
        }
        paragraphs.add("The numerical error beside a value is the program's own estimate of how far its digits can be"
                + " trusted. It says nothing about how well the inputs are known: an index or a gradient known to one per"
                + " cent leaves two or three digits of a focal length that mean something.");
        if (!result.accuracyReached()) {
            paragraphs.add("The asked accuracy was not reached: see the numerical errors above.");
        }
        return paragraphs;
    }

    /** How a study's figures are got. */
    private static String study(String key) {
        return switch (key) {
            case "budget" ->
                "Uncertainties: the law of propagation of uncertainty (JCGM 100:2008, 5), with sensitivities from"
                        + " extrapolated differences about the job's values, effective degrees of freedom after Welch and"
                        + " Satterthwaite (G.4) and Student's quantile as coverage factor; and the propagation of distributions by"
                        + " adaptive Monte Carlo (JCGM 101:2008, 7.9), whose shortest coverage interval is stated. Where their"
                        + " intervals differ by more than the tolerance of JCGM 101, 8.1, the linear budget is not valid. What"
                        + " is not among the inputs is not in the budget.";
            case "fit" ->
                "The fit minimises the sum of the squares of wanted less fitted values over their standard uncertainties"
                        + " within the bounds (Levenberg and Marquardt), from several starts where the bounds allow; the"
                        + " uncertainties of the unknowns follow from the derivatives at the minimum. They hold if the model is"
                        + " that of the thing measured.";
            case "sweep", "batch" ->
                "Each run is the whole job with other values, computed as a job of its own; the runs know nothing of each"
                        + " other.";
            default -> "";
        };
    }

    /** What signs, units and words mean. */
    static List<String> conventions(String task) {
        List<String> lines = new ArrayList<>();
        lines.add("Coordinates are right-handed; light enters a train along +z.");
        lines.add("A radius of curvature is positive when its centre lies toward +z.");
        lines.add(
                "Wavelengths are those in vacuum. Refractive indices are absolute (against vacuum) unless the job says"
                        + " otherwise; against air they are smaller by about 3 parts in 10 000.");
        lines.add("The optical length is the integral of index times length; travel times are those of the phase.");
        lines.add("Angles are true angles in radians.");
        if (task.equals("lens")) {
            lines.add("Back focal distance, rear principal plane and image distance count from the last vertex, front"
                    + " focal distance and front principal plane from the first; positive along the light.");
            lines.add(
                    "The power is 1 over the effective focal length; front and rear focal lengths are the index before"
                            + " and behind over the power.");
            lines.add("A negative image distance is a virtual image; a negative magnification an inverted one.");
            lines.add(
                    "Where there are several fields or wavelengths, a single value is that of the first; distortion and the"
                            + " departure of a line are those of the outermost field.");
        } else if (task.equals("sightline")) {
            lines.add(
                    "Heights are above the datum; distances run along it from below the eye. Elevations are above each"
                            + " end's own horizontal; the arrival's is that of the path drawn on from the eye.");
            lines.add(
                    "Refraction is positive where the other end looks higher than it is; k is 2 R times the refraction at the"
                            + " eye over the distance, positive where the ray bends towards the ground.");
            lines.add("A negative magnification is an inverted image. The dip of the horizon is positive downward.");
        } else {
            lines.add("A ray's transfer matrix maps x, y, px, py at its start plane to those at its end plane, p being"
                    + " index times direction cosine; both planes are of constant z.");
        }
        return lines;
    }
}
