package org.merewarden.advice;

import java.time.LocalDate;
import java.util.List;
import java.util.Optional;
import org.merewarden.advice.AdviceWorking.Basis;
import org.merewarden.advice.AdviceWorking.Between;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.outlook.Outlook;
import org.merewarden.core.outlook.SeasonBetween;
import org.merewarden.core.policy.EarlierSeason;
import org.merewarden.core.policy.LimitRule;
import org.merewarden.core.policy.Policy;
import org.merewarden.web.Seasons;
import org.springframework.stereotype.Service;
import tools.jackson.databind.json.JsonMapper;

/** Puts the rule to a stock: the same assessment, policy, season and log give the same recommendation. */
@Service
class Adviser {
    /** The work grows with the seasons between, and so does what is not known of them. */
    private static final int MOST_BETWEEN = 10;

    private static final int LAST_QUARTER_MONTHS = 3;

    private final Assessments assessments;
    private final Limits limits;
    private final SeasonsBetween between;
    private final PolicyStore policies;
    private final Seasons seasons;
    private final JsonMapper json;

    Adviser(
            Assessments assessments,
            Limits limits,
            SeasonsBetween between,
            PolicyStore policies,
            Seasons seasons,
            JsonMapper json) {
        this.assessments = assessments;
        this.limits = limits;
        this.between = between;
        this.policies = policies;
        this.seasons = seasons;
        this.json = json;
    }

    /**
     * What the rule recommends.
     *
     * @param limitTonnes total removals, t
     * @param provisional it rests on no evidence of the stock's own
     * @param working its steps as JSON, as they are stored
     */
    record Advice(
            long stockId,
            int season,
            long assessmentId,
            int policyNumber,
            double limitTonnes,
            boolean provisional,
            String working) {}

    /**
     * By the policy in force; empty where there is no assessment with draws, where the season is assessed already, or where
     * more than {@value #MOST_BETWEEN} seasons stand between.
     */
    Optional<Advice> advise(long stockId, int season) {
        return work(stockId, season).map(this::advice);
    }

    Advice advice(AdviceWorking w) {
        return new Advice(
                w.stockId(),
                w.season(),
                w.assessment().id(),
                w.policyNumber(),
                w.recommendation().limitTonnes(),
                w.recommendation().provisional(),
                json.writeValueAsString(StoredWorking.of(w)));
    }

    /** The same with all that it rests on. */
    Optional<AdviceWorking> work(long stockId, int season) {
        PolicyStore.Numbered inForce = policies.inForce();
        return work(stockId, season, inForce.policy(), inForce.number());
    }

    /** By any version of the policy. */
    Optional<AdviceWorking> work(long stockId, int season, Policy policy, int policyNumber) {
        Optional<AssessmentView> latest = assessments.latest(stockId);
        if (latest.isEmpty() || season <= latest.get().lastYear() || tooFar(latest.get(), season)) {
            return Optional.empty();
        }
        Posterior posterior = assessments.posterior(latest.get().id());
        return posterior.draws() == 0
                ? Optional.empty()
                : Optional.of(work(latest.get(), posterior, season, policy, policyNumber));
    }

    /** Whether too many seasons stand between the assessment and the one to be advised. */
    static boolean tooFar(AssessmentView assessment, int season) {
        return season > assessment.lastYear() + 1 + MOST_BETWEEN;
    }

    private AdviceWorking work(
            AssessmentView assessment, Posterior posterior, int season, Policy policy, int policyNumber) {
        long stockId = assessment.stockId();
        int last = posterior.lastYear();
        List<Between> notAssessed = between.of(stockId, last, season, assessment.lastRemovalsTonnes());
        Optional<LimitView> before = limits.inForce(stockId, season - 1);
        EarlierSeason earlier = new EarlierSeason(
                before.map(LimitView::amountTonnes).orElse(Double.NaN),
                before.filter(LimitView::closure).isPresent()
                        // what was taken before the closure was taken under the limit before it
                        ? Double.NaN
                        : removals(assessment, season - 1, notAssessed));
        Outlook outlook = new Outlook(
                posterior,
                notAssessed.stream()
                        .map(b -> SeasonBetween.ofCv(b.tonnes(), b.cv()))
                        .toList(),
                policy.horizonYears(),
                policy.limitFraction(),
                0,
                seed(assessment, season));
        return new AdviceWorking(
                stockId,
                season,
                assessment,
                policyNumber,
                policy,
                outlook,
                notAssessed,
                earlier,
                before.map(LimitView::id).orElse(null),
                new LimitRule(policy).recommend(outlook, earlier));
    }

    /** Of the season before, t: as recorded, else where its landings lead; NaN where nothing tells. */
    private double removals(AssessmentView assessment, int season, List<Between> notAssessed) {
        if (season <= assessment.lastYear()) {
            return assessments.evidence(assessment.id()).removals(season).orElse(Double.NaN);
        }
        return notAssessed.stream()
                .filter(b -> b.season() == season && (b.basis() == Basis.LANDINGS || b.basis() == Basis.LOGGED))
                .mapToDouble(Between::tonnes)
                .findFirst()
                .orElse(Double.NaN);
    }

    private static long seed(AssessmentView assessment, int season) {
        return Long.parseLong(assessment.evidenceHash().substring(0, 15), 16) + season;
    }

    /**
     * The season that is to be advised when none is named: the current one, or the next where the current one has its limit
     * or is in its last quarter.
     */
    int season(long stockId) {
        LocalDate today = seasons.today();
        int current = seasons.of(today);
        boolean late = today.isAfter(seasons.end(current).minusMonths(LAST_QUARTER_MONTHS));
        return late || limits.inForce(stockId, current).isPresent() ? current + 1 : current;
    }
}
