package org.merewarden.advice;

import java.util.Map;
import java.util.Optional;
import org.jspecify.annotations.Nullable;

/**
 * What somebody wants to be decided.
 *
 * @param advice what the rule recommends; it is put on record beside the limit
 * @param hand allocations by hand, kg by cooperative id; empty: by the rights
 * @param replaces number of the draft that this one replaces
 */
record Proposal(
        NewLimit limit,
        String reason,
        Optional<Adviser.Advice> advice,
        Map<Long, Long> hand,
        @Nullable Long replaces) {}
