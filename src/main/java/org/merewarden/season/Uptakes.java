package org.merewarden.season;

import java.util.List;
import java.util.Optional;

/** Uptake of the limits, as other features read it. A fixed number of statements. */
public interface Uptakes {
    List<UptakeView> ofSeason(int season);

    Optional<UptakeView> of(long stockId, int season);
}
