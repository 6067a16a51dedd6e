package org.merewarden.advice;

import org.jspecify.annotations.Nullable;

/**
 * What a reader asks beside the rule's own alternatives; kept in the address.
 *
 * @param ownTonnes a catch of their own, t/yr; null for none
 * @param halfGrowth the share of K at which growth is halved in the stress test
 */
record WhatIf(@Nullable Double ownTonnes, double halfGrowth) {
    static final double USUAL_HALF_GROWTH = 0.1;
    static final double MOST_TONNES = 1e7;

    /** Out of range is as good as not asked. */
    static WhatIf of(@Nullable Double own, @Nullable Double halfGrowthPercent) {
        boolean usable = own != null && own >= 0 && own <= MOST_TONNES;
        double share = halfGrowthPercent == null ? USUAL_HALF_GROWTH : halfGrowthPercent / 100;
        return new WhatIf(usable ? own : null, share > 0 && share <= 1 ? share : USUAL_HALF_GROWTH);
    }
}
