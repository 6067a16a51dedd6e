package org.merewarden.season;

import java.time.LocalDate;
import java.time.temporal.ChronoUnit;
import java.util.Optional;

/**
 * When a limit is used up if landings go on at the average so far: date = last + (limit − taken) / (taken / days).
 *
 * <pre>
 * taken  kg taken up to the last record
 * days   days from the limit's first day to the last record, both counted
 * </pre>
 *
 * A straight line and no more: it knows no season's pattern, no outstanding slips and no interval. From fewer than
 * {@link #FEWEST_DAYS} days, or from nothing taken, there is no pace.
 */
final class StraightLinePace {
    static final int FEWEST_DAYS = 14;

    private StraightLinePace() {}

    /** @return the day, at the earliest the last record's; empty where there is no pace */
    static Optional<LocalDate> usedUpOn(double takenKg, double limitKg, LocalDate first, LocalDate last) {
        long days = ChronoUnit.DAYS.between(first, last) + 1;
        if (days < FEWEST_DAYS || takenKg <= 0) {
            return Optional.empty();
        }
        double daysLeft = Math.max(0, limitKg - takenKg) * days / takenKg;
        return daysLeft > 36_500 ? Optional.empty() : Optional.of(last.plusDays((long) Math.ceil(daysLeft)));
    }
}
