package org.merewarden.core.policy;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;
import static org.assertj.core.api.Assertions.withinPercentage;

import java.util.Arrays;
import java.util.List;
import org.apache.commons.math3.distribution.NormalDistribution;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvFileSource;
import org.junit.jupiter.params.provider.CsvSource;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.outlook.Course;
import org.merewarden.core.outlook.MadePosterior;
import org.merewarden.core.outlook.Outlook;
import org.merewarden.core.policy.Recommendation.Rule;
import org.merewarden.core.policy.Recommendation.Step;

/** The rule's steps, worked by hand; grids as their sources print them. */
class LimitRuleTest {
    private static final LimitRule RULE = new LimitRule(Policy.DEFAULT);

    private static Outlook outlook(Posterior posterior) {
        return new Outlook(posterior, List.of(), 10, Policy.DEFAULT.limitFraction(), 0, 11);
    }

    private static double[] amounts(LimitRule rule, double ramp, double ceiling, EarlierSeason earlier) {
        return rule.steps(ramp, ceiling, earlier).stream()
                .mapToDouble(Step::tonnes)
                .toArray();
    }

    private static Policy with(Policy.LastSeason lastSeason) {
        Policy p = Policy.DEFAULT;
        return new Policy(
                p.limitFraction(),
                p.ramp(),
                p.quantile(),
                p.horizonYears(),
                p.tolerance(),
                p.steadinessCap(),
                lastSeason,
                p.setAsides(),
                p.rounding(),
                p.standing(),
                p.pooled(),
                p.intervalProbability());
    }

    private static Policy with(Policy.Ramp ramp, double quantile) {
        Policy p = Policy.DEFAULT;
        return new Policy(
                p.limitFraction(),
                ramp,
                quantile,
                p.horizonYears(),
                p.tolerance(),
                p.steadinessCap(),
                p.lastSeason(),
                p.setAsides(),
                p.rounding(),
                p.standing(),
                p.pooled(),
                p.intervalProbability());
    }

    // step 1: the ramp

    /** rule_40_10_grid.csv (recalled, fairly sure): catch linear in biomass from 0.1 K to 0.4 K, as a share of F target. */
    @ParameterizedTest
    @CsvFileSource(resources = "/reference/rule_40_10_grid.csv", numLinesToSkip = 1)
    void theCatchRampGivesThePublishedGrid(double depletion, double multiplier) {
        var law = new SurplusProduction(0.4, 1000, 1);
        Policy policy = with(new Policy.Ramp(Policy.Line.CATCH, 0.8, 0.1, 0.4), 0.35);
        double share = RampCourse.mortality(policy, law).applyAsDouble(depletion * 1000) / (0.8 * 0.2);
        assertThat(share).isCloseTo(multiplier, within(5e-7));
    }

    /** r 0.4, K 1000: FMSY 0.2, BMSY 500, B lim 200, F target 0.16. Halfway up the ramp, at 350 t, F is 0.08. */
    @ParameterizedTest
    @CsvSource({"100, 0", "200, 0", "275, 0.04", "350, 0.08", "500, 0.16", "900, 0.16"})
    void theMortalityRampIsAStraightLine(double biomass, double expected) {
        var law = new SurplusProduction(0.4, 1000, 1);
        assertThat(RampCourse.mortality(Policy.DEFAULT, law).applyAsDouble(biomass))
                .isCloseTo(expected, within(1e-12));
    }

    /**
     * buffer_quantiles.csv: exp(σ z(P*)), Ralston et al. 2011 (published). Draws alike but for a lognormal size scale, so
     * that the catch has that spread; its quantile over its median is the buffer.
     */
    @ParameterizedTest
    @CsvFileSource(resources = "/reference/buffer_quantiles.csv", numLinesToSkip = 1)
    void theQuantileIsThePublishedBuffer(double sigma, double quantile, double buffer) {
        int draws = 4001;
        double[] size = new double[draws];
        NormalDistribution normal = new NormalDistribution();
        for (int i = 0; i < draws; i++) {
            size[i] = Math.exp(sigma * normal.inverseCumulativeProbability((i + 0.5) / draws));
        }
        Outlook outlook = outlook(
                MadePosterior.of(draws, i -> 100 * size[i], i -> 0.2, 1, i -> 600 * size[i], 0, EvidenceStrength.FAIR));
        double median = ramp(0.5, outlook);
        assertThat(ramp(quantile, outlook) / median).isCloseTo(buffer, withinPercentage(0.1));
    }

    private static double ramp(double quantile, Outlook outlook) {
        return new LimitRule(with(Policy.DEFAULT.ramp(), quantile))
                .recommend(outlook, EarlierSeason.WITHOUT_LIMIT)
                .after(Rule.RAMP);
    }

