package org.merewarden.intake;

import java.util.List;
import java.util.Set;
import java.util.stream.Collectors;

/**
 * One table of the import formats.
 *
 * @param name e.g. {@code water-bodies}; also the name of its file or sheet
 * @param title what it holds, for people
 * @param order tables of one import are examined and stored in this order, so that a row may name what an earlier
 *     table brings
 */
public record TableDefinition(String name, String title, int order, List<Column> columns) {
    public TableDefinition {
        columns = List.copyOf(columns);
    }

    List<Column> keys() {
        return columns.stream().filter(Column::key).toList();
    }

    Set<String> columnNames() {
        return columns.stream().map(Column::name).collect(Collectors.toUnmodifiableSet());
    }

    /** The columns that every file of this table has to have. */
    List<String> requiredNames() {
        return columns.stream()
                .filter(c -> c.required() && c.defaultValue() == null)
                .map(Column::name)
                .toList();
    }
}
