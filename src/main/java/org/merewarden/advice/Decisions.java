package org.merewarden.advice;

import java.time.Clock;
import java.util.List;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.activity.ActivityLog;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.NotFound;
import org.merewarden.web.OfficeSettings;
import org.merewarden.web.Who;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/** Proposing, issuing, refusing and withdrawing limits. Proposer and issuer differ unless the office allows it. */
@Service
class Decisions {
    /** A decision that the rules do not allow; the message says which rule, for the page. */
    static final class NotAllowed extends RuntimeException {
        NotAllowed(String messageKey) {
            super(messageKey);
        }
    }

    private final LimitWriter writer;
    private final LimitHistory history;
    private final StandingKeeper standings;
    private final Assessments assessments;
    private final Register register;
    private final OfficeSettings settings;
    private final ActivityLog activity;
    private final Clock clock;

    Decisions(
            LimitWriter writer,
            LimitHistory history,
            StandingKeeper standings,
            Assessments assessments,
            Register register,
            OfficeSettings settings,
            ActivityLog activity,
            Clock clock) {
        this.writer = writer;
        this.history = history;
        this.standings = standings;
        this.assessments = assessments;
        this.register = register;
        this.settings = settings;
        this.activity = activity;
        this.clock = clock;
    }

    /** What the store holds of a reason, less the words that an own proposal adds. */
    static final int LONGEST_REASON = 4000;

    private static void checkLength(@Nullable String reason) {
        if (reason != null && reason.length() > LONGEST_REASON) {
            throw new NotAllowed("advice.reason.long");
        }
    }

    /** Writes the proposal down; returns the number of the notice-to-be. */
    @Transactional
    public long propose(NewLimit limit, String reason) {
        long id = writer.add(limit, Who.name());
        writer.decide(id, LimitWriter.PROPOSED, Who.name(), clock.instant(), reason);
        activity.record("proposed limit", subject(id, limit), null, describe(limit) + "; " + reason);
        return id;
    }

    /**
     * Issues a proposed limit and puts it in force.
     *
     * @param remark the issuer's words; required where the stock has no settled assessment
     */
    @Transactional
    public void issue(long id, @Nullable String remark) {
        checkLength(remark);
        NewLimit limit = open(id);
        LimitHistory.Decision proposal = history.ofLimit(id).get(0);
        boolean own = proposal.decidedBy().equals(Who.name());
        if (own && !settings.get(OfficeSettings.OWN_PROPOSALS).equals("yes")) {
            throw new NotAllowed("advice.issue.own");
        }
        if (remark == null && !settled(limit.stockId())) {
            throw new NotAllowed("advice.issue.unsettled");
        }
        String reason = (remark == null ? proposal.reason() : remark)
                + (own ? " (own proposal, as the office's settings allow)" : "");
        writer.decide(id, LimitWriter.ISSUED, Who.name(), clock.instant(), reason);
        writer.putInForce(id, limit, Who.name());
        standings.refresh(limit.stockId());
        activity.record("issued limit", subject(id, limit), "proposed", describe(limit) + "; " + reason);
    }

    @Transactional
    public void refuse(long id, String reason) {
        checkLength(reason);
        NewLimit limit = open(id);
        writer.decide(id, LimitWriter.REFUSED, Who.name(), clock.instant(), reason);
        activity.record("refused limit", subject(id, limit), "proposed", reason);
    }

    /** Takes an issued limit out of force. */
    @Transactional
    public void withdraw(long id, String reason) {
        checkLength(reason);
        writer.lock(id);
        NewLimit limit = find(id);
        List<String> acts =
                history.ofLimit(id).stream().map(LimitHistory.Decision::act).toList();
        if (!acts.contains(LimitWriter.ISSUED)
                || acts.contains(LimitWriter.WITHDRAWN)
                || acts.contains(LimitWriter.SUPERSEDED)) {
            throw new NotAllowed("advice.withdraw.notInForce");
        }
        writer.decide(id, LimitWriter.WITHDRAWN, Who.name(), clock.instant(), reason);
        writer.endForce(id);
        standings.refresh(limit.stockId());
        activity.record("withdrew limit", subject(id, limit), "in force", reason);
    }

    /** Whether the stock's latest assessment settled; a stock without one has none to rest on. */
    boolean settled(long stockId) {
        Optional<AssessmentView> latest = assessments.latest(stockId);
        return latest.isPresent() && latest.get().settled();
    }

    NewLimit find(long id) {
        return history.find(id).orElseThrow(() -> new NotFound("limit " + id));
    }

    private NewLimit open(long id) {
        // two people deciding at once: the second waits and then finds it decided
        writer.lock(id);
        NewLimit limit = find(id);
        if (!history.open(limit.stockId()).contains(id)) {
            throw new NotAllowed("advice.decided");
        }
        return limit;
    }

    private String subject(long id, NewLimit limit) {
        StockView stock = register.stock(limit.stockId()).orElseThrow();
        return "notice " + id + ", " + stock.title() + ", season " + limit.season();
    }

    static String describe(NewLimit limit) {
        String amount = limit.amount() == null ? limit.kind() : limit.amount() + " " + limit.unit();
        return amount + (limit.setAsidesTonnes() > 0 ? ", set aside " + limit.setAsidesTonnes() + " t" : "");
    }
}
