package org.merewarden.advice;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.OutlookDrawings.RiskCurve;
import org.merewarden.advice.OutlookPage.Part;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.core.outlook.Course;
import org.merewarden.core.policy.LimitArithmetic;
import org.merewarden.core.policy.Policy;
import org.merewarden.core.policy.Recommendation;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.merewarden.web.Texts;
import org.springframework.stereotype.Component;

/** Says what the rule makes of a stock, whatever of it is known. */
@Component
class OutlookPages {
    private final Adviser adviser;
    private final Assessments assessments;
    private final Alternatives alternatives;
    private final AlternativeRows rows;
    private final OutlookDrawings drawings;
    private final StepWords words;
    private final EffortWords effort;
    private final Texts texts;

    OutlookPages(
            Adviser adviser,
            Assessments assessments,
            Alternatives alternatives,
            AlternativeRows rows,
            OutlookDrawings drawings,
            StepWords words,
            EffortWords effort,
            Texts texts) {
        this.adviser = adviser;
        this.assessments = assessments;
        this.alternatives = alternatives;
        this.rows = rows;
        this.drawings = drawings;
        this.words = words;
        this.effort = effort;
        this.texts = texts;
    }

    /** @param usual the form of the next limit as it is filled in, whose set-asides and reported fraction are shown */
    OutlookPage page(StockView stock, int season, WhatIf ask, LimitForm usual) {
        return adviser.work(stock.id(), season)
                .map(working -> worked(stock, working, ask, usual))
                .orElseGet(() -> nothing(stock, season, ask));
    }

    private OutlookPage worked(StockView stock, AdviceWorking w, WhatIf ask, LimitForm usual) {
        List<Alternative> all = alternatives.of(w, ask);
        RiskCurve curve = drawings.curve(w);
        return new OutlookPage(
                w.season(),
                w.policyNumber(),
                Figures.setPercent(w.policy().intervalProbability()),
                lede(w),
                cautions(w.assessment()),
                words.of(w),
                words.earlier(w),
                parts(w, usual),
                effort.of(w),
                drawings.draw(w, curve, stock.title()),
                drawings.rows(w, curve),
                drawings.biomass(w, all, stock.title()),
                all.stream().map(Alternative::name).toList(),
                rows.of(w, all),
                rows.bySeason(w, all),
                rows.biomass(w, all),
                stress(w, ask));
    }

    /** Where the rule has nothing to work on: what is missing, in a sentence. */
    private OutlookPage nothing(StockView stock, int season, WhatIf ask) {
        Optional<AssessmentView> latest = assessments.latest(stock.id());
        String key = latest.map(a -> why(a, season)).orElse("unassessed");
        return new OutlookPage(
                season,
                0,
                "",
                texts.of("outlook.lede." + key, String.valueOf(season)),
                latest.map(this::cautions).orElseGet(() -> List.of(texts.of("advice.caution.unassessed"))),
                List.of(),
                null,
                List.of(),
                List.of(),
                null,
                List.of(),
                null,
                List.of(),
                List.of(),
                List.of(),
                List.of(),
                null);
    }

    private static String why(AssessmentView latest, int season) {
        if (season <= latest.lastYear()) {
            return "past";
        }
        return Adviser.tooFar(latest, season) ? "old" : "no-draws";
    }

    /** The recommendation and its risk, in a sentence or two. */
    String lede(AdviceWorking w) {
        Recommendation r = w.recommendation();
        Policy policy = w.policy();
        String season = String.valueOf(w.season());
        String horizon = String.valueOf(policy.horizonYears());
        if (r.limitTonnes() > 0) {
            return texts.of(
                    r.provisional() ? "outlook.lede.provisional" : "outlook.lede.limit",
                    season,
                    Figures.decided(r.limitTonnes()),
                    horizon,
                    Figures.chances(r.risk()));
        }
        if (!Double.isNaN(r.ceilingTonnes())) {
            return texts.of("outlook.lede.nothing", season, horizon, Figures.chances(r.risk()));
        }
        Integer recovery = r.recoverySeasons();
        return texts.of(
                        "outlook.lede.closed",
                        season,
                        horizon,
                        Figures.chances(r.risk()),
                        Figures.setPercent(policy.tolerance()))
                + " "
                + (recovery == null
                        ? texts.of("outlook.lede.never")
                        : texts.of("outlook.lede.recovery", String.valueOf(w.season() + recovery - 1)));
    }

    private List<String> cautions(AssessmentView assessment) {
        List<String> cautions = new ArrayList<>();
        if (!assessment.settled()) {
            cautions.add(texts.of("advice.caution.unsettled"));
        }
        String strength = assessment.strength().toLowerCase(Locale.ROOT);
        if (strength.equals("none") || strength.equals("thin")) {
            cautions.add(texts.of("advice.caution." + strength));
        }
        return cautions;
    }

    /** From the limit to the logbook, as the form is filled in and the notice will say it. */
    private List<Part> parts(AdviceWorking w, LimitForm usual) {
        double limit = w.recommendation().limitTonnes();
        // a sum of kilograms in tonnes may pass the limit by a rounding error
        double setAsides = Math.min(limit, usual.setAsides());
        double reported = usual.reportedFraction == null ? 1 : usual.reportedFraction;
        List<Part> parts = new ArrayList<>();
        parts.add(part("limit", limit));
        setAside("subsistence", usual.subsistence).ifPresent(parts::add);
        setAside("angling", usual.angling).ifPresent(parts::add);
        setAside("research", usual.research).ifPresent(parts::add);
        setAside("other", usual.other).ifPresent(parts::add);
        parts.add(part("commercial", limit - setAsides));
        parts.add(new Part(
                texts.of("outlook.part.logged", Figures.setPercent(reported)),
                Figures.decided(LimitArithmetic.toBeLogged(limit, setAsides, reported))));
        return parts;
    }

    private Optional<Part> setAside(String name, @Nullable Double tonnes) {
        return tonnes == null || tonnes == 0 ? Optional.empty() : Optional.of(part(name, tonnes));
    }

    private Part part(String name, double tonnes) {
        return new Part(texts.of("outlook.part." + name), Figures.decided(tonnes));
    }

    private String stress(AdviceWorking w, WhatIf ask) {
        var weakened = w.outlook().withDepensation(ask.halfGrowth());
        double limit = w.recommendation().limitTonnes();
        double tolerance = w.policy().tolerance();
        return texts.of(
                "outlook.stress",
                Figures.setPercent(ask.halfGrowth()),
                Figures.decided(limit),
                Figures.percentBeside(weakened.risk(Course.ofCatch(limit)), tolerance),
                Figures.percentBeside(w.recommendation().risk(), tolerance),
                Figures.percentBeside(weakened.risk(Course.CLOSURE), tolerance));
    }
}
