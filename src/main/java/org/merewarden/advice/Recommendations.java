package org.merewarden.advice;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.time.Clock;
import java.time.ZoneOffset;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import java.util.function.Function;
import java.util.stream.Collectors;
import org.merewarden.web.Seasons;
import org.merewarden.web.Who;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.jdbc.support.GeneratedKeyHolder;
import org.springframework.stereotype.Component;

/** What the rule recommends now, and what it recommended when a limit was written down. */
@Component
class Recommendations {
    /** Part of an amount by which two may be apart and count as the same: decimals do not always come back exactly. */
    private static final double SAME = 1e-9;

    private static final int FARTHEST = 5;

    private final Adviser adviser;
    private final JdbcClient jdbc;
    private final Seasons seasons;
    private final Clock clock;

    Recommendations(Adviser adviser, JdbcClient jdbc, Seasons seasons, Clock clock) {
        this.adviser = adviser;
        this.jdbc = jdbc;
        this.seasons = seasons;
        this.clock = clock;
    }

    /** A recommendation on record; the limit as total removals, t. */
    record Kept(long id, int policyNumber, double limitTonnes, boolean provisional) {}

    /** The season to be decided when none is named. */
    int season(long stockId) {
        return adviser.season(stockId);
    }

    /** Whether the season is near enough: the work of advising grows with the seasons between. */
    boolean advisable(int season) {
        return season <= seasons.current() + FARTHEST;
    }

    Optional<Adviser.Advice> current(long stockId, int season) {
        return !advisable(season) ? Optional.empty() : adviser.advise(stockId, season);
    }

    /** Puts it on record and returns its number. */
    long keep(Adviser.Advice advice) {
        var keys = new GeneratedKeyHolder();
        jdbc.sql("""
                        insert into recommendation (stock_id, season_year, assessment_id, policy_number, limit_t,
                            provisional, working, made_at, made_by)
                        values (:stock, :season, :assessment, :policy, :limit, :provisional, :working, :at, :by)""")
                .param("stock", advice.stockId())
                .param("season", advice.season())
                .param("assessment", advice.assessmentId())
                .param("policy", advice.policyNumber())
                .param("limit", advice.limitTonnes())
                .param("provisional", advice.provisional())
                .param("working", advice.working())
                .param("at", clock.instant().atOffset(ZoneOffset.UTC))
                .param("by", Who.name())
                .update(keys, "id");
        return Objects.requireNonNull(keys.getKey()).longValue();
    }

    /** The recommendations beside the stock's limits, by number. */
    Map<Long, Kept> ofStock(long stockId) {
        return jdbc
                .sql("select id, policy_number, limit_t, provisional from recommendation where stock_id = ?")
                .param(stockId)
                .query(Recommendations::kept)
                .list()
                .stream()
                .collect(Collectors.toMap(Kept::id, Function.identity()));
    }

    private static Kept kept(ResultSet row, int n) throws SQLException {
        return new Kept(row.getLong(1), row.getInt(2), row.getDouble(3), row.getBoolean(4));
    }

    static boolean differs(double amount, double recommended) {
        return Math.abs(amount - recommended) > SAME * Math.max(Math.abs(amount), Math.abs(recommended));
    }
}
