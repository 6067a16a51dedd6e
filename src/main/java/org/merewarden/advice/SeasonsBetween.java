package org.merewarden.advice;

import java.util.List;
import java.util.Optional;
import java.util.stream.IntStream;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.AdviceWorking.Basis;
import org.merewarden.advice.AdviceWorking.Between;
import org.merewarden.records.SeasonInProgress;
import org.springframework.stereotype.Component;

/**
 * The removals of the seasons between an assessment and the limit: where landings are logged, the final catch to which
 * they lead, scaled back to total removals (after a closure those so far); else the full limit; else the last assessed
 * season's removals.
 */
@Component
class SeasonsBetween {
    /** Of removals that are not logged: the spread that removals without a stated one have in an assessment. */
    private static final double USUAL_CV = 0.2;

    private final SeasonInProgress log;
    private final Limits limits;

    SeasonsBetween(SeasonInProgress log, Limits limits) {
        this.log = log;
        this.limits = limits;
    }

    /** @param lastRemovals of the last assessed season, t; null where unknown */
    List<Between> of(long stockId, int lastAssessed, int season, @Nullable Double lastRemovals) {
        return IntStream.range(lastAssessed + 1, season)
                .mapToObj(each -> between(stockId, each, lastRemovals))
                .toList();
    }

    private Between between(long stockId, int season, @Nullable Double lastRemovals) {
        SeasonInProgress.Logged logged = log.expected(stockId, season).orElse(null);
        Optional<LimitView> limit = limits.inForce(stockId, season);
        if (logged != null) {
            double reported = limit.map(LimitView::reportedFraction).orElse(1.0);
            double setAsides = limit.map(LimitView::setAsidesTonnes).orElse(0.0);
            boolean closed = limit.filter(LimitView::closure).isPresent();
            double commercial = closed ? logged.loggedTonnes() : logged.finalTonnes();
            return new Between(season, commercial / reported + setAsides, logged.cv(), Basis.LANDINGS);
        }
        Double allowed = limit.map(LimitView::amountTonnes).orElse(null);
        if (allowed != null) {
            return new Between(season, allowed, USUAL_CV, Basis.LIMIT);
        }
        return lastRemovals == null
                ? new Between(season, 0, 0, Basis.NOTHING)
                : new Between(season, lastRemovals, USUAL_CV, Basis.LAST_REMOVALS);
    }
}
