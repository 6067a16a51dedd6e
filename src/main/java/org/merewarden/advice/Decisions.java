package org.merewarden.advice;

import java.time.Clock;
import java.time.Instant;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.activity.ActivityLog;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.web.NotFound;
import org.merewarden.web.OfficeSettings;
import org.merewarden.web.Who;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/** Issuing, refusing and withdrawing limits. Proposer and issuer differ unless the office allows it. */
@Service
class Decisions {
    /** In the store. */
    static final int LONGEST_REASON = 4000;

    private final LimitWriter writer;
    private final AllocationWriter allocations;
    private final LimitHistory history;
    private final StandingKeeper standings;
    private final Assessments assessments;
    private final LimitSubjects subjects;
    private final OfficeSettings settings;
    private final ActivityLog activity;
    private final Clock clock;

    Decisions(
            LimitWriter writer,
            AllocationWriter allocations,
            LimitHistory history,
            StandingKeeper standings,
            Assessments assessments,
            LimitSubjects subjects,
            OfficeSettings settings,
            ActivityLog activity,
            Clock clock) {
        this.writer = writer;
        this.allocations = allocations;
        this.history = history;
        this.standings = standings;
        this.assessments = assessments;
        this.subjects = subjects;
        this.settings = settings;
        this.activity = activity;
        this.clock = clock;
    }

    /**
     * Issues a proposed limit. It is in force at once, or waits for the moment that it names.
     *
     * @param remark the issuer's words; required where the assessment behind the limit is missing, superseded or
     *     unsettled
     * @return whether it is in force
     */
    @Transactional
    public boolean issue(long id, @Nullable String remark) {
        LimitFile file = open(id, remark);
        NewLimit limit = file.limit();
        boolean own = file.first().decidedBy().equals(Who.name());
        if (own && !ownProposals()) {
            throw new NotAllowed("advice.issue.own");
        }
        Optional<String> doubt = doubt(limit);
        if (remark == null && doubt.isPresent()) {
            throw new NotAllowed("advice.issue." + doubt.get());
        }
        String reason = remark == null ? file.first().reason() : remark;
        Beside beside = new Beside(own, doubt.orElse(null), null);
        String before = subjects.standing(limit);
        boolean now = hold(id, limit, reason, beside);
        activity.record(
                "issued limit",
                subjects.subject(id, limit),
                before,
                subjects.describe(limit) + "; "
                        + (now ? "" : "from " + limit.terms().effectiveAt() + "; ") + reason
                        + doubt.map(d -> " (assessment " + d + ")").orElse("")
                        + (own ? " (own proposal)" : ""));
        return now;
    }

    private boolean hold(long id, NewLimit limit, String reason, Beside beside) {
        Instant now = clock.instant();
        Instant from = limit.holdsFrom(now);
        writer.decide(id, LimitWriter.ISSUED, Who.name(), from, reason, beside);
        allocations.byRights(id, limit);
        if (from.isAfter(now)) {
            writer.putPending(id, from);
            return false;
        }
        writer.putInForce(id, limit, Who.name(), now);
        standings.refresh(limit.stockId());
        return true;
    }

    @Transactional
    public void refuse(long id, String reason) {
        NewLimit limit = open(id, reason).limit();
        writer.decide(id, LimitWriter.REFUSED, Who.name(), clock.instant(), reason);
        activity.record("refused limit", subjects.subject(id, limit), "proposed: " + subjects.describe(limit), reason);
    }

    /**
     * Takes an issued limit out of force, or keeps it from coming into force.
     *
     * @return whether it was in force, so that its season is left without a limit
     */
    @Transactional
    public boolean withdraw(long id, String reason) {
        checkLength(reason);
        LimitFile file = locked(id);
        if (!file.standing()) {
            throw new NotAllowed("advice.withdraw.notInForce");
        }
        NewLimit limit = file.limit();
        writer.decide(id, LimitWriter.WITHDRAWN, Who.name(), clock.instant(), reason);
        boolean waited = writer.endPending(id);
        writer.endForce(id);
        standings.refresh(limit.stockId());
        activity.record(
                "withdrew limit",
                subjects.subject(id, limit),
                (waited ? "pending: " : "in force: ") + subjects.describe(limit),
                reason);
        return !waited;
    }

    /** Whether an approver may issue what they proposed themselves. */
    boolean ownProposals() {
        return settings.get(OfficeSettings.OWN_PROPOSALS).equals("yes");
    }

    /**
     * What is wrong with the assessment behind a limit: missing, superseded or unsettled. A closure rests on none, and
     * its own reason is always written.
     */
    Optional<String> doubt(NewLimit limit) {
        return doubt(limit, assessments.latest(limit.stockId()));
    }

    static Optional<String> doubt(NewLimit limit, Optional<AssessmentView> latest) {
        if (limit.terms().closure()) {
            return Optional.empty();
        }
        if (latest.isEmpty()) {
            return Optional.of("missing");
        }
        Long behind = limit.assessmentId();
        if (behind == null || latest.get().id() != behind) {
            return Optional.of("superseded");
        }
        return latest.get().settled() ? Optional.empty() : Optional.of("unsettled");
    }

    NewLimit find(long id) {
        return history.find(id).orElseThrow(() -> new NotFound("limit " + id));
    }

    private LimitFile open(long id, @Nullable String reason) {
        checkLength(reason);
        LimitFile file = locked(id);
        if (!file.open()) {
            throw new NotAllowed("advice.decided");
        }
        return file;
    }

    /** Two people deciding at once: the second waits and then finds it decided. */
    private LimitFile locked(long id) {
        writer.lock(id);
        return history.file(id).orElseThrow(() -> new NotFound("limit " + id));
    }

    private static void checkLength(@Nullable String reason) {
        if (reason != null && reason.length() > LONGEST_REASON) {
            throw new NotAllowed("advice.reason.long");
        }
    }
}
