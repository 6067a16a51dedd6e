package org.merewarden.advice;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.time.LocalDate;
import java.time.OffsetDateTime;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.stream.Collectors;
import org.merewarden.web.Seasons;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Repository;

/** Limits in force, read by projection. */
@Repository
class LimitStore implements Limits {
    static final String VIEW = """
            select l.id, l.stock_id, l.season_year, l.kind, l.amount, l.unit,
                l.set_aside_subsistence_t + l.set_aside_angling_t + l.set_aside_research_t + l.set_aside_other_t
                    as set_asides_t,
                l.reported_fraction, l.valid_from, l.valid_to, l.measures, l.legal_basis, l.objection,
                d.reason, d.effective_at, d.decided_by, l.purpose,
                case when l.origin = 'entered' then d.effective_at else d.decided_at end as issued_at
            from catch_limit l
            join limit_decision d on d.limit_id = l.id and d.act = 'ISSUED'
            """;
    private static final String IN_FORCE = VIEW + " join limit_in_force f on f.limit_id = l.id ";

    private static final String ALLOCATIONS = """
            select a.limit_id, l.stock_id, l.season_year, a.cooperative_id, c.name, a.share_percent, a.amount_kg
            from allocation a
            join catch_limit l on l.id = a.limit_id
            join cooperative c on c.id = a.cooperative_id
            """;

    private final JdbcClient jdbc;
    private final Seasons seasons;
    private final ClosureWords closures;

    LimitStore(JdbcClient jdbc, Seasons seasons, ClosureWords closures) {
        this.jdbc = jdbc;
        this.seasons = seasons;
        this.closures = closures;
    }

    @Override
    public List<LimitView> inForce(int season) {
        return jdbc.sql(IN_FORCE + "where f.season_year = ?").param(season).query(LimitStore::view).list().stream()
                .map(this::told)
                .toList();
    }

    @Override
    public Optional<LimitView> inForce(long stockId, int season) {
        return jdbc.sql(IN_FORCE + "where f.stock_id = ? and f.season_year = ?")
                .params(stockId, season)
                .query(LimitStore::view)
                .optional()
                .map(this::told);
    }

    private LimitView told(LimitView limit) {
        if (!limit.closure()) {
            return limit;
        }
        ClosureWords.Said said = closures.said(limit.effectiveAt());
        return limit.closedFrom(said.day(), said.measures());
    }

    @Override
    public List<AllocationView> allocations(int season) {
        return jdbc.sql(ALLOCATIONS + "join limit_in_force f on f.limit_id = a.limit_id where f.season_year = ?"
                        + " order by l.stock_id, c.name")
                .param(season)
                .query(LimitStore::allocation)
                .list();
    }

    /** The allocations of one limit, in force or not, by cooperative. */
    List<AllocationView> allocationsOf(long limitId) {
        return jdbc.sql(ALLOCATIONS + "where a.limit_id = ? order by c.name")
                .param(limitId)
                .query(LimitStore::allocation)
                .list();
    }

    /** The allocations of all limits of a stock, by limit. */
    Map<Long, List<AllocationView>> allocationsOfStock(long stockId) {
        return jdbc
                .sql(ALLOCATIONS + "where l.stock_id = ? order by c.name")
                .param(stockId)
                .query(LimitStore::allocation)
                .list()
                .stream()
                .collect(Collectors.groupingBy(AllocationView::limitId));
    }

    /** Numbers of the stock's limits that are in force, one for each season. */
    Set<Long> numbersInForce(long stockId) {
        return jdbc.sql("select limit_id from limit_in_force where stock_id = ?")
                .param(stockId)
                .query(Long.class)
                .set();
    }

    private static AllocationView allocation(ResultSet row, int n) throws SQLException {
        return new AllocationView(
                row.getLong(1),
                row.getLong(2),
                row.getInt(3),
                row.getLong(4),
                row.getString(5),
                row.getDouble(6),
                row.getLong(7));
    }

    @Override
    public int presentSeason() {
        int current = seasons.current();
        return jdbc.sql("select max(season_year) from limit_in_force where season_year <= ?")
                .param(current)
                .query(Integer.class)
                .optional()
                .orElse(current);
    }

    static LimitView view(ResultSet row, int n) throws SQLException {
        Double amount = row.getObject("amount", Double.class);
        String kind = row.getString("kind");
        double setAsides = row.getDouble("set_asides_t");
        double reported = row.getDouble("reported_fraction");
        return new LimitView(
                row.getLong("id"),
                row.getLong("stock_id"),
                row.getInt("season_year"),
                kind,
                amount,
                row.getString("unit"),
                setAsides,
                reported,
                kind.equals("catch") && amount != null
                        ? (Double) org.merewarden.core.policy.LimitArithmetic.toBeLogged(amount, setAsides, reported)
                        : null,
                row.getObject("valid_from", LocalDate.class),
                row.getObject("valid_to", LocalDate.class),
                row.getString("measures"),
                row.getString("legal_basis"),
                row.getString("objection"),
                row.getString("reason"),
                row.getObject("issued_at", OffsetDateTime.class).toInstant(),
                row.getString("decided_by"),
                row.getString("purpose"),
                row.getObject("effective_at", OffsetDateTime.class).toInstant());
    }
}
