package org.merewarden.intake;

import java.util.List;
import java.util.Map;
import java.util.function.UnaryOperator;
import org.jspecify.annotations.Nullable;

/** An import as its page shows it: finished strings only. */
record ImportPage(
        long id,
        int version,
        boolean open,
        boolean committable,
        String lede,
        String record,
        List<FileLine> files,
        List<FilterLink> filters,
        List<Refusal> refusals,
        List<RowLine> rows,
        @Nullable String previous,
        @Nullable String next) {

    /** An import in the list of all imports. */
    record Summary(String address, String id, String when, String who, String files, String state, String note) {}

    record FileLine(
            String tableAction,
            String leaveAction,
            String name,
            String table,
            String reading,
            String unknownColumns,
            String problem,
            String added,
            String changed,
            String same,
            String refused,
            String leftOut,
            boolean out) {}

    record FilterLink(String address, String label, boolean current) {}

    /** One broken rule; address is empty where the row cannot be mended any more. */
    record Refusal(String address, String file, String line, String column, String value, String rule) {}

    record RowLine(String address, String file, String line, String key, String fate, String what) {}

    /** A row opened for mending. */
    record RowPage(
            long importId,
            int version,
            String address,
            String leaveAction,
            String where,
            boolean open,
            boolean leftOut,
            String fate,
            String record,
            List<String> problems,
            List<CellField> fields,
            List<CellField> others) {
        /** What somebody typed stands in the fields, what is stored beside it. */
        RowPage typed(Map<String, String> texts, UnaryOperator<String> stored) {
            List<CellField> both = fields.stream()
                    .map(f -> f.typed(texts.getOrDefault(f.name(), f.value()), stored))
                    .toList();
            return new RowPage(
                    importId,
                    version,
                    address,
                    leaveAction,
                    where,
                    open,
                    leftOut,
                    fate,
                    record,
                    problems,
                    both,
                    others);
        }
    }

    /**
     * @param original what the file said, where that was mended; else empty
     * @param error the rule that the cell breaks, or empty
     */
    record CellField(
            String name,
            String value,
            String hint,
            String original,
            String error,
            boolean required,
            String describedBy) {
        CellField typed(String text, UnaryOperator<String> stored) {
            String beside = text.equals(value) ? original : stored.apply(value.isEmpty() ? "–" : value);
            return new CellField(name, text, hint, beside, error, required, describedBy);
        }
    }
}
