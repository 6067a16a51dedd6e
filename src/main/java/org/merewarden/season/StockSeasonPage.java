package org.merewarden.season;

import java.time.LocalDate;
import java.time.format.TextStyle;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.ClosedLimits;
import org.merewarden.advice.LimitView;
import org.merewarden.advice.Limits;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.merewarden.web.NotFound;
import org.merewarden.web.Seasons;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;

/** One stock's season: how the catch has grown, beside earlier seasons and the limit. */
@Component
class StockSeasonPage {
    private static final int EARLIER_SEASONS = 3;

    private final Register register;
    private final Limits limits;
    private final ClosedLimits closed;
    private final Takings takings;
    private final Seasons seasons;
    private final MessageSource messages;

    StockSeasonPage(
            Register register,
            Limits limits,
            ClosedLimits closed,
            Takings takings,
            Seasons seasons,
            MessageSource messages) {
        this.register = register;
        this.limits = limits;
        this.closed = closed;
        this.takings = takings;
        this.seasons = seasons;
        this.messages = messages;
    }

    record MonthRow(String month, List<String> tonnes) {}

    record Content(
            int season,
            String title,
            String stockAddress,
            String lede,
            String chart,
            List<Integer> seasons,
            List<MonthRow> months,
            String logAddress,
            String landingAddress) {}

    Content of(int season, String lake, String speciesKey) {
        StockView stock =
                register.stock(lake, speciesKey).orElseThrow(() -> new NotFound("stock " + lake + ":" + speciesKey));
        Optional<LimitView> inForce = limits.inForce(stock.id(), season);
        Optional<LimitView> closure = inForce.filter(LimitView::closure);
        Double toBeLogged = (closure.isPresent() ? closed.before(stock.id(), season) : inForce)
                .map(LimitView::toBeLoggedTonnes)
                .orElse(null);
        LocalDate start = seasons.start(season);
        CumulativeChart chart = new CumulativeChart(
                season, start, takings.byDay(stock.id(), season - EARLIER_SEASONS, season), toBeLogged);
        double taken = chart.afterMonths(season, 12);
        return new Content(
                season,
                stock.title(),
                stock.path(),
                lede(season, taken, toBeLogged, closure),
                chart.svg(
                        word("season.chart.title", stock.title(), String.valueOf(season)), word("season.chart.limit")),
                chart.seasons(),
                months(season, start, chart),
                "/season/" + season + "/landings?lake=" + Texts.encode(lake) + "&species=" + Texts.encode(speciesKey),
                "/landings/new?lake=" + Texts.encode(lake) + "&species=" + Texts.encode(speciesKey));
    }

    private String lede(int season, double taken, @Nullable Double toBeLogged, Optional<LimitView> closure) {
        if (closure.isPresent()) {
            String from = Figures.dateTime(closure.get().effectiveAt());
            return toBeLogged == null
                    ? word("season.stock.lede.closed", Figures.tonnes(taken), from)
                    : word("season.stock.lede.closed-after", Figures.tonnes(taken), Figures.decided(toBeLogged), from);
        }
        if (toBeLogged == null) {
            return word("season.stock.lede.no-limit", Figures.tonnes(taken), String.valueOf(season));
        }
        return taken > toBeLogged
                ? word("season.stock.lede.over", Figures.tonnes(taken), Figures.decided(toBeLogged))
                : word(
                        "season.stock.lede",
                        Figures.tonnes(taken),
                        Figures.decided(toBeLogged),
                        Figures.tonnes(toBeLogged - taken));
    }

    /** The season in progress has no figures for months to come: an empty cell is not a standstill. */
    private List<MonthRow> months(int season, LocalDate start, CumulativeChart chart) {
        Locale locale = LocaleContextHolder.getLocale();
        LocalDate today = seasons.today();
        List<MonthRow> rows = new ArrayList<>();
        for (int month = 1; month <= 12; month++) {
            LocalDate first = start.plusMonths(month - 1);
            int months = month;
            List<String> cells = chart.seasons().stream()
                    .map(s -> s == season && first.isAfter(today) ? "" : Figures.sig(chart.afterMonths(s, months)))
                    .toList();
            rows.add(new MonthRow(first.getMonth().getDisplayName(TextStyle.FULL_STANDALONE, locale), cells));
        }
        return rows;
    }

    private String word(String key, @Nullable Object... values) {
        return messages.getMessage(key, values, LocaleContextHolder.getLocale());
    }
}
