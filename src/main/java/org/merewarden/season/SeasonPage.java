package org.merewarden.season;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import java.util.function.Function;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.AllocationView;
import org.merewarden.advice.ClosedLimits;
import org.merewarden.advice.LimitView;
import org.merewarden.advice.Limits;
import org.merewarden.season.Takings.ByCooperative;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.merewarden.web.Seasons;
import org.merewarden.web.Svg;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;

/** Every limit of a season with what the log holds against it. The same few statements for any number of stocks. */
@Component
class SeasonPage {
    private static final double NEARLY = 0.9;

    private final Limits limits;
    private final ClosedLimits closed;
    private final Uptakes uptakes;
    private final Takings takings;
    private final Completeness completeness;
    private final Register register;
    private final Seasons seasons;
    private final MessageSource messages;

    SeasonPage(
            Limits limits,
            ClosedLimits closed,
            Uptakes uptakes,
            Takings takings,
            Completeness completeness,
            Register register,
            Seasons seasons,
            MessageSource messages) {
        this.limits = limits;
        this.closed = closed;
        this.uptakes = uptakes;
        this.takings = takings;
        this.completeness = completeness;
        this.register = register;
        this.seasons = seasons;
        this.messages = messages;
    }

    record Row(
            String title,
            String address,
            String limit,
            String setAsides,
            String toBeLogged,
            String taken,
            String left,
            String used,
            String bar,
            String recordedUpTo,
            String silent,
            String pace,
            boolean over) {}

    record Share(
            String stock,
            String cooperative,
            String allocated,
            String taken,
            String left,
            String recorded,
            boolean over) {}

    record Content(
            int season, List<String> lede, List<Row> rows, List<Share> shares, List<String> silent, String mixed) {}

    /**
     * One stock's figures before they become words. Tonnes; share is taken ÷ to be logged.
     *
     * @param limit in force, or in force until the closure
     * @param closure null where the stock is open
     */
    private record Line(
            StockView stock,
            @Nullable LimitView limit,
            @Nullable LimitView closure,
            @Nullable UptakeView uptake,
            double taken,
            @Nullable Double toBeLogged,
            @Nullable LocalDate usedUpOn) {
        double share() {
            return toBeLogged == null ? -1 : toBeLogged > 0 ? taken / toBeLogged : taken > 0 ? Double.MAX_VALUE : 0;
        }

        boolean over() {
            return toBeLogged != null && taken > toBeLogged;
        }
    }

    Content of(int season) {
        List<ByCooperative> byCooperative = takings.byCooperative(season);
        List<UptakeView> views = uptakes.ofSeason(season);
        List<Line> lines = lines(season, views, lastLandings(byCooperative));
        double mixed = takings.mixedKg(season);
        return new Content(
                season,
                lede(season, lines),
                lines.stream().map(line -> row(season, line)).toList(),
                shares(season, byCooperative),
                views.stream()
                        .flatMap(v -> v.silentCooperatives().stream())
                        .distinct()
                        .sorted()
                        .toList(),
                mixed > 0 ? word("season.mixed-unsplit", Texts.kg(mixed)) : "");
    }

    private static Map<Long, LocalDate> lastLandings(List<ByCooperative> takings) {
        Map<Long, LocalDate> last = new HashMap<>();
        takings.forEach(t -> last.merge(t.stockId(), t.lastLanding(), (a, b) -> a.isAfter(b) ? a : b));
        return last;
    }

    private List<Line> lines(int season, List<UptakeView> views, Map<Long, LocalDate> lastLandings) {
        Map<Long, LimitView> byStock =
                limits.inForce(season).stream().collect(Collectors.toMap(LimitView::stockId, Function.identity()));
        Map<Long, UptakeView> uptakeByStock =
                views.stream().collect(Collectors.toMap(UptakeView::stockId, Function.identity()));
        Map<Long, LimitView> before = closed.before(season);
        LocalDate today = seasons.today();
        List<Line> lines = new ArrayList<>();
        for (StockView stock : register.stocks()) {
            LimitView inForce = byStock.get(stock.id());
            LimitView closure = inForce != null && inForce.closure() ? inForce : null;
            LimitView limit = closure == null ? inForce : before.get(stock.id());
            UptakeView uptake = uptakeByStock.get(stock.id());
            double taken = uptake == null ? 0 : uptake.takenKg() / 1000;
            if (inForce != null || taken > 0) {
                Double toBeLogged = limit == null ? null : limit.toBeLoggedTonnes();
                LocalDate last = last(uptake, lastLandings.get(stock.id()));
                LocalDate usedUp = limit == null
                                || closure != null
                                || toBeLogged == null
                                || last == null
                                || today.isAfter(limit.validTo())
                        ? null
                        : StraightLinePace.usedUpOn(taken, toBeLogged, limit.validFrom(), last)
                                .orElse(null);
                lines.add(new Line(stock, limit, closure, uptake, taken, toBeLogged, usedUp));
            }
        }
        lines.sort(Comparator.comparingDouble(Line::share).reversed());
        return lines;
    }

    private static @Nullable LocalDate last(@Nullable UptakeView uptake, @Nullable LocalDate landing) {
        LocalDate recorded = uptake == null ? null : uptake.recordedUpTo();
        return landing == null || (recorded != null && recorded.isAfter(landing)) ? recorded : landing;
    }

