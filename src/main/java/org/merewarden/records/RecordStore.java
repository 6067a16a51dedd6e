package org.merewarden.records;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.time.OffsetDateTime;
import java.util.ArrayList;
import java.util.Collection;
import java.util.HashMap;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.stream.Collectors;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.web.Cells;
import org.springframework.jdbc.core.namedparam.MapSqlParameterSource;
import org.springframework.jdbc.core.namedparam.NamedParameterJdbcTemplate;
import org.springframework.stereotype.Component;

/**
 * Keeps evidence for ever: a change writes a new row and marks the old one as superseded; no cell is ever updated. Writes
 * in the caller's transaction, in batches.
 */
@Component
class RecordStore {
    /** Bound lists stay below the stores' limits on parameters. */
    private static final int OWNERS_AT_ONCE = 1000;

    /** A row as it should be. */
    record Wanted(long ownerId, Map<String, @Nullable Object> cells) {}

    /** A row in force. A provisional one is a forecast: it is replaced even by the same figures. */
    record InForce(long id, boolean provisional, Map<String, @Nullable Object> cells) {
        boolean same(long ownerBefore, long owner, Map<String, @Nullable Object> wanted) {
            return !provisional && ownerBefore == owner && cells.equals(wanted);
        }
    }

    record Owned(long ownerId, InForce row) {}

    /** @param importId null where somebody typed it in */
    record Entry(@Nullable Long importId, String by, OffsetDateTime at) {}

    private final NamedParameterJdbcTemplate jdbc;

    RecordStore(NamedParameterJdbcTemplate jdbc) {
        this.jdbc = jdbc;
    }

    /** Rows in force of these owners by their {@link RecordTable#key key}. */
    Map<String, Owned> inForce(RecordTable table, Collection<Long> ownerIds) {
        return find(table, table.ownerColumn(), ownerIds);
    }

    /** Rows in force with these event keys, whatever water they belong to. */
    Map<String, Owned> eventsInForce(Collection<String> eventKeys) {
        return find(RecordTables.EVENTS, "event_key", eventKeys);
    }

    private Map<String, Owned> find(RecordTable table, String column, Collection<?> values) {
        Map<String, Owned> found = new HashMap<>();
        List<?> all = new ArrayList<>(values);
        for (int from = 0; from < all.size(); from += OWNERS_AT_ONCE) {
            List<?> some = all.subList(from, Math.min(all.size(), from + OWNERS_AT_ONCE));
            jdbc.query(
                    "select * from " + table.sqlName() + " where current_mark = true and " + column + " in (:values)",
                    Map.of("values", some),
                    row -> {
                        Owned owned = read(table, row);
                        found.put(table.key(owned.ownerId(), owned.row().cells()), owned);
                    });
        }
        return found;
    }

    private static Owned read(RecordTable table, ResultSet row) throws SQLException {
        boolean provisional = table == RecordTables.CATCHES && row.getBoolean("provisional");
        return new Owned(
                row.getLong(table.ownerColumn()), new InForce(row.getLong("id"), provisional, table.cells(row)));
    }

    /** Stores what is new or differs from the row in force; later wins where two wanted rows share a key. */
    void write(RecordTable table, List<Wanted> wanted, Map<String, Owned> inForce, Entry entry) {
        Map<String, Wanted> fresh = new LinkedHashMap<>();
        List<Long> superseded = new ArrayList<>();
        for (Wanted row : wanted) {
            String key = table.key(row.ownerId(), row.cells());
            Owned before = inForce.get(key);
            if (before != null && before.row().same(before.ownerId(), row.ownerId(), row.cells())) {
                continue;
            }
            if (before != null && !fresh.containsKey(key)) {
                superseded.add(before.row().id());
            }
            fresh.put(key, row);
        }
        supersede(table, superseded, entry);
        insert(table, fresh.values(), entry);
    }

    private void supersede(RecordTable table, List<Long> ids, Entry entry) {
        jdbc.batchUpdate(
                "update " + table.sqlName() + " set current_mark = null, superseded_at = :at, superseded_by = :by"
                        + " where id = :id",
                ids.stream()
                        .map(id -> new MapSqlParameterSource("id", id)
                                .addValue("at", entry.at())
                                .addValue("by", entry.by()))
                        .toArray(MapSqlParameterSource[]::new));
    }

    private void insert(RecordTable table, Collection<Wanted> rows, Entry entry) {
        String columns = table.fields().stream().map(RecordTable.Field::sqlName).collect(Collectors.joining(", "));
        String places = IntStream.range(0, table.fields().size())
                .mapToObj(i -> ":c" + i)
                .collect(Collectors.joining(", "));
        jdbc.batchUpdate(
                "insert into " + table.sqlName() + " (" + table.ownerColumn() + ", " + columns
                        + ", import_id, recorded_at, recorded_by, current_mark) values (:owner, " + places
                        + ", :import, :at, :by, true)",
                rows.stream().map(row -> parameters(table, row, entry)).toArray(MapSqlParameterSource[]::new));
    }

    private static MapSqlParameterSource parameters(RecordTable table, Wanted row, Entry entry) {
        MapSqlParameterSource parameters = new MapSqlParameterSource("owner", row.ownerId())
                .addValue("import", entry.importId())
                .addValue("at", entry.at())
                .addValue("by", entry.by());
        for (int i = 0; i < table.fields().size(); i++) {
            parameters.addValue(
                    "c" + i, row.cells().get(table.fields().get(i).column().name()));
        }
        return parameters;
    }

    /** What the wanted row would change, e.g. "catch_t 12 → 13"; null where there is no row in force yet. */
    static @Nullable String changes(@Nullable Owned before, Wanted wanted) {
        if (before == null) {
            return null;
        }
        return Stream.of(
                        before.ownerId() == wanted.ownerId() ? "" : "moved to another water body",
                        before.row().provisional() ? "provisional → final" : "",
                        Cells.changes(before.row().cells(), wanted.cells()))
                .filter(part -> !part.isEmpty())
                .collect(Collectors.joining("; "));
    }
}
