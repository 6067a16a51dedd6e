package org.merewarden.intake;

import java.util.List;
import java.util.Map;
import org.jspecify.annotations.Nullable;

/**
 * A CSV file or a sheet as it was read, before its cells are understood.
 *
 * @param sheet the sheet's name, empty for a CSV file
 * @param reading how it was read, for people
 * @param header the columns' names, normalised; empty where a column has no name
 */
record SourceTable(String sheet, String reading, DecimalMark decimalMark, List<String> header, List<Row> rows) {
    /**
     * @param line line of the file (1 is the first) or row of the sheet
     * @param cells the texts of the cells that are not empty, by column
     * @param problem why the row could not be read as it should, or null
     */
    record Row(
            int line, Map<String, String> cells, @Nullable Problem problem) {}
}
