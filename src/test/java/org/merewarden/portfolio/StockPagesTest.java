package org.merewarden.portfolio;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.time.Instant;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import org.junit.jupiter.api.AfterEach;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.MadeDiagnostics;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Verdict;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.NotFound;
import org.springframework.context.i18n.LocaleContextHolder;
import tools.jackson.databind.JsonNode;
import tools.jackson.databind.json.JsonMapper;

class StockPagesTest {
    private static final StockView ALDER = Made.stock(1, "alder", "pike", "North");
    private static final Posterior SIX_SEASONS = Made.posterior(20, 0.25, 1, 6);

    @BeforeEach
    void english() {
        LocaleContextHolder.setLocale(Locale.UK);
    }

    @AfterEach
    void reset() {
        LocaleContextHolder.resetLocaleContext();
    }

    private static StockPage page(Entry entry, Posterior posterior) {
        return new Region().with(entry, posterior).page("alder", "PIKE");
    }

    private static Entry assessed() {
        return Made.entry(
                ALDER,
                Made.assessment(1, 20, 0.9, "FAIR"),
                Made.standing(1, "WATCH", 0.4),
                Made.catchLimit(1, 12),
                Made.uptake(1, 3400, "2026-09-03"));
    }

    private static String text(List<StockPage.Term> terms, String name) {
        return terms.stream()
                .filter(t -> t.name().equals(name))
                .findFirst()
                .orElseThrow()
                .text();
    }

    @Test
    void opensWithStandingBiomassLimitAndWhatTheLimitMeans() {
        assertThat(page(assessed(), SIX_SEASONS).lede())
                .containsExactly(
                        "Pike in Alder Water: watch.",
                        "About 72\u00a0t now (probably 57.6–90\u00a0t, 4 chances in 5), under the level below which less is"
                                + " fished.",
                        "12\u00a0t are allowed in 2026.",
                        "If 12\u00a0t were taken every year and never revised, the stock would in the long run be fished out"
                                + " in about 1 of 9 cases that fit our data. This is not a forecast for this season.");
    }

    @Test
    void saysWhatIsTakenAndLeft() {
        StockPage page = page(assessed(), SIX_SEASONS);
        assertThat(text(page.season(), "To be logged")).isEqualTo("9.9\u00a0t");
        assertThat(text(page.season(), "Taken")).isEqualTo("3.4\u00a0t");
        assertThat(text(page.season(), "Left")).isEqualTo("about 6.5\u00a0t, possibly less");
        assertThat(page.takenBar()).startsWith("<svg");
    }

    @Test
    void aClosedStockIsCalledClosedAndNotOver() {
        Entry closed = Made.closed(
                ALDER,
                Made.assessment(1, 20, 0.9, "FAIR"),
                Made.standing(1, "WATCH", 0.4),
                Made.catchLimit(1, 12.346),
                Made.uptake(1, 3400, "2026-06-01"));
        StockWords words = new StockWords(Made.texts(), new RowBuilder(Made.texts()));
        assertThat(words.lede(closed, 2026))
                .contains("The stock is closed from 5 Jun 2026, 14:00: nothing may be taken until the season ends;"
                        + " 12.346\u00a0t were allowed before.");
        List<StockPage.Term> season = words.season(closed);
        assertThat(text(season, "Limit, all removals"))
                .isEqualTo("closed from 5 Jun 2026, 14:00; 12.346\u00a0t until then");
        assertThat(season).extracting(StockPage.Term::name).doesNotContain("Left");
        PortfolioView.Row row = new RowBuilder(Made.texts()).row(closed);
        assertThat(row.limit()).isEqualTo("closed from 5 Jun 2026, 14:00");
        // (12.346 − 1) · 0.9
        assertThat(row.takenBar()).contains("3.4\u00a0t of 10.211\u00a0t to be logged");
        assertThat(closed.limitTonnes()).isEqualTo(12.346);
        StockPage.Term alone =
                words.season(Made.closed(ALDER, null, null, null, null)).get(0);
        assertThat(alone.text()).isEqualTo("closed from 5 Jun 2026, 14:00");
    }

    @Test
    void explainsFoldTippingBiomassAndReturnTime() {
        StockPage page = page(assessed(), SIX_SEASONS);
        assertThat(text(page.words(), "Fold")).startsWith("No more than about 20\u00a0t a year can last");
        assertThat(text(page.words(), "Tipping biomass")).contains("12\u00a0t").contains("20.5\u00a0t");
        assertThat(text(page.words(), "Return time")).contains("2.3 years");
    }

