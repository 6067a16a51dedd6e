package org.merewarden.advice;

import java.time.Instant;
import java.util.List;
import java.util.Optional;
import org.merewarden.core.policy.Policy;

/**
 * One version of the rule with what was decided about it, oldest first.
 *
 * @param inForce adopted last of all versions
 */
record PolicyVersion(int number, Policy policy, boolean inForce, List<Act> acts) {
    static final String PROPOSED = "PROPOSED";
    static final String ADOPTED = "ADOPTED";
    static final String REFUSED = "REFUSED";

    /** @param act PROPOSED, ADOPTED or REFUSED */
    record Act(String act, Instant at, String by, String reason) {}

    enum State {
        OPEN,
        IN_FORCE,
        REPLACED,
        REFUSED
    }

    State state() {
        return switch (latest().act()) {
            case PROPOSED -> State.OPEN;
            case REFUSED -> State.REFUSED;
            default -> inForce ? State.IN_FORCE : State.REPLACED;
        };
    }

    /** Every version has an act: it is proposed when it is written down. */
    Act latest() {
        return acts.get(acts.size() - 1);
    }

    /** The first version came with the program, so nobody here proposed it. */
    Optional<String> proposer() {
        return acts.stream().filter(a -> a.act().equals(PROPOSED)).map(Act::by).findFirst();
    }
}
