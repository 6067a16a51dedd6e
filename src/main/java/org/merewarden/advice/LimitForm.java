package org.merewarden.advice;

import jakarta.validation.constraints.DecimalMax;
import jakarta.validation.constraints.DecimalMin;
import jakarta.validation.constraints.Max;
import jakarta.validation.constraints.Min;
import jakarta.validation.constraints.NotNull;
import jakarta.validation.constraints.Pattern;
import jakarta.validation.constraints.PositiveOrZero;
import jakarta.validation.constraints.Size;
import java.time.Instant;
import java.time.LocalDate;
import java.time.LocalTime;
import java.time.ZoneId;
import java.util.LinkedHashMap;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.springframework.format.annotation.DateTimeFormat;

/** A limit as it is typed; amounts in t, by hand in kg. What hangs together is checked by {@link LimitRules}. */
@SuppressWarnings("NullAway") // after validation the required fields are there
class LimitForm {
    @NotNull(message = "{advice.form.season.needed}")
    @Min(value = 1800, message = "{advice.form.season.range}")
    @Max(value = 2200, message = "{advice.form.season.range}")
    public @Nullable Integer season;

    @NotNull(message = "{advice.form.kind.one}")
    @Pattern(regexp = "catch|effort|measures only", message = "{advice.form.kind.one}")
    public @Nullable String kind = "catch";

    @PositiveOrZero(message = "{advice.form.amount.range}")
    @DecimalMax(value = "10000000", message = "{advice.form.amount.range}")
    public @Nullable Double amount;

    @Size(max = 60, message = "{advice.form.long}")
    public @Nullable String unit = "t";

    @PositiveOrZero(message = "{advice.form.setAside.range}")
    @DecimalMax(value = "10000000", message = "{advice.form.setAside.range}")
    public @Nullable Double subsistence = 0.0;

    @PositiveOrZero(message = "{advice.form.setAside.range}")
    @DecimalMax(value = "10000000", message = "{advice.form.setAside.range}")
    public @Nullable Double angling = 0.0;

    @PositiveOrZero(message = "{advice.form.setAside.range}")
    @DecimalMax(value = "10000000", message = "{advice.form.setAside.range}")
    public @Nullable Double research = 0.0;

    @PositiveOrZero(message = "{advice.form.setAside.range}")
    @DecimalMax(value = "10000000", message = "{advice.form.setAside.range}")
    public @Nullable Double other = 0.0;

    @NotNull(message = "{advice.form.reported.range}")
    @DecimalMin(value = "0", inclusive = false, message = "{advice.form.reported.range}")
    @DecimalMax(value = "1", message = "{advice.form.reported.range}")
    public @Nullable Double reportedFraction = 1.0;

    @NotNull(message = "{advice.form.date.needed}")
    @DateTimeFormat(iso = DateTimeFormat.ISO.DATE)
    public @Nullable LocalDate validFrom;

    @NotNull(message = "{advice.form.date.needed}")
    @DateTimeFormat(iso = DateTimeFormat.ISO.DATE)
    public @Nullable LocalDate validTo;

    @Size(max = 4000, message = "{advice.form.long}")
    public @Nullable String measures;

    @Size(max = 1000, message = "{advice.form.long}")
    public @Nullable String legalBasis;

    @Size(max = 1000, message = "{advice.form.long}")
    public @Nullable String objection;

    @Size(max = 4000, message = "{advice.form.long}")
    public @Nullable String reason;

    @Size(max = 4000, message = "{advice.form.long}")
    public @Nullable String differenceReason;

    @DateTimeFormat(iso = DateTimeFormat.ISO.DATE)
    public @Nullable LocalDate reviewBy;

    @NotNull
    @Pattern(regexp = "season|revision", message = "{advice.form.purpose.one}")
    public @Nullable String purpose = Terms.SEASON;

    @DateTimeFormat(iso = DateTimeFormat.ISO.DATE)
    public @Nullable LocalDate effectiveDate;

    @DateTimeFormat(iso = DateTimeFormat.ISO.TIME)
    public @Nullable LocalTime effectiveTime;

    /** Kilograms by cooperative id; none filled in: by the rights. */
    public Map<Long, @Nullable Double> hand = new LinkedHashMap<>();

    /** Number of the draft that this form replaces. */
    public @Nullable Long draft;

    /** Of this form, so that it is stored once. */
    @Size(max = 100, message = "{advice.form.long}")
    public @Nullable String key;

    boolean revision() {
        return Terms.REVISION.equals(purpose);
    }

    boolean catchLimit() {
        return "catch".equals(kind);
    }

    double setAsides() {
        return orZero(subsistence) + orZero(angling) + orZero(research) + orZero(other);
    }

    private static double orZero(@Nullable Double value) {
        return value == null ? 0 : value;
    }

    /** Nothing is set aside from effort, or from measures. */
    private double kept(@Nullable Double value) {
        return catchLimit() ? orZero(value) : 0;
    }

    boolean byHand() {
        return catchLimit() && hand.values().stream().anyMatch(Objects::nonNull);
    }

    /** What the validated form describes. */
    Proposal toProposal(long stockId, @Nullable Long assessmentId, Optional<Adviser.Advice> advice, ZoneId zone) {
        Map<Long, Long> kilograms = new LinkedHashMap<>();
        if (byHand()) {
            hand.forEach((cooperative, kg) -> kilograms.put(cooperative, Math.round(kg)));
        }
        return new Proposal(
                toLimit(stockId, assessmentId, advice, zone),
                Objects.requireNonNullElse(reason, ""),
                advice,
                kilograms,
                draft);
    }

    private NewLimit toLimit(long stockId, @Nullable Long assessmentId, Optional<Adviser.Advice> advice, ZoneId zone) {
        boolean differs = advice.isPresent()
                && (!catchLimit()
                        || Recommendations.differs(amount, advice.get().limitTonnes()));
        Instant effective =
                revision() ? effectiveDate.atTime(effectiveTime).atZone(zone).toInstant() : null;
        return new NewLimit(
                stockId,
                season,
                kind,
                kind.equals("measures only") ? null : amount,
                kind.equals("effort") ? unit : "t",
                kept(subsistence),
                kept(angling),
                kept(research),
                kept(other),
                reportedFraction,
                validFrom,
                validTo,
                measures,
                legalBasis,
                objection,
                assessmentId,
                "decided",
                new Terms(purpose, effective, reviewBy, null, differs ? differenceReason : null, key));
    }
}
