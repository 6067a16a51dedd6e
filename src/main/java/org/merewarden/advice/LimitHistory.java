package org.merewarden.advice;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.time.Instant;
import java.time.LocalDate;
import java.time.OffsetDateTime;
import java.time.ZoneOffset;
import java.util.List;
import java.util.Optional;
import org.merewarden.web.Figures;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Repository;

/** Every limit of a stock with what was decided about it, in force or not. */
@Repository
class LimitHistory {
    private final JdbcClient jdbc;

    LimitHistory(JdbcClient jdbc) {
        this.jdbc = jdbc;
    }

    /** One decision. Act: PROPOSED, ISSUED, REFUSED, WITHDRAWN or SUPERSEDED; the instant from which it has effect. */
    record Decision(long limitId, String act, Instant effectiveAt, String decidedBy, String reason, boolean fromPaper) {

        /** When it took effect, for people; papers know the day only. */
        String when() {
            return fromPaper && act.equals(LimitWriter.ISSUED)
                    ? Figures.date(LocalDate.ofInstant(effectiveAt, ZoneOffset.UTC))
                    : Figures.dateTime(effectiveAt);
        }
    }

    /** The decisions about a stock's limits, newest first. */
    List<Decision> decisions(long stockId) {
        return jdbc.sql("""
                        select d.limit_id, d.act, d.effective_at, d.decided_by, d.reason, l.origin
                        from limit_decision d join catch_limit l on l.id = d.limit_id
                        where l.stock_id = ? order by d.effective_at desc, d.id desc""").param(stockId).query(LimitHistory::decision).list();
    }

    /** What was decided about one limit, oldest first. */
    List<Decision> ofLimit(long limitId) {
        return jdbc.sql("""
                        select d.limit_id, d.act, d.effective_at, d.decided_by, d.reason, l.origin
                        from limit_decision d join catch_limit l on l.id = d.limit_id
                        where d.limit_id = ? order by d.id""").param(limitId).query(LimitHistory::decision).list();
    }

    private static Decision decision(ResultSet row, int n) throws SQLException {
        return new Decision(
                row.getLong(1),
                row.getString(2),
                row.getObject(3, OffsetDateTime.class).toInstant(),
                row.getString(4),
                row.getString(5),
                row.getString(6).equals("entered"));
    }

    Optional<NewLimit> find(long limitId) {
        return jdbc.sql("select * from catch_limit where id = ?")
                .param(limitId)
                .query(LimitHistory::limit)
                .optional();
    }

    /** Limits of the stock that were proposed and neither issued nor refused nor withdrawn, newest first. */
    List<Long> open(long stockId) {
        return jdbc.sql("""
                        select l.id from catch_limit l where l.stock_id = ? and l.origin = 'decided'
                            and not exists (select 1 from limit_decision d where d.limit_id = l.id
                                and d.act <> 'PROPOSED')
                        order by l.id desc""").param(stockId).query(Long.class).list();
    }

    static NewLimit limit(ResultSet row, int n) throws SQLException {
        return new NewLimit(
                row.getLong("stock_id"),
                row.getInt("season_year"),
                row.getString("kind"),
                row.getObject("amount", Double.class),
                row.getString("unit"),
                row.getDouble("set_aside_subsistence_t"),
                row.getDouble("set_aside_angling_t"),
                row.getDouble("set_aside_research_t"),
                row.getDouble("set_aside_other_t"),
                row.getDouble("reported_fraction"),
                row.getObject("valid_from", LocalDate.class),
                row.getObject("valid_to", LocalDate.class),
                row.getString("measures"),
                row.getString("legal_basis"),
                row.getString("objection"),
                row.getObject("assessment_id", Long.class),
                row.getString("origin"));
    }
}
