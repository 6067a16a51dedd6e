package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;

import org.apache.commons.math3.distribution.BinomialDistribution;
import org.apache.commons.math3.distribution.ChiSquaredDistribution;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;
import org.merewarden.core.inference.statespace.Simulated.Regime;

/**
 * Simulation-based calibration (Talts et al. 2018, arXiv 1804.06788): parameters from the prior, data from the parameters,
 * and the truth's rank among the draws must be uniform.
 *
 * <p>60 stocks per regime by default, as many as the system property {@code calibration.stocks} says on demand. For MSY,
 * FMSY, present B/BMSY and σ_p: the central 90 % interval's coverage by the binomial distribution, and the ranks in six
 * bins by chi-square. Joint false-alarm rate 1 % over both regimes, 4 quantities and 2 tests (Bonferroni, 1/1600 each).
 */
class CalibrationTest {
    private static final int STOCKS = Integer.getInteger("calibration.stocks", 60);
    private static final double LEVEL = 0.01 / 16;
    private static final int BINS = 6;
    private static final int LOW = StateSpaceFit.DRAWS / 20;
    private static final int HIGH = StateSpaceFit.DRAWS - LOW;

    @ParameterizedTest
    @EnumSource(names = {"RICH", "CATCH_ONLY"})
    void theTruthIsOneOfTheDraws(Regime regime) {
        int[] covered = new int[4];
        int[][] bins = new int[4][BINS];
        for (int i = 0; i < STOCKS; i++) {
            Simulated stock = Simulated.of(regime, 1000L + i);
            ModelPriors priors = ModelPriors.of(stock.evidence);
            SeasonData data = SeasonData.of(stock.evidence, Simulated.LAST, priors);
            StateSpaceFit fit = StateSpaceFit.of(data, priors, i);
            double[] truth = stock.truth();
            double[][] drawn = Simulated.drawn(fit);
            for (int q = 0; q < truth.length; q++) {
                int rank = rank(truth[q], drawn[q]);
                covered[q] += rank >= LOW && rank <= HIGH ? 1 : 0;
                bins[q][rank * BINS / (StateSpaceFit.DRAWS + 1)]++;
            }
        }
        double inside = (HIGH - LOW + 1.0) / (StateSpaceFit.DRAWS + 1);
        BinomialDistribution count = new BinomialDistribution(STOCKS, inside);
        for (int q = 0; q < covered.length; q++) {
            assertThat(covered[q])
                    .as("stocks of %d whose 90 %% interval covers quantity %d", STOCKS, q)
                    .isBetween(
                            count.inverseCumulativeProbability(LEVEL / 2),
                            count.inverseCumulativeProbability(1 - LEVEL / 2));
            assertThat(chiSquare(bins[q]))
                    .as("ranks of quantity %d", q)
                    .isLessThan(new ChiSquaredDistribution(BINS - 1.0).inverseCumulativeProbability(1 - LEVEL));
        }
    }

    private static int rank(double truth, double[] draws) {
        int rank = 0;
        for (double draw : draws) {
            rank += draw < truth ? 1 : 0;
        }
        return rank;
    }

    private static double chiSquare(int[] counts) {
        double expected = (double) STOCKS / BINS;
        double sum = 0;
        for (int count : counts) {
            sum += (count - expected) * (count - expected) / expected;
        }
        return sum;
    }
}
