package org.merewarden.advice;

import java.util.ArrayList;
import java.util.List;
import java.util.stream.Collectors;
import org.merewarden.core.policy.LimitArithmetic;
import org.merewarden.web.Figures;
import org.merewarden.web.Texts;
import org.springframework.stereotype.Component;

/** Every cooperative's part of a limit, and what is left of the amount to be logged where shares leave something. */
@Component
class NoticeParts {
    private final LimitStore limits;
    private final Texts texts;

    NoticeParts(LimitStore limits, Texts texts) {
        this.limits = limits;
        this.texts = texts;
    }

    List<Notice.Part> of(long limitId, NewLimit limit) {
        List<AllocationView> allocated = limits.allocationsOf(limitId);
        List<Notice.Part> parts = allocated.stream()
                .map(a -> new Notice.Part(
                        a.cooperativeName(), Figures.sig(a.sharePercent()) + " %", Figures.whole(a.amountKg(), "kg")))
                .collect(Collectors.toCollection(ArrayList::new));
        long left = kilograms(limit)
                - allocated.stream().mapToLong(AllocationView::amountKg).sum();
        if (!parts.isEmpty() && left > 0) {
            parts.add(new Notice.Part(texts.of("notice.unallocated"), "", Figures.whole(left, "kg")));
        }
        return parts;
    }

    /** The amount to be logged in whole kilograms; 0 where the limit is not in tonnes. */
    private static long kilograms(NewLimit limit) {
        Double amount = limit.amount();
        return limit.kind().equals("catch") && amount != null
                // a hair, so that 2.3 t are 2,300 kg
                ? (long) Math.floor(
                        1000 * LimitArithmetic.toBeLogged(amount, limit.setAsidesTonnes(), limit.reportedFraction())
                                + 1e-6)
                : 0;
    }
}