    /** F 0.16 held from 500 t: C = (F K/r) ln(1 + r b₀ (e^a − 1)/a), a = 0.24: 400 ln(1 + 0.2 · 1.130205) = 81.52 t. */
    @Test
    void theRampsCatchIsTheClosedForm() {
        Recommendation r = RULE.recommend(outlook(MadePosterior.logistic(20, 500, 0)), EarlierSeason.WITHOUT_LIMIT);
        assertThat(r.after(Rule.RAMP)).isCloseTo(400 * Math.log(1 + 0.2 * Math.expm1(0.24) / 0.24), within(1e-9));
        assertThat(r.limitTonnes()).isEqualTo(81.5);
        assertThat(r.risk()).isZero();
        assertThat(r.decidedBy()).isEqualTo(Rule.RAMP);
    }

    // step 2: risk

    /** Without noise the ceiling of equal draws is the catch that ends the tenth season exactly at B lim. */
    @Test
    void theCeilingEndsAtTheLimit() {
        Outlook outlook = outlook(MadePosterior.logistic(20, 500, 0));
        Recommendation r = RULE.recommend(outlook, EarlierSeason.WITHOUT_LIMIT);
        double end = outlook.project(Course.ofCatch(r.ceilingTonnes())).biomassTonnes()[0][10];
        assertThat(end).isCloseTo(200, withinPercentage(1e-3));
        assertThat(r.ceilingTonnes()).isGreaterThan(100);
    }

    @Test
    void whereEvenNoCatchFailsTheLimitIsNothingAndRecoveryIsTold() {
        // from 50 t the logistic passes 200 t after 3.9 years; in each of the first three seasons it is below
        Recommendation r = RULE.recommend(outlook(MadePosterior.logistic(50, 50, 0)), new EarlierSeason(40, 10));
        assertThat(r.limitTonnes()).isZero();
        assertThat(r.ceilingTonnes()).isNaN();
        assertThat(r.recoverySeasons()).isEqualTo(4);
        assertThat(r.risk()).isEqualTo(1);
    }

    @Test
    void theRampsCatchIsLoweredToTheCeiling() {
        assertThat(amounts(RULE, 50, 32, EarlierSeason.WITHOUT_LIMIT)).containsExactly(50, 32, 32, 32, 32, 32);
        assertThat(amounts(RULE, 30, 32, EarlierSeason.WITHOUT_LIMIT)).containsExactly(30, 30, 30, 30, 30, 30);
        assertThat(amounts(RULE, 30, Double.POSITIVE_INFINITY, EarlierSeason.WITHOUT_LIMIT))
                .containsExactly(30, 30, 30, 30, 30, 30);
    }

    // step 3: steadiness. Cap 20 %

    @ParameterizedTest(name = "ramp {0}, ceiling {1}, before {2}: {3}")
    @CsvSource({
        "80, 100, 40, 48", // up by a fifth at most
        "45, 100, 40, 45", // within the cap
        "20, 100, 40, 32", // down by a fifth at most …
        "20, 30, 40, 20", //  … but the fifth does not pass step 2: no floor
        "20, 32, 40, 32", //  … and exactly at the ceiling it does
        "80, 44, 40, 44", // risk under the cap
        "80, NaN, 40, 0", // risk wins over any floor
        "80, 100, 0, 80", // a limit of 0 binds nothing
        "0, 100, 40, 32", // a ramp of nothing with a safe floor
        "80, 100, NaN, 80" // no earlier limit
    })
    void steadiness(double ramp, double ceiling, double before, double expected) {
        assertThat(amounts(RULE, ramp, ceiling, new EarlierSeason(before, Double.NaN))[2])
                .isCloseTo(expected, within(1e-12));
    }

    // step 4: last season

    @ParameterizedTest(name = "carry {0}, payback {1}, before {2}, taken {3}, ramp {4}, ceiling {5}: {6}")
    @CsvSource({
        "0, 1, 40, 30, 40, 100, 40", // nothing is carried over by default
        "0.1, 1, 40, 30, 40, 100, 44", // 10 t unused, a tenth of 40 t carried
        "0.5, 1, 40, 30, 40, 100, 50", // all 10 t
        "0.5, 1, 40, 30, 40, 43, 43", // risk again
        "0, 1, 40, 46, 40, 100, 34", // 6 t over, paid back
        "0, 0.5, 40, 46, 40, 100, 37", // half of it
        "0, 1, 40, 100, 40, 100, 0", // never below nothing
        "0.1, 1, 40, 40, 40, 100, 40", // exactly used
        "0.1, 1, 0, 5, 40, 100, 35", // a closed season's catch is paid back
        "0.1, 1, NaN, 5, 40, 100, 40", // no limit: nothing to compare with
        "0.1, 1, 40, NaN, 40, 100, 40" // removals unknown
    })
    void lastSeason(
            double carry, double payback, double before, double taken, double ramp, double ceiling, double expected) {
        LimitRule rule = new LimitRule(with(new Policy.LastSeason(carry, payback)));
        assertThat(amounts(rule, ramp, ceiling, new EarlierSeason(before, taken))[4])
                .isCloseTo(expected, within(1e-12));
    }

