package org.merewarden.advice;

import java.util.Optional;

/** What any version of the rule makes of a stock; nothing is stored. */
interface PolicyTrialRule {

    /**
     * @param season that is advised
     * @param limitTonnes total removals, t
     * @param decidedBy name of the rule that decided, as {@link org.merewarden.core.policy.Recommendation.Rule} has it
     * @param risk chance of B &lt; B lim at the end of at least one season of the version's horizon, 0–1
     */
    record Trial(int season, long assessmentId, double limitTonnes, String decidedBy, double risk) {}

    /** Empty where there is no assessment with draws, or the season is assessed already. */
    Optional<Trial> recommend(long stockId, PolicyStore.Numbered version);
}
