package org.merewarden;

import java.time.OffsetDateTime;
import java.time.ZoneOffset;
import java.util.List;
import org.springframework.jdbc.core.simple.JdbcClient;

/** Puts lakes, stocks and what hangs on them straight into the store, for tests of the features above the register. */
public final class TestRegion {
    private final JdbcClient jdbc;

    public TestRegion(JdbcClient jdbc) {
        this.jdbc = jdbc;
    }

    /** A lake of 1,000 ha with its depth, solids and temperature. */
    public long lake(String code, String name) {
        jdbc.sql("insert into water_body (code, name, district, kind, area_ha, mean_depth_m, dissolved_solids_mg_l,"
                        + " mean_air_temperature_c) values (?, ?, 'North', 'lake', 1000, 8, 120, 7)")
                .params(code, name)
                .update();
        return jdbc.sql("select id from water_body where code = ?")
                .param(code)
                .query(Long.class)
                .single();
    }

    public long stock(long lake, String species) {
        jdbc.sql("insert into stock (water_body_id, species) values (?, ?)")
                .params(lake, species)
                .update();
        return jdbc.sql("select max(id) from stock where water_body_id = ? and species = ?")
                .params(lake, species)
                .query(Long.class)
                .single();
    }

    public long cooperative(String code, String name) {
        jdbc.sql("insert into cooperative (code, name) values (?, ?)")
                .params(code, name)
                .update();
        return jdbc.sql("select id from cooperative where code = ?")
                .param(code)
                .query(Long.class)
                .single();
    }

    public void right(long cooperative, long stock, double sharePercent) {
        jdbc.sql("insert into fishing_right (cooperative_id, stock_id, share_percent) values (?, ?, ?)")
                .params(cooperative, stock, sharePercent)
                .update();
    }

    public void catches(long stock, int firstYear, List<Double> tonnes) {
        for (int i = 0; i < tonnes.size(); i++) {
            jdbc.sql("insert into catch_record (stock_id, season_year, catch_t, recorded_at, recorded_by, current_mark)"
                            + " values (?, ?, ?, ?, 'test', true)")
                    .params(stock, firstYear + i, tonnes.get(i), now())
                    .update();
        }
    }

    /** A yearly index at the middle of the season. */
    public void index(long stock, int firstYear, List<Double> values) {
        for (int i = 0; i < values.size(); i++) {
            jdbc.sql("insert into survey_record (stock_id, season_year, series, kind, amount, recorded_at, recorded_by,"
                            + " current_mark) values (?, ?, 'nets', 'index', ?, ?, 'test', true)")
                    .params(stock, firstYear + i, values.get(i), now())
                    .update();
        }
    }

    /** A catch limit issued and in force from the season's first day to its last. */
    public long limit(long stock, int season, double tonnes) {
        jdbc.sql(
                        "insert into catch_limit (stock_id, season_year, amount, unit, valid_from, valid_to, origin, created_at,"
                                + " created_by) values (?, ?, ?, 't', ?, ?, 'entered', ?, 'test')")
                .params(
                        stock,
                        season,
                        tonnes,
                        java.time.LocalDate.of(season, 1, 1),
                        java.time.LocalDate.of(season, 12, 31),
                        now())
                .update();
        long id = jdbc.sql("select max(id) from catch_limit where stock_id = ? and season_year = ?")
                .params(stock, season)
                .query(Long.class)
                .single();
        jdbc.sql("insert into limit_decision (limit_id, act, decided_at, decided_by, effective_at, reason)"
                        + " values (?, 'ISSUED', ?, 'test', ?, 'entered for a test')")
                .params(id, now(), now())
                .update();
        jdbc.sql("insert into limit_in_force (stock_id, season_year, limit_id) values (?, ?, ?)")
                .params(stock, season, id)
                .update();
        return id;
    }

    /** Closes the stock from that moment on; its limit has been in force for a month until then. */
    public long closure(long stock, int season, OffsetDateTime from) {
        long before = jdbc.sql("select limit_id from limit_in_force where stock_id = ? and season_year = ?")
                .params(stock, season)
                .query(Long.class)
                .single();
        jdbc.sql("update limit_decision set effective_at = ? where limit_id = ? and act = 'ISSUED'")
                .params(from.minusMonths(1), before)
                .update();
        jdbc.sql("delete from limit_in_force where limit_id = ?").param(before).update();
        long id = limit(stock, season, 0);
        jdbc.sql("update catch_limit set purpose = 'closure', effective_at = ?, valid_from = ? where id = ?")
                .params(from, from.toLocalDate(), id)
                .update();
        jdbc.sql("update limit_decision set effective_at = ? where limit_id = ?")
                .params(from, id)
                .update();
        return id;
    }

    private static OffsetDateTime now() {
        return OffsetDateTime.now(ZoneOffset.UTC);
    }
}
