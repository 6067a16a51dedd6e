package org.merewarden.sharing;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.function.Function;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.AllocationView;
import org.merewarden.advice.ClosedLimits;
import org.merewarden.advice.LimitView;
import org.merewarden.advice.Limits;
import org.merewarden.advice.PolicyInForce;
import org.merewarden.advice.StandingView;
import org.merewarden.advice.Standings;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.season.CooperativeLandingView;
import org.merewarden.season.CooperativeLandings;
import org.merewarden.season.UptakeView;
import org.merewarden.season.Uptakes;
import org.merewarden.waterbody.CooperativeView;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.RightView;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.merewarden.web.NotFound;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;

/**
 * What one cooperative sees: for each of its stocks what it may still take and why. Its own landings only; of the others
 * nothing but whether the whole limit is used up, which it has to know before it goes out.
 *
 * <p>Sums over fewer than three fishers are to be withheld; the log names cooperatives and no fishers, so no sum here is
 * one of persons.
 */
@Component
class CooperativePage {
    private static final int LATEST = 20;

    private final Register register;
    private final Limits limits;
    private final ClosedLimits closed;
    private final Standings standings;
    private final Assessments assessments;
    private final Uptakes uptakes;
    private final CooperativeLandings landings;
    private final PolicyInForce policies;
    private final MessageSource messages;

    CooperativePage(
            Register register,
            Limits limits,
            ClosedLimits closed,
            Standings standings,
            Assessments assessments,
            Uptakes uptakes,
            CooperativeLandings landings,
            PolicyInForce policies,
            MessageSource messages) {
        this.register = register;
        this.limits = limits;
        this.closed = closed;
        this.standings = standings;
        this.assessments = assessments;
        this.uptakes = uptakes;
        this.landings = landings;
        this.policies = policies;
        this.messages = messages;
    }

    /** @param bar a drawing, empty where the stock is not assessed */
    record Block(String title, List<String> answer, boolean stop, String bar, List<String> why, List<String> terms) {}

    record Landing(String date, String slip, String what, String landed, String live, String fate) {}

    record Content(String cooperative, int season, List<Block> blocks, List<Landing> landings) {}

    /**
     * What is known of one stock, for one cooperative. Tonnes.
     *
     * @param limit in force; a closure, where the stock was closed
     * @param beforeClosure what was allowed until then
     * @param limitFraction B lim / K of the policy in force
     */
    private record Known(
            StockView stock,
            @Nullable LimitView limit,
            @Nullable LimitView beforeClosure,
            @Nullable AllocationView allocation,
            @Nullable AssessmentView assessment,
            @Nullable StandingView standing,
            double limitFraction,
            double ownTaken,
            double allTaken) {
        boolean closed() {
            return limit != null && limit.closure();
        }
    }

    Content of(long cooperativeId) {
        CooperativeView cooperative = register.cooperatives().stream()
                .filter(c -> c.id() == cooperativeId)
                .findFirst()
                .orElseThrow(() -> new NotFound("share view"));
        int season = limits.presentSeason();
        LocalDate recorded = landings.recordedUpTo(cooperativeId, season).orElse(null);
        Map<Long, StockView> stocks = byKey(register.stocks(), StockView::id);
        List<Block> blocks = known(cooperativeId, season, stocks).stream()
                .map(known -> block(known, recorded))
                .toList();
        return new Content(cooperative.name(), season, blocks, own(cooperativeId, season, stocks));
    }

