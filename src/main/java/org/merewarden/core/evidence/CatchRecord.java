package org.merewarden.core.evidence;

import org.jspecify.annotations.Nullable;

/**
 * What one sector reported of one season.
 *
 * @param catchTonnes live weight as reported, t, >= 0
 * @param cv coefficient of variation of the report
 * @param reportedFraction fraction of the true catch that was reported, in (0, 1]
 */
public record CatchRecord(
        int year,
        String sector,
        double catchTonnes,
        @Nullable Double cv,
        double reportedFraction) {
    public CatchRecord {
        Check.that(catchTonnes >= 0 && Double.isFinite(catchTonnes), "0 <= catch_t < infinity", catchTonnes);
        Check.that(reportedFraction > 0 && reportedFraction <= 1, "0 < reported_fraction <= 1", reportedFraction);
    }

    /** Estimated true removals, t. */
    public double removalsTonnes() {
        return catchTonnes / reportedFraction;
    }
}
