package org.merewarden.advice;

import static org.assertj.core.api.Assertions.assertThat;

import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.merewarden.core.policy.Policy;

/** What is shown and typed again is the same constant to the last bit. */
class PolicyFormTest {
    @Test
    void theProgramsOwnPolicyComesBackAsItWas() {
        assertThat(PolicyForm.of(Policy.DEFAULT).toPolicy()).isEqualTo(Policy.DEFAULT);
    }

    /** 0.07, 0.29 and 0.57 times 100 are no whole numbers in binary arithmetic. */
    @ParameterizedTest
    @ValueSource(doubles = {0.07, 0.29, 0.57, 0.001, 0.1234, 1.0 / 3, 0.999})
    void perCentAreReadBackExactly(double fraction) {
        assertThat(PolicyForm.of(with(fraction)).toPolicy().tolerance()).isEqualTo(fraction);
    }

    private static Policy with(double tolerance) {
        Policy d = Policy.DEFAULT;
        return new Policy(
                d.limitFraction(),
                d.ramp(),
                d.quantile(),
                d.horizonYears(),
                tolerance,
                d.steadinessCap(),
                d.lastSeason(),
                d.setAsides(),
                d.rounding(),
                d.standing(),
                d.pooled(),
                d.intervalProbability());
    }
}
