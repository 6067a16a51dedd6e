package org.merewarden.core.evidence;

import org.jspecify.annotations.Nullable;

/**
 * The office's own lognormal prior of one parameter.
 *
 * @param series the series it is for; empty: all
 * @param median > 0, in the parameter's unit
 * @param logSd >= 0; 0 fixes the parameter
 */
public record PriorRecord(
        String parameter,
        String series,
        double median,
        double logSd,
        @Nullable String reason) {
    public PriorRecord {
        Check.positive("median", median);
        Check.that(logSd >= 0 && Double.isFinite(logSd), "0 <= log_sd < infinity", logSd);
    }
}
