package org.merewarden.advice;

import java.util.ArrayList;
import java.util.List;
import org.merewarden.core.policy.Policy;
import org.merewarden.web.Figures;
import org.merewarden.web.Texts;
import org.springframework.stereotype.Component;

/** Names, figures and ranges of the rule's constants. */
@Component
class PolicyWords {
    /** As many digits as a constant can be told apart by: nothing is rounded that somebody has decided on. */
    private static final int DIGITS = 15;

    private final Texts texts;

    PolicyWords(Texts texts) {
        this.texts = texts;
    }

    String word(String key, Object... arguments) {
        return texts.of(key, arguments);
    }

    String name(PolicyConstant constant) {
        return word("policy.constant." + constant.key);
    }

    String figure(PolicyConstant constant, Policy policy) {
        return figure(constant, constant.shown(policy));
    }

    /** @param typed in the constant's unit */
    String figure(PolicyConstant constant, double typed) {
        return word("policy.unit." + constant.unit, Figures.digits(typed, DIGITS), typed == 1 ? 1 : 2);
    }

    /** "more than 0 and at most 100 %". */
    String range(PolicyConstant constant) {
        PolicyConstant.Range range = constant.range;
        return word(
                "policy.range." + range.kind(),
                Figures.digits(range.low(), 6),
                figure(constant, rounded(range.high())));
    }

    /** 100/e to the digits that people type. */
    private static double rounded(double bound) {
        return Math.floor(bound * 1e4) / 1e4;
    }

    String line(Policy policy) {
        return word("policy.line." + policy.ramp().line());
    }

    /** The constants of the policy that are others in the other one: "Tolerance of risk 10 %". */
    String changed(Policy policy, Policy other) {
        List<String> changed = new ArrayList<>();
        if (policy.ramp().line() != other.ramp().line()) {
            changed.add(word("policy.constant.line") + " " + line(policy));
        }
        for (PolicyConstant constant : PolicyConstant.values()) {
            if (constant.shown(policy) != constant.shown(other)) {
                changed.add(name(constant) + " " + figure(constant, policy));
            }
        }
        return changed.isEmpty() ? word("policy.changed.nothing") : String.join(", ", changed);
    }
}
