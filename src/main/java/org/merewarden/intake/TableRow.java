package org.merewarden.intake;

import java.time.LocalDate;
import java.util.HashMap;
import java.util.Map;
import java.util.Objects;
import java.util.Set;
import org.jspecify.annotations.Nullable;

/**
 * One row whose cells were read by their columns' kinds; an empty cell is absent, unless its column has a default.
 *
 * @param line line of the file (or row of the sheet), the header being 1
 * @param absent columns of the table that the row's file does not have at all: it says nothing about them
 */
public record TableRow(int line, Map<String, Object> values, Set<String> absent) {
    public TableRow {
        values = Map.copyOf(values);
        absent = Set.copyOf(absent);
    }

    /** A row that speaks about every column. */
    public TableRow(int line, Map<String, Object> values) {
        this(line, values, Set.of());
    }

    /** This row with what is stored in the place of columns that its file does not have. */
    public TableRow over(Map<String, ? extends @Nullable Object> stored) {
        Map<String, Object> whole = new HashMap<>(values);
        for (String column : absent) {
            if (stored.containsKey(column)) {
                Object kept = stored.get(column);
                if (kept == null) {
                    whole.remove(column);
                } else {
                    whole.put(column, kept);
                }
            }
        }
        return new TableRow(line, whole, absent);
    }

    public @Nullable String text(String column) {
        return (String) values.get(column);
    }

    public String need(String column) {
        return (String) Objects.requireNonNull(values.get(column), column);
    }

    /** The text, or the empty string. */
    public String textOrEmpty(String column) {
        return Objects.requireNonNullElse(text(column), "");
    }

    public @Nullable Double number(String column) {
        return (Double) values.get(column);
    }

    public @Nullable Integer integer(String column) {
        return (Integer) values.get(column);
    }

    public @Nullable LocalDate date(String column) {
        return (LocalDate) values.get(column);
    }
}
