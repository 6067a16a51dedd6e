package org.merewarden.season;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.merewarden.waterbody.CooperativeView;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.WaterBodyView;
import org.merewarden.web.Figures;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Component;

/** The log as people read it: the last row of each history, with the history behind it. */
@Component
class LogEntries {
    static final int PAGE_SIZE = 100;
    private static final String LAST_ROWS = "where l.season_year = :season and n.id is null";

    private final JdbcClient jdbc;
    private final LandingStore store;
    private final Register register;
    private final MessageSource messages;

    LogEntries(JdbcClient jdbc, LandingStore store, Register register, MessageSource messages) {
        this.jdbc = jdbc;
        this.store = store;
        this.register = register;
        this.messages = messages;
    }

    /** @param history earlier rows as finished sentences, oldest first */
    record Line(
            long id,
            String date,
            String slip,
            String water,
            String species,
            String cooperative,
            String landed,
            String live,
            String fate,
            List<String> flags,
            boolean withdrawn,
            boolean last,
            String recorded,
            List<String> history,
            String address) {}

    /** @param entries rows that end a history, withdrawn ones too */
    record Totals(long entries, long counted, double landedKg, double liveKg) {}

    Totals totals(int season, LogFilter filter) {
        String counts = "case when l.entry_kind <> 'withdrawal' then ";
        return select(
                        "select count(*), sum(" + counts + "1 else 0 end), sum(" + counts
                                + "l.weight_kg else 0 end), sum(" + counts + "l.live_weight_kg else 0 end) "
                                + LandingStore.FROM,
                        season,
                        filter,
                        "")
                .query((row, n) -> new Totals(row.getLong(1), row.getLong(2), row.getDouble(3), row.getDouble(4)))
                .single();
    }

    List<LandingRow> rows(int season, LogFilter filter, int limit, int offset) {
        return select(
                        LandingStore.SELECT,
                        season,
                        filter,
                        " order by l.landed_on desc, l.id desc limit " + limit + " offset " + offset)
                .query((row, n) -> LandingStore.read(row))
                .list();
    }

    private JdbcClient.StatementSpec select(String start, int season, LogFilter filter, String end) {
        Map<String, Object> values = filter.values();
        String where = values.keySet().stream().map(c -> " and " + c).collect(Collectors.joining());
        JdbcClient.StatementSpec statement =
                jdbc.sql(start + LAST_ROWS + where + end).param("season", season);
        for (Map.Entry<String, Object> condition : values.entrySet()) {
            String name = condition.getKey().substring(condition.getKey().indexOf(':') + 1);
            statement = statement.param(name, condition.getValue());
        }
        return statement;
    }

    List<Line> withHistory(List<LandingRow> rows) {
        Map<Long, List<LandingRow>> histories = new LinkedHashMap<>();
        for (LandingRow row :
                store.histories(rows.stream().map(LandingRow::rootId).toList())) {
            histories.computeIfAbsent(row.rootId(), id -> new ArrayList<>()).add(row);
        }
        Names names = names();
        return rows.stream()
                .map(row -> line(row, histories.getOrDefault(row.rootId(), List.of()), names))
                .toList();
    }

    private record Names(Map<String, String> waters, Map<String, String> species, Map<String, String> cooperatives) {}

    private Names names() {
        Map<String, String> species = new LinkedHashMap<>();
        register.species().forEach(s -> species.put(s.code(), s.englishName()));
        register.stocks().forEach(s -> species.put(s.key(), s.speciesName()));
        return new Names(
                register.waterBodies().stream().collect(Collectors.toMap(WaterBodyView::code, WaterBodyView::name)),
                species,
                register.cooperatives().stream()
                        .collect(Collectors.toMap(CooperativeView::code, CooperativeView::name)));
    }

    private Line line(LandingRow row, List<LandingRow> history, Names names) {
        Entry e = row.entry();
        String presentation = e.presentation().equals("whole") ? "" : " " + e.presentation();
        return new Line(
                row.id(),
                Figures.date(e.landedOn()),
                Texts.orEmpty(e.slip()),
                names.waters.getOrDefault(e.lake(), e.lake()),
                species(e, names),
                e.cooperative() == null ? "" : names.cooperatives.getOrDefault(e.cooperative(), e.cooperative()),
                Texts.kg(e.weightKg()) + presentation,
                Texts.kg(row.liveWeightKg()),
                word("season.fate." + e.fate()),
                row.flags().stream()
                        .map(f -> word(f.messageKey(), String.valueOf(row.season())))
                        .toList(),
                row.withdrawal(),
                row.correctedBy() == null,
                word("season.log.recorded", Figures.dateTime(row.recordedAt()), row.recordedBy()),
                history.size() < 2
                        ? List.of()
                        : history.stream().map(this::step).toList(),
                "/landings/" + row.id() + "/correct");
    }

    private String species(Entry e, Names names) {
        if (e.species().equals(Entry.MIXED)) {
            return word("season.mixed");
        }
        String name = names.species.get(e.lake() + ":" + e.speciesKey());
        return name != null ? name : names.species.getOrDefault(e.species(), e.speciesKey());
    }

    private String step(LandingRow row) {
        String reason = row.reason() == null ? "" : word("season.log.reason", row.reason());
        return word(
                "season.log.step." + row.kind(),
                String.valueOf(row.id()),
                Figures.dateTime(row.recordedAt()),
                row.recordedBy(),
                row.entry().text() + reason);
    }

    private String word(String key, @Nullable Object... values) {
        return messages.getMessage(key, values, LocaleContextHolder.getLocale());
    }
}
