package org.merewarden.advice;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.time.Instant;
import java.time.LocalDate;
import java.time.OffsetDateTime;
import java.time.ZoneOffset;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.stream.Collectors;
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

    /**
     * One decision.
     *
     * @param act DRAFTED, DISCARDED, PROPOSED, ISSUED, REFUSED, WITHDRAWN or SUPERSEDED
     * @param effectiveAt the instant from which it has effect
     */
    record Decision(
            long limitId,
            String act,
            Instant decidedAt,
            Instant effectiveAt,
            String decidedBy,
            String reason,
            boolean fromPaper,
            Beside beside) {

        /** When it was decided, for people; papers know the day only. */
        String when() {
            return fromPaper && act.equals(LimitWriter.ISSUED)
                    ? Figures.date(LocalDate.ofInstant(effectiveAt, ZoneOffset.UTC))
                    : Figures.dateTime(decidedAt);
        }

        /** When it was decided; papers are stored later than they were decided. */
        Instant at() {
            return fromPaper ? effectiveAt : decidedAt;
        }

        /** Whether it has effect from another moment than that of the decision. */
        boolean laterEffect() {
            return !fromPaper && effectiveAt.isAfter(decidedAt);
        }
    }

    private static final String DECISIONS = """
            select d.limit_id, d.act, d.decided_at, d.effective_at, d.decided_by, d.reason, l.origin,
                d.own_proposal, d.doubt, d.successor_id
            from limit_decision d join catch_limit l on l.id = d.limit_id
            """;

    /** All limits of the stock with their decisions, newest first; two statements. */
    List<LimitFile> files(long stockId) {
        Map<Long, List<Decision>> acts = decisions(stockId).stream().collect(Collectors.groupingBy(Decision::limitId));
        return jdbc
                .sql("select * from catch_limit where stock_id = ? order by id desc")
                .param(stockId)
                .query((row, n) -> new LimitFile(
                        row.getLong("id"), limit(row, n), acts.getOrDefault(row.getLong("id"), List.of())))
                .list()
                .stream()
                .filter(file -> !file.acts().isEmpty())
                .toList();
    }

    Optional<LimitFile> file(long limitId) {
        return find(limitId).map(limit -> new LimitFile(limitId, limit, ofLimit(limitId)));
    }

    /** The limit that was written down from the form with this key. */
    Optional<Long> ofKey(String entryKey) {
        return jdbc.sql("select id from catch_limit where entry_key = ?")
                .param(entryKey)
                .query(Long.class)
                .optional();
    }

    /** The decisions about a stock's limits, in the order in which they were taken. */
    private List<Decision> decisions(long stockId) {
        return jdbc.sql(DECISIONS + "where l.stock_id = ? order by d.id")
                .param(stockId)
                .query(LimitHistory::decision)
                .list();
    }

    /** What was decided about one limit, oldest first. */
    List<Decision> ofLimit(long limitId) {
        return jdbc.sql(DECISIONS + "where d.limit_id = ? order by d.id")
                .param(limitId)
                .query(LimitHistory::decision)
                .list();
    }

    private static Decision decision(ResultSet row, int n) throws SQLException {
        return new Decision(
                row.getLong(1),
                row.getString(2),
                row.getObject(3, OffsetDateTime.class).toInstant(),
                row.getObject(4, OffsetDateTime.class).toInstant(),
                row.getString(5),
                row.getString(6),
                row.getString(7).equals("entered"),
                new Beside(row.getBoolean(8), row.getString(9), row.getObject(10, Long.class)));
    }

    Optional<NewLimit> find(long limitId) {
        return jdbc.sql("select * from catch_limit where id = ?")
                .param(limitId)
                .query(LimitHistory::limit)
                .optional();
    }

    /** Numbers of limits that are issued and wait for their moment. */
    List<Long> due(Instant now) {
        return jdbc.sql("select limit_id from limit_pending where effective_at <= ? order by effective_at, limit_id")
                .param(now.atOffset(ZoneOffset.UTC))
                .query(Long.class)
                .list();
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
                row.getString("origin"),
                terms(row));
    }

    private static Terms terms(ResultSet row) throws SQLException {
        OffsetDateTime effective = row.getObject("effective_at", OffsetDateTime.class);
        return new Terms(
                row.getString("purpose"),
                effective == null ? null : effective.toInstant(),
                row.getObject("review_by", LocalDate.class),
                row.getObject("recommendation_id", Long.class),
                row.getString("difference_reason"),
                row.getString("entry_key"));
    }
}
