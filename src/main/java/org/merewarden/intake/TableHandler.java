package org.merewarden.intake;

import java.util.List;

/** A feature's side of the importer, for one table. */
public interface TableHandler {
    TableDefinition definition();

    /**
     * Says what would become of every row; stores nothing. The importer has read the cells by their kinds, checked
     * bounds, choices, required cells and duplicate keys within the import; the handler checks references and compares
     * with what is stored. Few statements for many rows.
     *
     * @return one fate for each row, in order
     */
    List<Fate> examine(List<TableRow> rows, Batch batch);

    /** Stores new and changed rows in the caller's transaction. */
    void store(List<TableRow> rows, Provenance provenance);
}