    @Test
    void historyHoldsWhatTheDrawsAndTheRecordsHold() {
        StockPage page = page(assessed(), SIX_SEASONS);
        JsonNode data = JsonMapper.shared().readTree(page.biomass().json());
        assertThat(data.get("mid")).hasSize(7);
        assertThat(data.get("mid").get(0).get("x").asInt()).isEqualTo(2020);
        // reported 10 t at a reported fraction of one half
        assertThat(data.get("bars").get(0).get("y").asDouble()).isEqualTo(20);
        JsonNode marks = data.get("points").get(1);
        assertThat(marks.get("name").asString()).isEqualTo("marks");
        assertThat(marks.get("points").get(0).get("y").asDouble()).isEqualTo(61.5);
        JsonNode nets = data.get("points").get(0).get("points");
        assertThat(nets.get(1).get("y").asDouble() / nets.get(0).get("y").asDouble())
                .isEqualTo(2);
        assertThat(page.history()).hasSize(7);
        assertThat(page.history().get(3).surveys()).isEqualTo("marks: biomass 61.5\u00a0t");
        assertThat(page.history().get(6).fishing()).isEmpty();
        assertThat(page.biomass().drawing()).doesNotContain("NaN").contains(">2021<");
    }

    @Test
    void saysHowFarTheFoldIsAndHowProbableACollapseCourse() {
        StockPage page = page(assessed(), SIX_SEASONS);
        assertThat(text(page.words(), "Margin to the fold"))
                .isEqualTo("12\u00a0t a year lie under the largest lasting yield by 40% of it (probably 20% to 60%); in"
                        + " about 1 of 7 cases that fit our data they lie above it. It is never spare catch.");
        assertThat(text(page.words(), "Collapse course")).contains("about 1 of 9 cases");
        Entry beyond = Made.entry(
                ALDER,
                Made.assessment(1, 20, 0.9, "FAIR"),
                Made.standing(1, "CRITICAL", -0.3, 26, "limit"),
                Made.catchLimit(1, 26),
                null);
        assertThat(text(page(beyond, SIX_SEASONS).words(), "Margin to the fold"))
                .startsWith("26\u00a0t a year lie above the largest lasting yield by 30% of it (margin probably -50% to"
                        + " -10%)");
    }

    @Test
    void restsOnWhatTheRecordsTaughtAndSaysWhatWouldHelpMost() {
        Posterior told = MadeDiagnostics.with(SIX_SEASONS, MadeDiagnostics.typical());
        StockPage page = page(assessed(), told);
        assertThat(page.basis().strength()).startsWith("Evidence: fair.").endsWith("The estimation settled.");
        assertThat(page.basis().learned())
                .containsExactly(
                        "The records narrowed the range of MSY to about a third of what was thought before.",
                        "Of natural process variation they said next to nothing.",
                        "One estimate of the biomass at the start of the coming season, by mark–recapture for instance,"
                                + " would narrow the range of the coming season’s catch at FMSY by about 18%.");
        assertThat(page.basis().assessment().address()).isEqualTo("/stocks/alder/PIKE/assessments/1");
        assertThat(page.history().get(0).estimated()).isEqualTo("7.5 (7.5–7.5)");
        assertThat(page.history().get(6).estimated()).isEmpty();
        StockPage older = page(assessed(), SIX_SEASONS);
        assertThat(older.basis().learned()).isEmpty();
        assertThat(older.history().get(0).estimated()).isEmpty();
    }

    @Test
    void estimatesKeepSixDigitsAndRegressionsStandApart() {
        StockPage page = page(assessed(), SIX_SEASONS);
        assertThat(page.estimates())
                .containsExactly(
                        new StockPage.Term("Catchability: nets", "0.264203"),
                        new StockPage.Term("MSY, t a year", "19.4525"));
        assertThat(page.regressions())
                .containsExactly(new StockPage.Term("Schaefer: intercept a of catch per effort", "444.454"));
    }

    @Test
    void aStockWithoutAssessmentSaysWhatIsMissing() {
        StockPage page = page(Made.entry(ALDER, null, null, null, null), null);
        assertThat(page.lede()).containsExactly("Pike in Alder Water: not assessed.", "No limit is in force for 2026.");
        assertThat(page.missing()).contains("No assessment is stored yet");
        assertThat(page.equilibrium()).isNull();
        assertThat(page.biomass()).isNull();
    }

    @Test
    void aLakeWithoutSeasonsIsDrawnWithoutHistory() {
        Entry entry = Made.entry(
                ALDER, Made.assessment(1, 20, 0.9, "NONE"), Made.standing(1, "WATCH", 1, 0, "none"), null, null);
        StockPage page = page(entry, Made.posterior(20, 0.25, 1, 0));
        assertThat(page.missing()).contains("come from the lake and the species alone");
        assertThat(page.equilibrium()).isNotNull();
        assertThat(page.biomass()).isNull();
        assertThat(text(page.words(), "Tipping biomass")).startsWith("With nothing taken there is none");
        assertThat(page.lede()).noneMatch(s -> s.contains("taken every year"));
    }

