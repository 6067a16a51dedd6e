package org.merewarden.advice;

import java.time.Instant;
import org.jspecify.annotations.Nullable;

/**
 * How a stock stands, from its latest assessment's draws and the limit in force. Margins are fractions of MSY at the
 * 10, 50 and 90 % quantiles; probabilities in 0–1.
 *
 * @param removalsBasis limit, last removals or none: what {@code removalsTonnes} is
 * @param standing SECURE, WATCH, STRAINED or CRITICAL
 * @param probability max(P(collapse course), P(B &lt; B lim) now), on which the standing rests
 * @param tippingBiomassTonnes median over the draws that have one; null where fewer than half do
 */
public record StandingView(
        long stockId,
        long assessmentId,
        int season,
        double removalsTonnes,
        String removalsBasis,
        String standing,
        boolean mainlyLittleKnown,
        double probability,
        double collapseProbability,
        double belowLimitProbability,
        double marginLow,
        double margin,
        double marginHigh,
        double marginNegativeProbability,
        @Nullable Double tippingBiomassTonnes,
        @Nullable Double returnTimeYears,
        Instant computedAt) {

    /** Whether the removals are the limit in force, a decided amount, and no estimate. */
    boolean limit() {
        return removalsBasis.equals("limit");
    }
}
