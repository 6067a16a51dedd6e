package org.merewarden.advice;

import java.time.Clock;
import java.time.Duration;
import java.time.LocalDate;
import java.time.LocalDateTime;
import java.time.LocalTime;
import java.time.ZoneId;
import java.util.Optional;
import java.util.UUID;
import org.jspecify.annotations.Nullable;
import org.merewarden.web.Figures;
import org.merewarden.web.OfficeSettings;
import org.merewarden.web.Seasons;
import org.springframework.stereotype.Component;
import org.springframework.validation.Errors;

/** What must hang together in a limit as it is typed; each rule is answered at the field that a reader would change. */
@Component
class LimitRules {
    /** Shown in full: the difference may be small. */
    static final int DIGITS = 12;

    /** Between the filling in and the sending of a form. */
    private static final Duration GRACE = Duration.ofHours(1);

    private final Limits limits;
    private final HandRules hands;
    private final Seasons seasons;
    private final OfficeSettings settings;
    private final Clock clock;

    LimitRules(Limits limits, HandRules hands, Seasons seasons, OfficeSettings settings, Clock clock) {
        this.limits = limits;
        this.hands = hands;
        this.seasons = seasons;
        this.settings = settings;
        this.clock = clock;
    }

    /** A draft may still lack its words and its day of review. */
    void check(LimitForm form, long stockId, Optional<Adviser.Advice> advice, boolean draft, Errors errors) {
        form.key = key(form.key, errors);
        amounts(form, errors);
        unit(form, errors);
        days(form, errors);
        if (form.revision()) {
            revision(form, stockId, errors);
        } else {
            notLongPast(form, errors);
        }
        if (!draft && form.reason == null) {
            errors.rejectValue("reason", "advice.form.reason.needed");
        }
        advice.ifPresent(a -> recommended(form, a, draft, errors));
        if (form.byHand()) {
            hands.check(form, stockId, errors);
        }
    }

    /** The form's key; one that came without is given one and goes back, for it could be stored twice. */
    String key(@Nullable String given, Errors errors) {
        if (given == null) {
            errors.reject("advice.form.key.needed");
            return UUID.randomUUID().toString();
        }
        return given;
    }

    private static void amounts(LimitForm form, Errors errors) {
        Double amount = form.amount;
        boolean unread = errors.hasFieldErrors("amount");
        if (amount == null && !unread && !"measures only".equals(form.kind)) {
            errors.rejectValue("amount", "advice.form.amount.needed");
        }
        if ("measures only".equals(form.kind) && form.measures == null) {
            errors.rejectValue("measures", "advice.form.measures.needed");
        }
        if (form.catchLimit() && amount != null && !unread && form.setAsides() > amount) {
            errors.rejectValue("subsistence", "advice.form.setAside.sum");
        }
    }

    private static void unit(LimitForm form, Errors errors) {
        String unit = form.unit;
        boolean tonnes = unit == null || unit.equalsIgnoreCase("t");
        if ("effort".equals(form.kind) && tonnes) {
            errors.rejectValue("unit", "advice.form.unit.effort", new Object[] {unit == null ? "" : unit}, null);
        } else if (form.catchLimit() && !tonnes) {
            errors.rejectValue("unit", "advice.form.unit.catch", new Object[] {unit}, null);
        }
    }

    private void notLongPast(LimitForm form, Errors errors) {
        if (form.season != null && !errors.hasFieldErrors("season") && form.season < seasons.current() - 1) {
            Object[] said = {season(form.season), season(seasons.current())};
            errors.rejectValue("season", "advice.form.season.past", said, null);
        }
    }

    private void days(LimitForm form, Errors errors) {
        LocalDate from = form.validFrom;
        LocalDate to = form.validTo;
        if (!withinReason(from) || !withinReason(to)) {
            errors.rejectValue("validTo", "advice.form.date.range");
        } else if (from != null && to != null && from.isAfter(to)) {
            errors.rejectValue("validTo", "advice.form.date.order");
        } else if (from != null && to != null && form.season != null && !errors.hasFieldErrors("season")) {
            overlap(form.season, from, to, errors);
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

    private void overlap(int season, LocalDate from, LocalDate to, Errors errors) {
        LocalDate first = seasons.start(season);
        LocalDate last = seasons.end(season);
        if (to.isBefore(first) || from.isAfter(last)) {
            Object[] said = {
                Figures.date(from), Figures.date(to), season(season), Figures.date(first), Figures.date(last)
            };
            errors.rejectValue("validFrom", "advice.form.date.season", said, null);
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

    /** A day of the season and an hour that the office's clocks show, and that does not lie behind. */
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
            return;
        }
        LocalDateTime moment = day.atTime(time);
        ZoneId zone = settings.zone();
        if (zone.getRules().getValidOffsets(moment).isEmpty()) {
            errors.rejectValue(field, "advice.form.moment.none", new Object[] {time, Figures.date(day)}, null);
        } else if (moment.atZone(zone).toInstant().isBefore(clock.instant().minus(GRACE))) {
            errors.rejectValue(field, "advice.form.moment.past", new Object[] {time, Figures.date(day)}, null);
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
}
