package org.merewarden.portfolio;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.List;
import java.util.Locale;
import org.junit.jupiter.api.AfterEach;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.springframework.context.i18n.LocaleContextHolder;

class PortfolioViewsTest {
    private final Texts texts = Made.texts();
    private final RowBuilder rows = new RowBuilder(texts);
    private final PortfolioViews views = new PortfolioViews(texts, rows);

    private final Entry watched = Made.entry(
            Made.stock(1, "alder", "pike", "North"),
            Made.assessment(1, 30, 1.2, "STRONG"),
            Made.standing(1, "WATCH", 0.6),
            Made.catchLimit(1, 12),
            Made.uptake(1, 3400, "2026-09-03", "West Cooperative"));
    private final Entry critical = Made.entry(
            Made.stock(2, "alder", "perch", "North"),
            Made.assessment(2, 10, 0.7, "FAIR"),
            Made.standing(2, "CRITICAL", -0.1),
            Made.catchLimit(2, 9),
            Made.uptake(2, 8000, "2026-08-01", "West Cooperative"));
    private final Entry closed = Made.entry(
            Made.stock(3, "birch", "pike", null),
            Made.assessment(3, 5, 0.3, "FAIR", true),
            Made.standing(3, "STRAINED", 1.0),
            null,
            null);
    private final Entry unassessed = Made.entry(Made.stock(4, "cedar", "pike", null), null, null, null, null);
    private final List<Entry> all = List.of(watched, critical, closed, unassessed);

    @BeforeEach
    void english() {
        LocaleContextHolder.setLocale(Locale.UK);
    }

    @AfterEach
    void reset() {
        LocaleContextHolder.resetLocaleContext();
    }

    private PortfolioView.Row row(Entry entry) {
        return rows.row(entry);
    }

    @Test
    void opensWithTheCountsAndTheSeason() {
        String lede = String.join(" ", views.view(all, PortfolioQuery.ALL).lede());
        assertThat(lede)
                .startsWith(
                        "4 stocks in 3 waters: 2 strained or worse, one watched, one not yet assessed. 21\u00a0t are"
                                + " allowed this season; 11.4\u00a0t are recorded up to 1 Aug 2026.")
                .endsWith("One cooperative has been silent for more than six weeks: West Cooperative.");
    }

    @Test
    void saysThatThePossibleYieldIsNotAttainable() {
        assertThat(views.view(all, PortfolioQuery.ALL).possible())
                .contains("3 assessed stocks")
                .contains("45\u00a0t")
                .contains("not attainable together and not spare catch");
        assertThat(views.view(List.of(unassessed), PortfolioQuery.ALL).possible())
                .isNull();
    }

    @Test
    void aRowHoldsFinishedStrings() {
        PortfolioView.Row row = row(watched);
        assertThat(row.address()).isEqualTo("/stocks/alder/PIKE");
        assertThat(row.msy()).isEqualTo("30 (24–37.5)");
        assertThat(row.yield()).isEqualTo("30");
        assertThat(row.biomass()).isEqualTo("1.2 (0.96–1.5)");
        assertThat(row.margin()).isEqualTo("60% (15%)");
        assertThat(row.limit()).isEqualTo("12\u00a0t");
        assertThat(row.taken()).isEqualTo("3.4\u00a0t");
        assertThat(row.takenBar()).contains("3.4\u00a0t of 9.9\u00a0t to be logged");
        assertThat(row.evidence()).isEqualTo("strong");
        assertThat(row.assessed()).isEqualTo("3 Feb 2026");
    }

    @Test
    void aClosedStockShowsBiomassInsteadOfAMargin() {
        assertThat(row(closed).margin()).isEqualTo("closed");
        assertThat(row(closed).marginBar()).isEmpty();
        assertThat(row(closed).biomass()).isEqualTo("0.3 (0.24–0.375)");
    }

