package org.merewarden.advice;

import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.core.policy.LimitArithmetic;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;

/** What is in force, in finished strings. */
@Component
class AdviceView {
    private final Assessments assessments;
    private final Limits limits;
    private final Standings standings;
    private final MessageSource messages;

    AdviceView(Assessments assessments, Limits limits, Standings standings, MessageSource messages) {
        this.assessments = assessments;
        this.limits = limits;
        this.standings = standings;
        this.messages = messages;
    }

    /** What is allowed now, and what that would do. */
    String lede(StockView stock) {
        int season = limits.presentSeason();
        return lede(stock, assessments.latest(stock.id()), limits.inForce(stock.id(), season), season);
    }

    private String lede(StockView stock, Optional<AssessmentView> assessment, Optional<LimitView> limit, int season) {
        String allowed =
                limit.map(l -> inForce(l, season)).orElseGet(() -> text("advice.lede.noLimit", season(season)));
        Optional<StandingView> standing = standings.of(stock.id());
        if (assessment.isEmpty()) {
            return allowed + " " + text("advice.lede.unassessed");
        }
        return standing.map(s -> allowed + " "
                        + text(
                                "advice.lede.standing",
                                text("standing." + s.standing().toLowerCase(java.util.Locale.ROOT)),
                                Figures.tonnes(s.removalsTonnes()),
                                text("advice.basis." + s.removalsBasis().replace(' ', '-')),
                                Figures.chances(s.collapseProbability())))
                .orElse(allowed + " " + text("advice.lede.noDraws"));
    }

    private String inForce(LimitView limit, int season) {
        return limit.closure()
                ? text("advice.lede.closed", season(season), Figures.dateTime(limit.effectiveAt()))
                : text("advice.lede.limit", season(season), amount(limit));
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

    private String text(String key, @Nullable Object... values) {
        return messages.getMessage(key, values, LocaleContextHolder.getLocale());
    }
}
