package org.merewarden.advice;

import jakarta.validation.constraints.NotBlank;
import jakarta.validation.constraints.Size;
import java.time.Instant;
import java.time.LocalDate;
import java.time.LocalTime;
import java.time.ZoneId;
import java.util.Objects;
import org.jspecify.annotations.Nullable;
import org.springframework.format.annotation.DateTimeFormat;

/** Closing a stock, as it is typed. */
class ClosureForm {
    @DateTimeFormat(iso = DateTimeFormat.ISO.DATE)
    public @Nullable LocalDate closeOn;

    @DateTimeFormat(iso = DateTimeFormat.ISO.TIME)
    public @Nullable LocalTime closeAt;

    @NotBlank(message = "{advice.form.reason.needed}")
    @Size(max = 4000, message = "{advice.form.long}")
    public @Nullable String closeReason;

    @Size(max = 100, message = "{advice.form.long}")
    public @Nullable String closeKey;

    /**
     * The limit of nothing that the validated form describes.
     *
     * @param last day of the season
     * @param reported the limit's before it: what is logged until the closure is scaled by it still
     */
    NewLimit toLimit(long stockId, int season, LocalDate last, double reported, ZoneId zone) {
        LocalDate day = Objects.requireNonNull(closeOn);
        Instant from = day.atTime(Objects.requireNonNull(closeAt)).atZone(zone).toInstant();
        Terms terms = new Terms(Terms.CLOSURE, from, null, null, null, closeKey);
        return new NewLimit(
                stockId, season, "catch", 0.0, "t", 0, 0, 0, 0, reported, day, last, null, null, null, null, "decided",
                terms);
    }
}
