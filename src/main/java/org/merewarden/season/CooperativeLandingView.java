package org.merewarden.season;

import java.time.LocalDate;
import org.jspecify.annotations.Nullable;

/**
 * A landing as its own cooperative sees it: without place, note and who entered it.
 *
 * @param lake the water body's code
 * @param speciesKey species code, code.population, or mixed
 * @param fate kept, discarded, released or seized
 */
public record CooperativeLandingView(
        LocalDate landedOn,
        @Nullable String slip,
        String lake,
        String speciesKey,
        double weightKg,
        String presentation,
        double liveWeightKg,
        String fate) {}
