package org.merewarden.advice;

import java.time.Instant;
import java.time.LocalDate;
import org.jspecify.annotations.Nullable;

/**
 * On what terms a limit is decided.
 *
 * @param purpose season, revision or closure
 * @param effectiveAt from when a revision or closure holds; null for a season's limit, which holds from its issue
 * @param reviewBy the day by which a provisional ceiling is looked at again
 * @param recommendationId what the rule recommended when it was written down; null where it recommended nothing
 * @param differenceReason why the amount differs from the recommendation
 * @param entryKey of the form that was sent
 */
record Terms(
        String purpose,
        @Nullable Instant effectiveAt,
        @Nullable LocalDate reviewBy,
        @Nullable Long recommendationId,
        @Nullable String differenceReason,
        @Nullable String entryKey) {
    static final String SEASON = "season";
    static final String REVISION = "revision";
    static final String CLOSURE = "closure";

    /** A season's limit that rests on no recommendation, as papers have it. */
    static final Terms OF_PAPER = new Terms(SEASON, null, null, null, null, null);

    Terms recommendedBy(@Nullable Long recommendation) {
        return new Terms(purpose, effectiveAt, reviewBy, recommendation, differenceReason, entryKey);
    }

    boolean closure() {
        return purpose.equals(CLOSURE);
    }
}
