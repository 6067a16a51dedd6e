package org.merewarden.season;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.LimitView;
import org.merewarden.advice.Limits;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;

/** What the sender of a form reads back: what is stored now, what is left, what is remarkable. */
@Component
class LandingReply {
    private final Register register;
    private final Limits limits;
    private final LandingStore store;
    private final MessageSource messages;

    LandingReply(Register register, Limits limits, LandingStore store, MessageSource messages) {
        this.register = register;
        this.limits = limits;
        this.store = store;
        this.messages = messages;
    }

    /** @param flags finished sentences */
    record Line(long id, String text, List<String> flags, boolean withdrawn, String address) {}

    /** @param left a sentence for each limit that the landing is taken from */
    record Reply(String formKey, List<Line> lines, List<String> left, boolean canUndo) {}

    Reply of(String formKey, List<LandingRow> rows) {
        List<Line> lines = rows.stream().map(this::line).toList();
        Map<Long, Integer> stocks = new LinkedHashMap<>();
        for (LandingRow row : rows) {
            if (row.stockId() != null) {
                stocks.put(row.stockId(), row.season());
            }
        }
        List<String> left = new ArrayList<>();
        stocks.forEach((stock, season) -> left(stock, season).ifPresent(left::add));
        return new Reply(formKey, lines, left, lines.stream().anyMatch(l -> !l.withdrawn()));
    }

    private Line line(LandingRow row) {
        Entry e = row.entry();
        String what = row.stockId() == null
                ? e.speciesKey() + ", " + e.lake()
                : register.stock(row.stockId()).map(StockView::title).orElse(e.speciesKey());
        String weight = row.factor() == 1
                ? Texts.kg(e.weightKg())
                : word(
                        "season.reply.converted",
                        Texts.kg(e.weightKg()),
                        e.presentation(),
                        Texts.kg(row.liveWeightKg()));
        String text = word(
                "season.reply.line",
                String.valueOf(row.id()),
                Figures.date(e.landedOn()),
                what,
                weight,
                word("season.fate." + e.fate()));
        List<String> flags = row.flags().stream()
                .map(f -> word(f.messageKey(), String.valueOf(row.season())))
                .toList();
        return new Line(row.id(), text, flags, row.correctedBy() != null, "/landings/" + row.id() + "/correct");
    }

    private Optional<String> left(long stockId, int season) {
        Optional<LimitView> limit = limits.inForce(stockId, season);
        if (limit.isPresent() && limit.get().closure()) {
            String title = register.stock(stockId).map(StockView::title).orElse("");
            return Optional.of(word(
                    "season.reply.closed", title, Figures.dateTime(limit.get().effectiveAt())));
        }
        Double toBeLogged = limit.map(LimitView::toBeLoggedTonnes).orElse(null);
        return toBeLogged == null ? Optional.empty() : Optional.of(left(stockId, season, toBeLogged));
    }

    private String left(long stockId, int season, double toBeLogged) {
        double taken = store.taken(stockId, season) / 1000;
        String title = register.stock(stockId).map(StockView::title).orElse("");
        return taken > toBeLogged
                ? word("season.reply.over", title, Figures.tonnes(taken - toBeLogged), Figures.decided(toBeLogged))
                : word("season.reply.left", title, Figures.tonnes(toBeLogged - taken), Figures.decided(toBeLogged));
    }

    private String word(String key, @Nullable Object... values) {
        return messages.getMessage(key, values, LocaleContextHolder.getLocale());
    }
}
