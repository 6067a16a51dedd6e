package org.merewarden.intake;

import java.util.List;

/** What the same import brings in tables examined earlier; refused rows and rows left out are not among it. */
public interface Batch {
    /** @param keys the key cells of the wanted row in the order of its table's key columns */
    boolean brings(String table, String... keys);

    /** The rows of that table; empty where the import has none. */
    default List<TableRow> rows(String table) {
        return List.of();
    }
}
