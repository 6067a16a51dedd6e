package org.merewarden.advice;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.sql.Types;
import java.time.Instant;
import java.time.ZoneOffset;
import java.util.HashSet;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import org.jspecify.annotations.Nullable;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Repository;

/** Trials of versions and what came of them, each stock once. */
@Repository
class PolicyTrialStore {
    private static final String TRIAL =
            "select id, job_id, policy_number as number, against_number as against from policy_trial ";

    private final JdbcClient jdbc;

    PolicyTrialStore(JdbcClient jdbc) {
        this.jdbc = jdbc;
    }

    /** @param against the version that was in force when it was asked for */
    record Trial(long id, long jobId, int number, int against) {}

    /**
     * One stock of a trial.
     *
     * @param limitNow total removals of the limit in force in the present season, t; null where there is none in t
     * @param both what the two versions recommend; null where the rule had nothing to work on
     */
    record Row(
            long stockId,
            @Nullable Double limitNow,
            @Nullable Both both) {}

    /** @param here by the version that is tried, {@code against} by the one that was in force */
    record Both(PolicyTrialRule.Trial here, PolicyTrialRule.Trial against) {}

    void add(long jobId, int number, int against, String by, Instant at) {
        jdbc.sql("insert into policy_trial (job_id, policy_number, against_number, requested_at, requested_by)"
                        + " values (?, ?, ?, ?, ?)")
                .params(jobId, number, against, at.atOffset(ZoneOffset.UTC), by)
                .update();
    }

    Trial ofJob(long jobId) {
        return jdbc.sql(TRIAL + "where job_id = ?")
                .param(jobId)
                .query(Trial.class)
                .single();
    }

    Optional<Trial> latest(int number) {
        return jdbc.sql(TRIAL + "where policy_number = ? order by id desc limit 1")
                .param(number)
                .query(Trial.class)
                .optional();
    }

    Set<Long> storedStocks(long trialId) {
        return new HashSet<>(jdbc.sql("select stock_id from policy_trial_stock where trial_id = ?")
                .param(trialId)
                .query(Long.class)
                .list());
    }

    void add(long trialId, Row row) {
        Both both = row.both();
        jdbc.sql("""
                        insert into policy_trial_stock (trial_id, stock_id, limit_now_t, season_year, assessment_id,
                            limit_t, decided_by, risk, against_limit_t, against_decided_by, against_risk)
                        values (:trial, :stock, :now, :season, :assessment, :limit, :decided, :risk, :againstLimit,
                            :againstDecided, :againstRisk)""")
                .param("trial", trialId)
                .param("stock", row.stockId())
                .param("now", row.limitNow(), Types.DOUBLE)
                .param("season", both == null ? null : both.here().season(), Types.INTEGER)
                .param("assessment", both == null ? null : both.here().assessmentId(), Types.BIGINT)
                .param("limit", both == null ? null : both.here().limitTonnes(), Types.DOUBLE)
                .param("decided", both == null ? null : both.here().decidedBy(), Types.VARCHAR)
                .param("risk", both == null ? null : both.here().risk(), Types.DOUBLE)
                .param("againstLimit", both == null ? null : both.against().limitTonnes(), Types.DOUBLE)
                .param("againstDecided", both == null ? null : both.against().decidedBy(), Types.VARCHAR)
                .param("againstRisk", both == null ? null : both.against().risk(), Types.DOUBLE)
                .update();
    }

    List<Row> rows(long trialId) {
        return jdbc.sql("select * from policy_trial_stock where trial_id = ?")
                .param(trialId)
                .query(PolicyTrialStore::row)
                .list();
    }

    private static Row row(ResultSet row, int n) throws SQLException {
        boolean known = row.getString("decided_by") != null;
        return new Row(
                row.getLong("stock_id"),
                row.getObject("limit_now_t", Double.class),
                known ? new Both(trial(row, ""), trial(row, "against_")) : null);
    }

    private static PolicyTrialRule.Trial trial(ResultSet row, String prefix) throws SQLException {
        return new PolicyTrialRule.Trial(
                row.getInt("season_year"),
                row.getLong("assessment_id"),
                row.getDouble(prefix + "limit_t"),
                row.getString(prefix + "decided_by"),
                row.getDouble(prefix + "risk"));
    }
}