    private List<String> lede(int season, List<Line> lines) {
        List<Line> limited = lines.stream()
                .filter(l -> l.toBeLogged != null && l.closure == null)
                .toList();
        List<String> lede = new ArrayList<>();
        if (limited.isEmpty()) {
            lede.add(word("season.lede.none", String.valueOf(season)));
        } else {
            lede.addAll(use(limited));
        }
        long shut = lines.stream().filter(l -> l.closure != null).count();
        if (shut > 0) {
            lede.add(word("season.lede.closed", shut));
        }
        sum(lines).ifPresent(lede::add);
        return lede;
    }

    private List<String> use(List<Line> limited) {
        long over = limited.stream().filter(Line::over).count();
        long nearly =
                limited.stream().filter(l -> !l.over() && l.share() >= NEARLY).count();
        long before = limited.stream()
                .filter(l -> !l.over() && l.usedUpOn != null && !l.usedUpOn.isAfter(validTo(l)))
                .count();
        return List.of(word("season.lede.used", over, nearly, limited.size()), word("season.lede.pace", before));
    }

    /** Of a closed stock counts what was allowed until then. */
    private Optional<String> sum(List<Line> lines) {
        List<Line> limited = lines.stream().filter(l -> l.toBeLogged != null).toList();
        double allowed = limited.stream()
                .mapToDouble(l -> Objects.requireNonNullElse(l.toBeLogged, 0.0))
                .sum();
        double taken = limited.stream().mapToDouble(Line::taken).sum();
        return limited.isEmpty()
                ? Optional.empty()
                : Optional.of(word("season.lede.sum", Figures.tonnes(taken), Figures.decided(allowed)));
    }

    private static LocalDate validTo(Line line) {
        return line.limit == null ? LocalDate.MAX : line.limit.validTo();
    }

    private Row row(int season, Line line) {
        Double toBeLogged = line.toBeLogged;
        LimitView limit = line.limit;
        String used = toBeLogged == null || line.share() > 100 ? "" : Figures.percent(line.share());
        return new Row(
                line.stock.title(),
                "/season/" + season + "/stocks/" + line.stock.lake() + "/" + line.stock.speciesKey(),
                limit == null ? word("season.no-limit") : limitText(limit),
                limit == null || toBeLogged == null ? "" : Figures.decided(limit.setAsidesTonnes()),
                toBeLogged == null ? "" : Figures.decided(toBeLogged),
                Figures.tonnes(line.taken),
                left(line),
                used,
                toBeLogged == null ? "" : Svg.barToLimit(line.taken, toBeLogged, barTitle(line.taken, toBeLogged)),
                line.uptake == null ? Figures.UNKNOWN : Figures.date(line.uptake.recordedUpTo()),
                line.uptake == null ? "" : String.join(", ", line.uptake.silentCooperatives()),
                pace(line),
                line.over());
    }

    private String barTitle(double taken, double toBeLogged) {
        return word("season.bar", Figures.tonnes(taken), Figures.decided(toBeLogged));
    }

    private String limitText(LimitView limit) {
        Double amount = limit.amountTonnes();
        if (amount != null) {
            return Figures.decided(amount);
        }
        return limit.kind().equals("effort")
                ? Figures.decided(limit.amount(), limit.unit())
                : word("season.measures-only");
    }

    private String left(Line line) {
        Double toBeLogged = line.toBeLogged;
        if (line.closure == null) {
            return toBeLogged == null ? "" : left(toBeLogged - line.taken);
        }
        String closedFrom = word("limit.closed", Figures.dateTime(line.closure.effectiveAt()));
        return toBeLogged != null && line.over() ? closedFrom + "; " + left(toBeLogged - line.taken) : closedFrom;
    }

    private String left(double tonnes) {
        return tonnes < 0 ? word("season.over-by", Figures.tonnes(-tonnes)) : Figures.tonnes(tonnes);
    }

    private String pace(Line line) {
        if (line.closure != null) {
            return word("season.pace.closed");
        }
        if (line.over()) {
            return word("season.pace.over");
        }
        if (line.usedUpOn == null) {
            return Figures.UNKNOWN;
        }
        return line.usedUpOn.isAfter(validTo(line)) ? word("season.pace.after") : Figures.date(line.usedUpOn);
    }

    private List<Share> shares(int season, List<ByCooperative> byCooperative) {
        Map<String, Double> taken = new HashMap<>();
        byCooperative.forEach(t -> taken.put(t.stockId() + ":" + t.cooperativeId(), t.takenKg() / 1000));
        Map<Long, String> titles =
                register.stocks().stream().collect(Collectors.toMap(StockView::id, StockView::title));
        Completeness.Records records = completeness.of(season);
        return limits.allocations(season).stream()
                .map(a -> share(
                        a,
                        titles.getOrDefault(a.stockId(), ""),
                        Optional.ofNullable(taken.get(a.stockId() + ":" + a.cooperativeId()))
                                .orElse(0.0),
                        Figures.date(records.end(a.cooperativeId()).orElse(null))))
                .toList();
    }

    private Share share(AllocationView a, String title, double taken, String recorded) {
        double allocated = a.amountKg() / 1000.0;
        return new Share(
                title,
                a.cooperativeName(),
                Figures.decided(allocated),
                Figures.tonnes(taken),
                left(allocated - taken),
                recorded,
                taken > allocated);
    }

    private String word(String key, @Nullable Object... values) {
        return messages.getMessage(key, values, LocaleContextHolder.getLocale());
    }
}
