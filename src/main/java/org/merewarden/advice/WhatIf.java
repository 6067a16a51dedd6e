package org.merewarden.advice;

import org.jspecify.annotations.Nullable;

/**
 * What is looked at beside the rule's own alternatives.
 *
 * @param ownTonnes a catch of their own, t/yr; null for none
 * @param halfGrowth the share of K at which growth is halved in the stress test
 */
record WhatIf(@Nullable Double ownTonnes, double halfGrowth) {
    static final double USUAL_HALF_GROWTH = 0.1;
    static final WhatIf NOTHING = new WhatIf(null, USUAL_HALF_GROWTH);
}
