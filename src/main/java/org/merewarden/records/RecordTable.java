package org.merewarden.records;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.time.LocalDate;
import java.util.HashMap;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.intake.Batch;
import org.merewarden.intake.Column;
import org.merewarden.intake.Problem;
import org.merewarden.intake.TableDefinition;
import org.merewarden.intake.TableRow;
import org.merewarden.waterbody.StockReferences;

/**
 * How a table of the import formats is kept: which stored columns hold its cells, and whose rows they are. Columns that
 * only name the owner (water body, species, population) are not among the fields, but for events, whose species may be
 * empty.
 *
 * @param sqlName stored table
 * @param ownerColumn stock_id or water_body_id
 * @param reference columns of the format that name the owner
 * @param rules between the cells of one row
 */
record RecordTable(
        String name,
        String title,
        int order,
        String sqlName,
        String ownerColumn,
        List<Column> reference,
        List<Field> fields,
        RecordRules rules) {

    /** @param sqlName stored column; its kind of value follows from the import column */
    record Field(Column column, String sqlName) {}

    static Field field(Column column, String sqlName) {
        return new Field(column, sqlName);
    }

    static Field field(Column column) {
        return new Field(column, column.name());
    }

    /** Events carry their own key, which therefore comes first. */
    TableDefinition definition() {
        List<Column> own = fields.stream().map(Field::column).toList();
        List<Column> columns = name.equals("events")
                ? Stream.of(own.subList(0, 1), reference, own.subList(1, own.size()))
                        .flatMap(List::stream)
                        .toList()
                : Stream.of(reference, own).flatMap(List::stream).toList();
        return new TableDefinition(name, title, order, columns);
    }

    /** What the row says, by import column in order; unknown cells are null. */
    Map<String, @Nullable Object> cells(TableRow row) {
        Map<String, @Nullable Object> cells = new LinkedHashMap<>();
        fields.forEach(f -> cells.put(f.column().name(), value(row, f.column())));
        return cells;
    }

    private static @Nullable Object value(TableRow row, Column column) {
        Object value = row.values().get(column.name());
        return value == null && "".equals(column.defaultValue()) ? "" : value;
    }

    Map<String, @Nullable Object> cells(ResultSet row) throws SQLException {
        Map<String, @Nullable Object> cells = new LinkedHashMap<>();
        for (Field field : fields) {
            cells.put(
                    field.column().name(),
                    row.getObject(field.sqlName(), type(field.column().kind())));
        }
        return cells;
    }

    /** The stored row as the importer would have read it. */
    TableRow row(ResultSet row) throws SQLException {
        Map<String, Object> known = new HashMap<>();
        cells(row).forEach((column, value) -> {
            if (value != null) {
                known.put(column, value);
            }
        });
        return new TableRow(0, known);
    }

    boolean ofStock() {
        return ownerColumn.equals("stock_id");
    }

    /** What speaks against the row: its owner is unknown, or a rule is broken. */
    Stream<Problem> problems(TableRow row, StockReferences references, Batch batch) {
        boolean oneStock = ofStock() || !row.textOrEmpty("species").isEmpty();
        Problem unknown = oneStock ? references.stockProblem(row, batch) : references.lakeProblem(row, batch);
        return Stream.concat(Stream.ofNullable(unknown), rules.problems(row));
    }

    private static Class<?> type(Column.Kind kind) {
        return switch (kind) {
            case TEXT, CODE -> String.class;
            case NUMBER -> Double.class;
            case INTEGER, YEAR -> Integer.class;
            case DATE -> LocalDate.class;
        };
    }

    /** The row's key within its owner; events are known by their own key alone. */
    String key(long ownerId, Map<String, @Nullable Object> cells) {
        String own = fields.stream()
                .map(Field::column)
                .filter(Column::key)
                .map(c -> String.valueOf(cells.get(c.name())))
                .collect(Collectors.joining("|"));
        return name.equals("events") ? own : ownerId + "|" + own;
    }
}
