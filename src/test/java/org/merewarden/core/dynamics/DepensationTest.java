package org.merewarden.core.dynamics;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

class DepensationTest {
    private final SurplusProduction schaefer = new SurplusProduction(0.4, 1000, 1);

    @Test
    void halvesGrowthAtItsOwnBiomass() {
        Depensation law = new Depensation(schaefer, 0.1);
        assertThat(law.rate(100)).isCloseTo(0.4 * 100 * 0.9 / 2, within(1e-12));
        assertThat(law.rate(1000)).isZero();
        assertThat(law.rate(0)).isZero();
        assertThat(law.slope(0)).isZero();
        assertThat(law.perCapita(0)).isZero();
        assertThat(law.capacity()).isEqualTo(1000);
    }

    @Test
    void withoutTheEffectIsTheLawItself() {
        Depensation law = new Depensation(schaefer, 0);
        assertThat(law.rate(300)).isEqualTo(schaefer.rate(300));
        assertThat(law.slope(300)).isEqualTo(schaefer.slope(300));
        assertThat(law.slope(0)).isEqualTo(schaefer.slope(0));
    }

    @ParameterizedTest
    @ValueSource(doubles = {0, 1e-9, 0.5, 1, 3})
    void slopeIsTheDerivative(double n) {
        Depensation law = new Depensation(new SurplusProduction(0.4, 1000, n), 0.2);
        for (double biomass : new double[] {1e-6, 10, 300, 1000, 1500}) {
            double h = 1e-5 * biomass;
            double difference = (law.rate(biomass + h) - law.rate(biomass - h)) / (2 * h);
            assertThat(law.slope(biomass)).isCloseTo(difference, within(1e-8));
        }
    }

    @Test
    void rejectsANegativeEffect() {
        assertThatThrownBy(() -> new Depensation(schaefer, -0.1))
                .isInstanceOf(IllegalArgumentException.class)
                .hasMessage("0 <= d < infinity is violated: d = -0.1");
    }
}
