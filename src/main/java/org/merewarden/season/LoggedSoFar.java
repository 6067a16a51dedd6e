package org.merewarden.season;

import java.time.LocalDate;
import java.time.temporal.ChronoUnit;
import java.util.HashMap;
import java.util.Map;
import java.util.Optional;
import org.merewarden.records.SeasonInProgress;
import org.merewarden.web.Seasons;
import org.springframework.stereotype.Service;

/**
 * The final catch of a season in progress, if landings go on at the average so far:
 *
 * <pre>
 *   final = taken · days of the season / days up to the last record      cv = 0.05 + 0.3 · part of the season left
 * </pre>
 *
 * <p>The spread is our judgement. It knows no season's pattern; see {@link StraightLinePace}.
 */
@Service
class LoggedSoFar implements SeasonInProgress {
    private static final double LATE_SLIPS = 0.05;
    private static final double REST_OF_SEASON = 0.3;

    private final Uptakes uptakes;
    private final Takings takings;
    private final Seasons seasons;

    LoggedSoFar(Uptakes uptakes, Takings takings, Seasons seasons) {
        this.uptakes = uptakes;
        this.takings = takings;
        this.seasons = seasons;
    }

    @Override
    public Optional<Logged> expected(long stockId, int season) {
        return uptakes.of(stockId, season).flatMap(uptake -> expected(uptake, season));
    }

    private Optional<Logged> expected(UptakeView uptake, int season) {
        LocalDate start = seasons.start(season);
        long days = ChronoUnit.DAYS.between(start, seasons.end(season)) + 1;
        LocalDate last = uptake.recordedUpTo();
        long passed = last == null ? 0 : Math.min(days, ChronoUnit.DAYS.between(start, last) + 1);
        return last == null || passed < StraightLinePace.FEWEST_DAYS || uptake.takenKg() <= 0
                ? Optional.empty()
                : Optional.of(logged(uptake.takenKg() / 1000, (double) passed / days, last));
    }

    /** @param passed part of the season, in (0, 1] */
    static Logged logged(double tonnes, double passed, LocalDate last) {
        return new Logged(tonnes, tonnes / passed, LATE_SLIPS + REST_OF_SEASON * (1 - passed), last);
    }

    @Override
    public Map<Long, Double> loggedKilograms(long stockId, int season) {
        Map<Long, Double> kilograms = new HashMap<>();
        for (Takings.ByCooperative taken : takings.byCooperative(season)) {
            Long cooperative = taken.cooperativeId();
            if (taken.stockId() == stockId && cooperative != null) {
                kilograms.put(cooperative, taken.takenKg());
            }
        }
        return kilograms;
    }
}
