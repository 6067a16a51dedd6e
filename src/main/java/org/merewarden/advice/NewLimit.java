package org.merewarden.advice;

import java.time.Instant;
import java.time.LocalDate;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.policy.LimitArithmetic;

/**
 * A limit as it is written down. Amounts in t of total removals for kind catch; set-asides in t.
 *
 * @param origin decided (made here) or entered (from earlier papers)
 */
record NewLimit(
        long stockId,
        int season,
        String kind,
        @Nullable Double amount,
        String unit,
        double subsistenceTonnes,
        double anglingTonnes,
        double researchTonnes,
        double otherTonnes,
        double reportedFraction,
        LocalDate validFrom,
        LocalDate validTo,
        @Nullable String measures,
        @Nullable String legalBasis,
        @Nullable String objection,
        @Nullable Long assessmentId,
        String origin,
        Terms terms) {
    double setAsidesTonnes() {
        return subsistenceTonnes + anglingTonnes + researchTonnes + otherTonnes;
    }

    /** Total removals, t; null unless the kind is catch. */
    @Nullable
    Double amountTonnes() {
        return kind.equals("catch") ? amount : null;
    }

    /** The amount to be logged, kg; null unless the kind is catch. */
    @Nullable
    Double toBeLoggedKilograms() {
        Double tonnes = amountTonnes();
        return tonnes == null
                ? null
                : (Double) (1000 * LimitArithmetic.toBeLogged(tonnes, setAsidesTonnes(), reportedFraction));
    }

    /** When it holds if it is issued now: nothing holds for what lies behind. */
    Instant holdsFrom(Instant now) {
        Instant from = terms.effectiveAt();
        return from == null || from.isBefore(now) ? now : from;
    }

    NewLimit on(Terms other) {
        return new NewLimit(
                stockId,
                season,
                kind,
                amount,
                unit,
                subsistenceTonnes,
                anglingTonnes,
                researchTonnes,
                otherTonnes,
                reportedFraction,
                validFrom,
                validTo,
                measures,
                legalBasis,
                objection,
                assessmentId,
                origin,
                other);
    }
}
