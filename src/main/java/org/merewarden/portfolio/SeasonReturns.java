package org.merewarden.portfolio;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.HashSet;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.Set;
import java.util.function.Function;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.ClosedLimits;
import org.merewarden.advice.LimitView;
import org.merewarden.advice.Limits;
import org.merewarden.portfolio.SeasonReturn.Place;
import org.merewarden.records.RecordedCatches;
import org.merewarden.season.LoggedRemovals;
import org.merewarden.season.LoggedRemovals.Logged;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.Species;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Seasons;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Service;

/**
 * Gathers a season's return with a fixed number of statements. A stock's sector is told by the catch on record for it;
 * where none is recorded, as in a season in progress, by what is logged so far, never by both.
 */
@Service
class SeasonReturns {
    private final Register register;
    private final RecordedCatches recorded;
    private final LoggedRemovals log;
    private final Limits limits;
    private final ClosedLimits closed;
    private final Seasons seasons;

    SeasonReturns(
            Register register,
            RecordedCatches recorded,
            LoggedRemovals log,
            Limits limits,
            ClosedLimits closed,
            Seasons seasons) {
        this.register = register;
        this.recorded = recorded;
        this.log = log;
        this.limits = limits;
        this.closed = closed;
        this.seasons = seasons;
    }

    int presentSeason() {
        return limits.presentSeason();
    }

    SeasonReturn of(int season) {
        Map<Long, Place> places = places();
        Map<Long, LimitView> inForce =
                limits.inForce(season).stream().collect(Collectors.toMap(LimitView::stockId, Function.identity()));
        Map<Long, LimitView> beforeClosure = closed.before(season);
        List<Logged> logged = log.ofSeason(season);
        return new SeasonReturn(
                season,
                seasons.current() > season,
                removals(season, places, logged),
                places.values().stream()
                        .map(p -> limited(p, inForce.get(p.stock()), beforeClosure.get(p.stock())))
                        .toList(),
                logged.stream()
                        .filter(l -> l.stockId() == null)
                        .mapToDouble(Logged::tonnes)
                        .sum(),
                lastLanding(logged));
    }

    /** Of a stock closed early the amount that was allowed until then is told, not the 0 t of the closure. */
    private static SeasonReturn.Limited limited(
            Place place, @Nullable LimitView inForce, @Nullable LimitView beforeClosure) {
        if (inForce == null || !inForce.closure()) {
            return new SeasonReturn.Limited(place, inForce, null);
        }
        LocalDate on = LocalDate.ofInstant(
                inForce.effectiveAt(), LocaleContextHolder.getTimeZone().toZoneId());
        return new SeasonReturn.Limited(place, beforeClosure == null ? inForce : beforeClosure, on);
    }

    private List<SeasonReturn.Removal> removals(int season, Map<Long, Place> places, List<Logged> logged) {
        List<SeasonReturn.Removal> removals = new ArrayList<>();
        Set<String> told = new HashSet<>();
        recorded.ofSeason(season).forEach(r -> {
            told.add(r.stockId() + r.sector());
            removals.add(new SeasonReturn.Removal(
                    known(places, r.stockId()), r.sector(), r.catchTonnes(), r.correctedTonnes(), false));
        });
        for (Logged l : logged) {
            Long stock = l.stockId();
            if (stock != null && !told.contains(stock + l.sector())) {
                removals.add(new SeasonReturn.Removal(known(places, stock), l.sector(), l.tonnes(), null, true));
            }
        }
        return removals;
    }

    /** By stock. A species goes by its English name, whatever the waters call it. */
    private Map<Long, Place> places() {
        Map<String, String> names =
                register.species().stream().collect(Collectors.toMap(Species::code, Species::englishName));
        Map<Long, Place> places = new LinkedHashMap<>();
        for (StockView s : register.stocks()) {
            String species = names.getOrDefault(s.species(), s.speciesName());
            places.put(s.id(), new Place(s.id(), Objects.requireNonNullElse(s.district(), ""), species));
        }
        return places;
    }

    private static Place known(Map<Long, Place> places, long id) {
        return Objects.requireNonNull(places.get(id), () -> "a record names stock " + id + ", which is not registered");
    }

    private static @Nullable LocalDate lastLanding(List<Logged> logged) {
        return logged.stream()
                .map(Logged::lastLanding)
                .max(Comparator.naturalOrder())
                .orElse(null);
    }
}
