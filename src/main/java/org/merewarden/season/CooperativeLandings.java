package org.merewarden.season;

import java.time.LocalDate;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Service;

/** What the log holds of one cooperative and of no other, as its own view shows it. */
@Service
public class CooperativeLandings {
    private final JdbcClient jdbc;
    private final Completeness completeness;

    CooperativeLandings(JdbcClient jdbc, Completeness completeness) {
        this.jdbc = jdbc;
        this.completeness = completeness;
    }

    /** Taken from the limits, live weight in kg, by stock. */
    public Map<Long, Double> takenKg(long cooperativeId, int season) {
        Map<Long, Double> taken = new HashMap<>();
        jdbc.sql("select l.stock_id, sum(l.live_weight_kg) from landing l where l.cooperative_id = :cooperative"
                        + " and l.season_year = :season and l.stock_id is not null and " + StoredUptakes.TAKEN
                        + " group by l.stock_id")
                .param("cooperative", cooperativeId)
                .param("season", season)
                .query(row -> {
                    taken.put(row.getLong(1), row.getDouble(2));
                });
        return taken;
    }

    /** Its landings that count, latest first. */
    public List<CooperativeLandingView> latest(long cooperativeId, int season, int most) {
        return jdbc.sql(LandingStore.SELECT + "where l.cooperative_id = :cooperative and l.season_year = :season and "
                        + StoredUptakes.COUNTED + " order by l.landed_on desc, l.id desc limit " + most)
                .param("cooperative", cooperativeId)
                .param("season", season)
                .query((row, n) -> view(LandingStore.read(row)))
                .list();
    }

    private static CooperativeLandingView view(LandingRow row) {
        Entry e = row.entry();
        return new CooperativeLandingView(
                e.landedOn(),
                e.slip(),
                e.lake(),
                e.speciesKey(),
                e.weightKg(),
                e.presentation(),
                row.liveWeightKg(),
                e.fate());
    }

    /** Up to which day its records are complete, stated or else by its last landing; empty with no record. */
    public Optional<LocalDate> recordedUpTo(long cooperativeId, int season) {
        return completeness.of(season).end(cooperativeId);
    }
}
