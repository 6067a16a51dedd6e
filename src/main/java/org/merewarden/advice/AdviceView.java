package org.merewarden.advice;

import java.util.List;
import java.util.Optional;
import java.util.stream.DoubleStream;
import org.jspecify.annotations.Nullable;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.policy.LimitArithmetic;
import org.merewarden.core.policy.Policy;
import org.merewarden.core.policy.StandingRule;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;

/** What the advice page says, in finished strings. */
@Component
class AdviceView {
    private static final double[] SHARES_OF_MSY = {0, 0.25, 0.5, 0.75, 0.9, 1, 1.1};

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

    /** One constant catch with what it would mean in the long run. */
    record Alternative(
            String name, String catchTonnes, String collapse, boolean aboveTolerance, String margin, String tipping) {}

    /** The page's strings. */
    record Page(String title, String lede, List<String> cautions, List<Alternative> alternatives, boolean settled) {}

    Page page(StockView stock) {
        Optional<AssessmentView> assessment = assessments.latest(stock.id());
        int season = limits.presentSeason();
        Optional<LimitView> limit = limits.inForce(stock.id(), season);
        return new Page(
                stock.title(),
                lede(stock, assessment, limit, season),
                cautions(assessment),
                assessment.map(a -> alternatives(a, limit)).orElse(List.of()),
                assessment.isPresent() && assessment.get().settled());
    }

    private String lede(StockView stock, Optional<AssessmentView> assessment, Optional<LimitView> limit, int season) {
        String allowed = limit.map(l -> text("advice.lede.limit", season(season), amount(l)))
                .orElseGet(() -> text("advice.lede.noLimit", season(season)));
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

    private List<String> cautions(Optional<AssessmentView> assessment) {
        if (assessment.isEmpty()) {
            return List.of(text("advice.caution.unassessed"));
        }
        var cautions = new java.util.ArrayList<String>();
        if (!assessment.get().settled()) {
            cautions.add(text("advice.caution.unsettled"));
        }
        if (assessment.get().strength().equals("NONE")) {
            cautions.add(text("advice.caution.none"));
        } else if (assessment.get().strength().equals("THIN")) {
            cautions.add(text("advice.caution.thin"));
        }
        return cautions;
    }

    private List<Alternative> alternatives(AssessmentView assessment, Optional<LimitView> limit) {
        Posterior posterior = assessments.posterior(assessment.id());
        Double msy = assessment.msyTonnes();
        if (posterior.draws() == 0 || msy == null) {
            return List.of();
        }
        var rows = new java.util.ArrayList<Alternative>();
        Double allowed = limit.map(LimitView::amountTonnes).orElse(null);
        if (allowed != null) {
            rows.add(alternative(text("advice.alternative.limit"), posterior, allowed));
        }
        DoubleStream.of(SHARES_OF_MSY)
                .mapToObj(share -> alternative(
                        share == 0
                                ? text("advice.alternative.none")
                                : text("advice.alternative.share", Figures.percent(share)),
                        posterior,
                        share * msy))
                .forEach(rows::add);
        return rows;
    }

    private Alternative alternative(String name, Posterior posterior, double tonnes) {
        StandingRule.Result result = new StandingRule(Policy.DEFAULT).judge(posterior, tonnes);
        return new Alternative(
                name,
                Figures.sig(tonnes),
                Figures.percent(result.collapseProbability()),
                result.collapseProbability() > Policy.DEFAULT.tolerance(),
                Figures.percent(result.margin()) + " (" + Figures.percent(result.marginLow()) + " to "
                        + Figures.percent(result.marginHigh()) + ")",
                Figures.sig(result.tippingBiomassTonnes()));
    }

    static String toBeLogged(NewLimit limit) {
        Double amount = limit.amount();
        return limit.kind().equals("catch") && amount != null
                ? Figures.tonnes(LimitArithmetic.toBeLogged(amount, limit.setAsidesTonnes(), limit.reportedFraction()))
                : Figures.UNKNOWN;
    }

    static String amount(LimitView limit) {
        return limit.amount() == null ? limit.kind() : Figures.withUnit(limit.amount(), limit.unit());
    }

    static String season(int season) {
        return Integer.toString(season);
    }

    private String text(String key, @Nullable Object... values) {
        return messages.getMessage(key, values, LocaleContextHolder.getLocale());
    }
}
