/** Floor 3: media and their index fields. */
@NullMarked
package org.stillpath.medium;

import org.jspecify.annotations.NullMarked;
