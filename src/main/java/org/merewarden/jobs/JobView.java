package org.merewarden.jobs;

import java.time.Instant;
import org.jspecify.annotations.Nullable;

/** A job as pages show it. State: QUEUED, RUNNING, DONE, FAILED or CANCELLED. */
public record JobView(
        long id,
        String kind,
        String subject,
        String state,
        int done,
        int total,
        @Nullable String note,
        String requestedBy,
        Instant requestedAt,
        @Nullable Instant startedAt,
        @Nullable Instant finishedAt) {
    public boolean active() {
        return state.equals("QUEUED") || state.equals("RUNNING");
    }
}
