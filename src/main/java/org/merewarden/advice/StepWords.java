package org.merewarden.advice;

import java.util.ArrayList;
import java.util.List;
import java.util.stream.IntStream;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.AdviceWorking.Basis;
import org.merewarden.advice.AdviceWorking.Between;
import org.merewarden.advice.OutlookPage.Step;
import org.merewarden.core.inference.Quantiles;
import org.merewarden.core.policy.LimitRule;
import org.merewarden.core.policy.Policy;
import org.merewarden.core.policy.Recommendation;
import org.merewarden.core.policy.Recommendation.Rule;
import org.merewarden.web.Figures;
import org.merewarden.web.Texts;
import org.springframework.stereotype.Component;

/** The rule's working as numbered sentences with this stock's numbers. */
@Component
class StepWords {
    private final Texts texts;

    StepWords(Texts texts) {
        this.texts = texts;
    }

    List<Step> of(AdviceWorking w) {
        Recommendation r = w.recommendation();
        List<Step> steps = new ArrayList<>();
        steps.add(new Step(start(w), ""));
        steps.add(new Step(ramp(w), tonnes(r, Rule.RAMP)));
        steps.add(new Step(risk(w), tonnes(r, Rule.RISK)));
        steps.add(new Step(steadiness(w), tonnes(r, Rule.STEADINESS)));
        steps.add(new Step(lastSeason(w), tonnes(r, Rule.RISK_AGAIN)));
        steps.add(new Step(texts.of("outlook.step.rounding"), Figures.decided(r.after(Rule.ROUNDING))));
        return steps;
    }

    private static String tonnes(Recommendation r, Rule rule) {
        return exact(r.after(rule));
    }

    /** An amount on the way to the recommendation: four digits, one more than an estimate. */
    private static String exact(double tonnes) {
        return Figures.digits(tonnes, 4) + "\u00a0t";
    }

    /** Where the season of the limit starts from. */
    private String start(AdviceWorking w) {
        Policy policy = w.policy();
        double tail = (1 - policy.intervalProbability()) / 2;
        double[] biomass = IntStream.range(0, w.outlook().draws())
                .mapToDouble(w.outlook()::startBiomass)
                .toArray();
        double[] q = Quantiles.of(biomass, new double[] {tail, 0.5, 1 - tail});
        List<String> sentences = new ArrayList<>();
        sentences.add(texts.of(
                "outlook.step.assessed",
                String.valueOf(w.assessment().number()),
                String.valueOf(w.outlook().posterior().lastYear())));
        w.between().forEach(b -> sentences.add(between(b)));
        sentences.add(texts.of(
                "outlook.step.start",
                String.valueOf(w.season()),
                Figures.sig(q[1]),
                Figures.sig(q[0]),
                Figures.sig(q[2]),
                Figures.setPercent(policy.intervalProbability())));
        return String.join(" ", sentences);
    }

    private String between(Between b) {
        String season = String.valueOf(b.season());
        return b.basis() == Basis.NOTHING
                ? texts.of("outlook.between.nothing", season)
                : texts.of(
                        "outlook.between." + b.basis().name().toLowerCase(java.util.Locale.ROOT),
                        season,
                        b.basis() == Basis.LIMIT ? Figures.decided(b.tonnes()) : Figures.tonnes(b.tonnes()),
                        Figures.percent(b.cv()));
    }

    private String ramp(AdviceWorking w) {
        Policy policy = w.policy();
        Policy.Ramp ramp = policy.ramp();
        return texts.of(
                ramp.line() == Policy.Line.CATCH ? "outlook.step.ramp.catch" : "outlook.step.ramp.mortality",
                Figures.setPercent(ramp.line() == Policy.Line.CATCH ? ramp.lowFraction() : policy.limitFraction()),
                Figures.setPercent(ramp.targetFraction()),
                Figures.setPercent(ramp.highFraction()),
                Figures.setPercent(policy.quantile()));
    }

