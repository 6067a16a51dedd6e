package org.merewarden.advice;

import java.util.Map;
import java.util.Objects;
import java.util.Set;
import java.util.stream.Collectors;
import org.merewarden.core.policy.LimitArithmetic;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.RightView;
import org.merewarden.web.Figures;
import org.springframework.stereotype.Component;
import org.springframework.validation.Errors;

/** What must hang together in an allocation by hand: whole kilograms for each right, together at most what is logged. */
@Component
class HandRules {
    private static final double WHOLE = 1e-9;

    private final Register register;

    HandRules(Register register) {
        this.register = register;
    }

    void check(LimitForm form, long stockId, Errors errors) {
        Map<Long, String> names = register.rightsOfStock(stockId).stream()
                .collect(Collectors.toMap(RightView::cooperativeId, RightView::cooperativeName));
        Set<Long> given = form.hand.keySet();
        given.stream()
                .filter(id -> !names.containsKey(id))
                .forEach(id ->
                        errors.rejectValue(field(id), "advice.form.hand.right", new Object[] {id.toString()}, null));
        names.forEach((id, name) -> {
            Double kilograms = form.hand.get(id);
            if (kilograms == null && !errors.hasFieldErrors(field(id))) {
                errors.rejectValue(field(id), "advice.form.hand.all", new Object[] {name}, null);
            } else if (kilograms != null && !wholeKilograms(kilograms)) {
                Object[] said = {name, Figures.digits(kilograms, LimitRules.DIGITS)};
                errors.rejectValue(field(id), "advice.form.hand.whole", said, null);
            }
        });
        if (!errors.hasFieldErrors()) {
            sum(form, names, errors);
        }
    }

    private static boolean wholeKilograms(double kilograms) {
        return kilograms >= 0 && kilograms <= 1e10 && kilograms == Math.rint(kilograms);
    }

    private static void sum(LimitForm form, Map<Long, String> names, Errors errors) {
        double sum =
                form.hand.values().stream().mapToDouble(Objects::requireNonNull).sum();
        double logged = 1000
                * LimitArithmetic.toBeLogged(
                        Objects.requireNonNull(form.amount),
                        form.setAsides(),
                        Objects.requireNonNull(form.reportedFraction));
        if (sum > logged * (1 + WHOLE) + WHOLE) {
            Object[] sums = {
                Figures.digits(sum, LimitRules.DIGITS) + "\u00a0kg",
                Figures.digits(logged, LimitRules.DIGITS) + "\u00a0kg"
            };
            errors.rejectValue(field(names.keySet().iterator().next()), "advice.form.hand.sum", sums, null);
        }
    }

    static String field(long cooperativeId) {
        return "hand[" + cooperativeId + "]";
    }
}
