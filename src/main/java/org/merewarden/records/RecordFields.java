package org.merewarden.records;

import java.util.List;
import org.jspecify.annotations.Nullable;
import org.merewarden.intake.Column;
import org.merewarden.web.Choice;

/** The fields of a record's form, in the order of its table. */
final class RecordFields {
    /** @param choices null where anything may be typed */
    record FieldView(
            String property,
            String column,
            String type,
            boolean required,
            @Nullable List<Choice> choices) {}

    private RecordFields() {}

    static List<FieldView> of(RecordTable table) {
        return table.fields().stream().map(f -> view(f.column())).toList();
    }

    private static FieldView view(Column column) {
        String type = switch (column.kind()) {
            case NUMBER, INTEGER, YEAR -> "number";
            case DATE -> "date";
            default -> "text";
        };
        List<Choice> choices = column.choices().isEmpty()
                ? null
                : column.choices().stream().map(c -> new Choice(c, c)).toList();
        boolean required = column.name().equals("source") || column.required() && !"".equals(column.defaultValue());
        return new FieldView(RecordForm.property(column.name()), column.name(), type, required, choices);
    }
}
