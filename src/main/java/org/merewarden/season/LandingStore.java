package org.merewarden.season;

import java.sql.PreparedStatement;
import java.sql.ResultSet;
import java.sql.SQLException;
import java.sql.Types;
import java.time.Instant;
import java.time.LocalDate;
import java.time.OffsetDateTime;
import java.time.ZoneOffset;
import java.util.ArrayList;
import java.util.Collection;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.springframework.jdbc.core.JdbcTemplate;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Repository;

/** The rows of the log. Rows are added, never changed or deleted. */
@Repository
class LandingStore {
    private static final int CHUNK = 500;
    private static final String INSERT = """
            insert into landing (entry_key, entry_kind, corrects_id, root_id, reason, landed_on, season_year, slip,
              water_body_id, stock_id, species, population, cooperative_id, sector, gear, nets, nights, weight_kg,
              presentation, conversion_factor, live_weight_kg, number_of_fish, fate, place, note, flags, import_id,
              recorded_at, recorded_by)
            values (?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?)""";
    static final String FROM = """
            from landing l join water_body w on w.id = l.water_body_id
              left join cooperative c on c.id = l.cooperative_id
              left join landing n on n.corrects_id = l.id\s""";
    static final String SELECT = "select l.*, w.code as lake, c.code as cooperative, n.id as corrected_by " + FROM;

    private final JdbcClient jdbc;
    private final JdbcTemplate template;

    LandingStore(JdbcClient jdbc, JdbcTemplate template) {
        this.jdbc = jdbc;
        this.template = template;
    }

    /** Where rows come from: an import, or null for the form. */
    record Origin(@Nullable Long importId, Instant at, String by) {}

    /** What a row stands for: a landing of its own, or a correction or withdrawal of another row. */
    record Act(
            String kind, @Nullable LandingRow of, @Nullable String reason) {
        static final Act LANDING = new Act("landing", null, null);
    }

    void insert(List<Checked> rows, Act act, Origin origin) {
        template.batchUpdate(INSERT, rows, CHUNK, (statement, row) -> fill(statement, row, act, origin));
    }

    private static void fill(PreparedStatement to, Checked row, Act act, Origin origin) throws SQLException {
        Entry e = row.entry();
        LandingRow of = act.of();
        Object[] values = {
            e.key(),
            act.kind(),
            of == null ? null : of.id(),
            of == null ? null : of.rootId(),
            act.reason(),
            e.landedOn(),
            row.season(),
            e.slip(),
            row.waterBodyId(),
            row.stockId(),
            e.species(),
            e.population(),
            row.cooperativeId(),
            e.sector(),
            e.gear(),
            e.nets(),
            e.nights(),
            e.weightKg(),
            e.presentation(),
            row.factor(),
            row.liveWeightKg(),
            e.number(),
            e.fate(),
            e.place(),
            e.note(),
            Flag.store(row.flags()),
            origin.importId(),
            origin.at().atOffset(ZoneOffset.UTC),
            origin.by()
        };
        for (int i = 0; i < values.length; i++) {
            if (values[i] == null) {
                to.setNull(i + 1, nullType(i));
            } else {
                to.setObject(i + 1, values[i]);
            }
        }
    }

    private static int nullType(int column) {
        return switch (column) {
            case 2, 3, 9, 12, 26 -> Types.BIGINT;
            case 15, 16 -> Types.DOUBLE;
            case 21 -> Types.INTEGER;
            default -> Types.VARCHAR;
        };
    }

    /** Live weight taken from the limits, kg, by stock. */
    Map<Long, Double> takenByStock(int season) {
        Map<Long, Double> taken = new HashMap<>();
        jdbc.sql("select l.stock_id, sum(l.live_weight_kg) from landing l where l.season_year = :season"
                        + " and l.stock_id is not null and " + StoredUptakes.TAKEN + " group by l.stock_id")
                .param("season", season)
                .query(row -> {
                    taken.put(row.getLong(1), row.getDouble(2));
                });
        return taken;
    }

    double taken(long stockId, int season) {
        return jdbc.sql("select coalesce(sum(l.live_weight_kg), 0) from landing l where l.stock_id = :stock"
                        + " and l.season_year = :season and " + StoredUptakes.TAKEN)
                .param("stock", stockId)
                .param("season", season)
                .query(Double.class)
                .single();
    }

    Optional<LandingRow> find(long id) {
        return jdbc.sql(SELECT + "where l.id = :id")
                .param("id", id)
                .query((row, n) -> read(row))
                .optional();
    }

    List<LandingRow> byKeys(Collection<String> keys) {
        List<String> all = List.copyOf(keys);
        List<LandingRow> found = new ArrayList<>();
        for (int from = 0; from < all.size(); from += CHUNK) {
            found.addAll(jdbc.sql(SELECT + "where l.entry_key in (:keys)")
                    .param("keys", all.subList(from, Math.min(all.size(), from + CHUNK)))
                    .query((row, n) -> read(row))
                    .list());
        }
        return found;
    }

    /** Every row of the histories that these rows began, oldest first. */
    List<LandingRow> histories(Collection<Long> rootIds) {
        return rootIds.isEmpty()
                ? List.of()
                : jdbc.sql(SELECT + "where l.id in (:roots) or l.root_id in (:roots) order by l.id")
                        .param("roots", rootIds)
                        .query((row, n) -> read(row))
                        .list();
    }

    static LandingRow read(ResultSet row) throws SQLException {
        long id = row.getLong("id");
        return new LandingRow(
                id,
                entry(row),
                row.getString("entry_kind"),
                Objects.requireNonNullElse(row.getObject("root_id", Long.class), id),
                row.getObject("corrected_by", Long.class),
                row.getString("reason"),
                row.getInt("season_year"),
                row.getLong("water_body_id"),
                row.getObject("stock_id", Long.class),
                row.getObject("cooperative_id", Long.class),
                row.getDouble("conversion_factor"),
                row.getDouble("live_weight_kg"),
                Flag.read(row.getString("flags")),
                row.getObject("recorded_at", OffsetDateTime.class).toInstant(),
                row.getString("recorded_by"));
    }

    private static Entry entry(ResultSet row) throws SQLException {
        return new Entry(
                row.getString("entry_key"),
                row.getObject("landed_on", LocalDate.class),
                row.getString("slip"),
                row.getString("lake"),
                row.getString("species"),
                row.getString("population"),
                row.getString("cooperative"),
                row.getString("sector"),
                row.getString("gear"),
                row.getObject("nets", Double.class),
                row.getObject("nights", Double.class),
                row.getDouble("weight_kg"),
                row.getString("presentation"),
                row.getObject("number_of_fish", Integer.class),
                row.getString("fate"),
                row.getString("place"),
                row.getString("note"));
    }
}
