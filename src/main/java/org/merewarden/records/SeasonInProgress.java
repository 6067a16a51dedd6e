package org.merewarden.records;

import java.time.LocalDate;
import java.util.Map;
import java.util.Optional;

/**
 * What the log of a season that is not assessed yet says. The room that keeps the log implements it, so that advice, which
 * stands before that room, can read it; asked anew each time, it is never out of date.
 */
public interface SeasonInProgress {

    /**
     * Commercial landings that count against the limit, live weight.
     *
     * @param loggedTonnes so far, t, > 0
     * @param finalTonnes expected at the season's end, t, >= loggedTonnes; NaN where too few days have passed to tell a pace
     * @param cv of finalTonnes, >= 0
     * @param over whether the season's last day has come
     * @param recordedUpTo day of the last record
     */
    record Logged(double loggedTonnes, double finalTonnes, double cv, boolean over, LocalDate recordedUpTo) {
        public boolean paced() {
            return Double.isFinite(finalTonnes);
        }
    }

    /** Empty without landings. */
    Optional<Logged> logged(long stockId, int season);

    /** Kilograms logged so far by cooperative id. */
    Map<Long, Double> loggedKilograms(long stockId, int season);
}
