package org.merewarden.intake;

import java.util.List;
import java.util.Map;
import org.jspecify.annotations.Nullable;

/**
 * One file (or sheet) of an import with its rows.
 *
 * @param id 0 until it is stored
 * @param table the table it was recognised as, or null
 * @param header the columns' names; empty where the file could not be read
 * @param problem why the whole file is refused, or null
 */
record ImportedFile(
        long id,
        String fileName,
        String sheet,
        @Nullable String table,
        String sha256,
        String reading,
        DecimalMark decimalMark,
        List<String> header,
        @Nullable String problem,
        boolean leftOut,
        List<Row> rows) {

    /**
     * @param readingProblem why the line could not be read as it should, or null
     * @param fate REFUSED without reasons as long as the file's table is not known
     */
    record Row(
            long id,
            int line,
            Map<String, String> cells,
            @Nullable Problem readingProblem,
            boolean leftOut,
            Fate fate) {
        Row with(Fate newFate) {
            return new Row(id, line, cells, readingProblem, leftOut, newFate);
        }
    }

    boolean readable() {
        return !header.isEmpty();
    }

    /** Whether it stands in the way of storing the import. */
    boolean refused() {
        return !leftOut
                && (problem != null
                        || table == null
                        || rows.stream().anyMatch(r -> !r.leftOut() && r.fate().kind() == Fate.Kind.REFUSED));
    }

    /** The file's name, with the sheet's where it is a workbook. */
    String name() {
        return sheet.isEmpty() ? fileName : fileName + ", sheet " + sheet;
    }

    ImportedFile with(@Nullable String newProblem, List<Row> newRows) {
        return new ImportedFile(
                id, fileName, sheet, table, sha256, reading, decimalMark, header, newProblem, leftOut, newRows);
    }
}
