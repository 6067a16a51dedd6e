package org.merewarden.portfolio;

import java.time.LocalDateTime;
import java.util.Arrays;
import java.util.List;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.LimitView;
import org.merewarden.assessment.AssessmentView;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;

/** The shown rows as cells of a spreadsheet: numbers as numbers, one column for each end of an interval. */
@Component
class PortfolioSheet {
    private static final List<String> COLUMNS = List.of(
            "water",
            "species",
            "standing",
            "margin",
            "margin-negative",
            "msy",
            "msy-low",
            "msy-high",
            "yield",
            "biomass",
            "biomass-low",
            "biomass-high",
            "limit",
            "limit-unit",
            "closed",
            "taken",
            "evidence",
            "assessed");

    private final Texts texts;
    private final RowBuilder rows;

    PortfolioSheet(Texts texts, RowBuilder rows) {
        this.texts = texts;
        this.rows = rows;
    }

    List<String> header() {
        return COLUMNS.stream().map(c -> texts.get("sheet." + c)).toList();
    }

    List<List<@Nullable Object>> rows(List<Entry> entries) {
        return entries.stream().map(this::row).toList();
    }

    private List<@Nullable Object> row(Entry e) {
        return Stream.of(names(e), assessed(e), season(e)).flatMap(List::stream).toList();
    }

    private List<@Nullable Object> names(Entry e) {
        return cells(
                e.stock().lakeName(),
                RowBuilder.speciesName(e),
                rows.standing(e),
                e.margin(),
                e.marginNegativeProbability());
    }

    private static List<@Nullable Object> assessed(Entry e) {
        AssessmentView a = e.assessment();
        return a == null
                ? cells(null, null, null, null, null, null, null)
                : cells(
                        a.msyTonnes(),
                        a.msyLowTonnes(),
                        a.msyHighTonnes(),
                        e.msyKgPerHectare(),
                        a.bOverBmsy(),
                        a.bOverBmsyLow(),
                        a.bOverBmsyHigh());
    }

    private List<@Nullable Object> season(Entry e) {
        AssessmentView a = e.assessment();
        LimitView limit = e.limit();
        LimitView allowed = e.allowed();
        return cells(
                allowed == null ? null : allowed.amount(),
                allowed == null ? null : allowed.unit(),
                limit != null && limit.closure()
                        ? LocalDateTime.ofInstant(
                                        limit.effectiveAt(),
                                        LocaleContextHolder.getTimeZone().toZoneId())
                                .toString()
                        : null,
                e.takenTonnes(),
                a == null ? null : rows.strength(a.strength()),
                a == null ? null : RowBuilder.madeOn(a).toString());
    }

    private static List<@Nullable Object> cells(@Nullable Object... cells) {
        return Arrays.asList(cells);
    }
}
