package org.merewarden.sharing;

import jakarta.validation.constraints.Max;
import jakarta.validation.constraints.Min;
import jakarta.validation.constraints.NotBlank;
import jakarta.validation.constraints.NotNull;
import jakarta.validation.constraints.Size;
import org.jspecify.annotations.Nullable;

/** What is asked for when a share link is made. */
class ShareForm {
    @NotBlank
    private String cooperative = "";

    @Size(max = 200)
    private String label = "";

    @NotNull
    @Min(1)
    @Max(ShareLinks.MOST_DAYS)
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