    private String risk(AdviceWorking w) {
        Recommendation r = w.recommendation();
        Policy policy = w.policy();
        String horizon = String.valueOf(policy.horizonYears());
        String tolerance = Figures.setPercent(policy.tolerance());
        String limit = Figures.setPercent(policy.limitFraction());
        if (Double.isNaN(r.ceilingTonnes())) {
            return texts.of("outlook.step.risk.closed", limit, horizon, tolerance);
        }
        if (Double.isInfinite(r.ceilingTonnes())) {
            return texts.of("outlook.step.risk.none", limit, horizon, tolerance);
        }
        return texts.of(
                r.after(Rule.RISK) < r.after(Rule.RAMP) ? "outlook.step.risk.lowered" : "outlook.step.risk.passed",
                limit,
                horizon,
                tolerance,
                Figures.tonnes(r.ceilingTonnes()));
    }

    private String steadiness(AdviceWorking w) {
        Recommendation r = w.recommendation();
        double before = w.earlier().limitTonnes();
        String season = String.valueOf(w.season() - 1);
        if (Double.isNaN(before)) {
            return texts.of("outlook.step.steady.first", season);
        }
        if (before == 0) {
            return texts.of(
                    before(w, Basis.CLOSED) ? "outlook.step.steady.closedEarly" : "outlook.step.steady.closed", season);
        }
        double cap = w.policy().steadinessCap();
        double change = r.after(Rule.STEADINESS) - r.after(Rule.RISK);
        String key = change < 0 ? "lowered" : change > 0 ? "raised" : held(r, (1 - cap) * before) ? "risk" : "passed";
        return texts.of(
                "outlook.step.steady." + key,
                season,
                Figures.decided(before),
                Figures.setPercent(cap),
                exact((1 - cap) * before),
                exact((1 + cap) * before));
    }

    /** Under the floor because the floor is too risky. */
    private static boolean held(Recommendation r, double floor) {
        return r.after(Rule.STEADINESS) < floor;
    }

    private String lastSeason(AdviceWorking w) {
        LimitRule rule = new LimitRule(w.policy());
        double carried = rule.carriedOver(w.earlier());
        double back = rule.paidBack(w.earlier());
        Recommendation r = w.recommendation();
        boolean lowered = r.after(Rule.RISK_AGAIN) < r.after(Rule.LAST_SEASON);
        String again = lowered ? " " + texts.of("outlook.step.again") : "";
        String sure = before(w, Basis.LANDINGS) ? ".expected" : "";
        if (carried > 0) {
            return texts.of("outlook.step.carried" + sure, Figures.tonnes(carried)) + again;
        }
        return back > 0
                ? texts.of("outlook.step.back" + sure, Figures.tonnes(back)) + again
                : texts.of("outlook.step.nothing");
    }

    /** Last season's limit and what came of it; null where none was in force. */
    @Nullable
    String earlier(AdviceWorking w) {
        if (w.earlierNotice() == null) {
            return null;
        }
        double limit = w.earlier().limitTonnes();
        double taken = w.earlier().removalsTonnes();
        String season = String.valueOf(w.season() - 1);
        if (Double.isNaN(limit)) {
            return texts.of("outlook.earlier.other", season);
        }
        if (before(w, Basis.CLOSED)) {
            return texts.of("outlook.earlier.closed", season);
        }
        return Double.isNaN(taken)
                ? texts.of("outlook.earlier.unknown", season, Figures.decided(limit))
                : texts.of(
                        taken > limit ? "outlook.earlier.over" : "outlook.earlier.within",
                        season,
                        Figures.decided(limit),
                        Figures.tonnes(taken));
    }

    /** Whether the season before is known in this way. */
    private static boolean before(AdviceWorking w, Basis basis) {
        return w.between().stream().anyMatch(b -> b.season() == w.season() - 1 && b.basis() == basis);
    }
}
