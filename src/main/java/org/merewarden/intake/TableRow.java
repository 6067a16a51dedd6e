package org.merewarden.intake;

import java.time.LocalDate;
import java.util.Map;
import java.util.Objects;
import org.jspecify.annotations.Nullable;

/**
 * One row whose cells were read by their columns' kinds; an empty cell is absent, unless its column has a default.
 *
 * @param line line of the file (or row of the sheet), the header being 1
 */
public record TableRow(int line, Map<String, Object> values) {
    public TableRow {
        values = Map.copyOf(values);
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
