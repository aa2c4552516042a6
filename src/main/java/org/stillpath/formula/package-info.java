/** Floor 2: formulas, from text to tree to dimension check to exact derivatives. */
@NullMarked
package org.stillpath.formula;

import org.jspecify.annotations.NullMarked;
