package org.merewarden.records;

import jakarta.validation.constraints.DecimalMax;
import jakarta.validation.constraints.DecimalMin;
import jakarta.validation.constraints.Max;
import jakarta.validation.constraints.Min;
import jakarta.validation.constraints.NotBlank;
import jakarta.validation.constraints.NotNull;
import jakarta.validation.constraints.Size;
import java.time.LocalDate;
import java.util.HashMap;
import java.util.Map;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.intake.TableRow;
import org.springframework.beans.DirectFieldAccessor;
import org.springframework.format.annotation.DateTimeFormat;

/**
 * A record as people type it. The fields are named like the columns of the import formats, so that a typed record becomes
 * the row that a file would have brought and obeys the same rules. Bounds repeat those of the columns.
 */
abstract class RecordForm {
    @NotNull(message = "{form.needed}")
    @Min(value = 1800, message = "{form.least}")
    @Max(value = 2200, message = "{form.most}")
    public @Nullable Integer year;

    /** Where the figure comes from and why it is entered or corrected. */
    @NotBlank(message = "{form.needed}")
    @Size(max = 500, message = "{form.long}")
    public String source = "";

    abstract RecordTable table();

    /** Name of the form's field for a column: time_of_year → timeOfYear. */
    static String property(String column) {
        StringBuilder name = new StringBuilder();
        for (String part : column.split("_")) {
            name.append(
                    name.isEmpty()
                            ? part
                            : part.substring(0, 1).toUpperCase(java.util.Locale.ROOT) + part.substring(1));
        }
        return name.toString();
    }

    /** @param owner the cells that name the stock or the water */
    TableRow row(Map<String, String> owner) {
        Map<String, Object> values = new HashMap<>(owner);
        DirectFieldAccessor fields = new DirectFieldAccessor(this);
        for (RecordTable.Field field : table().fields()) {
            String column = field.column().name();
            Optional.ofNullable(fields.getPropertyValue(property(column)))
                    .or(() -> Optional.ofNullable(field.column().defaultValue()).filter(String::isEmpty))
                    .ifPresent(value -> values.put(column, value));
        }
        return new TableRow(1, values);
    }

    static RecordForm of(RecordTable table) {
        return switch (table.name()) {
            case "catches" -> new Catch();
            case "effort" -> new Effort();
            case "surveys" -> new Survey();
            case "events" -> new Event();
            default -> throw new IllegalArgumentException("no form for " + table.name());
        };
    }

    static final class Catch extends RecordForm {
        @NotBlank(message = "{form.needed}")
        public String sector = "commercial";

        @NotNull(message = "{form.needed}")
        @DecimalMin(value = "0", message = "{form.least}")
        @DecimalMax(value = "100000000", message = "{form.most}")
        public @Nullable Double catchT;

        @DecimalMin(value = "0.001", message = "{form.least}")
        @DecimalMax(value = "5", message = "{form.most}")
        public @Nullable Double cv;

        @DecimalMin(value = "0.001", message = "{form.least}")
        @DecimalMax(value = "1", message = "{form.most}")
        public @Nullable Double reportedFraction;

        @Override
        RecordTable table() {
            return RecordTables.CATCHES;
        }
    }

    static final class Effort extends RecordForm {
        @NotBlank(message = "{form.needed}")
        @Size(max = 60, message = "{form.long}")
        public String series = "";

        @NotNull(message = "{form.needed}")
        @DecimalMin(value = "0", message = "{form.least}")
        public @Nullable Double effort;

        @Size(max = 60, message = "{form.long}")
        public @Nullable String unit;

        @Override
        RecordTable table() {
            return RecordTables.EFFORT;
        }
    }

    static final class Survey extends RecordForm {
        @NotBlank(message = "{form.needed}")
        @Size(max = 60, message = "{form.long}")
        public String series = "";

        @NotNull(message = "{form.needed}")
        @DecimalMin(value = "0", message = "{form.least}")
        @DecimalMax(value = "1", message = "{form.most}")
        public @Nullable Double timeOfYear = 0.5;

        @NotBlank(message = "{form.needed}")
        public String kind = "index";

        @NotNull(message = "{form.needed}")
        @DecimalMin(value = "0", message = "{form.least}")
        public @Nullable Double value;

        @DecimalMin(value = "0.001", message = "{form.least}")
        @DecimalMax(value = "5", message = "{form.most}")
        public @Nullable Double cv;

        @DecimalMin(value = "0.001", message = "{form.least}")
        public @Nullable Double nets;

        @Size(max = 200, message = "{form.long}")
        public @Nullable String design;

        @Size(max = 60, message = "{form.long}")
        public @Nullable String unit;

        @Override
        RecordTable table() {
            return RecordTables.SURVEYS;
        }
    }

    static final class Event extends RecordForm {
        @NotBlank(message = "{form.needed}")
        @Size(max = 100, message = "{form.long}")
        public String key = "";

        public @Nullable String species = "";

        public @Nullable String population = "";

        @DateTimeFormat(iso = DateTimeFormat.ISO.DATE)
        public @Nullable LocalDate date;

        @NotBlank(message = "{form.needed}")
        public String kind = "";

        public @Nullable Double low;

        public @Nullable Double likely;

        public @Nullable Double high;

        @Size(max = 60, message = "{form.long}")
        public @Nullable String stage;

        @DecimalMin(value = "0", message = "{form.least}")
        public @Nullable Double number;

        @DecimalMin(value = "0.001", message = "{form.least}")
        public @Nullable Double meanWeightG;

        @DecimalMin(value = "0", message = "{form.least}")
        @DecimalMax(value = "1", message = "{form.most}")
        public @Nullable Double survival;

        @Min(value = 0, message = "{form.least}")
        @Max(value = 50, message = "{form.most}")
        public @Nullable Integer delayYears;

        @DecimalMin(value = "0.00001", message = "{form.least}")
        @DecimalMax(value = "1000", message = "{form.most}")
        public @Nullable Double recruitWeightKg;

        @Override
        RecordTable table() {
            return RecordTables.EVENTS;
        }
    }
}
