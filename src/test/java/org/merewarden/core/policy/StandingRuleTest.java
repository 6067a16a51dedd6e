package org.merewarden.core.policy;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.Arrays;
import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.merewarden.core.dynamics.CatchBalance;
import org.merewarden.core.dynamics.ConstantRemovals;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Verdict;

/** Draws of a logistic stock with MSY 100 t, FMSY 0.2 per year: BMSY 500, K 1000, B lim 200. Worked by hand. */
class StandingRuleTest {
    private final StandingRule rule = new StandingRule(Policy.DEFAULT);

    private static Posterior posterior(EvidenceStrength strength, double... biomass) {
        int draws = biomass.length;
        double[] msy = new double[draws];
        double[] fmsy = new double[draws];
        double[] shape = new double[draws];
        Arrays.fill(msy, 100);
        Arrays.fill(fmsy, 0.2);
        Arrays.fill(shape, 1);
        double[][] states =
                Arrays.stream(biomass).mapToObj(b -> new double[] {b}).toArray(double[][]::new);
        return new Posterior(
                "test",
                2026,
                msy,
                fmsy,
                shape,
                states,
                new double[draws][0],
                Map.of(),
                strength,
                new Verdict(true, List.of()));
    }

    @Test
    void countsDrawsBelowTheTippingBiomass() {
        // H 75: tipping biomass 250 (reference/SOURCES.md, r 0.4, K 1000); 240 is below it, yet above B lim
        StandingRule.Result result = rule.judge(posterior(EvidenceStrength.FAIR, 240, 260, 600, 700), 75);
        assertThat(result.collapseProbability()).isEqualTo(0.25);
        assertThat(result.belowLimitProbability()).isZero();
        assertThat(result.probability()).isEqualTo(0.25);
        assertThat(result.standing()).isEqualTo(Standing.STRAINED);
        assertThat(result.margin()).isCloseTo(0.25, within(1e-12));
        assertThat(result.tippingBiomassTonnes()).isCloseTo(250, within(1e-9));
        // eigenvalue −0.2 on the upper branch: 5 years
        assertThat(result.returnTimeYears()).isCloseTo(5, within(1e-9));
    }

    @Test
    void aCatchAboveMsyIsACollapseCourseFromAnyBiomass() {
        StandingRule.Result result = rule.judge(posterior(EvidenceStrength.STRONG, 900, 1000), 101);
        assertThat(result.collapseProbability()).isEqualTo(1);
        assertThat(result.standing()).isEqualTo(Standing.CRITICAL);
        assertThat(result.marginNegativeProbability()).isEqualTo(1);
        assertThat(result.tippingBiomassTonnes()).isNull();
        assertThat(result.returnTimeYears()).isNull();
    }

    @Test
    void aClosedStockIsJudgedByItsBiomass() {
        StandingRule.Result result = rule.judge(posterior(EvidenceStrength.FAIR, 150, 190, 250, 300), 0);
        assertThat(result.collapseProbability()).isZero();
        assertThat(result.belowLimitProbability()).isEqualTo(0.5);
        assertThat(result.standing()).isEqualTo(Standing.CRITICAL);
        assertThat(result.margin()).isEqualTo(1);
        assertThat(result.tippingBiomassTonnes()).isNull();
    }

    @Test
    void widthAloneIsSaidToBeLackOfKnowledge() {
        StandingRule.Result wide = rule.judge(posterior(EvidenceStrength.THIN, 100, 500, 600, 700, 800), 50);
        assertThat(wide.standing()).isEqualTo(Standing.STRAINED);
        assertThat(wide.mainlyLittleKnown()).isTrue();
        StandingRule.Result low = rule.judge(posterior(EvidenceStrength.STRONG, 100, 110, 120, 700), 50);
        assertThat(low.mainlyLittleKnown()).isFalse();
    }

    @ParameterizedTest
    @CsvSource({
        "0, FAIR, SECURE",
        "0.0499, THIN, SECURE",
        "0.0499, NONE, WATCH",
        "0.05, STRONG, WATCH",
        "0.0999, FAIR, WATCH",
        "0.10, FAIR, STRAINED",
        "0.4999, FAIR, STRAINED",
        "0.50, FAIR, CRITICAL",
        "1, NONE, CRITICAL"
    })
    void cutPointsBelongToTheWorseSide(double p, EvidenceStrength strength, Standing standing) {
        assertThat(rule.standing(p, strength)).isEqualTo(standing);
    }

    @ParameterizedTest
    @CsvSource({"600, 90", "300, 90", "260, 75", "240, 75", "30, 10", "10, 10", "1000, 99.9", "499, 99.9"})
    void collapseCourseIsWhatTheFlowDoes(double biomass, double removals) {
        // the closed-form flow under constant removals is another piece of code: it ends at zero or it does not
        var law = new SurplusProduction(0.4, 1000, 1);
        boolean ends = Double.isFinite(new ConstantRemovals(law, removals).extinctionTime(biomass));
        assertThat(CatchBalance.collapses(law, biomass, removals)).isEqualTo(ends);
    }
}
