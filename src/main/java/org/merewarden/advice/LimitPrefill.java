package org.merewarden.advice;

import java.time.Clock;
import java.time.Instant;
import java.time.LocalDate;
import java.time.LocalDateTime;
import java.time.temporal.ChronoUnit;
import java.util.Comparator;
import java.util.List;
import java.util.Optional;
import java.util.UUID;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.policy.LimitArithmetic;
import org.merewarden.core.policy.Policy;
import org.merewarden.web.OfficeSettings;
import org.merewarden.web.Seasons;
import org.springframework.stereotype.Component;

/** Fills the form in with what is known, so that the usual limit takes a look and a reason. */
@Component
class LimitPrefill {

    private final PolicyStore policies;
    private final LimitStore limits;
    private final Seasons seasons;
    private final OfficeSettings settings;
    private final Clock clock;

    LimitPrefill(PolicyStore policies, LimitStore limits, Seasons seasons, OfficeSettings settings, Clock clock) {
        this.policies = policies;
        this.limits = limits;
        this.seasons = seasons;
        this.settings = settings;
        this.clock = clock;
    }

    /**
     * What a form is filled in from.
     *
     * @param last the latest limit up to the season that has taken effect, was not withdrawn and is no closure
     * @param setAsides the written rule's, where it sets anything aside and recommends an amount
     */
    record Sources(
            int season,
            Optional<Adviser.Advice> advice,
            Optional<LimitFile> last,
            Optional<Policy.SetAsides> setAsides) {
        /** The last limit's set-asides may be kept. */
        boolean lastSetAsides() {
            return setAsides.isEmpty()
                    && last.isPresent()
                    && last.get().limit().kind().equals("catch")
                    && advice.map(a -> last.get().limit().setAsidesTonnes() <= a.limitTonnes())
                            .orElse(true);
        }
    }

    Sources sources(int season, Optional<Adviser.Advice> advice, List<LimitFile> files) {
        Instant now = clock.instant();
        Optional<LimitFile> last = files.stream()
                .filter(file ->
                        file.limit().season() <= season && !file.limit().terms().closure())
                .filter(file -> !file.state().equals(LimitWriter.WITHDRAWN))
                .filter(file -> !effective(file).isAfter(now))
                .max(Comparator.comparing((LimitFile file) -> file.limit().season())
                        .thenComparing(file -> effective(file)));
        Optional<Policy.SetAsides> shares = advice.map(a ->
                        Policies.find(policies.all(), a.policyNumber()).policy().setAsides())
                .filter(s -> s.subsistence() + s.angling() + s.research() + s.other() > 0);
        return new Sources(season, advice, last, shares);
    }

    private static Instant effective(LimitFile file) {
        LimitHistory.Decision issued = issued(file);
        return issued == null ? Instant.MAX : issued.effectiveAt();
    }

    private static LimitHistory.@Nullable Decision issued(LimitFile file) {
        return file.acts().stream()
                .filter(act -> act.act().equals(LimitWriter.ISSUED))
                .findFirst()
                .orElse(null);
    }

    /** The next limit: the recommendation for the season, on the last limit's terms. */
    LimitForm season(Sources sources) {
        LimitForm form = new LimitForm();
        form.key = UUID.randomUUID().toString();
        sources.last().ifPresent(last -> terms(form, last.limit(), sources.lastSetAsides()));
        form.legalBasis = form.legalBasis == null ? usual(OfficeSettings.LEGAL_BASIS) : form.legalBasis;
        form.objection = form.objection == null ? usual(OfficeSettings.OBJECTION) : form.objection;
        form.season = sources.season();
        form.validFrom = seasons.start(sources.season());
        form.validTo = seasons.end(sources.season());
        sources.advice().ifPresent(advice -> {
            form.kind = "catch";
            form.unit = "t";
            form.amount = advice.limitTonnes();
            sources.setAsides().ifPresent(shares -> setAsides(form, shares, advice.limitTonnes()));
        });
        return form;
    }

    /** What the office says of every limit; null where it says nothing. */
    private @Nullable String usual(String setting) {
        String text = settings.get(setting);
        return text.isBlank() ? null : text;
    }

    /** The limit of the season once more, to be changed from the next full hour on. */
    LimitForm revision(Sources sources) {
        LimitForm form = season(sources);
        form.purpose = Terms.REVISION;
        sources.last().ifPresent(last -> {
            terms(form, last.limit(), true);
            form.amount = last.limit().amount();
        });
        LocalDateTime next = nextHour();
        LocalDate first = seasons.start(sources.season());
        form.effectiveDate = next.toLocalDate().isBefore(first) ? first : next.toLocalDate();
        form.effectiveTime = next.toLocalTime();
        return form;
    }

    /** A closure from the next full hour on. */
    ClosureForm closure() {
        ClosureForm form = new ClosureForm();
        form.closeKey = UUID.randomUUID().toString();
        form.closeOn = nextHour().toLocalDate();
        form.closeAt = nextHour().toLocalTime();
        return form;
    }

    private LocalDateTime nextHour() {
        return LocalDateTime.now(clock.withZone(settings.zone())).plusHours(1).truncatedTo(ChronoUnit.HOURS);
    }

    /** A draft, to be gone on with. */
    LimitForm draft(LimitFile draft) {
        NewLimit limit = draft.limit();
        LimitForm form = new LimitForm();
        form.key = UUID.randomUUID().toString();
        form.draft = draft.id();
        form.season = limit.season();
        terms(form, limit, true);
        form.amount = limit.amount();
        form.validFrom = limit.validFrom();
        form.validTo = limit.validTo();
        form.reason = draft.first().reason();
        form.purpose = limit.terms().purpose();
        form.differenceReason = limit.terms().differenceReason();
        form.reviewBy = limit.terms().reviewBy();
        Instant effective = limit.terms().effectiveAt();
        if (effective != null) {
            form.effectiveDate = effective.atZone(settings.zone()).toLocalDate();
            form.effectiveTime = effective.atZone(settings.zone()).toLocalTime();
        }
        limits.allocationsOf(draft.id()).forEach(a -> form.hand.put(a.cooperativeId(), (double) a.amountKg()));
        return form;
    }

    private static void terms(LimitForm form, NewLimit limit, boolean withSetAsides) {
        form.kind = limit.kind();
        form.unit = limit.unit();
        form.reportedFraction = limit.reportedFraction();
        form.measures = limit.measures();
        form.legalBasis = limit.legalBasis();
        form.objection = limit.objection();
        if (withSetAsides) {
            form.subsistence = limit.subsistenceTonnes();
            form.angling = limit.anglingTonnes();
            form.research = limit.researchTonnes();
            form.other = limit.otherTonnes();
        }
    }

    private static void setAsides(LimitForm form, Policy.SetAsides shares, double tonnes) {
        form.subsistence = LimitArithmetic.setAside(shares.subsistence(), tonnes);
        form.angling = LimitArithmetic.setAside(shares.angling(), tonnes);
        form.research = LimitArithmetic.setAside(shares.research(), tonnes);
        form.other = LimitArithmetic.setAside(shares.other(), tonnes);
    }
}
