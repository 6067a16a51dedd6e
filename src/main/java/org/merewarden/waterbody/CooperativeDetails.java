package org.merewarden.waterbody;

import jakarta.persistence.Embeddable;
import jakarta.validation.constraints.NotBlank;
import jakarta.validation.constraints.Pattern;
import jakarta.validation.constraints.Size;
import java.util.LinkedHashMap;
import java.util.Map;
import org.jspecify.annotations.Nullable;
import org.merewarden.intake.TableRow;

/** What the office knows of a cooperative: form, stored columns and import cells in one. */
@Embeddable
class CooperativeDetails {
    @NotBlank(message = "{form.needed}")
    @Size(max = 60, message = "{form.long}")
    @Pattern(regexp = Slug.PATTERN, message = "{form.slug}")
    public String code = "";

    @NotBlank(message = "{form.needed}")
    @Size(max = 120, message = "{form.long}")
    public String name = "";

    @Size(max = 2000, message = "{form.long}")
    public @Nullable String note;

    static CooperativeDetails of(TableRow row) {
        CooperativeDetails details = new CooperativeDetails();
        details.code = row.need("code");
        details.name = row.need("name");
        details.note = row.text("note");
        return details;
    }

    Map<String, @Nullable Object> cells() {
        Map<String, @Nullable Object> cells = new LinkedHashMap<>();
        cells.put("code", code);
        cells.put("name", name);
        cells.put("note", note);
        return cells;
    }
}
