package org.merewarden.core.inference;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;

import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.merewarden.core.dynamics.SurplusProduction;

/** The step's growth, kept free of allocation for the fits, is the growth law of the dynamics. */
class AnnualStepTest {
    @ParameterizedTest
    @ValueSource(doubles = {0, 0.5, 1, 2})
    void growsAsTheDynamicsDo(double n) {
        SurplusProduction law = new SurplusProduction(0.4, 1000, n);
        for (double biomass : new double[] {1e-3, 20, 500, 999, 1300}) {
            assertThat(AnnualStep.growth(biomass, 0.4, 1000, n)).isEqualTo(law.rate(biomass), offset(1e-10));
            assertThat(AnnualStep.growthByBiomass(biomass, 0.4, 1000, n)).isEqualTo(law.slope(biomass), offset(1e-10));
        }
        assertThat(1000 * AnnualStep.bmsyFraction(n)).isEqualTo(law.bmsy(), offset(1e-10));
    }

    @ParameterizedTest
    @ValueSource(doubles = {0, 30})
    void oneSeasonByHand(double removals) {
        // (400 + 100)(1 − 0.2) = 400;  400 + 0.5 · 400 · 0.6 − C = 520 − C
        double after = AnnualStep.afterEvents(400, 100, 0.2);
        assertThat(after).isEqualTo(400);
        assertThat(AnnualStep.next(after, removals, 0.5, 1000, 1)).isEqualTo(520 - removals, offset(1e-12));
    }
}
