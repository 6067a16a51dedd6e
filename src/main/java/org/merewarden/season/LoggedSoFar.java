package org.merewarden.season;

import java.time.LocalDate;
import java.time.temporal.ChronoUnit;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.records.SeasonInProgress;
import org.springframework.stereotype.Service;

/**
 * The final catch of a season, if every cooperative goes on landing at its average so far:
 *
 * <pre>
 *   final = Σ taken · days of the season / days up to the cooperative's last record
 *   cv    = 0.05 + 0.3 · part of the season left after the latest record
 * </pre>
 *
 * <p>Each by its own days, for one that went silent in spring says nothing of the others' pace. Fewer than {@value
 * StraightLinePace#FEWEST_DAYS} days count as that many; where nobody's records reach so far, there is no pace. A season
 * that is over ends with what is logged, but for late slips. The spread is our judgement; it knows no season's pattern.
 */
@Service
class LoggedSoFar implements SeasonInProgress {
    private static final double LATE_SLIPS = 0.05;
    private static final double REST_OF_SEASON = 0.3;

    private final Takings takings;
    private final Completeness completeness;

    LoggedSoFar(Takings takings, Completeness completeness) {
        this.takings = takings;
        this.completeness = completeness;
    }

    @Override
    public Optional<Logged> logged(long stockId, int season) {
        List<Takings.ByCooperative> taken = takings.byCooperative(stockId, season).stream()
                .filter(t -> t.takenKg() > 0)
                .toList();
        return taken.isEmpty() ? Optional.empty() : Optional.of(logged(taken, season));
    }

    private Logged logged(List<Takings.ByCooperative> taken, int season) {
        Completeness.Records records = completeness.of(season);
        LocalDate start = records.start();
        LocalDate end = start.plusYears(1).minusDays(1);
        long days = days(start, end);
        double tonnes = 0;
        double extrapolated = 0;
        LocalDate last = start;
        for (Takings.ByCooperative each : taken) {
            LocalDate own = end(each, records);
            long passed = Math.min(days, Math.max(StraightLinePace.FEWEST_DAYS, days(start, own)));
            tonnes += each.takenKg() / 1000;
            extrapolated += each.takenKg() / 1000 * days / passed;
            last = own.isAfter(last) ? own : last;
        }
        if (!records.asOf().isBefore(end)) {
            return new Logged(tonnes, tonnes, LATE_SLIPS, true, last);
        }
        long passed = Math.min(days, days(start, last));
        double cv = LATE_SLIPS + REST_OF_SEASON * (1 - (double) passed / days);
        return new Logged(tonnes, passed < StraightLinePace.FEWEST_DAYS ? Double.NaN : extrapolated, cv, false, last);
    }

    /** What the cooperative stated, or its last landing where that is later or it stated nothing. */
    private static LocalDate end(Takings.ByCooperative taken, Completeness.Records records) {
        Long cooperative = taken.cooperativeId();
        @Nullable
        LocalDate stated = cooperative == null ? null : records.end(cooperative).orElse(null);
        return stated == null || taken.lastLanding().isAfter(stated) ? taken.lastLanding() : stated;
    }

    /** Both counted. */
    private static long days(LocalDate first, LocalDate last) {
        return ChronoUnit.DAYS.between(first, last) + 1;
    }

    @Override
    public Map<Long, Double> loggedKilograms(long stockId, int season) {
        Map<Long, Double> kilograms = new HashMap<>();
        for (Takings.ByCooperative taken : takings.byCooperative(stockId, season)) {
            Long cooperative = taken.cooperativeId();
            if (cooperative != null) {
                kilograms.put(cooperative, taken.takenKg());
            }
        }
        return kilograms;
    }
}
