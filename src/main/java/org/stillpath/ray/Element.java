package org.stillpath.ray;

import org.stillpath.geometry.Surface;
import org.stillpath.medium.IndexField;

/**
 * One surface of a train with what it does.
 *
 * @param surface where it is
 * @param action what it does
 * @param into the medium behind it, as the light goes; for a mirror, a stop and a thin lens the medium before it
 */
public record Element(Surface surface, Action action, IndexField into) {}
