package org.merewarden.advice;

import java.util.List;
import java.util.Optional;

/** Standings of all assessed stocks; a stock without one is unassessed. Every call is one statement. */
public interface Standings {
    List<StandingView> all();

    Optional<StandingView> of(long stockId);
}
