package org.merewarden.portfolio;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.TreeMap;
import java.util.function.Function;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.season.UptakeView;
import org.merewarden.web.Figures;
import org.springframework.stereotype.Component;

/** Builds the portfolio's page from the joined entries and the query. */
@Component
class PortfolioViews {
    private final Texts texts;
    private final RowBuilder rows;

    PortfolioViews(Texts texts, RowBuilder rows) {
        this.texts = texts;
        this.rows = rows;
    }

    PortfolioView view(List<Entry> all, PortfolioQuery query) {
        List<Entry> shown = query.apply(all);
        return new PortfolioView(
                lede(all, shown, query),
                possible(shown),
                fields(all, query),
                Stream.of(Column.values()).map(c -> header(c, query)).toList(),
                shown.stream().map(rows::row).toList(),
                Objects.requireNonNullElse(query.q(), ""),
                query.column().key(),
                query.descending() ? "desc" : "asc",
                query.address("/portfolio.csv"),
                query.address("/portfolio.xlsx"),
                !all.isEmpty());
    }

    private List<String> lede(List<Entry> all, List<Entry> shown, PortfolioQuery query) {
        List<String> lede = new ArrayList<>();
        if (query.filtered()) {
            lede.add(texts.get("lede.filtered", shown.size(), all.size()));
        }
        if (shown.isEmpty()) {
            return lede;
        }
        lede.add(texts.get(
                "lede.counts",
                shown.size(),
                (int) shown.stream().map(e -> e.stock().lake()).distinct().count(),
                count(shown, "strained") + count(shown, "critical"),
                count(shown, "watch"),
                count(shown, Entry.UNASSESSED)));
        lede.addAll(season(shown));
        return lede;
    }

    private static int count(List<Entry> entries, String standing) {
        return (int)
                entries.stream().filter(e -> e.standingCode().equals(standing)).count();
    }

    private List<String> season(List<Entry> shown) {
        List<String> lede = new ArrayList<>();
        lede.add(texts.get("lede.allowed", Figures.decided(sum(shown, Entry::limitTonnes))));
        List<UptakeView> logs =
                shown.stream().map(Entry::uptake).filter(Objects::nonNull).toList();
        String taken =
                Figures.tonnes(logs.stream().mapToDouble(UptakeView::takenKg).sum() / 1000);
        LocalDate upTo = logs.stream()
                .map(UptakeView::recordedUpTo)
                .filter(Objects::nonNull)
                .min(Comparator.naturalOrder())
                .orElse(null);
        lede.add(upTo == null ? texts.get("lede.taken", taken) : texts.get("lede.taken-to", taken, Figures.date(upTo)));
        List<String> silent = logs.stream()
                .flatMap(u -> u.silentCooperatives().stream())
                .distinct()
                .sorted()
                .toList();
        if (!silent.isEmpty()) {
            lede.add(texts.get("lede.silent", silent.size(), String.join(", ", silent)));
        }
        return lede;
    }

    private @Nullable String possible(List<Entry> shown) {
        long assessed = shown.stream().filter(e -> e.msyTonnes() != null).count();
        return assessed == 0
                ? null
                : texts.get("possible.words", (int) assessed, Figures.tonnes(sum(shown, Entry::msyTonnes)));
    }

    private static double sum(List<Entry> entries, Function<Entry, @Nullable Double> quantity) {
        return entries.stream()
                .map(quantity)
                .filter(Objects::nonNull)
                .mapToDouble(Double::doubleValue)
                .sum();
    }

    private PortfolioView.Header header(Column column, PortfolioQuery query) {
        boolean sorted = column == query.column();
        String direction = !sorted ? "none" : query.descending() ? "descending" : "ascending";
        String arrow = !sorted ? "" : query.descending() ? "▼" : "▲";
        return new PortfolioView.Header(
                texts.get("column." + column.key()),
                query.sortAddress(column),
                direction,
                arrow,
                column.number() ? "number" : "");
    }

    private List<PortfolioView.Field> fields(List<Entry> all, PortfolioQuery query) {
        Map<String, String> districts = new TreeMap<>();
        Map<String, String> species = new TreeMap<>();
        Map<String, String> cooperatives = new TreeMap<>();
        for (Entry e : all) {
            String district = e.stock().district();
            if (district != null) {
                districts.put(district, district);
            }
            species.put(e.stock().species(), e.stock().speciesName());
            e.rights().forEach(r -> cooperatives.put(r.cooperativeCode(), r.cooperativeName()));
        }
        return List.of(
                field("district", query.district(), districts),
                field("species", query.species(), species),
                field("cooperative", query.cooperative(), cooperatives),
                field(
                        "standing",
                        query.standing(),
                        worded("standing", "critical", "strained", "watch", "secure", "unassessed")),
                field("evidence", query.evidence(), worded("strength", "STRONG", "FAIR", "THIN", "NONE")));
    }

    private Map<String, String> worded(String kind, String... values) {
        Map<String, String> words = new LinkedHashMap<>();
        for (String value : values) {
            words.put(value, texts.get(kind + "." + value));
        }
        return words;
    }

    private PortfolioView.Field field(String name, @Nullable String chosen, Map<String, String> values) {
        List<PortfolioView.Option> options = new ArrayList<>();
        options.add(new PortfolioView.Option("", texts.get("filter.all"), chosen == null || chosen.isBlank()));
        values.forEach((value, label) -> options.add(new PortfolioView.Option(value, label, value.equals(chosen))));
        return new PortfolioView.Field(name, texts.get("filter." + name), options);
    }
}
