package org.merewarden.season;

import java.util.HashMap;
import java.util.HashSet;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.function.Function;
import java.util.stream.Collectors;
import org.merewarden.advice.ClosedLimits;
import org.merewarden.advice.LimitView;
import org.merewarden.advice.Limits;
import org.merewarden.waterbody.CooperativeView;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.waterbody.WaterBodyView;

/** What entries refer to: asked one by one for a form, read whole for an import of many rows. */
interface References {
    Optional<WaterBodyView> water(String code);

    Optional<StockView> stock(String lake, String speciesKey);

    Optional<CooperativeView> cooperative(String code);

    boolean right(String cooperative, long stockId);

    Optional<LimitView> limit(long stockId, int season);

    /** The limit before the closure; empty where the stock is not closed. */
    Optional<LimitView> beforeClosure(long stockId, int season);

    boolean anyLimit(int season);

    /** kg */
    double taken(long stockId, int season);

    /** One question, one statement. */
    record OneByOne(Register register, Limits limits, ClosedLimits closed, LandingStore store) implements References {
        @Override
        public Optional<WaterBodyView> water(String code) {
            return register.waterBody(code);
        }

        @Override
        public Optional<StockView> stock(String lake, String speciesKey) {
            return register.stock(lake, speciesKey);
        }

        @Override
        public Optional<CooperativeView> cooperative(String code) {
            return register.cooperative(code);
        }

        @Override
        public boolean right(String cooperative, long stockId) {
            return register.rightsOfStock(stockId).stream()
                    .anyMatch(r -> r.cooperativeCode().equals(cooperative));
        }

        @Override
        public Optional<LimitView> limit(long stockId, int season) {
            return limits.inForce(stockId, season);
        }

        @Override
        public Optional<LimitView> beforeClosure(long stockId, int season) {
            return closed.before(stockId, season);
        }

        @Override
        public boolean anyLimit(int season) {
            return !limits.inForce(season).isEmpty();
        }

        @Override
        public double taken(long stockId, int season) {
            return store.taken(stockId, season);
        }
    }

    /** Everything in a few statements, limits and uptake by season as they are asked for. */
    final class Loaded implements References {
        private final Limits limits;
        private final ClosedLimits closed;
        private final Map<Integer, Map<Long, LimitView>> beforeClosure = new HashMap<>();
        private final LandingStore store;
        private final Map<String, WaterBodyView> waters;
        private final Map<String, StockView> stocks;
        private final Map<String, CooperativeView> cooperatives;
        private final Set<String> rights = new HashSet<>();
        private final Map<Integer, Map<Long, LimitView>> limitsOfSeason = new HashMap<>();
        private final Map<Integer, Map<Long, Double>> takenOfSeason = new HashMap<>();

        Loaded(Register register, Limits limits, ClosedLimits closed, LandingStore store) {
            this.limits = limits;
            this.closed = closed;
            this.store = store;
            waters = register.waterBodies().stream().collect(Collectors.toMap(WaterBodyView::code, w -> w));
            stocks = register.stocks().stream().collect(Collectors.toMap(StockView::key, s -> s));
            cooperatives = register.cooperatives().stream().collect(Collectors.toMap(CooperativeView::code, c -> c));
            register.rights().forEach(r -> rights.add(r.cooperativeCode() + ":" + r.stockId()));
        }

        @Override
        public Optional<WaterBodyView> water(String code) {
            return Optional.ofNullable(waters.get(code));
        }

        @Override
        public Optional<StockView> stock(String lake, String speciesKey) {
            return Optional.ofNullable(stocks.get(lake + ":" + speciesKey));
        }

        @Override
        public Optional<CooperativeView> cooperative(String code) {
            return Optional.ofNullable(cooperatives.get(code));
        }

        @Override
        public boolean right(String cooperative, long stockId) {
            return rights.contains(cooperative + ":" + stockId);
        }

        @Override
        public Optional<LimitView> limit(long stockId, int season) {
            return Optional.ofNullable(limitsOf(season).get(stockId));
        }

        @Override
        public Optional<LimitView> beforeClosure(long stockId, int season) {
            return Optional.ofNullable(
                    beforeClosure.computeIfAbsent(season, closed::before).get(stockId));
        }

        @Override
        public boolean anyLimit(int season) {
            return !limitsOf(season).isEmpty();
        }

        private Map<Long, LimitView> limitsOf(int season) {
            return limitsOfSeason.computeIfAbsent(
                    season,
                    s -> limits.inForce(s).stream().collect(Collectors.toMap(LimitView::stockId, Function.identity())));
        }

        @Override
        public double taken(long stockId, int season) {
            return takenOfSeason.computeIfAbsent(season, store::takenByStock).getOrDefault(stockId, 0.0);
        }
    }
}
