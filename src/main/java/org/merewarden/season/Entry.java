package org.merewarden.season;

import java.time.LocalDate;
import org.jspecify.annotations.Nullable;

/**
 * One line of a landing slip as the sender wrote it. Two entries under the same key are the same landing exactly when
 * they are equal.
 *
 * @param key the sender's own, at most 100 characters
 * @param lake the water body's code
 * @param species FAO three-letter code, or {@link #MIXED}
 * @param population empty unless the water holds two stocks of the species
 * @param cooperative its code
 * @param weightKg as landed, 0–{@link EntryRules#MAX_WEIGHT_KG}
 * @param presentation how it was landed: whole, gutted …
 */
record Entry(
        String key,
        LocalDate landedOn,
        @Nullable String slip,
        String lake,
        String species,
        String population,
        @Nullable String cooperative,
        String sector,
        @Nullable String gear,
        @Nullable Double nets,
        @Nullable Double nights,
        double weightKg,
        String presentation,
        @Nullable Integer number,
        String fate,
        @Nullable String place,
        @Nullable String note) {
    /** A catch of several species weighed together, to be split later. */
    static final String MIXED = "mixed";

    String speciesKey() {
        return population.isEmpty() ? species : species + "." + population;
    }

    /** For people, e.g. "2026-06-01, skelder-water, FPE, 12.5 kg gutted, kept". */
    String text() {
        return landedOn + ", " + lake + ", " + speciesKey() + ", " + weightKg + " kg " + presentation + ", " + fate
                + (cooperative == null ? "" : ", " + cooperative)
                + (sector.equals("commercial") ? "" : ", " + sector)
                + (gear == null ? "" : ", " + gear)
                + (nets == null ? "" : ", " + nets + " nets")
                + (nights == null ? "" : ", " + nights + " nights")
                + (number == null ? "" : ", " + number + " fish")
                + (slip == null ? "" : ", slip " + slip)
                + (place == null ? "" : ", " + place)
                + (note == null ? "" : ", note: " + note);
    }
}
