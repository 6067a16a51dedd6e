package org.merewarden.advice;

import java.util.List;
import java.util.Map;
import org.merewarden.core.policy.LimitArithmetic;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.RightView;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Repository;

/** Writes what each cooperative may log under a limit. Rows are added, never edited. */
@Repository
class AllocationWriter {
    private final JdbcClient jdbc;
    private final Register register;

    AllocationWriter(JdbcClient jdbc, Register register) {
        this.jdbc = jdbc;
        this.register = register;
    }

    /** Allocates by the rights, unless it was done by hand. */
    void byRights(long limitId, NewLimit limit) {
        Double kilograms = limit.toBeLoggedKilograms();
        if (kilograms == null || allocated(limitId)) {
            return;
        }
        List<RightView> rights = register.rightsOfStock(limit.stockId());
        long[] parts = LimitArithmetic.allocate(
                kilograms, rights.stream().mapToDouble(RightView::sharePercent).toArray());
        for (int i = 0; i < parts.length; i++) {
            insert(limitId, rights.get(i), parts[i]);
        }
    }

    private boolean allocated(long limitId) {
        return jdbc.sql("select count(*) from allocation where limit_id = ?")
                        .param(limitId)
                        .query(Integer.class)
                        .single()
                > 0;
    }

    /** Keeps what was allocated by hand, kg by cooperative; those without a right to the stock get nothing. */
    void byHand(long limitId, long stockId, Map<Long, Long> kilograms) {
        for (RightView right : kilograms.isEmpty() ? List.<RightView>of() : register.rightsOfStock(stockId)) {
            insert(limitId, right, kilograms.getOrDefault(right.cooperativeId(), 0L));
        }
    }

    private void insert(long limitId, RightView right, long kilograms) {
        jdbc.sql("insert into allocation (limit_id, cooperative_id, share_percent, amount_kg) values (?, ?, ?, ?)")
                .params(limitId, right.cooperativeId(), right.sharePercent(), kilograms)
                .update();
    }
}
