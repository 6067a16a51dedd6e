package org.merewarden.sharing;

import jakarta.validation.constraints.Max;
import jakarta.validation.constraints.Min;
import jakarta.validation.constraints.NotBlank;
import jakarta.validation.constraints.NotNull;
import jakarta.validation.constraints.Size;
import org.jspecify.annotations.Nullable;

/** What is asked for when a share link is made. */
class ShareForm {
    @NotBlank(message = "{sharing.unknown-cooperative}")
    private String cooperative = "";

    @Size(max = 200, message = "{sharing.form.label.long}")
    private String label = "";

    @NotNull(message = "{sharing.form.days.range}")
    @Min(value = 1, message = "{sharing.form.days.range}")
    @Max(value = ShareLinks.MOST_DAYS, message = "{sharing.form.days.range}")
    private @Nullable Integer days = 365;

    public String getCooperative() {
        return cooperative;
    }

    public void setCooperative(String cooperative) {
        this.cooperative = cooperative;
    }

    public String getLabel() {
        return label;
    }

    public void setLabel(String label) {
        this.label = label.trim();
    }

    public @Nullable Integer getDays() {
        return days;
    }

    public void setDays(@Nullable Integer days) {
        this.days = days;
    }
}
