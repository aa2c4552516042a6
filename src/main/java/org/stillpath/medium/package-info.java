/**
 * Floor 3: media and their index fields.
 *
 * <p>A {@link org.stillpath.medium.Medium} is what a job names; it becomes an {@link org.stillpath.medium.IndexField} at a
 * wavelength, in a frame, over an earth. Inside, quantities are {@link org.stillpath.medium.ScalarField}s (formulas,
 * profiles, grids); height, clearance and distance come from a chart, {@link org.stillpath.medium.EarthChart} over a
 * sphere or a plane. Air takes its temperature, pressure and humidity through an {@link org.stillpath.medium.AirLaw}.
 */
@NullMarked
package org.stillpath.medium;

import org.jspecify.annotations.NullMarked;
