package org.merewarden.records;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.time.Instant;
import java.time.OffsetDateTime;
import java.util.List;
import java.util.Map;
import org.jspecify.annotations.Nullable;
import org.merewarden.waterbody.StockView;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Component;

/** Reads every row of evidence ever recorded, in force or not: one statement for each table. */
@Component
class RecordHistory {
    /** @param inForce false where a later row of the same key replaced it */
    record Line(
            String key,
            Map<String, @Nullable Object> cells,
            boolean inForce,
            boolean provisional,
            @Nullable Long importId,
            Instant recordedAt,
            String recordedBy) {}

    private final JdbcClient jdbc;

    RecordHistory(JdbcClient jdbc) {
        this.jdbc = jdbc;
    }

    /** Rows that count for this stock, in the order in which they were recorded. */
    List<Line> ofStock(RecordTable table, StockView stock) {
        boolean events = table == RecordTables.EVENTS;
        String of = events ? " and (species = '' or (species = :species and population = :population))" : "";
        JdbcClient.StatementSpec statement = jdbc.sql(select(table) + of + " order by id")
                .param("owner", table.ownerColumn().equals("stock_id") ? stock.id() : stock.waterBodyId());
        if (events) {
            statement = statement.param("species", stock.species()).param("population", stock.population());
        }
        return statement.query((row, n) -> line(table, row)).list();
    }

    /** All events of a water. */
    List<Line> eventsOf(long waterBodyId) {
        return jdbc.sql(select(RecordTables.EVENTS) + " order by id")
                .param("owner", waterBodyId)
                .query((row, n) -> line(RecordTables.EVENTS, row))
                .list();
    }

    private static String select(RecordTable table) {
        return "select * from " + table.sqlName() + " where " + table.ownerColumn() + " = :owner";
    }

    private static Line line(RecordTable table, ResultSet row) throws SQLException {
        Map<String, @Nullable Object> cells = table.cells(row);
        return new Line(
                table.key(row.getLong(table.ownerColumn()), cells),
                cells,
                row.getBoolean("current_mark"),
                table == RecordTables.CATCHES && row.getBoolean("provisional"),
                row.getObject("import_id", Long.class),
                row.getObject("recorded_at", OffsetDateTime.class).toInstant(),
                row.getString("recorded_by"));
    }
}
