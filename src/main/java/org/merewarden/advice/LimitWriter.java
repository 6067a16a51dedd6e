package org.merewarden.advice;

import java.sql.Types;
import java.time.Clock;
import java.time.Instant;
import java.time.OffsetDateTime;
import java.time.ZoneOffset;
import java.util.Objects;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.jdbc.support.GeneratedKeyHolder;
import org.springframework.stereotype.Repository;

/** Writes limits and their decisions. Rows are added, never edited; what is in force or waits for its moment is kept beside them. */
@Repository
class LimitWriter {
    static final String DRAFTED = "DRAFTED";
    static final String DISCARDED = "DISCARDED";
    static final String PROPOSED = "PROPOSED";
    static final String ISSUED = "ISSUED";
    static final String REFUSED = "REFUSED";
    static final String WITHDRAWN = "WITHDRAWN";
    static final String SUPERSEDED = "SUPERSEDED";

    private final JdbcClient jdbc;
    private final AllocationWriter allocations;
    private final Clock clock;

    LimitWriter(JdbcClient jdbc, AllocationWriter allocations, Clock clock) {
        this.jdbc = jdbc;
        this.allocations = allocations;
        this.clock = clock;
    }

    long add(NewLimit limit, String by) {
        Terms terms = limit.terms();
        var keys = new GeneratedKeyHolder();
        jdbc.sql("""
                        insert into catch_limit (stock_id, season_year, kind, amount, unit, set_aside_subsistence_t,
                            set_aside_angling_t, set_aside_research_t, set_aside_other_t, reported_fraction,
                            valid_from, valid_to, measures, legal_basis, objection, assessment_id, origin,
                            purpose, effective_at, review_by, recommendation_id, difference_reason, entry_key,
                            created_at, created_by)
                        values (:stock, :season, :kind, :amount, :unit, :subsistence, :angling, :research, :other,
                            :reported, :from, :to, :measures, :basis, :objection, :assessment, :origin, :purpose, :effective,
                            :review, :recommendation, :difference, :key, :at, :by)""")
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
                .param("purpose", terms.purpose())
                .param("effective", stored(terms.effectiveAt()), Types.TIMESTAMP_WITH_TIMEZONE)
                .param("review", terms.reviewBy(), Types.DATE)
                .param("recommendation", terms.recommendationId(), Types.BIGINT)
                .param("difference", terms.differenceReason(), Types.VARCHAR)
                .param("key", terms.entryKey(), Types.VARCHAR)
                .param("at", now())
                .param("by", by)
                .update(keys, "id");
        return Objects.requireNonNull(keys.getKey()).longValue();
    }

    /**
     * Keeps others from deciding about the limit: its stock's row first, then its own. In one order everywhere, or two
     * who decide about a stock would wait for each other.
     */
    void lock(long limitId) {
        jdbc.sql("select stock_id from catch_limit where id = ?")
                .param(limitId)
                .query(Long.class)
                .optional()
                .ifPresent(this::lockStock);
        jdbc.sql("select id from catch_limit where id = ? for update")
                .param(limitId)
                .query(Long.class)
                .optional();
    }

    void decide(long limitId, String act, String by, Instant effective, String reason) {
        decide(limitId, act, by, effective, reason, Beside.NOTHING);
    }

    void decide(long limitId, String act, String by, Instant effective, String reason, Beside beside) {
        jdbc.sql("""
                        insert into limit_decision (limit_id, act, decided_at, decided_by, effective_at, reason,
                            own_proposal, doubt, successor_id)
                        values (:limit, :act, :at, :by, :effective, :reason, :own, :doubt, :successor)""")
                .param("limit", limitId)
                .param("act", act)
                .param("at", now())
                .param("by", by)
                .param("effective", effective.atOffset(ZoneOffset.UTC))
                .param("reason", reason)
                .param("own", beside.own())
                .param("doubt", beside.doubt(), Types.VARCHAR)
                .param("successor", beside.successor(), Types.BIGINT)
                .update();
    }

    /** One decision about a stock's limits at a time. Whoever writes a limit down and goes on to decide locks first. */
    void lockStock(long stockId) {
        jdbc.sql("select id from stock where id = ? for update")
                .param(stockId)
                .query(Long.class)
                .optional();
    }

    /** Puts an issued limit in force; the one before is superseded from then on. */
    void putInForce(long limitId, NewLimit limit, String by, Instant effective) {
        Optional<Long> before = jdbc.sql("select limit_id from limit_in_force where stock_id = ? and season_year = ?")
                .params(limit.stockId(), limit.season())
                .query(Long.class)
                .optional();
        before.ifPresent(old -> {
            decide(old, SUPERSEDED, by, effective, "", Beside.replacedBy(limitId));
            endForce(old);
        });
        jdbc.sql("insert into limit_in_force (stock_id, season_year, limit_id) values (?, ?, ?)")
                .params(limit.stockId(), limit.season(), limitId)
                .update();
    }

    /** Keeps an issued limit until its moment. */
    void putPending(long limitId, Instant effective) {
        jdbc.sql("insert into limit_pending (limit_id, effective_at) values (?, ?)")
                .params(limitId, effective.atOffset(ZoneOffset.UTC))
                .update();
    }

    /** Whether it was waiting; of two that ask, one hears yes. */
    boolean endPending(long limitId) {
        return jdbc.sql("delete from limit_pending where limit_id = ?")
                        .param(limitId)
                        .update()
                == 1;
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
            decide(limitId, SUPERSEDED, by, clock.instant(), "", Beside.replacedBy(later.get()));
        } else {
            putInForce(limitId, limit, by, clock.instant());
            allocations.byRights(limitId, limit);
        }
    }

    void endForce(long limitId) {
        jdbc.sql("delete from limit_in_force where limit_id = ?").param(limitId).update();
    }

    private static @Nullable OffsetDateTime stored(@Nullable Instant instant) {
        return instant == null ? null : instant.atOffset(ZoneOffset.UTC);
    }

    private OffsetDateTime now() {
        return clock.instant().atOffset(ZoneOffset.UTC);
    }
}
