/** Growth laws, harvest rules, flows, equilibrium curves, folds, tipping biomass, extinction and return times. */
@NullMarked
package org.merewarden.core.dynamics;

import org.jspecify.annotations.NullMarked;
