package org.merewarden.advice;

import java.util.List;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.policy.EarlierSeason;
import org.merewarden.core.policy.Recommendation;

/**
 * A recommendation's working as it is kept beside the limit: amounts in t of total removals, null where there is none.
 *
 * @param ceilingTonnes null where every catch is within the tolerated risk, or where none is ({@code closed})
 * @param closed even no catch is too risky
 */
record StoredWorking(
        List<AdviceWorking.Between> between,
        @Nullable Double earlierLimitTonnes,
        @Nullable Double earlierRemovalsTonnes,
        List<Recommendation.Step> steps,
        @Nullable Double ceilingTonnes,
        boolean closed,
        @Nullable Integer recoverySeasons,
        double risk) {

    static StoredWorking of(AdviceWorking working) {
        Recommendation r = working.recommendation();
        EarlierSeason earlier = working.earlier();
        return new StoredWorking(
                working.between(),
                known(earlier.limitTonnes()),
                known(earlier.removalsTonnes()),
                r.steps(),
                known(r.ceilingTonnes()),
                Double.isNaN(r.ceilingTonnes()),
                r.recoverySeasons(),
                r.risk());
    }

    private static @Nullable Double known(double value) {
        return Double.isFinite(value) ? (Double) value : null;
    }
}