    // step 5: rounding down to 1, 2, 5 … kg of at most 1 %, at least 10 kg

    @ParameterizedTest(name = "{0} t: {1} t")
    @CsvSource({
        "12.347, 12.3", // 1 % is 123 kg: steps of 100 kg
        "12.3, 12.3",
        "0.7777, 0.77", // 7.8 kg: at least 10 kg
        "0.009, 0", // less than a step
        "0, 0",
        "28.19, 28", // 282 kg: steps of 200 kg
        "61.4, 61", // 614 kg: steps of 500 kg
        "1000, 1000",
        "987.6, 985", // 9.9 t: steps of 5 t
        "1.0, 1.0"
    })
    void rounding(double tonnes, double expected) {
        assertThat(RULE.rounded(tonnes)).isCloseTo(expected, within(1e-12));
    }

    /** Over many amounts: never up, never by more than 1 % or 10 kg, and rounding twice changes nothing. */
    @Test
    void roundingIsDownAndSmall() {
        for (double tonnes = 0.001; tonnes < 1e5; tonnes *= 1.0137) {
            double rounded = RULE.rounded(tonnes);
            assertThat(rounded).isLessThanOrEqualTo(tonnes * (1 + 1e-9));
            assertThat(tonnes - rounded).isLessThanOrEqualTo(Math.max(0.01, 0.01 * tonnes) + 1e-9);
            assertThat(RULE.rounded(rounded)).isCloseTo(rounded, within(1e-9 * rounded));
        }
    }

    // the whole

    @Test
    void firstYear() {
        Recommendation r = RULE.recommend(outlook(MadePosterior.logistic(50, 800, 0.1)), EarlierSeason.WITHOUT_LIMIT);
        assertThat(r.after(Rule.STEADINESS)).isEqualTo(r.after(Rule.RISK));
        assertThat(r.after(Rule.LAST_SEASON)).isEqualTo(r.after(Rule.RISK));
        assertThat(r.limitTonnes()).isPositive();
    }

    @Test
    void evidenceNoneIsProvisional() {
        Posterior none = MadePosterior.of(20, i -> 100, i -> 0.2, 1, i -> 600, 0.1, EvidenceStrength.NONE);
        assertThat(RULE.recommend(outlook(none), EarlierSeason.WITHOUT_LIMIT).provisional())
                .isTrue();
    }

    /** Whatever came before, the risk of the limit is within the tolerance unless no catch at all is. */
    @Test
    void riskAlwaysWins() {
        for (double start = 60; start < 1000; start += 90) {
            Outlook outlook = outlook(MadePosterior.logistic(300, start, 0.25));
            for (double before : new double[] {Double.NaN, 0, 5, 60, 500}) {
                for (double taken : new double[] {Double.NaN, 0, 80}) {
                    Recommendation r = new LimitRule(with(new Policy.LastSeason(0.5, 1)))
                            .recommend(outlook, new EarlierSeason(before, taken));
                    if (Double.isNaN(r.ceilingTonnes())) {
                        assertThat(r.limitTonnes()).isZero();
                    } else {
                        assertThat(r.risk()).isLessThanOrEqualTo(0.1);
                    }
                }
            }
        }
    }

    /** q = F/E: with equal draws at BMSY the effort is F target / q, 0.16/0.002 = 80 units. */
    @Test
    void effortIsTargetMortalityOverCatchability() {
        Outlook outlook = outlook(MadePosterior.logistic(20, 500, 0));
        double[] q = new double[20];
        Arrays.fill(q, 0.002);
        assertThat(RULE.effort(outlook, q)).isCloseTo(80, within(1e-9));
        Outlook lost = outlook(MadePosterior.logistic(20, 50, 0));
        assertThat(RULE.effort(lost, q)).isZero();
    }

    /** A very noisy stock: the target effort is too risky, and the largest tolerable one is taken. */
    @Test
    void effortIsLoweredToTheToleratedRisk() {
        Outlook outlook = outlook(MadePosterior.logistic(400, 600, 0.4));
        double[] q = new double[400];
        Arrays.fill(q, 0.002);
        double effort = RULE.effort(outlook, q);
        assertThat(effort).isBetween(1.0, 79.0);
        assertThat(riskOfEffort(outlook, effort, q)).isLessThanOrEqualTo(0.1);
        assertThat(riskOfEffort(outlook, 1.00001 * effort, q)).isGreaterThan(0.1);
    }

    private static double riskOfEffort(Outlook outlook, double effort, double... q) {
        return outlook.risk(
                Course.ofMortality(Arrays.stream(q).map(each -> each * effort).toArray()));
    }
}
