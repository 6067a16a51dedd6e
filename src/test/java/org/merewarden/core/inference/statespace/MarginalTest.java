package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;
import static org.assertj.core.data.Percentage.withPercentage;

import java.util.SplittableRandom;
import java.util.stream.Stream;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.SurveyRecord;

class MarginalTest {
    private static final double NONE = Double.NaN;
    private static final double[] CATCHES = {15, 22, NONE, 24, 20, 14};
    private static final double[] BIOMASS = {120, NONE, 95, NONE, 70, 75};
    private static final int DRAWS = 20_000;
    private static final double[] ONE_BIOMASS = {NONE, NONE, NONE, 70, NONE, NONE};

    static Stream<double[]> parameters() {
        return Stream.of(
                new double[] {20, 0.25, 0.1, 0.3},
                new double[] {12, 0.2, 0.15, 0.4},
                new double[] {30, 0.4, 0.2, 0.3},
                new double[] {25, 0.1, 0.1, 0.5});
    }

    /** Within 0.05 of a fine-grid filter, exact up to the grid. */
    @ParameterizedTest
    @MethodSource("parameters")
    void theLaplaceSumIsTheIntegralOverTheStates(double[] p) {
        for (double[] biomass : new double[][] {BIOMASS, ONE_BIOMASS}) {
            double grid = new GridFilter(p[0], p[1], p[2], p[3], CATCHES, 0.15, biomass, 0.2, Math.log(0.8), 0.3)
                    .logLikelihood();
            Marginal marginal = marginal(p, biomass);
            double laplace = marginal.evaluate(new double[1]) - marginal.logPrior(new double[1]);
            assertThat(laplace).isEqualTo(grid, offset(0.05));
        }
    }

    /**
     * The same source: means within 1 %. Weighted draws of the states; 20,000 pairs leave a standard error of 0.2 % where the
     * biomass varies by 30 %.
     */
    @ParameterizedTest
    @MethodSource("parameters")
    void drawsOfTheStatesHaveTheirPosteriorMeans(double[] p) {
        for (double[] biomass : new double[][] {BIOMASS, ONE_BIOMASS}) {
            GridFilter grid = new GridFilter(p[0], p[1], p[2], p[3], CATCHES, 0.15, biomass, 0.2, Math.log(0.8), 0.3);
            double[] means = meanBiomass(marginal(p, biomass), p[0]);
            for (int t = 0; t < means.length; t++) {
                assertThat(means[t]).as("season %d", t).isCloseTo(grid.meanBiomass(t), withPercentage(1));
            }
        }
    }

    private static double[] meanBiomass(Marginal marginal, double unitTonnes) {
        double level = marginal.evaluate(new double[1]);
        SplittableRandom random = new SplittableRandom(8);
        double[] sums = new double[CATCHES.length];
        double total = 0;
        for (int k = 0; k < DRAWS; k++) {
            double weight = Math.exp(marginal.mixture().draw(random) - level);
            double[] z = marginal.mixture().choose(random);
            total += weight;
            for (int t = 0; t < sums.length; t++) {
                sums[t] += weight
                        * unitTonnes
                        * Math.exp(z[2 * t] + marginal.density().logCapacity(t));
            }
        }
        for (int t = 0; t < sums.length; t++) {
            sums[t] /= total;
        }
        return sums;
    }

    private static Marginal marginal(double[] p, double[] biomass) {
        Cases cases = new Cases();
        for (int t = 0; t < CATCHES.length; t++) {
            if (!Double.isNaN(CATCHES[t])) {
                cases.caught(2000 + t, CATCHES[t], 0.15);
            }
            if (!Double.isNaN(biomass[t])) {
                cases.surveys.add(new SurveyRecord(2000 + t, "marked", 0, true, biomass[t], 0.2, null));
            }
        }
        Evidence evidence = cases.own("msy_t", p[0], 0)
                .own("fmsy", p[1], 1)
                .own("process_sd", p[2], 0)
                .own("harvest_sd", p[3], 0)
                .evidence();
        ModelPriors priors = ModelPriors.of(evidence);
        SeasonData data = SeasonData.of(evidence, 2005, priors);
        Marginal marginal = new Marginal(data, priors, new OuterParameters(priors, data));
        marginal.explore(new double[1]);
        return marginal;
    }
}
