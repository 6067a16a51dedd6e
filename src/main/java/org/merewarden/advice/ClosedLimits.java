package org.merewarden.advice;

import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.function.Function;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Repository;

/**
 * What was allowed before a stock was closed within its season: of each season's limits the latest one that was in force
 * before the closure, is no closure itself and was not withdrawn. Every call is one statement.
 */
@Repository
public class ClosedLimits {
    private static final String BEFORE = LimitStore.VIEW + """
            join limit_in_force f on f.stock_id = l.stock_id and f.season_year = l.season_year
            join catch_limit c on c.id = f.limit_id and c.purpose = 'closure'
            join limit_decision e on e.limit_id = c.id and e.act = 'ISSUED'
            where l.purpose <> 'closure' and d.effective_at <= e.effective_at and f.season_year = :season
                and (:stock is null or f.stock_id = :stock)
                and not exists (select 1 from limit_decision w where w.limit_id = l.id and w.act = 'WITHDRAWN')
            order by d.effective_at, l.id""";

    private final JdbcClient jdbc;

    ClosedLimits(JdbcClient jdbc) {
        this.jdbc = jdbc;
    }

    /** By stock; a stock that is not closed has none. */
    public Map<Long, LimitView> before(int season) {
        return read(season, null).stream()
                .collect(Collectors.toMap(LimitView::stockId, Function.identity(), (earlier, later) -> later));
    }

    /** Empty where the stock is not closed, or nothing was in force before. */
    public Optional<LimitView> before(long stockId, int season) {
        return read(season, stockId).stream().reduce((earlier, later) -> later);
    }

    private List<LimitView> read(int season, @Nullable Long stockId) {
        return jdbc.sql(BEFORE)
                .param("season", season)
                .param("stock", stockId, java.sql.Types.BIGINT)
                .query(LimitStore::view)
                .list();
    }
}
