package org.merewarden.portfolio;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.function.Function;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.portfolio.SeasonReturn.Allowed;
import org.merewarden.portfolio.SeasonReturn.Place;
import org.merewarden.portfolio.SeasonReturn.Removed;
import org.springframework.stereotype.Component;

/** A season's return as cells: lines of removals, lines of limits, then the totals, told apart by the first column. */
@Component
class ReturnSheet {
    private static final List<String> COLUMNS = List.of(
            "part",
            "season",
            "district",
            "species",
            "sector",
            "basis",
            "recorded",
            "corrected",
            "stocks",
            "limits",
            "without",
            "limit",
            "set-asides",
            "to-be-logged",
            "closed");

    private final Texts texts;
    private final ReturnViews words;

    ReturnSheet(Texts texts, ReturnViews words) {
        this.texts = texts;
        this.words = words;
    }

    List<String> header() {
        return COLUMNS.stream().map(c -> texts.of("returns.sheet." + c)).toList();
    }

    List<List<@Nullable Object>> rows(SeasonReturn r) {
        List<List<@Nullable Object>> rows = new ArrayList<>();
        r.removalsByKey()
                .forEach((k, sum) -> rows.add(cells(
                        part("removals"),
                        r.season(),
                        words.district(k.district()),
                        k.species(),
                        words.sector(k.sector()),
                        words.basis(k.logged()),
                        sum.tonnes(),
                        sum.correctedTonnes(),
                        sum.stocks())));
        r.limitsByKey()
                .forEach((k, sum) -> rows.add(joined(
                        cells(
                                part("limits"),
                                r.season(),
                                words.district(k.district()),
                                k.species(),
                                null,
                                null,
                                null,
                                null),
                        allowed(sum))));
        totals(rows, r, part("species"), Place::species, name -> cells(null, name));
        totals(rows, r, part("district"), Place::district, name -> cells(words.district(name), null));
        rows.add(total(r, part("all"), cells(null, null), r.removed(), r.allowed()));
        return rows;
    }

    private static void totals(
            List<List<@Nullable Object>> rows,
            SeasonReturn r,
            String part,
            Function<Place, String> key,
            Function<String, List<@Nullable Object>> names) {
        Map<String, Removed> removed = r.removedBy(key);
        r.allowedBy(key)
                .forEach((name, allowed) -> rows.add(
                        total(r, part, names.apply(name), Objects.requireNonNull(removed.get(name)), allowed)));
    }

    private static List<@Nullable Object> total(
            SeasonReturn r, String part, List<@Nullable Object> names, Removed removed, Allowed allowed) {
        return joined(
                joined(cells(part, r.season()), names),
                joined(cells(null, null, removed.tonnes(), removed.correctedTonnes()), allowed(allowed)));
    }

    private static List<@Nullable Object> allowed(Allowed a) {
        return cells(
                a.stocks(),
                a.limits(),
                a.without(),
                a.tonnes(),
                a.setAsides(),
                a.toBeLogged(),
                a.closed().isEmpty()
                        ? null
                        : a.closed().stream()
                                .distinct()
                                .map(LocalDate::toString)
                                .collect(Collectors.joining("; ")));
    }

    private String part(String part) {
        return texts.of("returns.part." + part);
    }

    private static List<@Nullable Object> joined(List<@Nullable Object> first, List<@Nullable Object> second) {
        return Stream.of(first, second).flatMap(List::stream).toList();
    }

    private static List<@Nullable Object> cells(@Nullable Object... cells) {
        return Arrays.asList(cells);
    }
}
