package org.merewarden.intake;

import java.util.List;

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
}
