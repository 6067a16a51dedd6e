package org.merewarden.assessment;

import java.time.Instant;
import java.util.List;
import org.jspecify.annotations.Nullable;

/**
 * An assessment's summary. Three numbers are the 10, 50 and 90 % quantiles of its draws; null where it has no draws.
 *
 * @param strength STRONG, FAIR, THIN or NONE
 * @param trend median B/BMSY at the start of the seasons firstYear … lastYear + 1
 */
public record AssessmentView(
        long id,
        long stockId,
        int number,
        Instant madeAt,
        String madeBy,
        String evidenceHash,
        String method,
        int firstYear,
        int lastYear,
        boolean settled,
        List<String> verdict,
        String strength,
        @Nullable Double msyLowTonnes,
        @Nullable Double msyTonnes,
        @Nullable Double msyHighTonnes,
        @Nullable Double fmsyPerYear,
        @Nullable Double capacityTonnes,
        @Nullable Double biomassLowTonnes,
        @Nullable Double biomassTonnes,
        @Nullable Double biomassHighTonnes,
        @Nullable Double bOverBmsyLow,
        @Nullable Double bOverBmsy,
        @Nullable Double bOverBmsyHigh,
        @Nullable Double lastRemovalsTonnes,
        boolean closedLastSeason,
        List<Double> trend) {}