    private List<Known> known(long cooperativeId, int season, Map<Long, StockView> stocks) {
        var limitOf = byKey(limits.inForce(season), LimitView::stockId);
        var beforeOf = closed.before(season);
        var allocationOf = byKey(
                limits.allocations(season).stream()
                        .filter(a -> a.cooperativeId() == cooperativeId)
                        .toList(),
                AllocationView::stockId);
        var assessmentOf = byKey(assessments.latest(), AssessmentView::stockId);
        var standingOf = byKey(standings.all(), StandingView::stockId);
        var uptakeOf = byKey(uptakes.ofSeason(season), UptakeView::stockId);
        Map<Long, Double> own = landings.takenKg(cooperativeId, season);
        double limitFraction = policies.policy().limitFraction();
        List<Known> all = new ArrayList<>();
        for (RightView right : register.rightsOfCooperative(cooperativeId)) {
            long id = right.stockId();
            StockView stock = stocks.get(id);
            UptakeView uptake = uptakeOf.get(id);
            if (stock != null) {
                all.add(new Known(
                        stock,
                        limitOf.get(id),
                        beforeOf.get(id),
                        allocationOf.get(id),
                        assessmentOf.get(id),
                        standingOf.get(id),
                        limitFraction,
                        own.getOrDefault(id, 0.0) / 1000,
                        uptake == null ? 0 : uptake.takenKg() / 1000));
            }
        }
        return all;
    }

    private static <T> Map<Long, T> byKey(List<T> all, Function<T, Long> key) {
        return all.stream().collect(Collectors.toMap(key, Function.identity()));
    }

    private Block block(Known known, @Nullable LocalDate recorded) {
        LimitView limit = known.limit;
        Double toBeLogged = limit == null ? null : limit.toBeLoggedTonnes();
        boolean usedUp = !known.closed() && toBeLogged != null && known.allTaken >= toBeLogged;
        List<String> answer = new ArrayList<>();
        if (limit != null && known.closed()) {
            answer.add(word("sharing.closed", Figures.dateTime(limit.effectiveAt())));
        }
        if (usedUp) {
            answer.add(word("sharing.all-used"));
        }
        answer.addAll(answer(known, recorded, usedUp));
        return new Block(known.stock.title(), answer, usedUp || known.closed(), bar(known), why(known), terms(limit));
    }

    private List<String> answer(Known known, @Nullable LocalDate recorded, boolean usedUp) {
        String taken = weight(known.ownTaken);
        String upTo = recorded == null ? word("sharing.no-record") : word("sharing.up-to", Figures.date(recorded));
        if (known.limit == null) {
            return List.of(word("sharing.no-limit"), word("sharing.taken", taken, upTo));
        }
        if (known.closed()) {
            return List.of(word("sharing.taken", taken, upTo));
        }
        if (known.allocation == null) {
            return List.of(word("sharing.taken", taken, upTo), word("sharing.not-allocated"));
        }
        double allocated = known.allocation.amountKg() / 1000.0;
        List<String> answer = new ArrayList<>();
        answer.add(word("sharing.of-yours", taken, allocated(known.allocation), upTo));
        double left = allocated - known.ownTaken;
        if (left <= 0) {
            answer.add(word("sharing.own-used"));
        } else if (!usedUp) {
            answer.add(word("sharing.left", weight(left)));
            answer.add(word("sharing.earlier"));
        }
        return answer;
    }

    /** Kilograms below one tonne: that is what a scale at the landing place shows. */
    private static String weight(double tonnes) {
        return tonnes > 0 && tonnes < 1 ? Figures.withUnit(1000 * tonnes, "kg") : Figures.tonnes(tonnes);
    }

    /** A decided amount, in the unit of {@link #weight}. */
    private static String allocated(AllocationView allocation) {
        long kilograms = allocation.amountKg();
        return kilograms < 1000 ? Figures.whole(kilograms, "kg") : Figures.decided(kilograms / 1000.0);
    }

    private String bar(Known known) {
        Levels levels = levels(known);
        return levels == null
                ? ""
                : BiomassBar.svg(
                        levels.low,
                        levels.now,
                        levels.high,
                        levels.lessBelow,
                        levels.nothingBelow,
                        word("sharing.bar.less", Figures.tonnes(levels.lessBelow)),
                        word("sharing.bar.nothing", Figures.tonnes(levels.nothingBelow)),
                        word(
                                "sharing.bar.title",
                                Figures.tonnes(levels.now),
                                Figures.sig(levels.low),
                                Figures.tonnes(levels.high),
                                Figures.tonnes(levels.lessBelow),
                                Figures.tonnes(levels.nothingBelow)));
    }

