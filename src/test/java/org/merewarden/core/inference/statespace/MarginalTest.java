package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;

import java.util.stream.Stream;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.SurveyRecord;

class MarginalTest {
    private static final double NONE = Double.NaN;
    private static final double[] CATCHES = {15, 22, NONE, 24, 20, 14};
    private static final double[] BIOMASS = {120, NONE, 95, NONE, 70, 75};
    private static final double[] ONE_BIOMASS = {NONE, NONE, NONE, 70, NONE, NONE};

    static Stream<double[]> parameters() {
        return Stream.of(
                new double[] {20, 0.25, 0.1, 0.3},
                new double[] {12, 0.2, 0.15, 0.4},
                new double[] {30, 0.4, 0.2, 0.3},
                new double[] {25, 0.1, 0.1, 0.5});
    }

    /** checks.md of the design: within 0.05 of a fine-grid filter, exact up to the grid. */
    @ParameterizedTest
    @MethodSource("parameters")
    void theLaplaceSumIsTheIntegralOverTheStates(double[] p) {
        for (double[] biomass : new double[][] {BIOMASS, ONE_BIOMASS}) {
            double grid = new GridFilter(p[0], p[1], p[2], p[3], CATCHES, 0.15, biomass, 0.2, Math.log(0.8), 0.3)
                    .logLikelihood();
            assertThat(laplace(p, biomass)).isEqualTo(grid, offset(0.05));
        }
    }

    private static double laplace(double[] p, double[] biomass) {
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
        OuterParameters outer = new OuterParameters(priors, data);
        Marginal marginal = new Marginal(data, priors, outer);
        double[] middle = {0};
        marginal.explore(middle);
        return marginal.evaluate(middle) - outer.logPrior(middle);
    }
}
