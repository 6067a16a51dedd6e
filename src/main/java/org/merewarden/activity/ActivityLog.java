package org.merewarden.activity;

import java.time.Clock;
import java.time.ZoneOffset;
import org.jspecify.annotations.Nullable;
import org.merewarden.web.Who;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Service;

/** The append-only record of who did what, when, from what to what. Written in the caller's transaction. */
@Service
public class ActivityLog {
    private final JdbcClient jdbc;
    private final Clock clock;

    ActivityLog(JdbcClient jdbc, Clock clock) {
        this.jdbc = jdbc;
        this.clock = clock;
    }

    /**
     * @param action a short verb phrase, e.g. "issued limit"
     * @param subject what it was done to, e.g. "Perch in Skelder Water, season 2026"
     * @param before the state before, null where there was none
     * @param after the state after, null where nothing is left
     */
    public void record(String action, String subject, @Nullable String before, @Nullable String after) {
        jdbc.sql("""
                insert into activity_entry (happened_at, actor, action, subject, before_text, after_text)
                values (:at, :actor, :action, :subject, :before, :after)""")
                .param("at", clock.instant().atOffset(ZoneOffset.UTC))
                .param("actor", Who.name())
                .param("action", action)
                .param("subject", subject)
                .param("before", before)
                .param("after", after)
                .update();
    }
}
