package org.merewarden.records;

import java.time.LocalDate;
import java.util.Map;
import java.util.Optional;

/**
 * What the log of a season that is not closed yet says. The room that keeps the log implements it, so that advice, which
 * stands before that room, can read it; asked anew each time, it is never out of date.
 */
public interface SeasonInProgress {

    /**
     * Commercial landings that count against the limit, live weight.
     *
     * @param loggedTonnes so far, t
     * @param finalTonnes expected at the season's end, t, >= loggedTonnes
     * @param cv of finalTonnes, >= 0
     * @param recordedUpTo day of the last record
     */
    record Logged(double loggedTonnes, double finalTonnes, double cv, LocalDate recordedUpTo) {}

    /** Empty without landings, or where the season has too few days to tell a pace. */
    Optional<Logged> expected(long stockId, int season);

    /** Kilograms logged so far by cooperative id. */
    Map<Long, Double> loggedKilograms(long stockId, int season);
}
