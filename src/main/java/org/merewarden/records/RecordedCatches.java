package org.merewarden.records;

import java.util.List;
import java.util.Objects;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Service;

/** The catches on record of all stocks, season by season. Every call is one statement. */
@Service
public class RecordedCatches {
    private final JdbcClient jdbc;

    RecordedCatches(JdbcClient jdbc) {
        this.jdbc = jdbc;
    }

    /**
     * A catch record in force.
     *
     * @param catchTonnes live weight as recorded, t, >= 0
     * @param reportedFraction part of the true catch that was recorded, in (0, 1]; 1 where nothing is said of it
     */
    public record Recorded(long stockId, String sector, double catchTonnes, double reportedFraction) {
        /** The true catch, t. */
        public double correctedTonnes() {
            return catchTonnes / reportedFraction;
        }
    }

    /** One for each stock and sector with a record; expectations of a season in progress are not among them. */
    public List<Recorded> ofSeason(int season) {
        return jdbc.sql("select stock_id, sector, catch_t, reported_fraction from catch_record"
                        + " where season_year = ? and current_mark and not provisional order by stock_id, sector")
                .param(season)
                .query((row, n) -> new Recorded(
                        row.getLong(1),
                        row.getString(2),
                        row.getDouble(3),
                        Objects.requireNonNullElse(row.getObject(4, Double.class), 1.0)))
                .list();
    }
}
