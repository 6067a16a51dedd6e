package org.merewarden.advice;

import java.time.Clock;
import org.merewarden.activity.ActivityLog;
import org.merewarden.web.NotFound;
import org.merewarden.web.Who;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/** Drafting and proposing limits, with the rule's recommendation beside them. */
@Service
class Proposals {
    private final LimitWriter writer;
    private final AllocationWriter allocations;
    private final LimitHistory history;
    private final Recommendations recommendations;
    private final Decisions decisions;
    private final LimitSubjects subjects;
    private final ActivityLog activity;
    private final Clock clock;

    Proposals(
            LimitWriter writer,
            AllocationWriter allocations,
            LimitHistory history,
            Recommendations recommendations,
            Decisions decisions,
            LimitSubjects subjects,
            ActivityLog activity,
            Clock clock) {
        this.writer = writer;
        this.allocations = allocations;
        this.history = history;
        this.recommendations = recommendations;
        this.decisions = decisions;
        this.subjects = subjects;
        this.activity = activity;
        this.clock = clock;
    }

    /** Writes a draft down, which only the office sees; returns its number. */
    @Transactional
    public long draft(Proposal proposal) {
        return write(proposal, LimitWriter.DRAFTED, "drafted limit");
    }

    /** Writes the proposal down; returns the number of the notice-to-be. */
    @Transactional
    public long propose(Proposal proposal) {
        return write(proposal, LimitWriter.PROPOSED, "proposed limit");
    }

    /** Proposes a closure and, where the one who closes may issue their own proposal, issues it in the same act. */
    @Transactional
    public long close(Proposal closure) {
        long id = propose(closure);
        if (Who.has("APPROVER") && decisions.ownProposals()) {
            decisions.issue(id, closure.reason());
        }
        return id;
    }

    private long write(Proposal proposal, String act, String action) {
        // before anything refers to the stock: a row that does holds it shared, and two such would wait for each other
        writer.lockStock(proposal.limit().stockId());
        Long recommendation = proposal.advice().map(recommendations::keep).orElse(null);
        NewLimit limit = proposal.limit();
        limit = limit.on(limit.terms().recommendedBy(recommendation));
        long id = writer.add(limit, Who.name());
        writer.decide(id, act, Who.name(), clock.instant(), proposal.reason());
        allocations.byHand(id, limit.stockId(), proposal.hand());
        String before = subjects.standing(limit);
        Long replaced = proposal.replaces();
        if (replaced != null) {
            before = replace(replaced, id, limit);
        }
        activity.record(
                action, subjects.subject(id, limit), before, subjects.describe(limit) + "; " + proposal.reason());
        return id;
    }

    private String replace(long draft, long by, NewLimit limit) {
        LimitFile file = draft(draft);
        if (file.limit().stockId() != limit.stockId()) {
            throw new NotAllowed("advice.draft.gone");
        }
        writer.decide(draft, LimitWriter.DISCARDED, Who.name(), clock.instant(), "", Beside.replacedBy(by));
        return "draft " + draft + ": " + subjects.describe(file.limit());
    }

    @Transactional
    public void discard(long id) {
        NewLimit limit = draft(id).limit();
        writer.decide(id, LimitWriter.DISCARDED, Who.name(), clock.instant(), "");
        activity.record("discarded draft", subjects.subject(id, limit), subjects.describe(limit), null);
    }

    private LimitFile draft(long id) {
        writer.lock(id);
        LimitFile file = history.file(id).orElseThrow(() -> new NotFound("draft " + id));
        if (!file.draft()) {
            throw new NotAllowed("advice.draft.gone");
        }
        return file;
    }
}
