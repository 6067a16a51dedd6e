package org.merewarden.advice;

import java.time.LocalDate;
import java.time.LocalDateTime;
import java.time.LocalTime;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import java.util.Set;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.policy.LimitArithmetic;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.RightView;
import org.merewarden.web.Figures;
import org.merewarden.web.OfficeSettings;
import org.merewarden.web.Seasons;
import org.springframework.stereotype.Component;
import org.springframework.validation.Errors;

/** What must hang together in a limit as it is typed; each rule is answered at the field that a reader would change. */
@Component
class LimitRules {
    /** Shown in full: the difference may be small. */
    private static final int DIGITS = 12;

    private static final double WHOLE = 1e-9;

    private final Limits limits;
    private final Register register;
    private final Seasons seasons;
    private final OfficeSettings settings;

    LimitRules(Limits limits, Register register, Seasons seasons, OfficeSettings settings) {
        this.limits = limits;
        this.register = register;
        this.seasons = seasons;
        this.settings = settings;
    }

    /** A draft may still lack its words and its day of review. */
    void check(LimitForm form, long stockId, Optional<Adviser.Advice> advice, boolean draft, Errors errors) {
        amounts(form, errors);
        days(form, errors);
        if (form.revision()) {
            revision(form, stockId, errors);
        }
        if (!draft && form.reason == null) {
            errors.rejectValue("reason", "advice.form.reason.needed");
        }
        advice.ifPresent(a -> recommended(form, a, draft, errors));
        if (form.byHand()) {
            hand(form, stockId, errors);
        }
    }

    private static void amounts(LimitForm form, Errors errors) {
        Double amount = form.amount;
        boolean unread = errors.hasFieldErrors("amount");
        if (amount == null && !unread && !"measures only".equals(form.kind)) {
            errors.rejectValue("amount", "advice.form.amount.needed");
        }
        if (form.catchLimit() && amount != null && !unread && form.setAsides() > amount) {
            errors.rejectValue("subsistence", "advice.form.setAside.sum");
        }
    }

    private static void days(LimitForm form, Errors errors) {
        LocalDate from = form.validFrom;
        LocalDate to = form.validTo;
        if (!withinReason(from) || !withinReason(to)) {
            errors.rejectValue("validTo", "advice.form.date.range");
        } else if (from != null && to != null && from.isAfter(to)) {
            errors.rejectValue("validTo", "advice.form.date.order");
        }
        LocalDate review = form.reviewBy;
        if (review == null || from == null || to == null || errors.hasFieldErrors("validTo")) {
            return;
        }
        LocalDate last = to.plusYears(1);
        if (review.isBefore(from) || review.isAfter(last)) {
            Object[] days = {Figures.date(review), Figures.date(from), Figures.date(last)};
            errors.rejectValue("reviewBy", "advice.form.review.range", days, null);
        }
    }

    private static boolean withinReason(@Nullable LocalDate date) {
        return date == null || (date.getYear() >= 1800 && date.getYear() <= 2201);
    }

    private void revision(LimitForm form, long stockId, Errors errors) {
        if (form.season != null && limits.inForce(stockId, form.season).isEmpty()) {
            errors.rejectValue("season", "advice.form.revision.nothing", new Object[] {season(form.season)}, null);
        }
        if (form.season != null && !errors.hasFieldErrors("season")) {
            moment(form.season, "effectiveDate", form.effectiveDate, form.effectiveTime, errors);
        }
    }

    /** A day of the season and an hour that the office's clocks show. */
    void moment(int season, String field, @Nullable LocalDate day, @Nullable LocalTime time, Errors errors) {
        if (errors.hasFieldErrors(field)) {
            return;
        }
        if (day == null || time == null) {
            errors.rejectValue(field, "advice.form.moment.needed");
            return;
        }
        LocalDate first = seasons.start(season);
        LocalDate last = seasons.end(season);
        if (day.isBefore(first) || day.isAfter(last)) {
            Object[] days = {Figures.date(day), season(season), Figures.date(first), Figures.date(last)};
            errors.rejectValue(field, "advice.form.moment.season", days, null);
        } else if (settings.zone()
                .getRules()
                .getValidOffsets(LocalDateTime.of(day, time))
                .isEmpty()) {
            errors.rejectValue(field, "advice.form.moment.none", new Object[] {time, Figures.date(day)}, null);
        }
    }

    private static String season(int season) {
        return Integer.toString(season);
    }

    private static void recommended(LimitForm form, Adviser.Advice advice, boolean draft, Errors errors) {
        if (draft || form.amount == null || "measures only".equals(form.kind)) {
            return;
        }
        if (form.catchLimit()
                && form.differenceReason == null
                && Recommendations.differs(form.amount, advice.limitTonnes())) {
            Object[] amounts = {full(advice.limitTonnes()), full(form.amount)};
            errors.rejectValue("differenceReason", "advice.form.difference.needed", amounts, null);
        }
        if (advice.provisional() && form.reviewBy == null && !errors.hasFieldErrors("reviewBy")) {
            errors.rejectValue("reviewBy", "advice.form.review.needed");
        }
    }

    private static String full(double tonnes) {
        return Figures.digits(tonnes, DIGITS) + "\u00a0t";
    }

    private void hand(LimitForm form, long stockId, Errors errors) {
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
                Object[] said = {name, Figures.digits(kilograms, DIGITS)};
                errors.rejectValue(field(id), "advice.form.hand.whole", said, null);
            }
        });
        if (!errors.hasFieldErrors()) {
            handSum(form, names, errors);
        }
    }

    private static boolean wholeKilograms(double kilograms) {
        return kilograms >= 0 && kilograms <= 1e10 && kilograms == Math.rint(kilograms);
    }

    private static void handSum(LimitForm form, Map<Long, String> names, Errors errors) {
        double sum =
                form.hand.values().stream().mapToDouble(Objects::requireNonNull).sum();
        double logged = 1000
                * LimitArithmetic.toBeLogged(
                        Objects.requireNonNull(form.amount),
                        form.setAsides(),
                        Objects.requireNonNull(form.reportedFraction));
        if (sum > logged * (1 + WHOLE) + WHOLE) {
            Object[] sums = {Figures.digits(sum, DIGITS) + "\u00a0kg", Figures.digits(logged, DIGITS) + "\u00a0kg"};
            errors.rejectValue(field(names.keySet().iterator().next()), "advice.form.hand.sum", sums, null);
        }
    }

    static String field(long cooperativeId) {
        return "hand[" + cooperativeId + "]";
    }
}
