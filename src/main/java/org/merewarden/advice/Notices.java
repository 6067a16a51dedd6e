package org.merewarden.advice;

import java.time.Instant;
import java.util.List;
import java.util.Locale;
import java.util.Objects;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.merewarden.web.OfficeSettings;
import org.springframework.stereotype.Service;

/** Writes notices: a limit with what was decided about it, as the page and the paper say it. */
@Service
class Notices {
    private final Register register;
    private final Decisions decisions;
    private final LimitHistory history;
    private final Assessments assessments;
    private final OfficeSettings settings;
    private final NoticeParts parts;
    private final Recommendations recommendations;
    private final LimitPapers papers;
    private final DecisionWords words;
    private final ClosureWords closures;

    Notices(
            Register register,
            Decisions decisions,
            LimitHistory history,
            Assessments assessments,
            OfficeSettings settings,
            NoticeParts parts,
            Recommendations recommendations,
            LimitPapers papers,
            DecisionWords words,
            ClosureWords closures) {
        this.register = register;
        this.decisions = decisions;
        this.history = history;
        this.assessments = assessments;
        this.settings = settings;
        this.parts = parts;
        this.recommendations = recommendations;
        this.papers = papers;
        this.words = words;
        this.closures = closures;
    }

    Notice notice(long id) {
        NewLimit limit = decisions.find(id);
        StockView stock = register.stock(limit.stockId()).orElseThrow();
        List<LimitHistory.Decision> acts = history.ofLimit(id);
        Optional<LimitHistory.Decision> issued =
                acts.stream().filter(a -> a.act().equals(LimitWriter.ISSUED)).findFirst();
        Instant from = issued.filter(act -> limit.terms().effectiveAt() != null)
                .map(LimitHistory.Decision::effectiveAt)
                .orElse(limit.terms().effectiveAt());
        Optional<ClosureWords.Said> closed =
                limit.terms().closure() ? Optional.ofNullable(from).map(closures::said) : Optional.empty();
        String reason = words.reason(issued.orElse(acts.get(0)));
        return new Notice(
                id,
                settings.get(OfficeSettings.OFFICE_NAME),
                issued.map(LimitHistory.Decision::when).orElse(null),
                stock.title(),
                stock.path(),
                AdviceView.season(limit.season()),
                limit.terms().closure() ? Terms.CLOSURE : limit.kind().replace(' ', '-'),
                amount(limit),
                setAsides(limit),
                Figures.setPercent(limit.reportedFraction()),
                AdviceView.toBeLogged(limit),
                Figures.date(closed.map(ClosureWords.Said::day).orElse(limit.validFrom())) + " – "
                        + Figures.date(limit.validTo()),
                from == null ? null : Figures.dateTime(from),
                limit.terms().reviewBy() == null
                        ? null
                        : Figures.date(limit.terms().reviewBy()),
                recommended(limit),
                limit.terms().differenceReason(),
                closed.map(ClosureWords.Said::measures).orElse(limit.measures()),
                limit.legalBasis(),
                limit.objection(),
                reason,
                strength(stock.id(), limit),
                acts.get(acts.size() - 1).act(),
                parts.of(id, limit),
                acts.stream().map(d -> act(d, reason)).toList(),
                papers.objections(id).size());
    }

    /** To the kilogram: a decided amount is no estimate. */
    private static String amount(NewLimit limit) {
        Double amount = limit.amount();
        if (amount == null) {
            return "";
        }
        return limit.kind().equals("catch") ? Figures.decided(amount) : Figures.withUnit(amount, limit.unit());
    }

    private @Nullable String recommended(NewLimit limit) {
        Long id = limit.terms().recommendationId();
        Recommendations.Kept kept =
                id == null ? null : recommendations.ofStock(limit.stockId()).get(id);
        return kept == null ? null : Figures.decided(kept.limitTonnes());
    }

    private Notice.Act act(LimitHistory.Decision d, String told) {
        String reason = words.reason(d);
        return new Notice.Act(
                d.act(), d.when(), d.decidedBy(), reason.isEmpty() || reason.equals(told) ? null : reason);
    }

    /** Of the assessment that the proposal rested on, whatever was assessed since; papers know none, so the latest. */
    private @Nullable String strength(long stockId, NewLimit limit) {
        Optional<AssessmentView> assessment = limit.origin().equals("decided")
                ? assessments.ofStock(stockId).stream()
                        .filter(a -> Objects.equals(a.id(), limit.assessmentId()))
                        .findFirst()
                : assessments.latest(stockId);
        return assessment.map(a -> a.strength().toLowerCase(Locale.ROOT)).orElse(null);
    }

    private static List<Notice.SetAside> setAsides(NewLimit limit) {
        return List.of(
                new Notice.SetAside("subsistence", Figures.decided(limit.subsistenceTonnes())),
                new Notice.SetAside("angling", Figures.decided(limit.anglingTonnes())),
                new Notice.SetAside("research", Figures.decided(limit.researchTonnes())),
                new Notice.SetAside("other", Figures.decided(limit.otherTonnes())));
    }
}
