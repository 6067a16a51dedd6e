package org.merewarden.advice;

import java.math.BigDecimal;
import java.util.Arrays;
import java.util.List;
import java.util.Objects;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.policy.Policy;
import org.springframework.stereotype.Component;
import org.springframework.validation.BindingResult;

/** Every rule that a proposed version must keep, each answered at its field with the value and the rule. */
@Component
class PolicyFormCheck {
    /** The errors' code; every one brings its own text. */
    private static final String RULE = "rule";

    private final PolicyWords words;

    PolicyFormCheck(PolicyWords words) {
        this.words = words;
    }

    void check(PolicyForm form, BindingResult result) {
        for (PolicyConstant constant : PolicyConstant.values()) {
            String field = PolicyForm.field(constant);
            String problem = result.hasFieldErrors(field) ? null : problem(constant, form.typed(constant));
            if (problem != null) {
                result.rejectValue(field, RULE, problem);
            }
        }
        if (Arrays.stream(Policy.Line.values()).noneMatch(l -> l.name().equals(form.line))) {
            result.rejectValue("line", RULE, words.word("policy.form.line"));
        }
        if (form.reason == null) {
            result.rejectValue("reason", RULE, words.word("policy.form.reason.needed"));
        } else if (form.reason.length() > Decisions.LONGEST_REASON) {
            result.rejectValue("reason", RULE, words.word("policy.form.reason.long", form.reason.length()));
        }
        order(form, result, PolicyConstant.LOW, PolicyConstant.HIGH);
        order(form, result, PolicyConstant.WATCH, PolicyConstant.STRAINED);
        order(form, result, PolicyConstant.STRAINED, PolicyConstant.CRITICAL);
        setAsides(form, result);
    }

    private @Nullable String problem(PolicyConstant constant, @Nullable Double typed) {
        String name = words.name(constant);
        if (typed == null) {
            return words.word("policy.form.needed", name, words.range(constant));
        }
        if (!constant.range.holds(typed)) {
            return words.word("policy.form.range", name, words.figure(constant, typed), words.range(constant));
        }
        if (constant.unit == PolicyConstant.Unit.SEASONS && typed != Math.rint(typed)) {
            return words.word("policy.form.whole", name, words.figure(constant, typed));
        }
        return null;
    }

    private void order(PolicyForm form, BindingResult result, PolicyConstant lower, PolicyConstant upper) {
        Double low = form.typed(lower);
        Double high = form.typed(upper);
        if (low != null && high != null && !result.hasFieldErrors(PolicyForm.field(upper)) && low >= high) {
            result.rejectValue(
                    PolicyForm.field(upper),
                    RULE,
                    words.word(
                            "policy.form.order",
                            words.name(upper),
                            words.figure(upper, high),
                            words.name(lower),
                            words.figure(lower, low)));
        }
    }

    private void setAsides(PolicyForm form, BindingResult result) {
        List<PolicyConstant> parts = List.of(
                PolicyConstant.SUBSISTENCE, PolicyConstant.ANGLING, PolicyConstant.RESEARCH, PolicyConstant.OTHER);
        BigDecimal sum = parts.stream()
                .map(form::typed)
                .filter(Objects::nonNull)
                .map(BigDecimal::valueOf)
                .reduce(BigDecimal.ZERO, BigDecimal::add);
        boolean eachHolds = parts.stream().noneMatch(p -> result.hasFieldErrors(PolicyForm.field(p)));
        if (eachHolds && sum.compareTo(BigDecimal.valueOf(100)) > 0) {
            result.rejectValue(
                    PolicyForm.field(PolicyConstant.SUBSISTENCE),
                    RULE,
                    words.word("policy.form.setAsides", words.figure(PolicyConstant.SUBSISTENCE, sum.doubleValue())));
        }
    }
}
