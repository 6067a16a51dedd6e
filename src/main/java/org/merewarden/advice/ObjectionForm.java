package org.merewarden.advice;

import jakarta.validation.constraints.NotBlank;
import jakarta.validation.constraints.NotNull;
import jakarta.validation.constraints.Size;
import java.time.LocalDate;
import org.jspecify.annotations.Nullable;
import org.springframework.format.annotation.DateTimeFormat;

/** An objection to an issued limit, as it is typed. */
class ObjectionForm {
    @NotBlank(message = "{advice.objection.objector.needed}")
    @Size(max = 200, message = "{advice.form.long}")
    public @Nullable String objector;

    @NotNull(message = "{advice.form.date.needed}")
    @DateTimeFormat(iso = DateTimeFormat.ISO.DATE)
    public @Nullable LocalDate receivedOn;

    @NotBlank(message = "{advice.objection.text.needed}")
    @Size(max = 4000, message = "{advice.form.long}")
    public @Nullable String text;

    @Size(max = 4000, message = "{advice.form.long}")
    public @Nullable String answer;
}
