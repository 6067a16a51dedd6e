package org.merewarden.core.evidence;

import org.jspecify.annotations.Nullable;

/**
 * One survey result.
 *
 * @param timeOfYear 0 the season's start … 1 its end
 * @param absoluteBiomass true: {@code value} is a biomass in t; false: an index in the series' own unit
 * @param value >= 0; an index of 0 means nothing was caught
 * @param cv coefficient of variation of this result
 * @param nets units of effort behind the value
 */
public record SurveyRecord(
        int year,
        String series,
        double timeOfYear,
        boolean absoluteBiomass,
        double value,
        @Nullable Double cv,
        @Nullable Double nets) {
    public SurveyRecord {
        Check.that(timeOfYear >= 0 && timeOfYear <= 1, "0 <= time_of_year <= 1", timeOfYear);
        Check.that(value >= 0 && Double.isFinite(value), "0 <= value < infinity", value);
    }
}
