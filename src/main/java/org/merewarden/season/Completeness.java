package org.merewarden.season;

import java.time.LocalDate;
import java.util.HashMap;
import java.util.Map;
import java.util.Optional;
import org.merewarden.web.Seasons;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Component;

/**
 * Up to which date the log of each cooperative can be taken as whole. A missing slip is not a zero: what a cooperative
 * stated last counts; without a statement that reaches into the season, its last landing of the season does.
 */
@Component
class Completeness {
    /** Records that end longer ago than this are called silent. */
    static final int SILENT_AFTER_WEEKS = 6;

    private final JdbcClient jdbc;
    private final Seasons seasons;

    Completeness(JdbcClient jdbc, Seasons seasons) {
        this.jdbc = jdbc;
        this.seasons = seasons;
    }

    /** What is known of one season's records; two statements and the settings. */
    Records of(int season) {
        LocalDate start = seasons.start(season);
        LocalDate end = seasons.end(season);
        LocalDate today = seasons.today();
        Map<Long, LocalDate> ends = new HashMap<>(dates("""
                select l.cooperative_id, max(l.landed_on) from landing l
                where l.season_year = :season and l.cooperative_id is not null and\s""" + StoredUptakes.COUNTED + """
                 group by l.cooperative_id""", season));
        dates("""
                select c.cooperative_id, c.complete_up_to from complete_up_to c where c.complete_up_to >= :start and c.id =
                (select max(d.id) from complete_up_to d where d.cooperative_id = c.cooperative_id)""", start).forEach((cooperative, date) -> ends.put(cooperative, date.isAfter(end) ? end : date));
        return new Records(ends, start, today.isBefore(end) ? today : end);
    }

    private Map<Long, LocalDate> dates(String sql, Object value) {
        Map<Long, LocalDate> dates = new HashMap<>();
        jdbc.sql(sql)
                .param(value instanceof LocalDate ? "start" : "season", value)
                .query(row -> {
                    dates.put(row.getLong(1), row.getObject(2, LocalDate.class));
                });
        return dates;
    }

    /** @param asOf today, or the season's last day once it is over */
    record Records(Map<Long, LocalDate> endByCooperative, LocalDate start, LocalDate asOf) {
        Optional<LocalDate> end(long cooperativeId) {
            return Optional.ofNullable(endByCooperative.get(cooperativeId));
        }

        boolean silent(long cooperativeId) {
            LocalDate end = end(cooperativeId).orElse(start.minusDays(1));
            return end.isBefore(asOf.minusWeeks(SILENT_AFTER_WEEKS));
        }
    }
}
