package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;

import java.util.Arrays;
import java.util.Comparator;
import java.util.List;
import java.util.SplittableRandom;
import org.apache.commons.math3.stat.StatUtils;
import org.junit.jupiter.api.Test;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.core.evidence.Traits;
import org.merewarden.core.inference.Diagnostics.Gathering;
import org.merewarden.core.inference.Diagnostics.Help;

class NextEvidenceTest {
    private final StateSpaceAssessor assessor = new StateSpaceAssessor();

    /** By hand: var h = 1, cov = var q = 1; v = 3 leaves 1 − 1/4 of the variance. */
    @Test
    void narrowingByHand() {
        double[] q = {-1, 1};
        assertThat(NextEvidence.narrowing(q, q, 3)).isEqualTo(1 - Math.sqrt(0.75), offset(1e-12));
        assertThat(NextEvidence.narrowing(q, q, 0)).isEqualTo(1, offset(1e-12));
        assertThat(NextEvidence.narrowing(new double[] {1, -1, 1, -1}, new double[] {1, 1, -1, -1}, 0.1))
                .isZero();
        assertThat(NextEvidence.narrowing(new double[] {5, 5}, q, 1)).isNaN();
    }

    /**
     * Without seasons, in closed form: Q = ln MSY + ln β + c with variance 0.6² + 0.3² = 0.45, ln B = Q − ln FMSY with
     * variance 0.45 + 0.5² = 0.7, covariance 0.45. Offsets: four standard errors, measured over 200 seeds.
     */
    @Test
    void priorsAloneFollowTheClosedForm() {
        Evidence bare = new Cases().own("msy_t", 20, 0.6).own("fmsy", 0.2, 0.5).evidence();
        List<Help> helps = assessor.assess(bare, 2019, 5).diagnostics().helps();
        assertThat(helps)
                .extracting(Help::gathering)
                .containsExactly(Gathering.BIOMASS_ESTIMATE, Gathering.CATCH_COUNT);
        assertThat(helps.get(0).narrowing()).isEqualTo(1 - Math.sqrt(1 - 0.45 / 0.79), offset(0.052));
        assertThat(helps.get(1).narrowing()).isEqualTo(1 - Math.sqrt(1 - 0.45 / 1.7), offset(0.029));
    }

    /** Prior log-sd 0.7 of FMSY, nobody having judged, and a well-known biomass: what is unknown of the catch is FMSY. */
    @Test
    void ageOrGrowthHelpsWhereNothingIsKnown() {
        Cases cases = Cases.albacore(0.1);
        cases.surveys.clear();
        cases.catches.removeIf(c -> c.year() < 1987);
        cases.surveys.add(new SurveyRecord(1989, "marked", 0.5, true, 150, 0.1, null));
        Evidence e = cases.evidence();
        assertThat(helps(e)).anyMatch(h -> h.gathering() == Gathering.LIFE_HISTORY);
        Traits aged = new Traits("ALB", false, null, 12.0, null, null, null);
        Evidence known = new Evidence(
                e.habitat(), aged, e.catches(), e.effort(), e.surveys(), e.events(), e.areas(), e.priors());
        assertThat(helps(known)).noneMatch(h -> h.gathering() == Gathering.LIFE_HISTORY);
        assertThat(helps(cases.own("fmsy", 0.2, 0.7).evidence()))
                .noneMatch(h -> h.gathering() == Gathering.LIFE_HISTORY);
    }

    private static List<Help> helps(Evidence evidence) {
        return NextEvidence.of(HindcastTest.fit(evidence, 1989), evidence);
    }

    @Test
    void helpsAreSortedAndWorthwhile() {
        List<Help> helps = helps(Cases.albacore(0.3).evidence());
        assertThat(helps)
                .isSortedAccordingTo(Comparator.comparingDouble(Help::narrowing).reversed());
        assertThat(helps).allMatch(h -> h.narrowing() >= 0.01 && h.narrowing() < 1);
        assertThat(helps)
                .anyMatch(h ->
                        h.gathering() == Gathering.INDEX_VALUE && h.series().equals("longline"));
        assertThat(helps).anyMatch(h -> h.gathering() == Gathering.BIOMASS_ESTIMATE);
    }

    /**
     * The linear formula against the thing itself: estimates of biomass simulated from draws, all draws weighted by them,
     * the weighted sd of ln(FMSY B) averaged as a variance over 400 estimates. Posteriors are not normal: within 0.03.
     */
    @Test
    void theFormulaForetellsWhatAnEstimateWouldDo() {
        Evidence evidence = Simulated.of(Simulated.Regime.GAPPY, 12).evidence;
        StateSpaceFit fit = HindcastTest.fit(evidence, Simulated.LAST);
        int draws = StateSpaceFit.DRAWS;
        double[] fmsy = fit.parameter(OuterParameters.FMSY);
        double[] logB = new double[draws];
        double[] q = new double[draws];
        for (int k = 0; k < draws; k++) {
            logB[k] = Math.log(fit.draws().biomassTonnes()[k][30]);
            q[k] = Math.log(fmsy[k]) + logB[k];
        }
        SplittableRandom random = new SplittableRandom(8);
        double after = 0;
        for (int trial = 0; trial < 400; trial++) {
            double seen = logB[random.nextInt(draws)] + 0.3 * random.nextGaussian();
            double[] w = Arrays.stream(logB)
                    .map(b -> Math.exp(-0.5 * Math.pow((seen - b) / 0.3, 2)))
                    .toArray();
            double sum = Arrays.stream(w).sum();
            double mean = 0;
            double square = 0;
            for (int k = 0; k < draws; k++) {
                mean += w[k] / sum * q[k];
                square += w[k] / sum * q[k] * q[k];
            }
            after += (square - mean * mean) / 400;
        }
        double expected = 1 - Math.sqrt(after / StatUtils.populationVariance(q));
        Help biomass = NextEvidence.of(fit, evidence).stream()
                .filter(h -> h.gathering() == Gathering.BIOMASS_ESTIMATE)
                .findFirst()
                .orElseThrow();
        assertThat(biomass.narrowing()).isEqualTo(expected, offset(0.03));
        assertThat(expected).isGreaterThan(0.05);
    }
}
