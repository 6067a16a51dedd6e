package org.merewarden.advice;

import java.time.Instant;
import java.time.LocalDate;
import org.jspecify.annotations.Nullable;

/**
 * An issued limit. {@code amountTonnes} is total removals; null unless the kind is catch.
 *
 * @param id also the number of its notice
 * @param kind catch, effort or measures only
 * @param amount in {@code unit}: t for a catch limit, net-nights or the like for effort
 * @param setAsidesTonnes subsistence, angling, research and others together
 * @param toBeLoggedTonnes (removals − set-asides) × expected reported fraction; null unless the kind is catch
 * @param purpose season, revision of the season's limit, or closure (then the amount is 0 t)
 * @param effectiveAt from when it is in force
 */
public record LimitView(
        long id,
        long stockId,
        int season,
        String kind,
        @Nullable Double amount,
        String unit,
        double setAsidesTonnes,
        double reportedFraction,
        @Nullable Double toBeLoggedTonnes,
        LocalDate validFrom,
        LocalDate validTo,
        @Nullable String measures,
        @Nullable String legalBasis,
        @Nullable String objection,
        String reason,
        Instant issuedAt,
        String issuedBy,
        String purpose,
        Instant effectiveAt) {

    /** Total removals allowed, t; null unless the kind is catch. */
    public @Nullable Double amountTonnes() {
        return kind.equals("catch") ? amount : null;
    }

    /** The same, valid from this day and with these measures. */
    LimitView closedFrom(LocalDate day, String words) {
        return new LimitView(
                id,
                stockId,
                season,
                kind,
                amount,
                unit,
                setAsidesTonnes,
                reportedFraction,
                toBeLoggedTonnes,
                day,
                validTo,
                words,
                legalBasis,
                objection,
                reason,
                issuedAt,
                issuedBy,
                purpose,
                effectiveAt);
    }

    /** Whether it closed the stock within its season. */
    public boolean closure() {
        return purpose.equals(Terms.CLOSURE);
    }
}
