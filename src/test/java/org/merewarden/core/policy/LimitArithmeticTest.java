package org.merewarden.core.policy;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import java.util.Arrays;
import java.util.SplittableRandom;
import org.junit.jupiter.api.Test;

class LimitArithmeticTest {
    @Test
    void fromLimitToLogbookByHand() {
        // 12 t − 2 t set aside = 10 t commercial; 85 % of it is reported: 8.5 t
        assertThat(LimitArithmetic.toBeLogged(12, 2, 0.85)).isCloseTo(8.5, within(1e-12));
        assertThat(LimitArithmetic.toBeLogged(0, 0, 1)).isZero();
    }

    /** By hand: 12.345 t · 0.1 = 1.2345 t, rounded down to 1.234 t. */
    @Test
    void aSetAsideIsItsShareRoundedDownToTheKilogram() {
        assertThat(LimitArithmetic.setAside(0.1, 12.345)).isEqualTo(1.234);
        assertThat(LimitArithmetic.setAside(0.1, 12.3)).isEqualTo(1.23);
        assertThat(LimitArithmetic.setAside(0.29, 100)).isEqualTo(29);
        assertThat(LimitArithmetic.setAside(0.075, 0)).isZero();
        assertThat(LimitArithmetic.setAside(1, 7.5)).isEqualTo(7.5);
    }

    @Test
    void impossiblePartsAreRejectedWithTheRule() {
        assertThatThrownBy(() -> LimitArithmetic.toBeLogged(1, 1.5, 1)).hasMessageContaining("set-asides <= limit");
        assertThatThrownBy(() -> LimitArithmetic.toBeLogged(1, 0, 0)).hasMessageContaining("0 < reported fraction");
        assertThatThrownBy(() -> LimitArithmetic.allocate(10, 60, 50)).hasMessageContaining("<= 100");
    }

    @Test
    void wholeKilogramsByLargestRemainder() {
        // exact 33.33, 33.33, 33.33 of 100: the one kilogram left goes to the first
        double third = 100.0 / 3;
        assertThat(LimitArithmetic.allocate(100, third, third, third)).containsExactly(34, 33, 33);
        // exact 12.5, 37.5 of 50: tie, to the earlier
        assertThat(LimitArithmetic.allocate(50, 25, 75)).containsExactly(13, 37);
        // exact 1.4, 2.8, 2.8 of 7: one each left for the two larger remainders
        assertThat(LimitArithmetic.allocate(7, 20, 40, 40)).containsExactly(1, 3, 3);
        assertThat(LimitArithmetic.allocate(100)).isEmpty();
    }

    @Test
    void partsAddUpAndStayWithinAKilogramOfTheirShare() {
        var random = new SplittableRandom(20261201);
        for (int trial = 0; trial < 2000; trial++) {
            double[] raw = random.doubles(1 + random.nextInt(7), 0.01, 1).toArray();
            double scale = 100 / Arrays.stream(raw).sum();
            double[] shares = Arrays.stream(raw).map(x -> x * scale).toArray();
            double total = random.nextDouble(0, 1e6);
            long[] parts = LimitArithmetic.allocate(total, shares);
            assertThat(Arrays.stream(parts).sum()).isEqualTo((long) Math.floor(total + 1e-6));
            for (int i = 0; i < parts.length; i++) {
                assertThat((double) parts[i]).isBetween(total * shares[i] / 100 - 1, total * shares[i] / 100 + 1);
            }
        }
    }
}
