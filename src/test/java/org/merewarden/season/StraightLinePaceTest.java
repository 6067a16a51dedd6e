package org.merewarden.season;

import static org.assertj.core.api.Assertions.assertThat;

import java.time.LocalDate;
import org.junit.jupiter.api.Test;

/** Expected days worked by hand. */
class StraightLinePaceTest {
    private static final LocalDate FIRST = LocalDate.of(2026, 1, 1);

    @Test
    void halfInTwentyDaysIsWholeInTwentyMore() {
        assertThat(StraightLinePace.usedUpOn(500, 1000, FIRST, LocalDate.of(2026, 1, 20)))
                .contains(LocalDate.of(2026, 2, 9));
    }

    @Test
    void aPartOfADayCountsAsTheDay() {
        // 30 kg in 30 days, 0.5 kg left: half a day
        assertThat(StraightLinePace.usedUpOn(30, 30.5, FIRST, LocalDate.of(2026, 1, 30)))
                .contains(LocalDate.of(2026, 1, 31));
    }

    @Test
    void whatIsUsedUpIsUsedUpAtTheLastRecord() {
        assertThat(StraightLinePace.usedUpOn(1200, 1000, FIRST, LocalDate.of(2026, 3, 1)))
                .contains(LocalDate.of(2026, 3, 1));
    }

    @Test
    void thereIsNoPaceFromThirteenDaysOrFromNothing() {
        assertThat(StraightLinePace.usedUpOn(500, 1000, FIRST, LocalDate.of(2026, 1, 13)))
                .isEmpty();
        assertThat(StraightLinePace.usedUpOn(0, 1000, FIRST, LocalDate.of(2026, 6, 1)))
                .isEmpty();
    }

    @Test
    void aLimitThatWouldLastACenturyHasNoDate() {
        assertThat(StraightLinePace.usedUpOn(0.001, 1000, FIRST, LocalDate.of(2026, 6, 1)))
                .isEmpty();
    }
}
