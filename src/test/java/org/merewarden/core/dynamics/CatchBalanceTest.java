package org.merewarden.core.dynamics;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

class CatchBalanceTest {
    /** Logistic, r 0.4, K 1000: computed from the closed form, confirmed by ODE integration (reference/SOURCES.md). */
    @ParameterizedTest
    @CsvSource({"50, 146.446609, 853.553391", "75, 250, 750", "96, 400, 600"})
    void logisticEquilibria(double removals, double lower, double upper) {
        var balance = new CatchBalance(new SurplusProduction(0.4, 1000, 1), removals);
        assertThat(balance.tippingBiomass()).isCloseTo(lower, within(5e-7));
        assertThat(balance.stableBiomass()).isCloseTo(upper, within(5e-7));
    }

    @ParameterizedTest
    @CsvSource({"0, 0.3", "0, 0.99", "0.188115, 0.7", "0.5, 0.01", "2, 0.5", "4, 0.999"})
    void growthEqualsTheCatchOnBothSidesOfTheFold(double shape, double shareOfMsy) {
        var law = SurplusProduction.fromReferencePoints(37, 0.2, shape);
        double removals = shareOfMsy * law.msy();
        var balance = new CatchBalance(law, removals);
        assertThat(law.rate(balance.tippingBiomass())).isCloseTo(removals, within(1e-9 * law.msy()));
        assertThat(law.rate(balance.stableBiomass())).isCloseTo(removals, within(1e-9 * law.msy()));
        assertThat(balance.tippingBiomass()).isLessThan(law.bmsy());
        assertThat(balance.stableBiomass()).isGreaterThan(law.bmsy());
    }

    @Test
    void withoutACatchNothingTips() {
        var balance = new CatchBalance(new SurplusProduction(0.4, 1000, 0.5), 0);
        assertThat(balance.tippingBiomass()).isZero();
        assertThat(balance.stableBiomass()).isEqualTo(1000);
    }

    @Test
    void atAndAboveTheFoldThereIsNone() {
        assertThatThrownBy(() -> new CatchBalance(new SurplusProduction(0.4, 1000, 1), 100))
                .isInstanceOf(IllegalArgumentException.class)
                .hasMessageContaining("H < MSY");
    }
}
