package org.merewarden.advice;

import java.util.Optional;
import org.merewarden.core.policy.Recommendation;
import org.springframework.stereotype.Component;

/** The adviser's recommendation, by whichever version is asked for. */
@Component
class AdviserTrialRule implements PolicyTrialRule {
    private final Adviser adviser;

    AdviserTrialRule(Adviser adviser) {
        this.adviser = adviser;
    }

    @Override
    public Optional<Trial> recommend(long stockId, PolicyStore.Numbered version) {
        return adviser.work(stockId, adviser.season(stockId), version.policy(), version.number())
                .map(AdviserTrialRule::trial);
    }

    private static Trial trial(AdviceWorking working) {
        Recommendation recommended = working.recommendation();
        return new Trial(
                working.season(),
                working.assessment().id(),
                recommended.limitTonnes(),
                recommended.decidedBy().name(),
                recommended.risk());
    }
}
