package org.merewarden.advice;

import java.util.List;
import org.jspecify.annotations.Nullable;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Service;

/** Limits that wait for a decision, as other features read them. Every call is one statement. */
@Service
public class WaitingLimits {
    private final JdbcClient jdbc;

    WaitingLimits(JdbcClient jdbc) {
        this.jdbc = jdbc;
    }

    /**
     * A proposed limit.
     *
     * @param notice number of its draft notice
     * @param amount in {@code unit}; null for measures only
     */
    public record Proposal(
            long notice, long stockId, int season, @Nullable Double amount, String unit) {}

    /** Neither issued nor refused yet, of all stocks, the oldest first. */
    public List<Proposal> waiting() {
        return jdbc.sql("""
                        select l.id, l.stock_id, l.season_year, l.amount, l.unit from catch_limit l
                        where exists (select 1 from limit_decision p where p.limit_id = l.id and p.act = 'PROPOSED')
                            and not exists (select 1 from limit_decision d
                            where d.limit_id = l.id and d.act not in ('DRAFTED', 'PROPOSED'))
                        order by l.id""")
                .query((row, n) -> new Proposal(
                        row.getLong(1),
                        row.getLong(2),
                        row.getInt(3),
                        row.getObject(4, Double.class),
                        row.getString(5)))
                .list();
    }
}
