package org.merewarden.advice;

import jakarta.validation.constraints.AssertTrue;
import jakarta.validation.constraints.DecimalMax;
import jakarta.validation.constraints.DecimalMin;
import jakarta.validation.constraints.Max;
import jakarta.validation.constraints.Min;
import jakarta.validation.constraints.NotBlank;
import jakarta.validation.constraints.NotNull;
import jakarta.validation.constraints.Pattern;
import jakarta.validation.constraints.PositiveOrZero;
import jakarta.validation.constraints.Size;
import java.time.LocalDate;
import org.jspecify.annotations.Nullable;
import org.springframework.format.annotation.DateTimeFormat;

/** A proposal as it is typed; amounts in t. */
@SuppressWarnings("NullAway") // after validation the required fields are there
class LimitForm {
    @NotNull(message = "{advice.form.season.needed}")
    @Min(value = 1800, message = "{advice.form.season.range}")
    @Max(value = 2200, message = "{advice.form.season.range}")
    private @Nullable Integer season;

    @NotNull
    @Pattern(regexp = "catch|effort|measures only", message = "{advice.form.kind.one}")
    private String kind = "catch";

    @PositiveOrZero(message = "{advice.form.amount.range}")
    @DecimalMax(value = "10000000", message = "{advice.form.amount.range}")
    private @Nullable Double amount;

    @Size(max = 60, message = "{advice.form.long}")
    private String unit = "t";

    @PositiveOrZero(message = "{advice.form.setAside.range}")
    @DecimalMax(value = "10000000", message = "{advice.form.setAside.range}")
    private @Nullable Double subsistence = 0.0;

    @PositiveOrZero(message = "{advice.form.setAside.range}")
    @DecimalMax(value = "10000000", message = "{advice.form.setAside.range}")
    private @Nullable Double angling = 0.0;

    @PositiveOrZero(message = "{advice.form.setAside.range}")
    @DecimalMax(value = "10000000", message = "{advice.form.setAside.range}")
    private @Nullable Double research = 0.0;

    @PositiveOrZero(message = "{advice.form.setAside.range}")
    @DecimalMax(value = "10000000", message = "{advice.form.setAside.range}")
    private @Nullable Double other = 0.0;

    @NotNull(message = "{advice.form.reported.range}")
    @DecimalMin(value = "0", inclusive = false, message = "{advice.form.reported.range}")
    @DecimalMax(value = "1", message = "{advice.form.reported.range}")
    private @Nullable Double reportedFraction = 1.0;

    @NotNull(message = "{advice.form.date.needed}")
    @DateTimeFormat(iso = DateTimeFormat.ISO.DATE)
    private @Nullable LocalDate validFrom;

    @NotNull(message = "{advice.form.date.needed}")
    @DateTimeFormat(iso = DateTimeFormat.ISO.DATE)
    private @Nullable LocalDate validTo;

    @Size(max = 4000, message = "{advice.form.long}")
    private String measures = "";

    @Size(max = 1000, message = "{advice.form.long}")
    private String legalBasis = "";

    @Size(max = 1000, message = "{advice.form.long}")
    private String objection = "";

    @NotBlank(message = "{advice.form.reason.needed}")
    @Size(max = 4000, message = "{advice.form.long}")
    private String reason = "";

    @AssertTrue(message = "{advice.form.amount.needed}")
    boolean isAmountGiven() {
        return kind == null || kind.equals("measures only") || amount != null;
    }

    @AssertTrue(message = "{advice.form.setAside.sum}")
    boolean isSetAsidesWithinLimit() {
        return !"catch".equals(kind) || amount == null || setAsides() <= amount;
    }

    @AssertTrue(message = "{advice.form.date.order}")
    boolean isDatesInOrder() {
        return validFrom == null || validTo == null || !validFrom.isAfter(validTo);
    }

    @AssertTrue(message = "{advice.form.date.range}")
    boolean isDatesWithinReason() {
        return withinReason(validFrom) && withinReason(validTo);
    }

    private static boolean withinReason(@Nullable LocalDate date) {
        return date == null || (date.getYear() >= 1800 && date.getYear() <= 2201);
    }

    private double setAsides() {
        return orZero(subsistence) + orZero(angling) + orZero(research) + orZero(other);
    }

    private static double orZero(@Nullable Double value) {
        return value == null ? 0 : value;
    }

    /** The limit that the validated form describes. */
    NewLimit toLimit(long stockId, @Nullable Long assessmentId) {
        return new NewLimit(
                stockId,
                season,
                kind,
                kind.equals("measures only") ? null : amount,
                kind.equals("catch") || unit.isBlank() ? "t" : unit.strip(),
                orZero(subsistence),
                orZero(angling),
                orZero(research),
                orZero(other),
                reportedFraction,
                validFrom,
                validTo,
                emptyToNull(measures),
                emptyToNull(legalBasis),
                emptyToNull(objection),
                assessmentId,
                "decided");
    }

    private static @Nullable String emptyToNull(@Nullable String text) {
        return text == null || text.isBlank() ? null : text.strip();
    }

    public @Nullable Integer getSeason() {
        return season;
    }

    public void setSeason(@Nullable Integer season) {
        this.season = season;
    }

    public String getKind() {
        return kind;
    }

    public void setKind(String kind) {
        this.kind = kind;
    }

    public @Nullable Double getAmount() {
        return amount;
    }

    public void setAmount(@Nullable Double amount) {
        this.amount = amount;
    }

    public String getUnit() {
        return unit;
    }

    public void setUnit(String unit) {
        this.unit = unit;
    }

    public @Nullable Double getSubsistence() {
        return subsistence;
    }

    public void setSubsistence(@Nullable Double subsistence) {
        this.subsistence = subsistence;
    }

    public @Nullable Double getAngling() {
        return angling;
    }

    public void setAngling(@Nullable Double angling) {
        this.angling = angling;
    }

    public @Nullable Double getResearch() {
        return research;
    }

    public void setResearch(@Nullable Double research) {
        this.research = research;
    }

    public @Nullable Double getOther() {
        return other;
    }

    public void setOther(@Nullable Double other) {
        this.other = other;
    }

    public @Nullable Double getReportedFraction() {
        return reportedFraction;
    }

    public void setReportedFraction(@Nullable Double reportedFraction) {
        this.reportedFraction = reportedFraction;
    }

    public @Nullable LocalDate getValidFrom() {
        return validFrom;
    }

    public void setValidFrom(@Nullable LocalDate validFrom) {
        this.validFrom = validFrom;
    }

    public @Nullable LocalDate getValidTo() {
        return validTo;
    }

    public void setValidTo(@Nullable LocalDate validTo) {
        this.validTo = validTo;
    }

    public String getMeasures() {
        return measures;
    }

    public void setMeasures(String measures) {
        this.measures = measures;
    }

    public String getLegalBasis() {
        return legalBasis;
    }

    public void setLegalBasis(String legalBasis) {
        this.legalBasis = legalBasis;
    }

    public String getObjection() {
        return objection;
    }

    public void setObjection(String objection) {
        this.objection = objection;
    }

    public String getReason() {
        return reason;
    }

    public void setReason(String reason) {
        this.reason = reason;
    }
}
