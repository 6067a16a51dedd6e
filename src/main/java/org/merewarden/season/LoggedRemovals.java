package org.merewarden.season;

import java.time.LocalDate;
import java.util.List;
import org.jspecify.annotations.Nullable;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Service;

/** What the log holds of a season's removals by all sectors, as other features read it. Every call is one statement. */
@Service
public class LoggedRemovals {
    private final JdbcClient jdbc;

    LoggedRemovals(JdbcClient jdbc) {
        this.jdbc = jdbc;
    }

    /**
     * Kept, discarded and seized fish; what was released is no removal.
     *
     * @param stockId null for landings not split by species yet, or of a species that is no stock of its water
     * @param tonnes live weight, t
     */
    public record Logged(@Nullable Long stockId, String sector, double tonnes, LocalDate lastLanding) {}

    /** One for each stock and sector with a landing. */
    public List<Logged> ofSeason(int season) {
        return jdbc.sql("select l.stock_id, l.sector, sum(l.live_weight_kg), max(l.landed_on) from landing l"
                        + " where l.season_year = ? and l.fate in ('kept', 'discarded', 'seized') and "
                        + StoredUptakes.COUNTED + " group by l.stock_id, l.sector order by l.stock_id, l.sector")
                .param(season)
                .query((row, n) -> new Logged(
                        row.getObject(1, Long.class),
                        row.getString(2),
                        row.getDouble(3) / 1000,
                        row.getObject(4, LocalDate.class)))
                .list();
    }
}
