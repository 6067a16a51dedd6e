package org.merewarden.season;

import java.time.LocalDate;
import java.util.List;
import org.jspecify.annotations.Nullable;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Component;

/** Sums of what is taken from the limits; each call is one statement. */
@Component
class Takings {
    private final JdbcClient jdbc;

    Takings(JdbcClient jdbc) {
        this.jdbc = jdbc;
    }

    /** @param cooperativeId null where a landing names none */
    record ByCooperative(long stockId, @Nullable Long cooperativeId, double takenKg, LocalDate lastLanding) {}

    List<ByCooperative> byCooperative(int season) {
        return byCooperative(jdbc.sql(byCooperative("")).param("season", season));
    }

    List<ByCooperative> byCooperative(long stockId, int season) {
        return byCooperative(jdbc.sql(byCooperative(" and l.stock_id = :stock"))
                .param("season", season)
                .param("stock", stockId));
    }

    private static String byCooperative(String condition) {
        return "select l.stock_id, l.cooperative_id, sum(l.live_weight_kg), max(l.landed_on) from landing l"
                + " where l.season_year = :season and l.stock_id is not null and " + StoredUptakes.TAKEN + condition
                + " group by l.stock_id, l.cooperative_id";
    }

    private static List<ByCooperative> byCooperative(JdbcClient.StatementSpec statement) {
        return statement
                .query((row, n) -> new ByCooperative(
                        row.getLong(1),
                        row.getObject(2, Long.class),
                        row.getDouble(3),
                        row.getObject(4, LocalDate.class)))
                .list();
    }

    record Day(int season, LocalDate date, double takenKg) {}

    /** Day by day in order, of the seasons first to last. */
    List<Day> byDay(long stockId, int first, int last) {
        return jdbc.sql("select l.season_year, l.landed_on, sum(l.live_weight_kg) from landing l"
                        + " where l.stock_id = :stock and l.season_year between :first and :last and "
                        + StoredUptakes.TAKEN
                        + " group by l.season_year, l.landed_on order by l.season_year, l.landed_on")
                .param("stock", stockId)
                .param("first", first)
                .param("last", last)
                .query((row, n) -> new Day(row.getInt(1), row.getObject(2, LocalDate.class), row.getDouble(3)))
                .list();
    }

    /** Weighed together and not yet split by species, kg live weight; in no limit's sum. */
    double mixedKg(int season) {
        return jdbc.sql("select coalesce(sum(l.live_weight_kg), 0) from landing l where l.season_year = :season"
                        + " and l.species = 'mixed' and " + StoredUptakes.TAKEN)
                .param("season", season)
                .query(Double.class)
                .single();
    }
}
