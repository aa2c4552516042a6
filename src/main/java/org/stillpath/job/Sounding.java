package org.stillpath.job;

import java.util.List;
import java.util.Optional;
import java.util.OptionalInt;

/**
 * One ascent of a radiosonde from a file that a job names, in SI.
 *
 * @param source name of the file, for messages
 * @param station identifier of the station
 * @param time when it was, for people: {@code 2026-07-01 12 h UTC}
 * @param levels from the ground up, in the order of the file
 */
public record Sounding(String source, String station, String time, List<Level> levels) {
    public Sounding {
        levels = List.copyOf(levels);
    }

    /**
     * What was measured at one level; NaN where it is missing or was removed by quality control.
     *
     * @param geopotential geopotential height, metres
     * @param pressure pascal
     * @param temperature kelvin
     * @param humidity relative, a fraction, over water
     * @param depression of the dew point below the temperature, kelvin
     * @param line its line in the file
     */
    public record Level(
            double geopotential, double pressure, double temperature, double humidity, double depression, int line) {}

    /**
     * Which of a file's soundings is taken; what is left out is not asked for.
     *
     * @param station identifier
     * @param date {@code YYYY-MM-DD}, UTC
     * @param hour nominal, 0 to 23, UTC
     */
    public record Wanted(Optional<String> station, Optional<String> date, OptionalInt hour) {}
}
