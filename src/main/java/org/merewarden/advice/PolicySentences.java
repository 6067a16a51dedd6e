package org.merewarden.advice;

import java.util.List;
import org.merewarden.core.policy.Policy;
import org.springframework.stereotype.Component;

/** The rule in plain language. */
@Component
class PolicySentences {
    private final PolicyWords words;

    PolicySentences(PolicyWords words) {
        this.words = words;
    }

    /** From the assessment to the limit, one text for each step in its order. */
    List<String> steps(Policy policy) {
        return List.of(ramp(policy), risk(policy), steadiness(policy), lastSeason(policy), rounding(policy));
    }

    /** What holds beside the steps. */
    List<String> others(Policy policy) {
        return List.of(
                words.word("policy.other.unsettled"),
                words.word("policy.other.none"),
                setAsides(policy),
                standing(policy),
                words.word("policy.other.interval", figure(PolicyConstant.INTERVAL, policy)),
                words.word("policy.other.pooling"));
    }

    private String ramp(Policy policy) {
        return words.word(
                "policy.step.ramp." + policy.ramp().line(),
                figure(PolicyConstant.LIMIT_FRACTION, policy),
                figure(PolicyConstant.TARGET, policy),
                figure(PolicyConstant.LOW, policy),
                figure(PolicyConstant.HIGH, policy),
                figure(PolicyConstant.QUANTILE, policy));
    }

    private String risk(Policy policy) {
        return words.word(
                policy.horizonYears() == 1 ? "policy.step.risk.one" : "policy.step.risk",
                figure(PolicyConstant.HORIZON, policy),
                figure(PolicyConstant.TOLERANCE, policy),
                figure(PolicyConstant.LIMIT_FRACTION, policy));
    }

    private String steadiness(Policy policy) {
        return words.word("policy.step.steadiness", figure(PolicyConstant.STEADINESS, policy));
    }

    private String lastSeason(Policy policy) {
        Policy.LastSeason last = policy.lastSeason();
        if (last.carryOver() == 0 && last.payback() == 0) {
            return words.word("policy.step.lastSeason.none");
        }
        return words.word(
                "policy.step.lastSeason",
                words.word(
                        last.carryOver() == 0 ? "policy.step.carryOver.none" : "policy.step.carryOver",
                        figure(PolicyConstant.CARRY_OVER, policy)),
                words.word(
                        last.payback() == 0 ? "policy.step.payback.none" : "policy.step.payback",
                        figure(PolicyConstant.PAYBACK, policy)));
    }

    private String rounding(Policy policy) {
        return words.word(
                policy.rounding().share() == 0 ? "policy.step.rounding.fixed" : "policy.step.rounding",
                figure(PolicyConstant.ROUNDING_SHARE, policy),
                figure(PolicyConstant.ROUNDING_LEAST, policy));
    }

    private String setAsides(Policy policy) {
        Policy.SetAsides parts = policy.setAsides();
        boolean none = parts.subsistence() + parts.angling() + parts.research() + parts.other() == 0;
        return words.word(
                none ? "policy.other.setAsides.none" : "policy.other.setAsides",
                figure(PolicyConstant.SUBSISTENCE, policy),
                figure(PolicyConstant.ANGLING, policy),
                figure(PolicyConstant.RESEARCH, policy),
                figure(PolicyConstant.OTHER, policy));
    }

    private String standing(Policy policy) {
        return words.word(
                "policy.other.standing",
                figure(PolicyConstant.WATCH, policy),
                figure(PolicyConstant.STRAINED, policy),
                figure(PolicyConstant.CRITICAL, policy));
    }

    private String figure(PolicyConstant constant, Policy policy) {
        return words.figure(constant, policy);
    }
}
