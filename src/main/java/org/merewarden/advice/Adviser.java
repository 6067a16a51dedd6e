package org.merewarden.advice;

import java.util.Optional;
import org.springframework.stereotype.Service;

/** Puts the rule to a stock. */
@Service
class Adviser {

    /**
     * What the rule recommends.
     *
     * @param limitTonnes total removals, t
     * @param provisional it rests on no evidence of the stock's own
     * @param working its steps as JSON, as they are stored
     */
    record Advice(
            long stockId,
            int season,
            long assessmentId,
            int policyNumber,
            double limitTonnes,
            boolean provisional,
            String working) {}

    /** By the policy in force; empty where there is no assessment with draws. */
    Optional<Advice> advise(long stockId, int season) {
        return Optional.empty();
    }

    /** The season that is to be advised when none is named: the current one, or the next where it has its limit. */
    int season(long stockId) {
        return 0;
    }
}
