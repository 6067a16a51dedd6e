package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;

import java.util.Arrays;
import java.util.SplittableRandom;
import org.junit.jupiter.api.Test;
import org.merewarden.core.inference.Quantiles;
import org.merewarden.core.inference.statespace.Simulated.Regime;

class LadderTest {
    private static final double[] LEVELS = {0.1, 0.25, 0.5, 0.75, 0.9};

    /**
     * Chains against weighting, on a rich stock whose weighted posterior is one that calibration holds to the truth: every
     * quantile of every parameter within 5 joint standard errors of √(p (1 − p)/ESS) on the scale of probability
     * (25 comparisons, two-sided: false alarm below 1e-4).
     */
    @Test
    void chainsAgreeWithWeighting() {
        Ladder weighted = ladder(1);
        Ladder chains = ladder(3);
        assertThat(weighted.rung()).isEqualTo(1);
        assertThat(chains.rung()).isEqualTo(3);
        assertThat(chains.settled()).isTrue();
        assertThat(chains.rungs())
                .hasSize(3)
                .last()
                .asString()
                .contains("Markov")
                .contains("accepted");
        assertThat(chains.sample().logEvidence()).isNaN();
        double worth =
                1 / (1 / weighted.sample().effectiveSize() + 1 / chains.sample().effectiveSize());
        for (int k = 0; k < weighted.sample().draw(0).length; k++) {
            double[] a = parameter(weighted.sample(), k);
            double[] b = parameter(chains.sample(), k);
            for (double p : LEVELS) {
                double cut = Quantiles.of(a, p);
                double below = Arrays.stream(b).filter(v -> v < cut).count() / (double) b.length;
                assertThat(below)
                        .as("parameter %d, quantile %s", k, p)
                        .isEqualTo(p, offset(5 * Math.sqrt(p * (1 - p) / worth)));
            }
        }
    }

    private static Ladder ladder(int leastRung) {
        Simulated stock = Simulated.of(Regime.RICH, 7);
        ModelPriors priors = ModelPriors.of(stock.evidence);
        SeasonData data = SeasonData.of(stock.evidence, Simulated.LAST, priors);
        Marginal marginal = new Marginal(data, priors, new OuterParameters(priors, data));
        return new Ladder(marginal, new SplittableRandom(1), leastRung);
    }

    private static double[] parameter(ImportanceSample sample, int k) {
        int[] chosen = sample.resample(4000, new SplittableRandom(2));
        return Arrays.stream(chosen).mapToDouble(i -> sample.draw(i)[k]).toArray();
    }
}
