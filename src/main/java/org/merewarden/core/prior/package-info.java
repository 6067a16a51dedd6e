/** Priors from lake, life history and the evidence's scale, each with its source, range and reason. */
@NullMarked
package org.merewarden.core.prior;

import org.jspecify.annotations.NullMarked;
