package org.merewarden.advice;

import java.time.Instant;
import java.util.Objects;
import org.merewarden.activity.ActivityLog;
import org.merewarden.web.Who;
import org.slf4j.Logger;
import org.slf4j.LoggerFactory;
import org.springframework.stereotype.Service;
import org.springframework.transaction.support.TransactionTemplate;

/** Puts revisions and closures that were issued ahead in force at their moment. */
@Service
class PendingLimits {
    private static final Logger LOG = LoggerFactory.getLogger(PendingLimits.class);

    private final LimitHistory history;
    private final LimitWriter writer;
    private final StandingKeeper standings;
    private final LimitSubjects subjects;
    private final ActivityLog activity;
    private final TransactionTemplate transaction;

    PendingLimits(
            LimitHistory history,
            LimitWriter writer,
            StandingKeeper standings,
            LimitSubjects subjects,
            ActivityLog activity,
            TransactionTemplate transaction) {
        this.history = history;
        this.writer = writer;
        this.standings = standings;
        this.subjects = subjects;
        this.activity = activity;
        this.transaction = transaction;
    }

    /** Every limit whose moment has come, each in a transaction of its own, in the order of their moments. */
    void takeEffect(Instant now) {
        for (long id : history.due(now)) {
            try {
                transaction.executeWithoutResult(status -> takeEffect(id));
            } catch (RuntimeException e) {
                // the others still take effect, and this one is tried again at the next round
                LOG.error("limit {} could not be put in force", id, e);
            }
        }
    }

    private void takeEffect(long id) {
        writer.lock(id);
        if (!writer.endPending(id)) {
            return; // withdrawn meanwhile, or put in force by another process
        }
        NewLimit limit = history.find(id).orElseThrow();
        String before = subjects.standing(limit);
        Instant from = Objects.requireNonNull(limit.terms().effectiveAt());
        writer.putInForce(id, limit, Who.name(), from);
        standings.refresh(limit.stockId());
        activity.record("put limit in force", subjects.subject(id, limit), before, subjects.describe(limit));
    }
}
