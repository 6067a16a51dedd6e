package org.merewarden.season;

import java.time.Instant;
import java.util.List;
import org.jspecify.annotations.Nullable;

/**
 * One stored row of the log.
 *
 * @param kind landing, correction or withdrawal
 * @param rootId the first row of its history, itself for a landing
 * @param correctedBy the row that stands for it now; null on the row in force
 * @param reason why it was corrected or withdrawn
 */
record LandingRow(
        long id,
        Entry entry,
        String kind,
        long rootId,
        @Nullable Long correctedBy,
        @Nullable String reason,
        int season,
        long waterBodyId,
        @Nullable Long stockId,
        @Nullable Long cooperativeId,
        double factor,
        double liveWeightKg,
        List<Flag> flags,
        Instant recordedAt,
        String recordedBy) {
    /** Whether it is, or was, taken from a limit. */
    boolean taken() {
        return entry.sector().equals("commercial") && !entry.fate().equals("released") && !withdrawal();
    }

    boolean withdrawal() {
        return kind.equals("withdrawal");
    }
}
