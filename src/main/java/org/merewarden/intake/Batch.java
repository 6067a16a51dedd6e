package org.merewarden.intake;

/** What the same import brings in tables examined earlier. */
public interface Batch {
    /** @param keys the key cells of the wanted row in the order of its table's key columns */
    boolean brings(String table, String... keys);
}
