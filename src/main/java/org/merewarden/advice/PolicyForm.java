package org.merewarden.advice;

import java.util.LinkedHashMap;
import java.util.Map;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.policy.Policy;

/** A version as it is typed: every constant in its own unit, per cent as per cent. */
class PolicyForm {
    /** By {@link PolicyConstant#key}. */
    public Map<String, @Nullable Double> values = new LinkedHashMap<>();

    public @Nullable String line;
    public @Nullable String reason;

    static PolicyForm of(Policy policy) {
        var form = new PolicyForm();
        form.line = policy.ramp().line().name();
        for (PolicyConstant constant : PolicyConstant.values()) {
            form.values.put(constant.key, constant.shown(policy));
        }
        return form;
    }

    @Nullable
    Double typed(PolicyConstant constant) {
        return values.get(constant.key);
    }

    /** Its name as a field of the form. */
    static String field(PolicyConstant constant) {
        return "values[" + constant.key + "]";
    }

    /** The policy that the checked form describes. */
    Policy toPolicy() {
        return new Policy(
                value(PolicyConstant.LIMIT_FRACTION),
                new Policy.Ramp(
                        Policy.Line.valueOf(String.valueOf(line)),
                        value(PolicyConstant.TARGET),
                        value(PolicyConstant.LOW),
                        value(PolicyConstant.HIGH)),
                value(PolicyConstant.QUANTILE),
                (int) value(PolicyConstant.HORIZON),
                value(PolicyConstant.TOLERANCE),
                value(PolicyConstant.STEADINESS),
                new Policy.LastSeason(value(PolicyConstant.CARRY_OVER), value(PolicyConstant.PAYBACK)),
                new Policy.SetAsides(
                        value(PolicyConstant.SUBSISTENCE),
                        value(PolicyConstant.ANGLING),
                        value(PolicyConstant.RESEARCH),
                        value(PolicyConstant.OTHER)),
                new Policy.Rounding(value(PolicyConstant.ROUNDING_SHARE), value(PolicyConstant.ROUNDING_LEAST)),
                new Policy.CutPoints(
                        value(PolicyConstant.WATCH), value(PolicyConstant.STRAINED), value(PolicyConstant.CRITICAL)),
                // nothing borrows across lakes yet: no choice to offer
                Policy.DEFAULT.pooled(),
                value(PolicyConstant.INTERVAL));
    }

    private double value(PolicyConstant constant) {
        Double typed = typed(constant);
        if (typed == null) {
            throw new IllegalStateException("not checked: " + constant);
        }
        return constant.stored(typed);
    }
}
