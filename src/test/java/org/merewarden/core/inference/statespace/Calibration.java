package org.merewarden.core.inference.statespace;

import java.util.Arrays;
import java.util.Locale;
import java.util.stream.IntStream;
import org.apache.commons.math3.distribution.BinomialDistribution;
import org.apache.commons.math3.distribution.ChiSquaredDistribution;
import org.merewarden.core.inference.statespace.Simulated.Regime;

/**
 * Simulated stocks refitted, and where the truth stands among the draws of each (Talts et al. 2018, arXiv 1804.06788):
 * parameters from the prior, data from the parameters; then the truth's rank is uniform.
 */
final class Calibration {
    static final String[] QUANTITIES = {"MSY", "FMSY", "B/BMSY", "process sd"};
    private static final int LOW = StateSpaceFit.DRAWS / 20;
    private static final int HIGH = StateSpaceFit.DRAWS - LOW;

    /** Share of ranks in the central interval: (HIGH − LOW + 1)/(DRAWS + 1), 0.9 but for the grid of ranks. */
    static final double INSIDE = (HIGH - LOW + 1.0) / (StateSpaceFit.DRAWS + 1);

    private final int[][] ranks;
    private final int unsettled;

    private Calibration(int[][] ranks, int unsettled) {
        this.ranks = ranks;
        this.unsettled = unsettled;
    }

    /** Over the given number of stocks, other ones for each regime, on all cores, whose number changes nothing. */
    static Calibration of(Regime regime, int stocks) {
        int[][] ranks = IntStream.range(0, stocks)
                .parallel()
                .mapToObj(i -> ranks(regime, i))
                .toArray(int[][]::new);
        int unsettled = (int)
                Arrays.stream(ranks).filter(r -> r[QUANTITIES.length] == 0).count();
        return new Calibration(ranks, unsettled);
    }

    private static int[] ranks(Regime regime, int i) {
        Simulated stock = Simulated.of(regime, 1_000_000L * (1 + regime.ordinal()) + i);
        ModelPriors priors = ModelPriors.of(stock.evidence);
        SeasonData data = SeasonData.of(stock.evidence, Simulated.LAST, priors);
        StateSpaceFit fit = StateSpaceFit.of(data, priors, i);
        double[] truth = stock.truth();
        double[][] drawn = Simulated.drawn(fit);
        int[] result = new int[truth.length + 1];
        for (int q = 0; q < truth.length; q++) {
            double value = truth[q];
            result[q] =
                    (int) Arrays.stream(drawn[q]).filter(draw -> draw < value).count();
        }
        result[truth.length] = fit.ladder().settled() ? 1 : 0;
        return result;
    }

    int stocks() {
        return ranks.length;
    }

    int unsettled() {
        return unsettled;
    }

    /** Number of stocks whose central 90 % interval holds the truth. */
    int covered(int quantity) {
        return (int) Arrays.stream(ranks)
                .filter(r -> r[quantity] >= LOW && r[quantity] <= HIGH)
                .count();
    }

    /** The same in % of the stocks. */
    double coverage(int quantity) {
        return 100.0 * covered(quantity) / stocks();
    }

    /** Bounds of {@link #covered} that a calibrated engine leaves with probability at most {@code level}. */
    int[] bounds(double level) {
        BinomialDistribution count = new BinomialDistribution(ranks.length, INSIDE);
        return new int[] {
            count.inverseCumulativeProbability(level / 2), count.inverseCumulativeProbability(1 - level / 2)
        };
    }

    /** Chi-square of the ranks in equal bins. */
    double chiSquare(int quantity, int bins) {
        int[] counts = new int[bins];
        for (int[] rank : ranks) {
            counts[rank[quantity] * bins / (StateSpaceFit.DRAWS + 1)]++;
        }
        double expected = (double) ranks.length / bins;
        return Arrays.stream(counts)
                .mapToDouble(count -> (count - expected) * (count - expected) / expected)
                .sum();
    }

    static double chiSquareBound(int bins, double level) {
        return new ChiSquaredDistribution(bins - 1.0).inverseCumulativeProbability(1 - level);
    }

    @Override
    public String toString() {
        StringBuilder text = new StringBuilder();
        for (int q = 0; q < QUANTITIES.length; q++) {
            text.append(String.format(
                    Locale.ROOT, "%s %.1f %% (chi-square %.1f)  ", QUANTITIES[q], coverage(q), chiSquare(q, 10)));
        }
        return text + "not settled " + unsettled + " of " + stocks();
    }
}
