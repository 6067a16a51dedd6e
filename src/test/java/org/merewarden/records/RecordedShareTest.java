package org.merewarden.records;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.List;
import org.junit.jupiter.api.Test;
import org.merewarden.records.RecordedShare.Taken;

class RecordedShareTest {
    private static final List<Taken> CATCHES = List.of(
            new Taken("perch", 2001, 8),
            new Taken("perch", 2001, 2),
            new Taken("perch", 2002, 6),
            new Taken("pike", 2002, 2));

    /** Perch (8 + 2 + 6)/2 = 8 t a season, pike 2 t in its only one: 0.8 and 0.2. */
    @Test
    void sharesAreOfTheMeansPerRecordedSeason() {
        assertThat(RecordedShare.of("perch", 2, CATCHES)).isEqualTo(0.8);
        assertThat(RecordedShare.of("pike", 2, CATCHES)).isEqualTo(0.2);
    }

    @Test
    void aStockWithoutAnyRecordLeavesTheSharesOpen() {
        assertThat(RecordedShare.of("perch", 3, CATCHES)).isNull();
        assertThat(RecordedShare.of("roach", 3, CATCHES)).isNull();
    }

    @Test
    void nothingTakenTellsNothing() {
        assertThat(RecordedShare.of("perch", 1, List.of(new Taken("perch", 2001, 0))))
                .isNull();
        assertThat(RecordedShare.of("perch", 1, List.of())).isNull();
    }
}
