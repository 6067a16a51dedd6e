package org.merewarden.advice;

import static org.assertj.core.api.Assertions.assertThat;

import java.time.OffsetDateTime;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.merewarden.StatementCount;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;

@WholeApplication
class ClosedLimitsTest {
    private static final int SEASON = 2171;
    private static final OffsetDateTime FROM = OffsetDateTime.parse("2171-06-05T14:00Z");

    @Autowired
    private ClosedLimits closed;

    @Autowired
    private JdbcClient jdbc;

    private TestRegion region;
    private long stock;

    @BeforeEach
    void stock() {
        region = new TestRegion(jdbc);
        stock = region.stock(region.lake("closed-" + System.nanoTime(), "Closed Water"), "FPE");
    }

    /** A limit that is superseded at once by what is issued next. */
    private long superseded(double tonnes, OffsetDateTime from) {
        long id = region.limit(stock, SEASON, tonnes);
        jdbc.sql("delete from limit_in_force where limit_id = ?").param(id).update();
        jdbc.sql("update limit_decision set effective_at = ? where limit_id = ?")
                .params(from, id)
                .update();
        return id;
    }

    @Test
    void theLatestOneInForceUntilTheClosureIsTold() throws Exception {
        superseded(4, FROM.minusMonths(3));
        superseded(99, FROM.plusDays(3));
        long last = region.limit(stock, SEASON, 7.5);
        region.closure(stock, SEASON, FROM);
        assertThat(closed.before(stock, SEASON).map(LimitView::id)).contains(last);
        assertThat(closed.before(SEASON).get(stock).amountTonnes()).isEqualTo(7.5);
        assertThat(StatementCount.during(() -> closed.before(SEASON))).isEqualTo(1);
        assertThat(StatementCount.during(() -> closed.before(stock, SEASON))).isEqualTo(1);
    }

    @Test
    void aWithdrawnOneIsNot() {
        long first = superseded(4, FROM.minusMonths(3));
        long last = region.limit(stock, SEASON, 7.5);
        region.closure(stock, SEASON, FROM);
        jdbc.sql("insert into limit_decision (limit_id, act, decided_at, decided_by, effective_at, reason)"
                        + " values (?, 'WITHDRAWN', ?, 'test', ?, 'for a test')")
                .params(last, FROM.minusDays(9), FROM.minusDays(9))
                .update();
        assertThat(closed.before(stock, SEASON).map(LimitView::id)).contains(first);
    }

    @Test
    void anOpenStockHasNone() {
        region.limit(stock, SEASON, 7.5);
        assertThat(closed.before(stock, SEASON)).isEmpty();
        assertThat(closed.before(SEASON)).doesNotContainKey(stock);
    }
}
