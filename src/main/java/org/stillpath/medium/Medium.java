package org.stillpath.medium;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.stillpath.formula.Chart;
import org.stillpath.geometry.Frame;
import org.stillpath.geometry.Vector;

/**
 * A named medium of a job: what its index is, in which frame, and how far it may be believed. Immutable. It becomes an
 * {@link IndexField} once the wavelength and the frame are known.
 */
public sealed interface Medium permits UniformMedium, AirMedium, AtmosphereMedium, FieldMedium, SolidMedium {
    /** Origin, axis, validity, source and warnings. */
    Declaration declaration();

    /**
     * The medium at one wavelength, in a frame, without an earth: height and clearance are the z of the medium's frame,
     * distance its x.
     *
     * @param wavelength vacuum wavelength in metres; NaN is allowed where {@link #needsWavelength} is false
     * @param frame where the medium's own frame lies in the job, from {@link #frame}
     * @throws IllegalArgumentException if the medium needs a wavelength and none is given
     */
    default IndexField field(double wavelength, Frame frame) {
        return placed(wavelength, frame, Chart.FLAT);
    }

    /**
     * The medium at one wavelength, in a frame, over an earth.
     *
     * @param wavelength vacuum wavelength in metres; NaN is allowed where {@link #needsWavelength} is false
     * @param frame where the medium's own frame lies in the job, from {@link #frame}
     * @param chart gives height, clearance and distance in the job's coordinates
     * @throws IllegalArgumentException if the medium needs a wavelength and none is given
     */
    default IndexField field(double wavelength, Frame frame, Chart chart) {
        return placed(wavelength, frame, FramedChart.of(chart, frame));
    }

    /**
     * The medium at one wavelength, in a frame.
     *
     * @param chart gives height, clearance and distance in the medium's own frame
     * @throws IllegalArgumentException if the medium needs a wavelength and none is given
     */
    IndexField placed(double wavelength, Frame frame, Chart chart);

    /**
     * The field of the group index, with which light pulses and the modulation of a distance meter travel; empty where
     * the medium does not say how its index depends on the wavelength. Parameters as for {@link #field(double, Frame,
     * Chart)}.
     */
    default Optional<IndexField> groupField(double wavelength, Frame frame, Chart chart) {
        return Optional.empty();
    }

    /**
     * The same medium with its tables joined by another interpolant, to see how much hangs on what they leave open between their
     * rows; empty where no table leaves a choice. Grids have one interpolant only.
     */
    default Optional<Medium> joinedOtherwise() {
        return Optional.empty();
    }

    /** Whether the index depends on the wavelength, so that the job must name one. */
    boolean needsWavelength();

    /** The same medium with another declaration. */
    Medium with(Declaration other);

    /**
     * The same medium at one temperature everywhere; itself where its index is given without one.
     *
     * @param kelvin the temperature
     */
    default Medium atTemperature(double kelvin) {
        return this;
    }

    /** Its name in the job. */
    default String name() {
        return declaration().name();
    }

    /** Origin of its frame in the job's coordinates (metres), where it overrides the train's. */
    default Optional<Vector> origin() {
        return declaration().origin();
    }

    /** Direction of its z axis in the job's coordinates, where it overrides the train's. */
    default Optional<Vector> axis() {
        return declaration().axis();
    }

    /** Where it was published; empty where nothing is said. */
    default String source() {
        return declaration().source();
    }

    /** What was assumed, or is doubtful, whatever the wavelength. */
    default List<String> warnings() {
        return declaration().warnings();
    }

    /**
     * What is doubtful at one wavelength, besides {@link #warnings()}: a wavelength outside the range that the medium was
     * published for.
     */
    default List<String> warningsAt(double wavelength) {
        List<String> list = new ArrayList<>();
        declaration().range().ifPresent(r -> {
            if (wavelength < r.shortest() || wavelength > r.longest()) {
                list.add("the wavelength " + Told.wavelength(wavelength) + " lies outside the range of medium `"
                        + name() + "`, " + Told.wavelength(r.shortest()) + " to " + Told.wavelength(r.longest()));
            }
        });
        return List.copyOf(list);
    }

    /**
     * The frame of the medium in the job's coordinates: the given origin and the job's axes, unless the medium says
     * otherwise.
     *
     * @param defaultOrigin where the train puts its origin, metres
     */
    default Frame frame(Vector defaultOrigin) {
        Vector o = origin().orElse(defaultOrigin);
        return axis().map(a -> Frame.along(o, a)).orElseGet(() -> Frame.at(o));
    }
}