    /** Neither a limit nor an assessed season: a margin of 100 % would count from removals that nobody knows. */
    @Test
    void withoutKnownRemovalsThereIsNoMargin() {
        Entry lakeOnly = Made.entry(
                Made.stock(5, "dove", "pike", null),
                Made.assessment(5, 5, 1.6, "NONE"),
                Made.standing(5, "WATCH", 1.0, 0, "none"),
                null,
                null);
        assertThat(row(lakeOnly).margin()).isEqualTo("—");
        assertThat(row(lakeOnly).marginBar()).isEmpty();
        assertThat(new PortfolioSheet(texts, rows)
                        .rows(List.of(lakeOnly))
                        .get(0)
                        .subList(3, 5))
                .containsOnlyNulls();
        assertThat(Column.MARGIN.order(false).compare(lakeOnly, watched)).isPositive();
        assertThat(Column.MARGIN.order(true).compare(lakeOnly, watched)).isPositive();
    }

    @Test
    void saysWhetherWidthOrWantOfEvidenceDecides() {
        assertThat(known("STRONG")).isEqualTo("mainly because the range is wide");
        assertThat(known("FAIR")).isEqualTo("mainly because the range is wide");
        assertThat(known("THIN")).isEqualTo("mainly because little is known");
        assertThat(known("NONE")).isEqualTo("mainly because little is known");
        assertThat(row(watched).littleKnown()).isEmpty();
    }

    private String known(String strength) {
        return row(Made.entry(
                        Made.stock(6, "elm", "pike", null),
                        Made.assessment(6, 5, 1.6, strength),
                        Made.wide(6, "STRAINED"),
                        null,
                        null))
                .littleKnown();
    }

    @Test
    void anUnassessedStockHasBlankNumbers() {
        PortfolioView.Row row = row(unassessed);
        assertThat(row.standing()).isEqualTo("not assessed");
        assertThat(List.of(row.margin(), row.msy(), row.yield(), row.biomass(), row.biomassLine(), row.limit()))
                .containsOnly("");
    }

    @Test
    void marksTheSortedColumn() {
        PortfolioQuery query = new PortfolioQuery(null, null, null, null, null, null, "msy", "desc", null);
        assertThat(views.view(all, query).headers())
                .filteredOn(h -> !h.ariaSort().equals("none"))
                .singleElement()
                .satisfies(h -> {
                    assertThat(h.ariaSort()).isEqualTo("descending");
                    assertThat(h.label()).startsWith("MSY");
                    assertThat(h.arrow()).isEqualTo("▼");
                });
    }

    @Test
    void offersWhatTheStocksHoldAndKeepsTheChoice() {
        PortfolioQuery query = new PortfolioQuery(null, "North", null, null, null, null, null, null, null);
        PortfolioView view = views.view(all, query);
        assertThat(view.lede().get(0)).isEqualTo("2 stocks of 4 fit what you asked for.");
        PortfolioView.Field district = view.fields().get(0);
        assertThat(district.options()).extracting(PortfolioView.Option::value).containsExactly("", "North");
        assertThat(district.options())
                .extracting(PortfolioView.Option::selected)
                .containsExactly(false, true);
        assertThat(view.csvAddress()).isEqualTo("/portfolio.csv?district=North");
    }

    /** 12.5 t until the closure of one stock, 7 t of another. */
    @Test
    void whatWasAllowedUntilAClosureCounts() {
        Entry closed = Made.closed(watched.stock(), null, null, Made.catchLimit(1, 12.5), null);
        Entry open = Made.entry(watched.stock(), null, null, Made.catchLimit(1, 7), null);
        assertThat(views.view(List.of(closed, open), PortfolioQuery.ALL).lede().get(1))
                .isEqualTo("19.5\u00a0t are allowed this season;");
        List<Object> cells =
                new PortfolioSheet(texts, rows).rows(List.of(closed)).get(0);
        assertThat(cells.subList(12, 15)).containsExactly(12.5, "t", "2026-06-05T14:00");
    }

    @Test
    void theSheetHoldsTheSameAsNumbers() {
        List<Object> cells =
                new PortfolioSheet(texts, rows).rows(List.of(watched)).get(0);
        assertThat(cells)
                .containsExactly(
                        "Alder Water",
                        "pike",
                        "watch",
                        0.6,
                        0.15,
                        30.0,
                        24.0,
                        37.5,
                        30.0,
                        1.2,
                        0.8 * 1.2,
                        1.5,
                        12.0,
                        "t",
                        null,
                        3.4,
                        "strong",
                        "2026-02-03");
        assertThat(new PortfolioSheet(texts, rows).header()).hasSize(cells.size());
    }
}
