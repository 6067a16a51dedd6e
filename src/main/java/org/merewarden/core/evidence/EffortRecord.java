package org.merewarden.core.evidence;

import org.jspecify.annotations.Nullable;

/**
 * Fishing effort of one season in the series' own unit.
 *
 * @param effort >= 0
 */
public record EffortRecord(
        int year, String series, double effort, @Nullable String unit) {
    public EffortRecord {
        Check.that(effort >= 0 && Double.isFinite(effort), "0 <= effort < infinity", effort);
    }
}
