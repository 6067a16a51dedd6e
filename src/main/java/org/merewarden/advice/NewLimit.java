package org.merewarden.advice;

import java.time.LocalDate;
import org.jspecify.annotations.Nullable;

/**
 * A limit about to be written down. Amounts in t of total removals for kind catch; set-asides in t.
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
        String origin) {
    double setAsidesTonnes() {
        return subsistenceTonnes + anglingTonnes + researchTonnes + otherTonnes;
    }
}
