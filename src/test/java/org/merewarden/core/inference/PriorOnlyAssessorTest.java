package org.merewarden.core.inference;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;

import java.util.Arrays;
import org.apache.commons.math3.stat.StatUtils;
import org.junit.jupiter.api.Test;
import org.merewarden.core.evidence.Habitat;

class PriorOnlyAssessorTest {
    private final PriorOnlyAssessor assessor = new PriorOnlyAssessor();

    private static double[] logs(double[] values) {
        return Arrays.stream(values).map(Math::log).toArray();
    }

    /** No catch, no survey: the draws are the stated lognormals; 1,000 draws give a mean to 0.3 sd / √1000 · 4. */
    @Test
    void withoutCatchesTheDrawsAreThePriors() {
        Reference bare = new Reference().own("msy_t", 20, 0.5).own("fmsy", 0.2, 0.3);
        Posterior posterior = assessor.assess(bare.evidence(), 2019, 5);

        assertThat(posterior.draws()).isEqualTo(1000);
        assertThat(posterior.seasons()).isZero();
        assertThat(posterior.firstYear()).isEqualTo(2020);
        assertThat(posterior.strength()).isEqualTo(EvidenceStrength.NONE);
        assertThat(posterior.verdict().settled()).isTrue();
        assertThat(posterior.verdict().reasons().get(0)).contains("no catch is recorded");
        double[] lnMsy = logs(posterior.msyTonnes());
        assertThat(StatUtils.mean(lnMsy)).isEqualTo(Math.log(20), offset(4 * 0.5 / Math.sqrt(1000)));
        assertThat(Math.sqrt(StatUtils.variance(lnMsy))).isEqualTo(0.5, offset(4 * 0.5 / Math.sqrt(2000)));
        double[] lnStart = new double[1000];
        for (int i = 0; i < 1000; i++) {
            lnStart[i] = Math.log(posterior.presentBiomass(i) / posterior.capacity(i));
        }
        // held at 1.5, which 2 % of the draws exceed: the mean falls by less than 0.01
        assertThat(StatUtils.mean(lnStart)).isEqualTo(Math.log(0.8), offset(0.01 + 4 * 0.3 / Math.sqrt(1000)));
    }

    /** Every kept draw is replayed here: it survives the catches. MSY below the prior's is ruled out by them. */
    @Test
    void keptDrawsBearTheCatches() {
        Reference caught = new Reference().own("msy_t", 10, 0.8).own("fmsy", 0.2, 0.4);
        for (int year = 1990; year < 2020; year++) {
            caught.caught(year, 10);
        }
        Posterior posterior = assessor.assess(caught.evidence(), 2019, 5);
        assertThat(posterior.strength()).isEqualTo(EvidenceStrength.THIN);
        assertThat(posterior.seasons()).isEqualTo(30);
        for (int i = 0; i < posterior.draws(); i++) {
            double r = 2 * posterior.fmsyPerYear()[i];
            double capacity = posterior.capacity(i);
            double b = posterior.biomassTonnes()[i][0];
            for (int t = 0; t < 30; t++) {
                b = b + r * b * (1 - b / capacity) - 10;
                assertThat(b).isPositive();
            }
            assertThat(posterior.presentBiomass(i)).isEqualTo(b, offset(1e-9 * capacity));
        }
        assertThat(Quantiles.of(posterior.msyTonnes(), 0.5)).isGreaterThan(11);
    }

    @Test
    void catchesThatNoDrawCanBearDoNotSettle() {
        Reference absurd = new Reference().own("msy_t", 1, 0.1).own("fmsy", 0.2, 0.1);
        for (int year = 1990; year < 2020; year++) {
            absurd.caught(year, 1e5);
        }
        Posterior posterior = assessor.assess(absurd.evidence(), 2019, 5);
        assertThat(posterior.draws()).isZero();
        assertThat(posterior.verdict().settled()).isFalse();
        assertThat(posterior.verdict().reasons().get(0)).startsWith("Only 0 of 200000 draws");
    }

    /** One precise biomass estimate: the conjugate lognormal update of ln(β K), worked by hand in the test. */
    @Test
    void aBiomassEstimateUpdatesTheDraws() {
        Reference marked = new Reference()
                .own("msy_t", 20, 0.4)
                .own("fmsy", 0.2, 0)
                .own("biomass_fraction_at_start", 0.8, 0.1)
                .biomass(2019, 1, 100, 0.2);
        Posterior posterior = assessor.assess(marked.evidence(), 2019, 5);
        double priorVariance = 0.4 * 0.4 + 0.1 * 0.1;
        double dataVariance = Math.log1p(0.2 * 0.2) + 0.04;
        double expected = (Math.log(0.8 * 200) / priorVariance + Math.log(100) / dataVariance)
                / (1 / priorVariance + 1 / dataVariance);
        double sd = Math.sqrt(1 / (1 / priorVariance + 1 / dataVariance));
        double[] ln = new double[posterior.draws()];
        for (int i = 0; i < ln.length; i++) {
            ln[i] = Math.log(posterior.presentBiomass(i));
        }
        assertThat(StatUtils.mean(ln)).isEqualTo(expected, offset(4 * sd / Math.sqrt(ln.length)));
        assertThat(Math.sqrt(StatUtils.variance(ln))).isEqualTo(sd, offset(4 * sd / Math.sqrt(2.0 * ln.length)));
        assertThat(posterior.strength()).isEqualTo(EvidenceStrength.THIN);
    }

    @Test
    void theLakeAloneIsEnoughForDraws() {
        Reference lake = new Reference();
        lake.habitat = new Habitat("lake", 2000, 4.0, 100.0, null, null, 4);
        Posterior posterior = assessor.assess(lake.evidence(), 2019, 5);
        // 1.2376 √25 · 2000 ha / 1000 / 4 stocks = 3.094 t (Ryder 1965)
        assertThat(Quantiles.of(logs(posterior.msyTonnes()), 0.5))
                .isEqualTo(Math.log(3.094), offset(4 * 1.2533 * 1.063 / Math.sqrt(1000)));
        assertThat(posterior.verdict().reasons()).anyMatch(s -> s.contains("Ryder 1965"));
    }
}
