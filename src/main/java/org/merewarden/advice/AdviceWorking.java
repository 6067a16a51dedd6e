package org.merewarden.advice;

import java.util.List;
import org.jspecify.annotations.Nullable;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.core.outlook.Outlook;
import org.merewarden.core.policy.EarlierSeason;
import org.merewarden.core.policy.Policy;
import org.merewarden.core.policy.Recommendation;

/**
 * What the rule makes of one stock for one season, with everything it started from.
 *
 * @param season the one that is advised
 * @param between the seasons between the assessment and it, in order
 * @param earlier the season before it
 * @param earlierNotice number of that season's notice; null where no limit was in force
 */
record AdviceWorking(
        long stockId,
        int season,
        AssessmentView assessment,
        int policyNumber,
        Policy policy,
        Outlook outlook,
        List<Between> between,
        EarlierSeason earlier,
        @Nullable Long earlierNotice,
        Recommendation recommendation) {

    /** What the removals of a season between rest on. */
    enum Basis {
        /** The season is over: what is logged. */
        LOGGED,
        /** Where the landings so far lead. */
        LANDINGS,
        /** Closed before its end: what was logged until then. */
        CLOSED,
        LIMIT,
        LAST_REMOVALS,
        NOTHING
    }

    /**
     * Removals of a season that is not assessed yet.
     *
     * @param tonnes total removals, median, t
     * @param cv their spread
     */
    record Between(int season, double tonnes, double cv, Basis basis) {}
}
