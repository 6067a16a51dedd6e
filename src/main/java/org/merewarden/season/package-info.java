/** Landings, uptake, corrections and what the season still holds. */
@NullMarked
package org.merewarden.season;

import org.jspecify.annotations.NullMarked;
