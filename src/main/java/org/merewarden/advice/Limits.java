package org.merewarden.advice;

import java.util.List;
import java.util.Optional;

/** Limits in force, as other features read them. Every call is one statement, and one more for each closure. */
public interface Limits {
    List<LimitView> inForce(int season);

    Optional<LimitView> inForce(long stockId, int season);

    /** All allocations of the limits in force in the season. */
    List<AllocationView> allocations(int season);

    /** The season that pages show when none is named: the current one, else the latest with a limit in force. */
    int presentSeason();
}
