package org.merewarden.advice;

import jakarta.validation.constraints.NotBlank;
import jakarta.validation.constraints.Size;
import java.time.LocalDate;
import java.time.LocalTime;
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
}
