package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;

import java.util.Arrays;
import java.util.List;
import org.apache.commons.math3.stat.StatUtils;
import org.junit.jupiter.api.Test;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.Habitat;
import org.merewarden.core.inference.Diagnostics.Learned;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Quantiles;

class PriorsAloneTest {
    private final StateSpaceAssessor assessor = new StateSpaceAssessor();

    private static double[] logs(double[] values) {
        return Arrays.stream(values).map(Math::log).toArray();
    }

    /** No record of any season: the draws are the stated lognormals; offsets are four standard errors of 1,000 draws. */
    @Test
    void withoutRecordsTheDrawsAreThePriors() {
        Evidence bare = new Cases().own("msy_t", 20, 0.5).own("fmsy", 0.2, 0.3).evidence();
        Posterior posterior = assessor.assess(bare, 2019, 5);

        assertThat(posterior.draws()).isEqualTo(1000);
        assertThat(posterior.seasons()).isZero();
        assertThat(posterior.firstYear()).isEqualTo(2020);
        assertThat(posterior.strength()).isEqualTo(EvidenceStrength.NONE);
        assertThat(posterior.verdict().settled()).isTrue();
        assertThat(posterior.verdict().reasons().get(0)).contains("no catch, effort or survey is recorded");
        double[] lnMsy = logs(posterior.msyTonnes());
        assertThat(StatUtils.mean(lnMsy)).isEqualTo(Math.log(20), offset(4 * 0.5 / Math.sqrt(1000)));
        assertThat(Math.sqrt(StatUtils.variance(lnMsy))).isEqualTo(0.5, offset(4 * 0.5 / Math.sqrt(2000)));
        double[] lnStart = new double[1000];
        for (int i = 0; i < 1000; i++) {
            lnStart[i] = Math.log(posterior.presentBiomass(i) / posterior.capacity(i));
        }
        assertThat(StatUtils.mean(lnStart)).isEqualTo(Math.log(0.8), offset(4 * 0.3 / Math.sqrt(1000)));
    }

    /** What is shown as learned is the draws themselves: the same medians as the result's, and nothing learned. */
    @Test
    void theLearnedQuantilesAreTheDraws() {
        Evidence bare = new Cases().own("msy_t", 20, 0.5).own("fmsy", 0.2, 0.3).evidence();
        Posterior posterior = assessor.assess(bare, 2019, 5);
        List<Learned> learned = posterior.diagnostics().learned();

        assertThat(learned).hasSize(7);
        assertThat(learned.get(0).low()).isEqualTo(Quantiles.of(posterior.msyTonnes(), 0.1));
        assertThat(learned.get(0).median()).isEqualTo(Quantiles.of(posterior.msyTonnes(), 0.5));
        assertThat(learned.get(0).high()).isEqualTo(Quantiles.of(posterior.msyTonnes(), 0.9));
        assertThat(learned.get(1).median()).isEqualTo(Quantiles.of(posterior.fmsyPerYear(), 0.5));
        double[] fraction = new double[1000];
        Arrays.setAll(fraction, i -> posterior.presentBiomass(i) / posterior.capacity(i));
        assertThat(learned.get(2).median()).isCloseTo(Quantiles.of(fraction, 0.5), offset(1e-9));
        assertThat(learned).allMatch(l -> l.overlap() == null || l.overlap() == 1);
    }

    @Test
    void theLakeAloneIsEnoughForDraws() {
        Evidence bare = new Cases().evidence();
        Habitat water = new Habitat("lake", 2000, 4.0, 100.0, null, null, 4);
        Evidence lake =
                new Evidence(water, bare.traits(), List.of(), List.of(), List.of(), List.of(), List.of(), List.of());
        Posterior posterior = assessor.assess(lake, 2019, 5);
        // 1.2376 √25 · 2000 ha / 1000 / 4 stocks = 3.094 t (Ryder 1965)
        assertThat(Quantiles.of(logs(posterior.msyTonnes()), 0.5))
                .isEqualTo(Math.log(3.094), offset(4 * 1.2533 * 1.063 / Math.sqrt(1000)));
        assertThat(posterior.verdict().reasons()).anyMatch(s -> s.contains("Ryder 1965"));
    }
}
