package org.merewarden.waterbody;

import jakarta.persistence.Embeddable;
import jakarta.validation.constraints.DecimalMax;
import jakarta.validation.constraints.DecimalMin;
import jakarta.validation.constraints.NotBlank;
import jakarta.validation.constraints.NotNull;
import jakarta.validation.constraints.Size;
import java.time.LocalDate;
import java.util.LinkedHashMap;
import java.util.Map;
import org.jspecify.annotations.Nullable;
import org.merewarden.intake.TableRow;
import org.springframework.format.annotation.DateTimeFormat;

/** A factor from landed to live weight, from a date on: form, stored columns and import cells in one. */
@Embeddable
class ConversionDetails {
    @NotBlank(message = "{form.needed}")
    @Size(max = 3, message = "{form.long}")
    public String species = "";

    @NotBlank(message = "{form.needed}")
    @Size(max = 60, message = "{form.long}")
    public String presentation = "";

    @NotNull(message = "{form.needed}")
    @DateTimeFormat(iso = DateTimeFormat.ISO.DATE)
    public @Nullable LocalDate validFrom;

    @NotNull(message = "{form.needed}")
    @DecimalMin(value = "1", message = "{form.least}")
    @DecimalMax(value = "10", message = "{form.most}")
    public @Nullable Double factor;

    static ConversionDetails of(TableRow row) {
        ConversionDetails details = new ConversionDetails();
        details.species = row.need("species");
        details.presentation = row.need("presentation");
        details.validFrom = row.date("valid_from");
        details.factor = row.number("factor");
        return details;
    }

    Map<String, @Nullable Object> cells() {
        Map<String, @Nullable Object> cells = new LinkedHashMap<>();
        cells.put("species", species);
        cells.put("presentation", presentation);
        cells.put("valid_from", validFrom);
        cells.put("factor", factor);
        return cells;
    }

    String key() {
        return species + "|" + presentation + "|" + validFrom;
    }
}