    @Test
    void anUnsettledVerdictComesFirst() {
        AssessmentView a = Made.assessment(1, 20, 0.9, "THIN");
        AssessmentView unsettled = new AssessmentView(
                a.id(),
                1,
                2,
                Instant.EPOCH,
                "anna",
                "0",
                "for a test",
                2020,
                2025,
                false,
                List.of("Too few draws agree."),
                "THIN",
                null,
                null,
                null,
                null,
                null,
                null,
                null,
                null,
                null,
                null,
                null,
                null,
                false,
                List.of());
        Posterior empty = new Posterior(
                "for a test",
                2020,
                new double[0],
                new double[0],
                new double[0],
                new double[0][],
                new double[0][],
                Map.of(),
                EvidenceStrength.THIN,
                new Verdict(false, List.of("Too few draws agree.")));
        StockPage page = page(Made.entry(ALDER, unsettled, null, null, null), empty);
        assertThat(page.lede().get(0)).contains("not settled").endsWith("Too few draws agree.");
        assertThat(page.lede().get(1)).isEqualTo("Pike in Alder Water: assessment without result.");
        assertThat(page.equilibrium()).isNull();
        assertThat(page.assessments())
                .singleElement()
                .satisfies(l -> assertThat(l.label()).contains("not settled"));
    }

    @Test
    void aClosedStockIsToldByItsBiomass() {
        Entry closed = Made.entry(
                ALDER,
                Made.assessment(1, 20, 0.3, "FAIR", true),
                Made.standing(1, "STRAINED", 1, 0, "limit"),
                Made.catchLimit(1, 0),
                null);
        assertThat(page(closed, SIX_SEASONS).lede())
                .containsExactly(
                        "Pike in Alder Water: strained.",
                        "About 24\u00a0t now (probably 19.2–30\u00a0t, 4 chances in 5), under the level below which less is"
                                + " fished.",
                        "Nothing may be taken in 2026.");
    }

    @Test
    void anEffortLimitHasItsUnitAndNoBar() {
        Entry entry = Made.entry(
                ALDER,
                Made.assessment(1, 20, 1.1, "FAIR"),
                Made.standing(1, "SECURE", 0.1, 18, "last removals"),
                Made.limit(1, "effort", 600.0, "net-nights"),
                null);
        StockPage page = page(entry, SIX_SEASONS);
        assertThat(page.lede()).contains("600\u00a0net-nights are allowed in 2026.");
        assertThat(page.lede().get(3)).startsWith("If the 18\u00a0t of the last");
        assertThat(page.takenBar()).isEmpty();
        assertThat(page.season()).extracting(StockPage.Term::name).doesNotContain("Left");
    }

    @Test
    void anUnknownStockIsNotFound() {
        assertThatThrownBy(() -> new Region().page("nowhere", "PIKE")).isInstanceOf(NotFound.class);
    }

    @Test
    void comparisonNamesWhatItCannotDraw() {
        Region region = new Region()
                .with(assessed(), SIX_SEASONS)
                .with(Made.entry(Made.stock(2, "birch", "pike", null), null, null, null, null), null);
        CompareView view =
                region.comparison().view(List.of("alder:PIKE", "birch:PIKE", "x:Y", "alder:PIKE"), Axes.SHARE, null);
        assertThat(view.lede())
                .containsExactly(
                        "The margin to the fold is that of Pike in Alder Water: 40% of its largest lasting yield.",
                        "There is no stock of this name: x:Y.",
                        "Not drawn, because no assessment has a result for it: Pike in Birch Water.");
        assertThat(view.rows()).singleElement().satisfies(r -> {
            assertThat(r.tipping()).isEqualTo("20.5\u00a0t");
            assertThat(r.limit()).isEqualTo("12\u00a0t");
        });
        assertThat(view.axes()).extracting(CompareView.Link::current).containsExactly("page", null, null);
        assertThat(view.axes().get(1).address())
                .isEqualTo(
                        "/portfolio/compare?stock=alder:PIKE&stock=birch:PIKE&stock=x:Y&axes=hectare&focus=alder:PIKE");
    }

    @Test
    void comparisonWithoutStocksExplains() {
        CompareView view = new Region().comparison().view(List.of(), Axes.SHARE, null);
        assertThat(view.drawing()).isNull();
        assertThat(view.lede()).singleElement().asString().startsWith("Choose between one and twelve");
    }
}
