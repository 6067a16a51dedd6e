package org.merewarden.core.dynamics;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvFileSource;
import org.junit.jupiter.params.provider.MethodSource;

class HarvestRuleTest {
    static Stream<HarvestRule> rules() {
        return Stream.of(
                new ConstantCatch(),
                new ConstantEffort(),
                new Reserve(300),
                new Reserve(0),
                new PolicyRamp(200, 500),
                new PolicyRamp(0, 500),
                new CatchLinearRamp(100, 400));
    }

    @ParameterizedTest
    @MethodSource("rules")
    void slopeIsTheDerivativeAwayFromKinks(HarvestRule rule) {
        for (double biomass = 7; biomass < 1200; biomass += 13) {
            double difference = (rule.effect(biomass + 1e-3) - rule.effect(biomass - 1e-3)) / 2e-3;
            assertThat(rule.slope(biomass)).isCloseTo(difference, within(1e-9));
        }
    }

    @ParameterizedTest
    @MethodSource("rules")
    void isContinuousAndNeverNegative(HarvestRule rule) {
        for (double kink : rule.kinks()) {
            assertThat(rule.effect(kink - 1e-9)).isCloseTo(rule.effect(kink + 1e-9), within(1e-7));
            double right = (rule.effect(kink + 1e-3) - rule.effect(kink)) / 1e-3;
            assertThat(rule.slope(kink)).isCloseTo(right, within(1e-4));
        }
        for (double biomass = 0; biomass < 1200; biomass += 10) {
            assertThat(rule.effect(biomass)).isNotNegative();
        }
    }

    @Test
    void rulesAreTheirFormulas() {
        assertThat(new ConstantCatch().effect(123)).isEqualTo(1);
        assertThat(new ConstantEffort().effect(123)).isEqualTo(123);
        assertThat(new Reserve(100).effect(123)).isEqualTo(23);
        assertThat(new Reserve(100).effect(99)).isZero();
        PolicyRamp ramp = new PolicyRamp(200, 500);
        assertThat(ramp.shareOfTarget(200)).isZero();
        assertThat(ramp.shareOfTarget(350)).isEqualTo(0.5);
        assertThat(ramp.shareOfTarget(900)).isEqualTo(1);
        assertThat(ramp.effect(350)).isEqualTo(175);
    }

    /** The grid is recalled, fairly sure; printed to six digits. */
    @ParameterizedTest
    @CsvFileSource(resources = "/reference/rule_40_10_grid.csv", numLinesToSkip = 1)
    void catchLinearRampGivesThePublishedGrid(double depletion, double multiplier) {
        CatchLinearRamp ramp = new CatchLinearRamp(0.1 * 1000, 0.4 * 1000);
        assertThat(ramp.shareOfTarget(depletion * 1000)).isCloseTo(multiplier, within(5e-7));
    }

    @Test
    void catchLinearRampIsALineInCatch() {
        CatchLinearRamp ramp = new CatchLinearRamp(100, 400);
        assertThat(ramp.effect(250)).isCloseTo(200, within(1e-12));
        assertThat(ramp.effect(400)).isEqualTo(400);
        assertThat(ramp.shareOfTarget(0)).isZero();
    }

    @Test
    void rejectsALimitThatIsNotBelowItsTarget() {
        assertThatThrownBy(() -> new PolicyRamp(500, 500))
                .isInstanceOf(IllegalArgumentException.class)
                .hasMessage("B lim < BMSY is violated: B lim = 500.0, BMSY = 500.0");
        assertThatThrownBy(() -> new CatchLinearRamp(5, 4)).hasMessageContaining("B_lo = 5.0, B_up = 4.0");
        assertThatThrownBy(() -> new Reserve(-1)).hasMessage("0 <= B0 < infinity is violated: B0 = -1.0");
    }
}