    /** Tonnes; the two levels from the medians of the draws: BMSY = B ÷ (B/BMSY), B lim = the policy's part of K. */
    private record Levels(double low, double now, double high, double lessBelow, double nothingBelow) {}

    private static @Nullable Levels levels(Known known) {
        AssessmentView a = known.assessment;
        if (a == null || a.biomassTonnes() == null || a.bOverBmsy() == null || a.capacityTonnes() == null) {
            return null;
        }
        double now = a.biomassTonnes();
        return new Levels(
                Objects.requireNonNullElse(a.biomassLowTonnes(), now),
                now,
                Objects.requireNonNullElse(a.biomassHighTonnes(), now),
                now / a.bOverBmsy(),
                known.limitFraction * a.capacityTonnes());
    }

    private List<String> why(Known known) {
        List<String> why = new ArrayList<>();
        Levels levels = levels(known);
        if (levels == null) {
            why.add(word("sharing.why.unassessed"));
        } else {
            why.add(word(
                    levels.now < levels.lessBelow ? "sharing.why.under" : "sharing.why.above",
                    Figures.sig(levels.low),
                    Figures.tonnes(levels.high),
                    Figures.tonnes(levels.lessBelow)));
        }
        Double amount = known.limit == null ? null : known.limit.amountTonnes();
        if (known.limit != null && amount != null && !known.closed()) {
            why.add(word("sharing.why.limit", Figures.decided(amount), Figures.decided(known.limit.setAsidesTonnes())));
        }
        LimitView before = known.beforeClosure;
        if (known.closed() && before != null && before.amountTonnes() != null) {
            why.add(word("sharing.why.before-closure", Figures.decided(before.amountTonnes())));
        }
        StandingView standing = known.standing;
        if (standing != null && amount != null && standing.removalsBasis().equals("limit")) {
            why.add(word(
                    "sharing.why.risk",
                    Figures.tonnes(standing.removalsTonnes()),
                    Figures.chances(standing.collapseProbability())));
        }
        if (known.assessment != null && !known.assessment.settled()) {
            why.add(word("sharing.why.unsettled"));
        }
        return why;
    }

    private List<String> terms(@Nullable LimitView limit) {
        if (limit == null) {
            return List.of();
        }
        List<String> terms = new ArrayList<>();
        terms.add(word("sharing.terms.valid", Figures.date(limit.validFrom()), Figures.date(limit.validTo())));
        Double amount = limit.amount();
        if (limit.closure()) {
            terms.add(word("sharing.terms.closed", Figures.dateTime(limit.effectiveAt())));
        } else if (amount != null) {
            terms.add(word("sharing.terms.limit", Figures.decided(amount, limit.unit())));
        }
        add(terms, "sharing.terms.measures", limit.measures());
        add(terms, "sharing.terms.basis", limit.legalBasis());
        add(terms, "sharing.terms.objection", limit.objection());
        return terms;
    }

    private void add(List<String> terms, String key, @Nullable String text) {
        if (text != null && !text.isBlank()) {
            terms.add(word(key, text));
        }
    }

    private List<Landing> own(long cooperativeId, int season, Map<Long, StockView> stocks) {
        Map<String, String> titles =
                stocks.values().stream().collect(Collectors.toMap(StockView::key, StockView::title));
        return landings.latest(cooperativeId, season, LATEST).stream()
                .map(l -> landing(l, titles))
                .toList();
    }

    private Landing landing(CooperativeLandingView l, Map<String, String> titles) {
        String plain = l.speciesKey() + ", " + l.lake();
        String presentation = l.presentation().equals("whole") ? "" : " " + l.presentation();
        return new Landing(
                Figures.date(l.landedOn()),
                Objects.requireNonNullElse(l.slip(), ""),
                titles.getOrDefault(l.lake() + ":" + l.speciesKey(), plain),
                Figures.withUnit(l.weightKg(), "kg") + presentation,
                Figures.withUnit(l.liveWeightKg(), "kg"),
                word("season.fate." + l.fate()));
    }

    private String word(String key, @Nullable Object... values) {
        return messages.getMessage(key, values, LocaleContextHolder.getLocale());
    }
}
