package org.merewarden.portfolio;

import static java.util.stream.Collectors.groupingBy;
import static java.util.stream.Collectors.toMap;

import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.function.Function;
import org.merewarden.advice.ClosedLimits;
import org.merewarden.advice.LimitView;
import org.merewarden.advice.Limits;
import org.merewarden.advice.StandingView;
import org.merewarden.advice.Standings;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.season.UptakeView;
import org.merewarden.season.Uptakes;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.RightView;
import org.merewarden.waterbody.StockView;
import org.springframework.stereotype.Service;

/** Joins what the features show of the stocks, with as many statements for one stock as for a thousand. */
@Service
class Portfolio {
    private final Register register;
    private final Assessments assessments;
    private final Standings standings;
    private final Limits limits;
    private final ClosedLimits closed;
    private final Uptakes uptakes;

    Portfolio(
            Register register,
            Assessments assessments,
            Standings standings,
            Limits limits,
            ClosedLimits closed,
            Uptakes uptakes) {
        this.register = register;
        this.assessments = assessments;
        this.standings = standings;
        this.limits = limits;
        this.closed = closed;
        this.uptakes = uptakes;
    }

    int presentSeason() {
        return limits.presentSeason();
    }

    /** All registered stocks, by lake name, then species. */
    List<Entry> entries(int season) {
        Map<Long, List<RightView>> rights = register.rights().stream().collect(groupingBy(RightView::stockId));
        Map<Long, AssessmentView> latest = byStock(assessments.latest(), AssessmentView::stockId);
        Map<Long, StandingView> standing = byStock(standings.all(), StandingView::stockId);
        Map<Long, LimitView> inForce = byStock(limits.inForce(season), LimitView::stockId);
        Map<Long, LimitView> before = closed.before(season);
        Map<Long, UptakeView> uptake = byStock(uptakes.ofSeason(season), UptakeView::stockId);
        return register.stocks().stream()
                .map(s -> new Entry(
                        s,
                        rights.getOrDefault(s.id(), List.of()),
                        latest.get(s.id()),
                        standing.get(s.id()),
                        inForce.get(s.id()),
                        before.get(s.id()),
                        uptake.get(s.id())))
                .toList();
    }

    Optional<Entry> entry(String lake, String speciesKey, int season) {
        return register.stock(lake, speciesKey).map(s -> entry(s, season));
    }

    private Entry entry(StockView stock, int season) {
        Optional<LimitView> inForce = limits.inForce(stock.id(), season);
        return new Entry(
                stock,
                register.rightsOfStock(stock.id()),
                assessments.latest(stock.id()).orElse(null),
                standings.of(stock.id()).orElse(null),
                inForce.orElse(null),
                inForce.filter(LimitView::closure)
                        .flatMap(l -> closed.before(stock.id(), season))
                        .orElse(null),
                uptakes.of(stock.id(), season).orElse(null));
    }

    private static <T> Map<Long, T> byStock(List<T> views, Function<T, Long> stockId) {
        return views.stream().collect(toMap(stockId, Function.identity()));
    }
}
