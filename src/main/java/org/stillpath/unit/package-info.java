/** Floor 1: "12.5 km" to SI and back, and dimensions. */
@NullMarked
package org.stillpath.unit;

import org.jspecify.annotations.NullMarked;
