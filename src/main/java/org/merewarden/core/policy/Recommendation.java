package org.merewarden.core.policy;

import java.util.List;
import org.jspecify.annotations.Nullable;

/**
 * A limit with the working that led to it. Amounts in t of total removals.
 *
 * @param limitTonnes what is recommended
 * @param steps in order, each with the amount that stands after it; the last is the rounding
 * @param ceilingTonnes largest constant catch within the tolerated risk; infinity where no catch is too large, NaN where
 *     even no catch is too risky (the limit is then 0)
 * @param recoverySeasons with nothing taken, seasons until the risk of being below B lim is tolerable; null where the
 *     ceiling is a number, or where 50 seasons do not suffice
 * @param risk chance of B &lt; B lim at the end of at least one season of the horizon at the limit, 0–1
 * @param provisional the evidence says nothing of the stock itself
 */
public record Recommendation(
        double limitTonnes,
        List<Step> steps,
        double ceilingTonnes,
        @Nullable Integer recoverySeasons,
        double risk,
        boolean provisional) {

    /** A rule of the policy. */
    public enum Rule {
        /** The quantile of the ramp's catch. */
        RAMP,
        /** Lowered to what the tolerated risk allows. */
        RISK,
        /** Held within the cap of change. */
        STEADINESS,
        /** Carried over from last season or paid back. */
        LAST_SEASON,
        /** Lowered again to what the tolerated risk allows. */
        RISK_AGAIN,
        /** Rounded down. */
        ROUNDING
    }

    /** @param tonnes the amount after the rule was applied */
    public record Step(Rule rule, double tonnes) {}

    public Recommendation {
        steps = List.copyOf(steps);
    }

    /** The last rule before the rounding that changed the amount; the ramp where none did. */
    public Rule decidedBy() {
        Rule decided = Rule.RAMP;
        for (int i = 1; i < steps.size() - 1; i++) {
            if (steps.get(i).tonnes() != steps.get(i - 1).tonnes()) {
                decided = steps.get(i).rule();
            }
        }
        return decided;
    }

    /** The amount that stood after a rule. */
    public double after(Rule rule) {
        return steps.stream()
                .filter(s -> s.rule() == rule)
                .findFirst()
                .orElseThrow()
                .tonnes();
    }
}
