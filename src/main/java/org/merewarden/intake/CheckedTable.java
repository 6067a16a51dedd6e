package org.merewarden.intake;

import java.util.stream.Stream;

/** A table with the rules of its feature, for reading rows without a store. */
public record CheckedTable(TableDefinition definition, Rules rules) {

    /** What speaks against one row, beyond what its columns say of themselves. */
    public interface Rules {
        /** @param batch what the folder's earlier tables bring */
        Stream<Problem> problems(TableRow row, Batch batch);
    }
}
