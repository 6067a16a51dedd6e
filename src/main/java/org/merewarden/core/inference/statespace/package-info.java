/** Surplus production with hidden biomass and harvest rate, fitted to whatever evidence exists. */
@NullMarked
package org.merewarden.core.inference.statespace;

import org.jspecify.annotations.NullMarked;
