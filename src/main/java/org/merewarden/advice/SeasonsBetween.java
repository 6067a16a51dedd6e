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

    /** Of what is logged of a season that is closed or over. */
    private static final double LATE_SLIPS = 0.05;

    private final SeasonInProgress log;
    private final Limits limits;
    private final ClosedLimits closed;

    SeasonsBetween(SeasonInProgress log, Limits limits, ClosedLimits closed) {
        this.log = log;
        this.limits = limits;
        this.closed = closed;
    }

    /** @param lastRemovals of the last assessed season, t; null where unknown */
    List<Between> of(long stockId, int lastAssessed, int season, @Nullable Double lastRemovals) {
        return IntStream.range(lastAssessed + 1, season)
                .mapToObj(each -> between(stockId, each, lastRemovals))
                .toList();
    }

    private Between between(long stockId, int season, @Nullable Double lastRemovals) {
        Optional<SeasonInProgress.Logged> logged = log.logged(stockId, season);
        Optional<LimitView> limit = limits.inForce(stockId, season);
        if (limit.filter(LimitView::closure).isPresent()) {
            return untilClosed(season, logged, closed.before(stockId, season));
        }
        if (logged.isPresent() && logged.get().paced()) {
            Basis basis = logged.get().over() ? Basis.LOGGED : Basis.LANDINGS;
            return new Between(
                    season,
                    removals(logged.get().finalTonnes(), limit),
                    logged.get().cv(),
                    basis);
        }
        Double allowed = limit.map(LimitView::amountTonnes).orElse(null);
        if (allowed != null) {
            return new Between(season, allowed, USUAL_CV, Basis.LIMIT);
        }
        return lastRemovals == null
                ? new Between(season, 0, 0, Basis.NOTHING)
                : new Between(season, lastRemovals, USUAL_CV, Basis.LAST_REMOVALS);
    }

    /** Nothing more is taken; what was, was taken under the limit that was closed. */
    private static Between untilClosed(
            int season, Optional<SeasonInProgress.Logged> logged, Optional<LimitView> before) {
        double commercial = logged.map(SeasonInProgress.Logged::loggedTonnes).orElse(0.0);
        return new Between(season, removals(commercial, before), LATE_SLIPS, Basis.CLOSED);
    }

    /** Total removals behind commercial landings as logged, t. */
    private static double removals(double loggedTonnes, Optional<LimitView> limit) {
        return loggedTonnes / limit.map(LimitView::reportedFraction).orElse(1.0)
                + limit.map(LimitView::setAsidesTonnes).orElse(0.0);
    }
}
