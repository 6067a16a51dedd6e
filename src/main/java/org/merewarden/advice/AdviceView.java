package org.merewarden.advice;

import java.util.Optional;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.core.policy.LimitArithmetic;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.merewarden.web.Texts;
import org.springframework.stereotype.Component;

/** What is in force, in finished strings. */
@Component
class AdviceView {
    private final Assessments assessments;
    private final Limits limits;
    private final Standings standings;
    private final Texts texts;

    AdviceView(Assessments assessments, Limits limits, Standings standings, Texts texts) {
        this.assessments = assessments;
        this.limits = limits;
        this.standings = standings;
        this.texts = texts;
    }

    /** What is allowed now, and what that would do. */
    String lede(StockView stock) {
        int season = limits.presentSeason();
        return lede(stock, assessments.latest(stock.id()), limits.inForce(stock.id(), season), season);
    }

    private String lede(StockView stock, Optional<AssessmentView> assessment, Optional<LimitView> limit, int season) {
        String allowed =
                limit.map(l -> inForce(l, season)).orElseGet(() -> texts.of("advice.lede.noLimit", season(season)));
        Optional<StandingView> standing = standings.of(stock.id());
        if (assessment.isEmpty()) {
            return allowed + " " + texts.of("advice.lede.unassessed");
        }
        return standing.map(s -> allowed + " "
                        + texts.of(
                                "advice.lede.standing",
                                texts.of("standing." + s.standing().toLowerCase(java.util.Locale.ROOT)),
                                s.limit() ? Figures.decided(s.removalsTonnes()) : Figures.tonnes(s.removalsTonnes()),
                                texts.of("advice.basis." + s.removalsBasis().replace(' ', '-')),
                                Figures.chances(s.collapseProbability())))
                .orElse(allowed + " " + texts.of("advice.lede.noDraws"));
    }

    private String inForce(LimitView limit, int season) {
        return limit.closure()
                ? texts.of("advice.lede.closed", season(season), Figures.dateTime(limit.effectiveAt()))
                : texts.of("advice.lede.limit", season(season), amount(limit));
    }

    static String toBeLogged(NewLimit limit) {
        Double amount = limit.amount();
        return limit.kind().equals("catch") && amount != null
                ? Figures.decided(LimitArithmetic.toBeLogged(amount, limit.setAsidesTonnes(), limit.reportedFraction()))
                : Figures.UNKNOWN;
    }

    private static String amount(LimitView limit) {
        return limit.amount() == null ? limit.kind() : Figures.decided(limit.amount(), limit.unit());
    }

    static String season(int season) {
        return Integer.toString(season);
    }
}
