package org.merewarden.records;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.intake.TableRow;
import org.merewarden.web.NotFound;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/** Reads the rows in force of one stock as the core's evidence, in eight statements. */
@Service
class StoredEvidence implements EvidenceReader {
    private record Stock(long id, long waterBodyId, String population, int stocksInLake, TableRow cells) {}

    private static final String STOCKS = """
            select s.id as stock_id, w.id as water_body_id, s.population, w.kind, w.area_ha, w.mean_depth_m,
                w.dissolved_solids_mg_l, w.conductivity_us_cm, w.mean_air_temperature_c, s.species, s.recruitment,
                s.productivity, s.max_age_years, s.growth_k_per_year, s.growth_linf_cm, s.share_of_lake_yield,
                (select count(*) from stock other where other.water_body_id = w.id) as stocks_in_lake
            from stock s join water_body w on w.id = s.water_body_id""";

    private final JdbcClient jdbc;

    StoredEvidence(JdbcClient jdbc) {
        this.jdbc = jdbc;
    }

    @Override
    @Transactional(readOnly = true)
    public Evidence evidence(long stockId) {
        Stock stock = stock(stockId);
        return EvidenceMapping.evidence(
                stock.cells(),
                stock.stocksInLake(),
                recordedShare(stock, taken(stock.waterBodyId())),
                table -> rows(table, stock));
    }

    @Override
    @Transactional(readOnly = true)
    public Map<Long, Subject> subjects(long waterBodyId) {
        List<RecordedShare.Taken> taken = taken(waterBodyId);
        return jdbc
                .sql(STOCKS + " where w.id = :water")
                .param("water", waterBodyId)
                .query(StoredEvidence::readStock)
                .list()
                .stream()
                .collect(Collectors.toMap(
                        Stock::id,
                        s -> new Subject(
                                EvidenceMapping.habitat(s.cells(), s.stocksInLake(), recordedShare(s, taken)),
                                EvidenceMapping.traits(s.cells()))));
    }

    private static @Nullable Double recordedShare(Stock stock, List<RecordedShare.Taken> taken) {
        return RecordedShare.of(Long.toString(stock.id()), stock.stocksInLake(), taken);
    }

    private List<RecordedShare.Taken> taken(long waterBodyId) {
        return jdbc.sql("""
                        select c.stock_id, c.season_year, c.catch_t / coalesce(c.reported_fraction, 1) as removals_t
                        from catch_record c join stock s on s.id = c.stock_id
                        where s.water_body_id = :water and c.current_mark = true and c.provisional = false""")
                .param("water", waterBodyId)
                .query((row, number) -> new RecordedShare.Taken(
                        row.getString("stock_id"), row.getInt("season_year"), row.getDouble("removals_t")))
                .list();
    }

    private Stock stock(long stockId) {
        return jdbc.sql(STOCKS + " where s.id = :stock")
                .param("stock", stockId)
                .query(StoredEvidence::readStock)
                .optional()
                .orElseThrow(() -> new NotFound("no stock with the number " + stockId));
    }

    private static Stock readStock(ResultSet row, int number) throws SQLException {
        Map<String, Object> cells = new HashMap<>();
        for (String column : EvidenceMapping.SUBJECT_TEXTS) {
            put(cells, row, column, String.class);
        }
        for (String column : EvidenceMapping.SUBJECT_NUMBERS) {
            put(cells, row, column, Double.class);
        }
        return new Stock(
                row.getLong("stock_id"),
                row.getLong("water_body_id"),
                row.getString("population"),
                row.getInt("stocks_in_lake"),
                new TableRow(0, cells));
    }

    private static void put(Map<String, Object> cells, ResultSet row, String column, Class<?> type)
            throws SQLException {
        Object value = row.getObject(column, type);
        if (value != null) {
            cells.put(column, value);
        }
    }

    private List<TableRow> rows(RecordTable table, Stock stock) {
        String rows = "select * from " + table.sqlName() + " where " + table.ownerColumn()
                + " = :owner and current_mark = true" + which(table);
        return jdbc.sql(rows)
                .param("owner", table.ofStock() ? stock.id() : stock.waterBodyId())
                .param("species", stock.cells().need("species"))
                .param("population", stock.population())
                .query((row, number) -> table.row(row))
                .list();
    }

    /** A provisional catch is a forecast of the season in progress, not evidence; some events are of one stock. */
    private static String which(RecordTable table) {
        if (table == RecordTables.CATCHES) {
            return " and provisional = false";
        }
        return table == RecordTables.EVENTS
                ? " and (species = '' or (species = :species and population = :population))"
                : "";
    }
}
