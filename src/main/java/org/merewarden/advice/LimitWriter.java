package org.merewarden.advice;

import java.sql.Types;
import java.time.Clock;
import java.time.Instant;
import java.time.OffsetDateTime;
import java.time.ZoneOffset;
import java.util.List;
import java.util.Objects;
import java.util.Optional;
import org.merewarden.core.policy.LimitArithmetic;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.RightView;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.jdbc.support.GeneratedKeyHolder;
import org.springframework.stereotype.Repository;

/** Writes limits, their decisions and allocations. Rows are added, never edited. */
@Repository
class LimitWriter {
    static final String PROPOSED = "PROPOSED";
    static final String ISSUED = "ISSUED";
    static final String REFUSED = "REFUSED";
    static final String WITHDRAWN = "WITHDRAWN";
    static final String SUPERSEDED = "SUPERSEDED";

    private final JdbcClient jdbc;
    private final Register register;
    private final Clock clock;

    LimitWriter(JdbcClient jdbc, Register register, Clock clock) {
        this.jdbc = jdbc;
        this.register = register;
        this.clock = clock;
    }

    long add(NewLimit limit, String by) {
        var keys = new GeneratedKeyHolder();
        jdbc.sql("""
                        insert into catch_limit (stock_id, season_year, kind, amount, unit, set_aside_subsistence_t,
                            set_aside_angling_t, set_aside_research_t, set_aside_other_t, reported_fraction,
                            valid_from, valid_to, measures, legal_basis, objection, assessment_id, origin,
                            created_at, created_by)
                        values (:stock, :season, :kind, :amount, :unit, :subsistence, :angling, :research, :other,
                            :reported, :from, :to, :measures, :basis, :objection, :assessment, :origin, :at, :by)""")
                .param("stock", limit.stockId())
                .param("season", limit.season())
                .param("kind", limit.kind())
                .param("amount", limit.amount(), Types.DOUBLE)
                .param("unit", limit.unit())
                .param("subsistence", limit.subsistenceTonnes())
                .param("angling", limit.anglingTonnes())
                .param("research", limit.researchTonnes())
                .param("other", limit.otherTonnes())
                .param("reported", limit.reportedFraction())
                .param("from", limit.validFrom())
                .param("to", limit.validTo())
                .param("measures", limit.measures(), Types.VARCHAR)
                .param("basis", limit.legalBasis(), Types.VARCHAR)
                .param("objection", limit.objection(), Types.VARCHAR)
                .param("assessment", limit.assessmentId(), Types.BIGINT)
                .param("origin", limit.origin())
                .param("at", now())
                .param("by", by)
                .update(keys, "id");
        return Objects.requireNonNull(keys.getKey()).longValue();
    }

    void lock(long limitId) {
        jdbc.sql("select id from catch_limit where id = ? for update")
                .param(limitId)
                .query(Long.class)
                .optional();
    }

    void decide(long limitId, String act, String by, Instant effective, String reason) {
        jdbc.sql("insert into limit_decision (limit_id, act, decided_at, decided_by, effective_at, reason)"
                        + " values (?, ?, ?, ?, ?, ?)")
                .params(limitId, act, now(), by, effective.atOffset(ZoneOffset.UTC), reason)
                .update();
    }

    /** Puts an issued limit in force and allocates it by the rights; the one before is superseded. */
    void putInForce(long limitId, NewLimit limit, String by) {
        Optional<Long> before = jdbc.sql("select limit_id from limit_in_force where stock_id = ? and season_year = ?")
                .params(limit.stockId(), limit.season())
                .query(Long.class)
                .optional();
        before.ifPresent(old -> {
            decide(old, SUPERSEDED, by, clock.instant(), "superseded by notice " + limitId);
            endForce(old);
        });
        jdbc.sql("insert into limit_in_force (stock_id, season_year, limit_id) values (?, ?, ?)")
                .params(limit.stockId(), limit.season(), limitId)
                .update();
        allocate(limitId, limit);
    }

    /** Puts a limit from papers in force, unless one that was issued later is; then it is superseded as it comes. */
    void enterInForce(long limitId, NewLimit limit, Instant issued, String by) {
        Optional<Long> later = jdbc.sql("""
                        select f.limit_id from limit_in_force f
                        join limit_decision d on d.limit_id = f.limit_id and d.act = 'ISSUED'
                        where f.stock_id = ? and f.season_year = ? and d.effective_at > ?""")
                .params(limit.stockId(), limit.season(), issued.atOffset(ZoneOffset.UTC))
                .query(Long.class)
                .optional();
        if (later.isPresent()) {
            decide(limitId, SUPERSEDED, by, clock.instant(), "superseded by notice " + later.get());
        } else {
            putInForce(limitId, limit, by);
        }
    }

    void endForce(long limitId) {
        jdbc.sql("delete from limit_in_force where limit_id = ?").param(limitId).update();
    }

    private void allocate(long limitId, NewLimit limit) {
        Double amount = limit.amount();
        if (!limit.kind().equals("catch") || amount == null) {
            return;
        }
        List<RightView> rights = register.rightsOfStock(limit.stockId());
        double kilograms = 1000 * LimitArithmetic.toBeLogged(amount, limit.setAsidesTonnes(), limit.reportedFraction());
        long[] parts = LimitArithmetic.allocate(
                kilograms, rights.stream().mapToDouble(RightView::sharePercent).toArray());
        for (int i = 0; i < parts.length; i++) {
            jdbc.sql("insert into allocation (limit_id, cooperative_id, share_percent, amount_kg) values (?, ?, ?, ?)")
                    .params(
                            limitId,
                            rights.get(i).cooperativeId(),
                            rights.get(i).sharePercent(),
                            parts[i])
                    .update();
        }
    }

    private OffsetDateTime now() {
        return clock.instant().atOffset(ZoneOffset.UTC);
    }
}
