package org.merewarden.season;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Choice;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;

/** One season's log, a page at a time, and the same as a sheet. */
@Component
class LogPage {
    /** The columns of the import format, then what the store adds. */
    static final List<String> EXPORT_HEADER = Stream.concat(
                    LandingsTable.DEFINITION.columns().stream().map(org.merewarden.intake.Column::name),
                    Stream.of("live_weight_kg", "flags", "entry", "state", "recorded_at", "recorded_by"))
            .toList();

    private final LogEntries entries;
    private final Register register;
    private final MessageSource messages;

    LogPage(LogEntries entries, Register register, MessageSource messages) {
        this.entries = entries;
        this.register = register;
        this.messages = messages;
    }

    /** Addresses are null where there is no such page. */
    record Content(
            int season,
            String lede,
            List<LogEntries.Line> lines,
            String exportAddress,
            @Nullable String newer,
            @Nullable String older) {}

    Content of(int season, LogFilter filter) {
        LogEntries.Totals totals = entries.totals(season, filter);
        int page = filter.pageNumber();
        int offset = Math.min(page - 1, 1_000_000) * LogEntries.PAGE_SIZE;
        String address = "/season/" + season + "/landings";
        boolean more = totals.entries() > (long) offset + LogEntries.PAGE_SIZE;
        return new Content(
                season,
                word(
                        "season.log.lede",
                        totals.counted(),
                        sum(totals.liveKg()),
                        sum(totals.landedKg()),
                        totals.entries() - totals.counted()),
                entries.withHistory(entries.rows(season, filter, LogEntries.PAGE_SIZE, offset)),
                address + ".csv?" + dropFirst(filter.query()),
                page > 1 ? address + "?page=" + (page - 1) + filter.query() : null,
                more ? address + "?page=" + (page + 1) + filter.query() : null);
    }

    /** Whole kilograms where there are many: weights of a product's factor have more digits than a scale. */
    private static String sum(double kilograms) {
        return Texts.kg(kilograms < 1000 ? kilograms : Math.rint(kilograms));
    }

    private static String dropFirst(String query) {
        return query.isEmpty() ? "" : query.substring(1);
    }

    Stream<Choice> species() {
        Map<String, String> names = new LinkedHashMap<>();
        names.put(Entry.MIXED, word("season.mixed"));
        register.stocks().stream()
                .sorted(java.util.Comparator.comparing(StockView::speciesName))
                .forEach(s -> names.putIfAbsent(s.speciesKey(), s.speciesName()));
        return names.entrySet().stream().map(e -> new Choice(e.getKey(), e.getValue()));
    }

    String all() {
        return word("word.all");
    }

    List<List<@Nullable Object>> export(int season, LogFilter filter) {
        List<List<@Nullable Object>> rows = new ArrayList<>();
        for (LandingRow row : entries.rows(season, filter, Integer.MAX_VALUE, 0)) {
            Entry e = row.entry();
            rows.add(Arrays.asList(
                    e.key(),
                    e.landedOn(),
                    e.slip(),
                    e.lake(),
                    e.species(),
                    e.population(),
                    e.cooperative(),
                    e.sector(),
                    e.gear(),
                    e.nets(),
                    e.nights(),
                    e.weightKg(),
                    e.presentation(),
                    e.number(),
                    e.fate(),
                    e.place(),
                    e.note(),
                    row.liveWeightKg(),
                    Flag.store(row.flags()),
                    row.id(),
                    row.kind(),
                    row.recordedAt(),
                    row.recordedBy()));
        }
        return rows;
    }

    private String word(String key, Object... values) {
        return messages.getMessage(key, values, LocaleContextHolder.getLocale());
    }
}
