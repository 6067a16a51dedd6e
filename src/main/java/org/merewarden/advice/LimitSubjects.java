package org.merewarden.advice;

import org.jspecify.annotations.Nullable;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Cells;
import org.springframework.stereotype.Component;

/** How limits are named in the record of who did what: in full, since it is read long after. */
@Component
class LimitSubjects {
    private final Register register;
    private final Limits limits;

    LimitSubjects(Register register, Limits limits) {
        this.register = register;
        this.limits = limits;
    }

    String subject(long id, NewLimit limit) {
        StockView stock = register.stock(limit.stockId()).orElseThrow();
        return "notice " + id + ", " + stock.title() + ", season " + limit.season();
    }

    String describe(NewLimit limit) {
        String setAsides =
                limit.setAsidesTonnes() > 0 ? ", set aside " + Cells.plain(limit.setAsidesTonnes()) + " t" : "";
        return amount(limit.terms().purpose(), limit.kind(), limit.amount(), limit.unit()) + setAsides;
    }

    /** What is in force where the limit would be. */
    String standing(NewLimit limit) {
        return limits.inForce(limit.stockId(), limit.season())
                .map(l -> "in force: " + amount(l.purpose(), l.kind(), l.amount(), l.unit()) + ", notice " + l.id())
                .orElse("no limit in force");
    }

    private static String amount(String purpose, String kind, @Nullable Double amount, String unit) {
        return (purpose.equals(Terms.SEASON) ? "" : purpose + ", ")
                + (amount == null ? kind : Cells.plain(amount) + " " + unit);
    }
}
